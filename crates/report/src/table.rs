//! A table as journals print it: a caption, heads, rows, notes. It knows no statistics.

use crate::rich::Rich;
use crate::value::Value;

/// A table.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Table {
    /// The caption.
    pub title: Rich,
    /// The columns.
    pub columns: Vec<Column>,
    /// The rows; each has a cell for every column.
    pub rows: Vec<Row>,
    /// Notes below the table, each a sentence or more.
    pub notes: Vec<Rich>,
}

/// A column.
#[derive(Clone, Debug, PartialEq)]
pub struct Column {
    /// The head.
    pub head: Rich,
    /// A head above this and the neighbouring columns with the same spanner.
    pub spanner: Option<Rich>,
    /// Whether the column's cells are the heads of their rows (set left) or values (set right).
    pub kind: ColumnKind,
}

/// What a column holds.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum ColumnKind {
    /// Heads of rows.
    RowHead,
    /// Numbers and intervals.
    Value,
    /// Words.
    Words,
}

/// A row.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Row {
    /// One a column.
    pub cells: Vec<Cell>,
    /// Whether a new block of rows begins here (a thin rule or a gap above).
    pub opens_block: bool,
}

/// A cell.
#[derive(Clone, Debug, Default, PartialEq)]
pub enum Cell {
    /// Nothing.
    #[default]
    Empty,
    /// Words.
    Text(Rich),
    /// A number.
    Number(Placed),
    /// `[lower, upper]`.
    Interval {
        /// The lower limit.
        lower: Placed,
        /// The upper limit.
        upper: Placed,
    },
    /// A number that does not exist here, shown as a dash; a note says why.
    Undefined,
}

/// A value and the path by which documents refer to it.
#[derive(Clone, Debug, PartialEq)]
pub struct Placed {
    /// The value.
    pub value: Value,
    /// The segments of its path, from the comparison's name on; empty where it has none.
    pub path: Vec<String>,
}
