//! A table of text cells, parsed column by column when asked.
//!
//! Cells are kept as they stand in the file: `01` stays apart from `1`, and a number keeps all the
//! digits that were written.

mod missing;
mod not_a_number;
mod number;
pub mod order;

use std::collections::BTreeMap;
use std::sync::OnceLock;

use polars::prelude::{DataFrame, PolarsResult, StringChunked};

pub(crate) use missing::Missing;
pub use not_a_number::{BadCell, Mend, NotANumber};
use number::parse_number;

/// What the cells of a column are.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Kind {
    /// Every cell that is not missing is a number. A column without any cell counts as well.
    Number,
    /// Some cell is not a number.
    Text,
}

/// A column as groups of rows.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Factor {
    /// The distinct texts: numbers first, in their order, then the others in the order of their
    /// characters.
    pub levels: Vec<String>,
    /// For every row the index of its level; none where the cell is missing.
    pub codes: Vec<Option<usize>>,
}

/// How the cells of a file are to be understood.
#[derive(Clone, Debug)]
pub(crate) struct Notation {
    pub(crate) separator: char,
    pub(crate) decimal: char,
    pub(crate) missing: Missing,
}

/// A table.
#[derive(Clone, Debug)]
pub struct Frame {
    cells: DataFrame,
    /// The line of the file on which each row starts, counted from 1.
    lines: Vec<u32>,
    notation: Notation,
    kinds: Vec<OnceLock<Kind>>,
}

impl Frame {
    /// A table of cells as they were written; those that stand for a missing value become null.
    pub(crate) fn new(
        mut cells: DataFrame,
        lines: Vec<u32>,
        notation: Notation,
    ) -> PolarsResult<Self> {
        for index in 0..cells.width() {
            cells.try_apply_at_idx(index, |column| {
                let missing = &notation.missing;
                let texts = column.str()?;
                if texts.iter().flatten().any(|cell| missing.includes(cell)) {
                    let kept = texts.iter().map(|cell| cell.filter(|cell| !missing.includes(cell)));
                    return Ok(kept.collect::<StringChunked>());
                }
                Ok(texts.clone())
            })?;
        }
        let kinds = vec![OnceLock::new(); cells.width()];
        Ok(Self { cells, lines, notation, kinds })
    }

    /// How many rows it has.
    #[must_use]
    pub fn rows(&self) -> usize {
        self.lines.len()
    }

    /// The names of the columns, in the order of the file.
    #[must_use]
    pub fn names(&self) -> Vec<String> {
        self.cells.get_column_names().into_iter().map(|name| name.to_string()).collect()
    }

    /// What the cells of a column are, or none where there is no such column.
    #[must_use]
    pub fn kind(&self, name: &str) -> Option<Kind> {
        let kept = self.kinds.get(self.cells.get_column_index(name)?)?;
        let cells = self.column(name)?;
        let is_number = |cell: &str| parse_number(cell, self.notation.decimal).is_ok();
        Some(*kept.get_or_init(|| match cells.iter().flatten().all(is_number) {
            true => Kind::Number,
            false => Kind::Text,
        }))
    }

    /// A column as numbers, with NaN where a cell is missing. Numbers are written with a decimal
    /// point, or with the decimal comma that was declared; a sign, an exponent and blanks around are
    /// understood. Infinity is not a number.
    ///
    /// # Errors
    /// When there is no such column, or a cell that is not missing is not a number.
    pub fn numbers(&self, name: &str) -> Result<Vec<f64>, NotANumber> {
        let no_such_column = || NotANumber::NoSuchColumn { column: name.to_owned() };
        let cells = self.column(name).ok_or_else(no_such_column)?;
        let number = |cell: Option<&str>| {
            cell.map_or(Ok(f64::NAN), |cell| parse_number(cell, self.notation.decimal))
        };
        let numbers: Result<Vec<f64>, _> = cells.iter().map(number).collect();
        numbers.map_err(|_| {
            let bad = not_a_number::describe(name, cells, &self.lines, &self.notation);
            NotANumber::Cell(Box::new(bad))
        })
    }

    /// A column as text, exactly as in the file and without quotation marks around; none where a cell
    /// is missing. None at all where there is no such column.
    #[must_use]
    pub fn texts(&self, name: &str) -> Option<Vec<Option<String>>> {
        let cells = self.column(name)?;
        Some(cells.iter().map(|cell| cell.map(str::to_owned)).collect())
    }

    /// The distinct texts of a column, ordered as in [`Factor::levels`], or none where there is no
    /// such column.
    #[must_use]
    pub fn levels(&self, name: &str) -> Option<Vec<String>> {
        let levels = self.ordered(self.column(name)?);
        Some(levels.into_iter().map(str::to_owned).collect())
    }

    /// A column as groups of rows, or none where there is no such column.
    #[must_use]
    pub fn factor(&self, name: &str) -> Option<Factor> {
        let cells = self.column(name)?;
        let levels = self.ordered(cells);
        let codes: BTreeMap<&str, usize> =
            levels.iter().enumerate().map(|(code, level)| (*level, code)).collect();
        let code = |cell: Option<&str>| cell.and_then(|cell| codes.get(cell).copied());
        let codes = cells.iter().map(code).collect();
        Some(Factor { levels: levels.into_iter().map(str::to_owned).collect(), codes })
    }

    fn ordered<'a>(&self, cells: &'a StringChunked) -> Vec<&'a str> {
        order::levels(cells.iter().flatten(), self.notation.decimal)
    }

    fn column(&self, name: &str) -> Option<&StringChunked> {
        self.cells.column(name).ok()?.str().ok()
    }
}
