//! Names without their quotes, numbers as values, texts with their escapes resolved.

use crate::span::Span;
use crate::syntax::SyntaxError;

/// A name without its back-quotes.
pub(crate) fn bare_name(written: &str) -> &str {
    match written.strip_prefix('`') {
        Some(inner) => inner.strip_suffix('`').unwrap_or(inner),
        None => written,
    }
}

/// The value of a number as written, `95%` being .95; none where it is beyond all bounds.
pub(crate) fn number(written: &str) -> Option<f64> {
    // Dividing the value of `95%` by 100 rounds twice; moving the exponent rounds once.
    let value: f64 = match written.strip_suffix('%') {
        Some(percent) => match percent.split_once(['e', 'E']) {
            Some((digits, exponent)) => {
                let exponent: i32 = exponent.parse().ok()?;
                format!("{digits}e{}", exponent.checked_sub(2)?).parse().ok()?
            }
            None => format!("{percent}e-2").parse().ok()?,
        },
        None => written.parse().ok()?,
    };
    value.is_finite().then_some(value)
}

/// Whether a text token ends with its closing quotes.
pub(crate) fn is_closed(token: &str, quotes: &str) -> bool {
    let Some(inner) = token.strip_prefix(quotes).and_then(|rest| rest.strip_suffix(quotes)) else {
        return false;
    };
    let backslashes = inner.bytes().rev().take_while(|byte| *byte == b'\\').count();
    backslashes % 2 == 0
}

/// A text without its quotes and with its escapes resolved, which knows where each part of it
/// stands in the source.
pub(crate) struct Cooked {
    /// What the text says.
    pub(crate) text: String,
    /// For each byte of `text` the offset of its source in the full text, and last the end.
    pub(crate) offsets: Vec<usize>,
    /// Offsets in `text` of braces that were escaped and so open no live value.
    pub(crate) escaped_braces: Vec<usize>,
}

impl Cooked {
    /// Resolves a token that starts at `start` of the full text. None, and an error, where an
    /// escape is unknown.
    pub(crate) fn new(token: &str, start: usize, errors: &mut Vec<SyntaxError>) -> Option<Self> {
        let quotes = if token.starts_with("\"\"\"") { "\"\"\"" } else { "\"" };
        let inner = token.strip_prefix(quotes).unwrap_or(token);
        let inner = inner.strip_suffix(quotes).unwrap_or(inner);
        let mut cooked =
            Self { text: String::new(), offsets: Vec::new(), escaped_braces: Vec::new() };
        let start = start + quotes.len();
        let sound = if quotes.len() == 3 {
            cooked.long(inner, start, errors)
        } else {
            cooked.line(inner, start, errors)
        };
        cooked.offsets.push(start + inner.len());
        sound.then_some(cooked)
    }

    /// A long text: what its lines are indented by in common is no part of it, nor is an empty
    /// first or last line.
    fn long(&mut self, inner: &str, start: usize, errors: &mut Vec<SyntaxError>) -> bool {
        let lines: Vec<&str> = inner.split_inclusive('\n').collect();
        let indentation = lines
            .iter()
            .skip(1)
            .filter(|line| !line.trim().is_empty())
            .map(|line| line.len() - line.trim_start_matches([' ', '\t']).len())
            .min()
            .unwrap_or(0);
        let mut sound = true;
        let mut offset = start;
        let last = lines.len().saturating_sub(1);
        for (number, line) in lines.iter().enumerate() {
            let empty = line.trim().is_empty();
            let edge = empty && (number == 0 || number == last) && lines.len() > 1;
            let blanks = line.len() - line.trim_start_matches([' ', '\t']).len();
            let cut = if number == 0 { 0 } else { indentation.min(blanks) };
            if !edge {
                let line = line.get(cut..).unwrap_or_default();
                sound &= self.line(line, offset + cut, errors);
            }
            offset += line.len();
        }
        let closing_line = inner.rsplit_once('\n').is_some_and(|(_, last)| last.trim().is_empty());
        if closing_line && self.text.ends_with('\n') {
            self.text.pop();
            self.offsets.pop();
        }
        sound
    }

    fn line(&mut self, line: &str, start: usize, errors: &mut Vec<SyntaxError>) -> bool {
        let mut sound = true;
        let mut characters = line.char_indices().peekable();
        while let Some((offset, character)) = characters.next() {
            let place = start + offset;
            if character == '\r' && characters.peek().is_some_and(|(_, next)| *next == '\n') {
                continue;
            }
            if character != '\\' {
                self.push(character, place);
                continue;
            }
            match characters.next() {
                Some((_, 'n')) => self.push('\n', place),
                Some((_, 't')) => self.push('\t', place),
                Some((_, same @ ('"' | '\\'))) => self.push(same, place),
                Some((_, '{')) => {
                    self.escaped_braces.push(self.text.len());
                    self.push('{', place);
                }
                other => {
                    errors.push(unknown_escape(other.map(|(_, character)| character), place));
                    sound = false;
                }
            }
        }
        sound
    }

    fn push(&mut self, character: char, place: usize) {
        self.text.push(character);
        self.offsets.extend(std::iter::repeat_n(place, character.len_utf8()));
    }

    /// The place in the full text of a range of `text`.
    pub(crate) fn span(&self, start: usize, end: usize) -> Span {
        let at = |offset: usize| self.offsets.get(offset).copied().unwrap_or_default();
        Span::new(at(start), at(end))
    }
}

fn unknown_escape(character: Option<char>, place: usize) -> SyntaxError {
    let written: String = std::iter::once('\\').chain(character).collect();
    let span = Span::new(place, place + written.len());
    let message = format!("`{written}` means nothing in a text");
    SyntaxError::new(span, message)
        .help("a backslash is written `\\\\`; the others are `\\\"`, `\\n`, `\\t` and `\\{`")
        .fix("Double the backslash", Span::new(place, place + 1), "\\\\")
}

#[cfg(test)]
mod tests {
    use super::*;

    #[track_caller]
    fn cooked(token: &str) -> String {
        let mut errors = Vec::new();
        let cooked = Cooked::new(token, 0, &mut errors).expect("the text has no unknown escape");
        assert_eq!(cooked.offsets.len(), cooked.text.len() + 1);
        cooked.text
    }

    #[test]
    fn escapes_are_resolved() {
        assert_eq!(cooked(r#""a \"b\" \\ c\nd\te""#), "a \"b\" \\ c\nd\te");
        assert_eq!(cooked(r#""\{{x}}""#), "{{x}}");
    }

    #[test]
    fn an_unknown_escape_is_an_error_at_its_place() {
        let mut errors = Vec::new();
        assert!(Cooked::new(r#""C:\data""#, 10, &mut errors).is_none());
        assert_eq!(errors[0].span, Span::new(13, 15));
    }

    #[test]
    fn long_texts_lose_their_indentation() {
        assert_eq!(cooked("\"\"\"one\n  two\n    three\n\"\"\""), "one\ntwo\n  three");
        assert_eq!(cooked("\"\"\"\r\n  one\r\n\r\n  two\"\"\""), "one\n\ntwo");
        assert_eq!(cooked("\"\"\"\"\"\""), "");
    }

    #[test]
    fn percentages_are_shares_of_one() {
        assert_eq!(number("95%"), Some(0.95));
        assert_eq!(number("2.5e1%"), Some(0.25));
        assert_eq!(number(".05"), Some(0.05));
        assert_eq!(number("1e999"), None);
    }

    #[test]
    fn a_closing_quote_that_is_escaped_closes_nothing() {
        assert!(is_closed(r#""a""#, "\""));
        assert!(is_closed(r#""a\\""#, "\""));
        assert!(!is_closed(r#""a\""#, "\""));
        assert!(!is_closed("\"", "\""));
        assert!(!is_closed("\"\"\"\"\"", "\"\"\""));
    }
}
