//! Live values in a prose region of a Markdown text.

use super::{closing, live_value, unclosed};
use crate::ast::LiveValue;
use crate::span::Span;
use crate::syntax::SyntaxError;

/// The live values of a prose region, and what is wrong with it.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Prose {
    /// In the order of the text; their spans reach from `{{` to `}}`.
    pub values: Vec<LiveValue>,
    /// Malformed live values.
    pub errors: Vec<SyntaxError>,
}

/// Finds the live values of a prose region.
///
/// Code spans, fenced code and HTML comments hold none, and `\{{` opens none. A live value ends in the paragraph
/// in which it starts.
#[must_use]
pub fn live_values(text: &str, region: Span) -> Prose {
    let prose = region.of(text);
    let mut found = Prose::default();
    let mut fence: Option<&str> = None;
    let mut offset = 0;
    while offset < prose.len() {
        let rest = prose.get(offset..).unwrap_or_default();
        let at_line_start = offset == 0 || prose.get(..offset).is_some_and(|p| p.ends_with('\n'));
        if at_line_start {
            let line = rest.split_inclusive('\n').next().unwrap_or_default();
            let marker = fence_marker(line);
            match fence {
                Some(open) => {
                    if marker.is_some_and(|marker| closes(marker, open, line)) {
                        fence = None;
                    }
                    offset += line.len();
                    continue;
                }
                None if marker.is_some() => {
                    fence = marker;
                    offset += line.len();
                    continue;
                }
                None => {}
            }
        }
        if let Some(after) = rest.strip_prefix('\\') {
            offset += 1 + after.chars().next().map_or(0, char::len_utf8);
        } else if rest.starts_with('`') {
            offset += code_span(rest);
        } else if rest.starts_with("<!--") {
            offset += rest.find("-->").map_or(rest.len(), |end| end + 3);
        } else if rest.starts_with("{{") {
            offset += braces(rest, region.start + offset, &mut found);
        } else {
            offset += rest.chars().next().map_or(1, char::len_utf8);
        }
    }
    found
}

/// Reads a live value at the start of `rest`, which is at `start` of the full text, and returns how
/// many bytes are done with.
fn braces(rest: &str, start: usize, found: &mut Prose) -> usize {
    let paragraph = paragraph(rest);
    let inner = paragraph.get(2..).unwrap_or_default();
    let Some(length) = closing(inner) else {
        found.errors.push(unclosed(Span::new(start, start + 2)));
        return 2;
    };
    let content = inner.get(..length).unwrap_or_default();
    let whole = length + 4;
    let place = |span: Span| span.shifted(start + 2);
    match live_value(content, Span::new(start, start + whole), place) {
        Ok(value) => found.values.push(value),
        Err(error) => found.errors.push(*error),
    }
    whole
}

/// The text up to the next blank line.
fn paragraph(text: &str) -> &str {
    let mut length = 0;
    for line in text.split_inclusive('\n') {
        if length > 0 && line.trim().is_empty() {
            break;
        }
        length += line.len();
    }
    text.get(..length).unwrap_or(text)
}

/// The length of the code span at the start of `text`, or of the back-quotes alone where nothing
/// closes them.
fn code_span(text: &str) -> usize {
    let quotes = run(text);
    let paragraph = paragraph(text);
    let mut offset = quotes;
    while let Some(next) = paragraph.get(offset..).and_then(|rest| rest.find('`')) {
        offset += next;
        let length = run(paragraph.get(offset..).unwrap_or_default());
        offset += length;
        if length == quotes {
            return offset;
        }
    }
    quotes
}

fn run(text: &str) -> usize {
    text.bytes().take_while(|byte| *byte == b'`').count()
}

/// The back-quotes or tildes that open or close fenced code on this line.
fn fence_marker(line: &str) -> Option<&str> {
    let line = line.trim_start_matches([' ', '\t', '>']);
    let sign = line.chars().next().filter(|sign| matches!(sign, '`' | '~'))?;
    let length = line.chars().take_while(|character| *character == sign).count();
    let (marker, info) = line.split_at_checked(length)?;
    (length >= 3 && !(sign == '`' && info.contains('`'))).then_some(marker)
}

fn closes(marker: &str, open: &str, line: &str) -> bool {
    let bare = line.trim().trim_start_matches('>').trim_start();
    marker.starts_with(open) && bare == marker
}

#[cfg(test)]
mod tests {
    use super::*;

    #[track_caller]
    fn paths(text: &str) -> Vec<String> {
        let prose = live_values(text, Span::new(0, text.len()));
        assert_eq!(prose.errors, []);
        let text_of = |value: &LiveValue| value.span.of(text).to_owned();
        prose.values.iter().map(text_of).collect()
    }

    #[test]
    fn values_are_found_between_words() {
        let text = "So {{main.omnibus.pillai}}, or {{ main.groups.`on duty`.mood.mean 1 }}.";
        let expected = ["{{main.omnibus.pillai}}", "{{ main.groups.`on duty`.mood.mean 1 }}"];
        assert_eq!(paths(text), expected);
    }

    #[test]
    fn code_and_escapes_hold_no_values() {
        assert!(paths("Write `{{main.x}}` or ``{{a`}}``, or \\{{main.x}}.").is_empty());
        assert!(paths("```python\n{{x}}\n```\n").is_empty());
        assert_eq!(paths("~~~\n{{x}}\n~~~\n{{main.x}}"), ["{{main.x}}"]);
        assert_eq!(paths("<!-- {{main.x}} --> {{main.y}} <!-- {{main.z}}"), ["{{main.y}}"]);
        assert_eq!(paths("a stray ` quote\n\n{{main.x}}"), ["{{main.x}}"]);
    }

    #[test]
    fn a_malformed_value_is_an_error_at_its_place() {
        for (text, place) in [
            ("{{}}", "{{}}"),
            ("x {{main.}}", "{{main.}}"),
            ("{{main.x 2.5}}", "2.5"),
            ("{{main.x 99}}", "99"),
            ("{{3.x}}", "3"),
            ("{{main x y}}", "x"),
            ("{{main.x\n\n}}", "{{"),
            ("{{main.x {{main.y}}", "{{"),
        ] {
            let prose = live_values(text, Span::new(0, text.len()));
            let error = prose.errors.first().expect("the value is malformed");
            assert_eq!(error.span.of(text), place, "{text:?}");
        }
    }
}
