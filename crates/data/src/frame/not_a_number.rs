//! What is said when a column is not all numbers, and how it may be mended.

use std::collections::BTreeSet;
use std::fmt;

use polars::prelude::StringChunked;

use super::Notation;
use super::number::{Unparsed, parse_number};
use crate::clause::clause;

/// How many characters of a cell a message shows.
const SHOWN: usize = 40;

/// A column that was asked for as numbers and is not.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
pub enum NotANumber {
    /// The table has no such column.
    #[error("there is no column `{column}`")]
    NoSuchColumn {
        /// What was asked for.
        column: String,
    },
    /// The column has cells that are not numbers.
    #[error(transparent)]
    Cell(Box<BadCell>),
}

/// The first cell of a column that is not a number.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct BadCell {
    /// The column.
    pub column: String,
    /// The row of the table, counted from 1 after the header.
    pub row: usize,
    /// The line of the file on which that row starts, counted from 1.
    pub line: usize,
    /// What stands in the cell.
    pub text: String,
    /// How many cells of the column are not numbers.
    pub count: usize,
    /// What would most likely mend it.
    pub mend: Mend,
}

/// What would most likely mend a column that is not all numbers.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Mend {
    /// The numbers have a decimal comma that was not declared.
    DeclareDecimalComma,
    /// The numbers have a decimal point, and a decimal comma was declared.
    DropDecimalComma,
    /// The numbers have a comma between thousands.
    RemoveThousands,
    /// A word stands for a missing value.
    DeclareMissing {
        /// All words to declare: those declared already, then those found.
        words: Vec<String>,
    },
    /// An infinite number stands in the cell.
    RemoveInfinity,
    /// No cell is a number: the column tells groups apart, or holds remarks.
    UseAsText,
    /// The cell is to be corrected in the file.
    CorrectCell,
}

impl NotANumber {
    /// What to do, for the line below the message.
    #[must_use]
    pub fn help(&self) -> Option<String> {
        match self {
            Self::NoSuchColumn { .. } => None,
            Self::Cell(bad) => Some(bad.help()),
        }
    }

    /// The clause of the `read` statement that mends it, where one does.
    #[must_use]
    pub fn clause(&self) -> Option<String> {
        match self {
            Self::NoSuchColumn { .. } => None,
            Self::Cell(bad) => bad.mend.clause(),
        }
    }
}

impl fmt::Display for BadCell {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        let Self { column, row, line, text, count, .. } = self;
        match count {
            1 => write!(out, "`{column}` has a cell that is not a number: ")?,
            _ => write!(out, "`{column}` has {count} cells that are not numbers, first ")?,
        }
        let shown: String = match text.char_indices().nth(SHOWN) {
            Some((end, _)) => format!("{}...", text.get(..end).unwrap_or_default()),
            None => text.clone(),
        };
        write!(out, "{shown:?} in row {row} (line {line} of the file)")
    }
}

impl std::error::Error for BadCell {}

impl BadCell {
    fn help(&self) -> String {
        match (&self.mend, self.mend.clause()) {
            (Mend::DeclareMissing { .. }, Some(clause)) => {
                format!("if it stands for a missing value, write `{clause}` after `read`")
            }
            (_, Some(clause)) => {
                format!("if the numbers have a decimal comma, write `{clause}` after `read`")
            }
            (mend, None) => mend.in_the_file().to_owned(),
        }
    }
}

impl Mend {
    fn clause(&self) -> Option<String> {
        match self {
            Self::DeclareDecimalComma => Some(clause("decimal", [","])),
            Self::DeclareMissing { words } => {
                Some(clause("missing", words.iter().map(String::as_str)))
            }
            Self::DropDecimalComma
            | Self::RemoveThousands
            | Self::RemoveInfinity
            | Self::UseAsText
            | Self::CorrectCell => None,
        }
    }

    /// What to do where no clause mends it.
    fn in_the_file(&self) -> &'static str {
        match self {
            Self::DropDecimalComma => "the numbers have a decimal point: leave out `decimal \",\"`",
            Self::RemoveThousands => {
                "the commas seem to set off thousands: remove them in the file"
            }
            Self::RemoveInfinity => {
                "an infinite value can't be analysed: correct the cell in the file, or empty it"
            }
            Self::UseAsText => "no cell of this column is a number: it can serve as a factor",
            Self::DeclareDecimalComma | Self::DeclareMissing { .. } | Self::CorrectCell => {
                "correct the cell in the file, or empty it if the value is missing"
            }
        }
    }
}

/// What is wrong with a column that has at least one cell that is not a number.
pub(super) fn describe(
    column: &str,
    cells: &StringChunked,
    lines: &[u32],
    notation: &Notation,
) -> BadCell {
    let is_bad = |cell: &str| parse_number(cell, notation.decimal).is_err();
    let found = || cells.iter().enumerate().filter_map(|(row, cell)| Some((row, cell?)));
    let bad: Vec<&str> = found().map(|(_, cell)| cell).filter(|cell| is_bad(cell)).collect();
    let numbers = found().count() - bad.len();
    let (row, text) = found().find(|(_, cell)| is_bad(cell)).unwrap_or_default();
    BadCell {
        column: column.to_owned(),
        row: row + 1,
        line: lines.get(row).map_or(0, |&line| line as usize),
        text: text.to_owned(),
        count: bad.len(),
        mend: mend(&bad, numbers, notation),
    }
}

fn mend(bad: &[&str], numbers: usize, notation: &Notation) -> Mend {
    let all_parse_with = |sign| bad.iter().all(|cell| parse_number(cell, sign).is_ok());
    if notation.decimal != ','
        && bad.iter().all(|cell| has_thousands(cell))
        && notation.separator != ';'
    {
        return Mend::RemoveThousands;
    }
    if notation.decimal == '.' && all_parse_with(',') {
        return Mend::DeclareDecimalComma;
    }
    if notation.decimal == ',' && all_parse_with('.') {
        return Mend::DropDecimalComma;
    }
    if bad.iter().any(|cell| parse_number(cell, notation.decimal) == Err(Unparsed::Infinite)) {
        return Mend::RemoveInfinity;
    }
    if numbers == 0 {
        return Mend::UseAsText;
    }
    let distinct: BTreeSet<&str> = bad.iter().map(|cell| cell.trim()).collect();
    let repeated = distinct.len() == 1
        && bad.len() > 1
        && bad.iter().all(|cell| !cell.chars().any(char::is_numeric));
    if repeated || distinct.iter().all(|cell| stands_for_missing(cell)) {
        let declared = notation.missing.declared().iter().map(String::as_str);
        let words = declared.chain(distinct).map(str::to_owned).collect();
        return Mend::DeclareMissing { words };
    }
    Mend::CorrectCell
}

/// Words and signs that files commonly hold where a value is missing.
fn stands_for_missing(cell: &str) -> bool {
    let word = cell.to_lowercase();
    let words = ["na", "n/a", "#n/a", "n.a.", "nan", "null", "none", "nil", "missing", "unknown"];
    let signs = [".", "..", "-", "--", "\u{2013}", "\u{2014}", "?", "*"];
    words.contains(&word.as_str()) || signs.contains(&word.as_str())
}

/// Whether commas set off groups of three digits, as in 12,345.6.
fn has_thousands(cell: &str) -> bool {
    let cell = cell.trim().trim_start_matches(['+', '-', '\u{2212}']);
    let whole = cell.split_once('.').map_or(cell, |(whole, _)| whole);
    let mut groups = whole.split(',');
    let digits = |group: &str| group.bytes().all(|byte| byte.is_ascii_digit());
    let first = groups.next().unwrap_or_default();
    let mut rest = groups.peekable();
    (1..=3).contains(&first.len())
        && digits(first)
        && !first.starts_with('0')
        && rest.peek().is_some()
        && rest.all(|group| group.len() == 3 && digits(group))
}
