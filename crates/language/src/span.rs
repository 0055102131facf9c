//! Places in text: byte offsets inside, converted only at the edges (UTF-16 in the server, code
//! points in the kernel).

use std::ops::Range;

/// A half-open range of byte offsets in one source text.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct Span {
    /// First byte.
    pub start: usize,
    /// One past the last byte.
    pub end: usize,
}

impl Span {
    /// The range `start..end`.
    #[must_use]
    pub fn new(start: usize, end: usize) -> Self {
        Self { start, end }
    }

    /// Whether `offset` lies in the span or touches its end, as a cursor does.
    #[must_use]
    pub fn touches(self, offset: usize) -> bool {
        self.start <= offset && offset <= self.end
    }

    /// The text that the span covers, or nothing where the span does not fit the text.
    #[must_use]
    pub fn of(self, text: &str) -> &str {
        text.get(self.range()).unwrap_or_default()
    }

    /// The span as a standard range.
    #[must_use]
    pub fn range(self) -> Range<usize> {
        self.start..self.end
    }

    /// The span moved right by `by` bytes.
    #[must_use]
    pub fn shifted(self, by: usize) -> Self {
        Self { start: self.start + by, end: self.end + by }
    }
}

/// A value and where it was written.
#[derive(Clone, Debug, PartialEq)]
pub struct Spanned<T> {
    /// What was written.
    pub value: T,
    /// Where.
    pub span: Span,
}

/// A name as written, without its back-quotes.
pub type Name = Spanned<String>;

/// Which source of a document: a script and a Markdown file have one, a notebook one a cell.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct SourceId(pub usize);

/// A span in one source of a document.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct Location {
    /// The source.
    pub source: SourceId,
    /// The range of bytes in it.
    pub span: Span,
}
