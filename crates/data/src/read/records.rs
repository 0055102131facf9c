//! Where the records of a text of separated values begin and end, and how many cells each has.
//!
//! The grammar is that of RFC 4180 (Shafranovich, 2005, Internet Engineering Task Force, section 2),
//! with any separator and with any kind of line end.

use std::borrow::Cow;
use std::ops::Range;

use super::error::ReadError;

/// A record: a line of a file, or several lines where a quoted cell holds line breaks.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(super) struct Record {
    /// Its bytes, without the line end.
    pub(super) range: Range<usize>,
    /// The line on which it starts, counted from 1.
    pub(super) line: usize,
    /// How many cells it has.
    pub(super) cells: usize,
    /// Whether nothing but blanks stands in it.
    pub(super) blank: bool,
    /// Whether it ends with a line feed (and a carriage return before it, possibly) or with the text.
    pub(super) ends_plainly: bool,
}

/// The records of a text, in order. Ends after the first error.
pub(super) struct Records<'a> {
    text: &'a str,
    separator: u8,
    position: usize,
    line: usize,
}

impl<'a> Records<'a> {
    pub(super) fn new(text: &'a str, separator: u8) -> Self {
        Self { text, separator, position: 0, line: 1 }
    }

    fn byte(&self, position: usize) -> Option<u8> {
        self.text.as_bytes().get(position).copied()
    }

    /// Moves behind the cell that starts here.
    fn skip_cell(&mut self) -> Result<(), ReadError> {
        let start = self.line;
        if self.byte(self.position) == Some(b'"') {
            self.position += 1;
            loop {
                match self.byte(self.position) {
                    Some(b'"') if self.byte(self.position + 1) == Some(b'"') => self.position += 1,
                    Some(b'"') => break,
                    Some(b'\n') => self.line += 1,
                    Some(b'\r') if self.byte(self.position + 1) != Some(b'\n') => self.line += 1,
                    Some(_) => {}
                    None => return Err(ReadError::UnclosedQuote { line: start }),
                }
                self.position += 1;
            }
            self.position += 1;
        }
        let quoted = self.position;
        while let Some(byte) = self.byte(self.position) {
            match byte {
                b'\n' | b'\r' => break,
                _ if byte == self.separator => break,
                b'"' => return Err(ReadError::StrayQuote { line: self.line }),
                _ => self.position += 1,
            }
        }
        // Behind a closing quotation mark nothing may stand, wherever it was opened.
        let closed = quoted.checked_sub(1).and_then(|position| self.byte(position)) == Some(b'"');
        match closed && self.position > quoted {
            true => Err(ReadError::StrayQuote { line: self.line }),
            false => Ok(()),
        }
    }

    fn record(&mut self) -> Result<Record, ReadError> {
        let (start, line) = (self.position, self.line);
        let mut cells = 1;
        self.skip_cell()?;
        while self.byte(self.position) == Some(self.separator) {
            self.position += 1;
            cells += 1;
            self.skip_cell()?;
        }
        let range = start..self.position;
        let ends_plainly = match (self.byte(self.position), self.byte(self.position + 1)) {
            (Some(b'\r'), Some(b'\n')) => {
                self.position += 2;
                true
            }
            (end, _) => {
                self.position += usize::from(end.is_some());
                end != Some(b'\r')
            }
        };
        self.line += 1;
        let blank = cells == 1
            && self.text.get(range.clone()).is_some_and(|record| record.trim().is_empty());
        Ok(Record { range, line, cells, blank, ends_plainly })
    }
}

impl Iterator for Records<'_> {
    type Item = Result<Record, ReadError>;

    fn next(&mut self) -> Option<Self::Item> {
        if self.position >= self.text.len() {
            return None;
        }
        let record = self.record();
        if record.is_err() {
            self.position = self.text.len();
        }
        Some(record)
    }
}

/// The cells of a record, without the quotation marks around them.
pub(super) fn cells<'a>(
    text: &'a str,
    record: &Record,
    separator: u8,
) -> impl Iterator<Item = Cow<'a, str>> {
    let mut rest = text.get(record.range.clone());
    std::iter::from_fn(move || {
        let record = rest?;
        let mut quoted = false;
        let end = record.bytes().position(|byte| {
            quoted ^= byte == b'"';
            byte == separator && !quoted
        });
        let (cell, after) = match end {
            Some(end) => (record.get(..end)?, record.get(end + 1..)),
            None => (record, None),
        };
        rest = after;
        let inner = cell.strip_prefix('"').and_then(|cell| cell.strip_suffix('"'));
        Some(match inner {
            Some(inner) if inner.contains('"') => inner.replace("\"\"", "\"").into(),
            Some(inner) => inner.into(),
            None => cell.into(),
        })
    })
}
