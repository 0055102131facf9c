//! A diagnostic as plain text with the line that it is about and a caret below, for terminals and
//! for a notebook's error output.

use crate::diagnostic::{Diagnostic, Severity};
use crate::document::Document;
use crate::span::Location;

/// The whole diagnostic. `place` names a source for the reader: a file's name, a cell's number.
pub fn present(
    diagnostic: &Diagnostic,
    document: &Document,
    place: &dyn Fn(Location) -> String,
) -> String {
    let mut out = format!("{}: {}\n", heading(diagnostic), diagnostic.message);
    out.push_str(&excerpt(document, diagnostic.location, place));
    for related in &diagnostic.related {
        out.push_str(&format!("  {}\n", related.message));
        out.push_str(&excerpt(document, related.location, place));
    }
    if let Some(help) = &diagnostic.help {
        out.push_str(&format!("  help: {help}\n"));
    }
    out
}

/// `error [unknown-column]`.
fn heading(diagnostic: &Diagnostic) -> String {
    format!("{} [{}]", severity_word(diagnostic.severity), diagnostic.rule)
}

/// The word that names a severity to a reader.
#[must_use]
pub fn severity_word(severity: Severity) -> &'static str {
    match severity {
        Severity::Error => "error",
        Severity::Warning => "warning",
        Severity::Information => "note",
    }
}

/// The first line of a location, its number, and carets under the part that is meant.
fn excerpt(document: &Document, location: Location, place: &dyn Fn(Location) -> String) -> String {
    let text = document.text(location.source);
    let line = Line::around(text, location.span.start);
    let number = line.number.to_string();
    let gutter = " ".repeat(number.len());
    let before = text.get(line.start..location.span.start).unwrap_or_default();
    let end = location.span.end.min(line.end).max(location.span.start);
    let meant = text.get(location.span.start..end).unwrap_or_default();
    let indent: String = before.chars().map(|c| if c == '\t' { '\t' } else { ' ' }).collect();
    let carets = "^".repeat(meant.chars().count().max(1));
    format!(
        "  {place}\n  {number} | {source}\n  {gutter} | {indent}{carets}\n",
        place = place(location),
        source = text.get(line.start..line.end).unwrap_or_default(),
    )
}

/// A line of a text.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Line {
    /// Counted from 1.
    pub number: usize,
    /// Its first byte.
    pub start: usize,
    /// One past its last byte, before the line break.
    pub end: usize,
}

impl Line {
    /// The line that holds the byte at `offset`; the last line where the offset lies beyond.
    #[must_use]
    pub fn around(text: &str, offset: usize) -> Self {
        let before = text.get(..offset.min(text.len())).unwrap_or(text);
        let start = before.rfind('\n').map_or(0, |at| at + 1);
        let rest = text.get(start..).unwrap_or_default();
        let length = rest.find('\n').unwrap_or(rest.len());
        let line = rest.get(..length).unwrap_or_default();
        let end = start + line.trim_end_matches('\r').len();
        Self { number: before.matches('\n').count() + 1, start, end }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::span::{SourceId, Span};

    #[test]
    fn carets_stand_under_the_part_that_is_meant() {
        let document = Document::script("show omnibus of main\nshow é functons of main\n");
        let location = Location { source: SourceId(0), span: Span::new(29, 37) };
        let diagnostic = Diagnostic::error("unknown-view", location, "there is no view `functons`")
            .help("did you mean `functions`?");
        let shown = present(&diagnostic, &document, &|_| "a.tus:2".to_owned());
        assert_eq!(
            shown,
            "error [unknown-view]: there is no view `functons`\n  a.tus:2\n  2 | show é functons of main\n    |        ^^^^^^^^\n  help: did you mean `functions`?\n"
        );
    }

    #[test]
    fn a_place_beyond_the_text_shows_the_last_line() {
        let document = Document::script("show\r\n");
        let location = Location { source: SourceId(0), span: Span::new(90, 95) };
        let diagnostic = Diagnostic::error("syntax", location, "something is missing");
        let shown = present(&diagnostic, &document, &|_| "a.tus".to_owned());
        assert!(shown.contains("  2 | \n    | ^\n"), "{shown}");
    }
}
