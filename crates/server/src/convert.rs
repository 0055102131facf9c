//! Positions between the protocol (lines and code units) and the language (bytes).

use tower_lsp::lsp_types::{Position, PositionEncodingKind, Range, TextDocumentContentChangeEvent};
use tussock_language::span::Span;

/// What a `character` of a position counts.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Encoding {
    /// Bytes.
    Utf8,
    /// UTF-16 code units: what a client means that says nothing.
    #[default]
    Utf16,
    /// Code points.
    Utf32,
}

impl Encoding {
    /// The first of the client's encodings that is known here; clients list the best first.
    #[must_use]
    pub fn negotiate(offered: Option<&[PositionEncodingKind]>) -> Self {
        offered.unwrap_or_default().iter().find_map(Self::named).unwrap_or_default()
    }

    fn named(kind: &PositionEncodingKind) -> Option<Self> {
        [Self::Utf8, Self::Utf16, Self::Utf32].into_iter().find(|known| known.kind() == *kind)
    }

    /// Its name in the protocol.
    #[must_use]
    pub fn kind(self) -> PositionEncodingKind {
        match self {
            Self::Utf8 => PositionEncodingKind::UTF8,
            Self::Utf16 => PositionEncodingKind::UTF16,
            Self::Utf32 => PositionEncodingKind::UTF32,
        }
    }

    /// How many units a character takes.
    fn width(self, character: char) -> usize {
        match self {
            Self::Utf8 => character.len_utf8(),
            Self::Utf16 => character.len_utf16(),
            Self::Utf32 => 1,
        }
    }
}

/// Where the lines of one version of a text begin. A line ends at `\n`, `\r\n` or a lone `\r`.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Lines {
    starts: Vec<usize>,
}

impl Lines {
    /// The lines of `text`; an empty text has one.
    #[must_use]
    pub fn of(text: &str) -> Self {
        let bytes = text.as_bytes();
        let breaks = bytes.iter().enumerate().filter(|&(at, byte)| match byte {
            b'\n' => true,
            b'\r' => bytes.get(at + 1) != Some(&b'\n'),
            _ => false,
        });
        let starts = std::iter::once(0).chain(breaks.map(|(at, _)| at + 1)).collect();
        Self { starts }
    }

    /// The byte at a position. A position beyond its line means the line's end, one beyond the
    /// text the text's end, one inside a character the character's start.
    #[must_use]
    pub fn offset(&self, text: &str, position: Position, encoding: Encoding) -> usize {
        let Some(&start) = self.starts.get(position.line as usize) else {
            return text.len();
        };
        let mut left = position.character as usize;
        let mut offset = start;
        for character in self.line(text, position.line as usize).chars() {
            let width = encoding.width(character);
            if width > left {
                break;
            }
            left -= width;
            offset += character.len_utf8();
        }
        offset
    }

    /// The position of a byte. A byte beyond the text means the text's end, one inside a
    /// character the character's start, one inside a line break the line's end.
    #[must_use]
    pub fn position(&self, text: &str, offset: usize, encoding: Encoding) -> Position {
        let line = self.starts.partition_point(|&start| start <= offset).saturating_sub(1);
        let start = self.starts.get(line).copied().unwrap_or_default();
        let units = self
            .line(text, line)
            .char_indices()
            .take_while(|(at, character)| start + at + character.len_utf8() <= offset)
            .map(|(_, character)| encoding.width(character))
            .sum::<usize>();
        Position { line: narrow(line), character: narrow(units) }
    }

    /// The range of a span.
    #[must_use]
    pub fn range(&self, text: &str, span: Span, encoding: Encoding) -> Range {
        Range {
            start: self.position(text, span.start, encoding),
            end: self.position(text, span.end.max(span.start), encoding),
        }
    }

    /// The span of a range; an inverted range is empty.
    #[must_use]
    pub fn span(&self, text: &str, range: Range, encoding: Encoding) -> Span {
        let start = self.offset(text, range.start, encoding);
        let end = self.offset(text, range.end, encoding);
        Span::new(start, end.max(start))
    }

    /// A line without its line break.
    fn line<'a>(&self, text: &'a str, line: usize) -> &'a str {
        let start = self.starts.get(line).copied().unwrap_or(text.len());
        let end = self.starts.get(line + 1).copied().unwrap_or(text.len());
        let whole = text.get(start..end).unwrap_or_default();
        let unbroken = whole.strip_suffix('\n').unwrap_or(whole);
        unbroken.strip_suffix('\r').unwrap_or(unbroken)
    }
}

/// Applies edits to a text, each against the result of the one before.
pub fn apply(text: &mut String, changes: Vec<TextDocumentContentChangeEvent>, encoding: Encoding) {
    for change in changes {
        match change.range {
            None => *text = change.text,
            Some(range) => {
                let span = Lines::of(text).span(text, range, encoding);
                text.replace_range(span.range(), &change.text);
            }
        }
    }
}

/// Lines and columns are 32-bit in the protocol; no text that an editor opens exceeds that.
fn narrow(count: usize) -> u32 {
    u32::try_from(count).unwrap_or(u32::MAX)
}
