//! A table as journals print it: a caption, heads, rows, notes. It knows no statistics.

use crate::number::DASH;
use crate::rich::Rich;
use crate::value::Value;

/// A table.
///
/// ```
/// use tussock_report::table::{Column, Placed, Row, Table};
/// use tussock_report::value::Value;
/// let path = |key| ["main", "omnibus", "pillai", key];
/// let table = Table::new("Multivariate tests")
///     .column(Column::row_head("Criterion"))
///     .column(Column::value("*V*"))
///     .column(Column::value("*p*"))
///     .row(
///         Row::headed("Pillai's trace")
///             .number(Placed::new(Value::bounded(0.3812), path("value")))
///             .number(Placed::new(Value::p(3e-10, -21.9), path("p"))),
///     )
///     .note("The criterion was fixed in advance.");
/// let paths: Vec<String> = table.placed().map(Placed::path_text).collect();
/// assert_eq!(paths, ["main.omnibus.pillai.value", "main.omnibus.pillai.p"]);
/// ```
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Table {
    /// What numbers the table in a document, such as `Table 2`.
    pub label: Option<Rich>,
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
    /// Whether a new block of rows begins here (a gap above).
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

impl Table {
    /// A table with this caption and nothing else yet.
    pub fn new(title: impl Into<Rich>) -> Self {
        Self { title: title.into(), ..Self::default() }
    }

    /// The same with what numbers it in a document, such as `Table 2`.
    #[must_use]
    pub fn label(mut self, label: impl Into<Rich>) -> Self {
        self.label = Some(label.into());
        self
    }

    /// The same with a column added at the right.
    #[must_use]
    pub fn column(mut self, column: Column) -> Self {
        self.columns.push(column);
        self
    }

    /// The same with columns added at the right.
    #[must_use]
    pub fn columns(mut self, columns: impl IntoIterator<Item = Column>) -> Self {
        self.columns.extend(columns);
        self
    }

    /// The same with a row added below.
    #[must_use]
    pub fn row(mut self, row: Row) -> Self {
        self.rows.push(row);
        self
    }

    /// The same with rows added below.
    #[must_use]
    pub fn rows(mut self, rows: impl IntoIterator<Item = Row>) -> Self {
        self.rows.extend(rows);
        self
    }

    /// The same with a note added.
    #[must_use]
    pub fn note(mut self, note: impl Into<Rich>) -> Self {
        self.notes.push(note.into());
        self
    }

    /// Every value with its path, row by row; an interval gives its lower and its upper limit.
    pub fn placed(&self) -> impl Iterator<Item = &Placed> {
        self.rows.iter().flat_map(|row| &row.cells).flat_map(Cell::placed)
    }

    /// The number of columns that a renderer has to draw: that of the widest row where one has more
    /// cells than there are columns, so that no cell is lost.
    pub(crate) fn width(&self) -> usize {
        let widest = self.rows.iter().map(|row| row.cells.len()).max().unwrap_or(0);
        widest.max(self.columns.len())
    }

    /// The kind of a column; a column beyond the last holds values.
    pub(crate) fn kind(&self, column: usize) -> ColumnKind {
        self.columns.get(column).map_or(ColumnKind::Value, |column| column.kind)
    }

    /// The head of a column; a column beyond the last has none.
    pub(crate) fn head(&self, column: usize) -> Rich {
        self.columns.get(column).map(|column| column.head.clone()).unwrap_or_default()
    }

    /// The heads above the heads, from left to right, so that every column is under one of them.
    pub(crate) fn spanners(&self) -> Vec<Spanner<'_>> {
        let mut spanners: Vec<Spanner<'_>> = Vec::new();
        for index in 0..self.width() {
            let text = self.columns.get(index).and_then(|column| column.spanner.as_ref());
            match spanners.last_mut() {
                Some(last) if text.is_some() && last.text == text => last.columns += 1,
                Some(_) | None => spanners.push(Spanner { text, first: index, columns: 1 }),
            }
        }
        spanners
    }

    /// Whether any column has a head above its head.
    pub(crate) fn is_spanned(&self) -> bool {
        self.columns.iter().any(|column| column.spanner.is_some())
    }

    /// `Table 2. The caption`, or what there is of it.
    pub(crate) fn caption(&self) -> Option<Rich> {
        match &self.label {
            None if self.title.is_empty() => None,
            None => Some(self.title.clone()),
            Some(label) => {
                let mut caption = Rich::default();
                caption.push(label.text(), crate::rich::Style::Strong);
                if !self.title.is_empty() {
                    caption.push(".", crate::rich::Style::Strong);
                    caption = caption.then(Rich::plain(" ")).then(self.title.clone());
                }
                Some(caption)
            }
        }
    }

    /// All notes as one paragraph with its lead.
    pub(crate) fn notes_paragraph(&self) -> Option<Rich> {
        if self.notes.iter().all(Rich::is_empty) {
            return None;
        }
        let notes = self.notes.iter().filter(|note| !note.is_empty()).cloned();
        Some(Rich::parse("*Note.* ").then(Rich::join(notes, " ")))
    }
}

/// A head above the heads of neighbouring columns, or the place of one.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(crate) struct Spanner<'a> {
    /// The head; none where the column has no head above its own.
    pub(crate) text: Option<&'a Rich>,
    /// The index of the first column below it.
    pub(crate) first: usize,
    /// The number of columns below it.
    pub(crate) columns: usize,
}

impl Column {
    /// A column whose cells are the heads of their rows.
    pub fn row_head(head: impl Into<Rich>) -> Self {
        Self::new(head, ColumnKind::RowHead)
    }

    /// A column of numbers or intervals.
    pub fn value(head: impl Into<Rich>) -> Self {
        Self::new(head, ColumnKind::Value)
    }

    /// A column of words.
    pub fn words(head: impl Into<Rich>) -> Self {
        Self::new(head, ColumnKind::Words)
    }

    /// The same under a head that it shares with its neighbours of the same spanner.
    #[must_use]
    pub fn under(mut self, spanner: impl Into<Rich>) -> Self {
        self.spanner = Some(spanner.into());
        self
    }

    fn new(head: impl Into<Rich>, kind: ColumnKind) -> Self {
        Self { head: head.into(), spanner: None, kind }
    }
}

impl Row {
    /// A row without cells yet.
    #[must_use]
    pub fn new() -> Self {
        Self::default()
    }

    /// A row that begins with its head.
    pub fn headed(head: impl Into<Rich>) -> Self {
        Self::new().text(head)
    }

    /// The same with a gap above, because a new block of rows begins with it.
    #[must_use]
    pub fn opening_block(mut self) -> Self {
        self.opens_block = true;
        self
    }

    /// The same with a cell added.
    #[must_use]
    pub fn cell(mut self, cell: impl Into<Cell>) -> Self {
        self.cells.push(cell.into());
        self
    }

    /// The same with cells added.
    #[must_use]
    pub fn cells(mut self, cells: impl IntoIterator<Item = impl Into<Cell>>) -> Self {
        self.cells.extend(cells.into_iter().map(Into::into));
        self
    }

    /// The same with a cell of words added.
    #[must_use]
    pub fn text(self, text: impl Into<Rich>) -> Self {
        self.cell(Cell::Text(text.into()))
    }

    /// The same with a number added.
    #[must_use]
    pub fn number(self, number: impl Into<Placed>) -> Self {
        self.cell(Cell::Number(number.into()))
    }

    /// The same with `[lower, upper]` added.
    #[must_use]
    pub fn interval(self, lower: impl Into<Placed>, upper: impl Into<Placed>) -> Self {
        self.cell(Cell::Interval { lower: lower.into(), upper: upper.into() })
    }

    /// The same with an empty cell added.
    #[must_use]
    pub fn empty(self) -> Self {
        self.cell(Cell::Empty)
    }

    /// The same with a dash added: the number does not exist here, and a note says why.
    #[must_use]
    pub fn undefined(self) -> Self {
        self.cell(Cell::Undefined)
    }
}

impl Cell {
    /// The values of the cell: none, one, or the two limits of an interval.
    pub fn placed(&self) -> impl Iterator<Item = &Placed> {
        let (first, second) = match self {
            Self::Empty | Self::Text(_) | Self::Undefined => (None, None),
            Self::Number(number) => (Some(number), None),
            Self::Interval { lower, upper } => (Some(lower), Some(upper)),
        };
        first.into_iter().chain(second)
    }

    /// What the cell says, by the number rules. An interval without limits is a dash.
    #[must_use]
    pub fn rich(&self) -> Rich {
        match self {
            Self::Empty => Rich::default(),
            Self::Text(text) => text.clone(),
            Self::Number(number) => Rich::plain(number.value.text()),
            Self::Interval { lower, upper } => {
                let (lower, upper) = (lower.value.limit_text(), upper.value.limit_text());
                if lower == DASH && upper == DASH {
                    return Rich::plain(DASH);
                }
                Rich::plain(format!("[{lower}, {upper}]"))
            }
            Self::Undefined => Rich::plain(DASH),
        }
    }
}

impl From<Rich> for Cell {
    fn from(text: Rich) -> Self {
        Self::Text(text)
    }
}

impl From<Placed> for Cell {
    fn from(number: Placed) -> Self {
        Self::Number(number)
    }
}

impl From<Value> for Cell {
    fn from(value: Value) -> Self {
        Self::Number(value.into())
    }
}

impl Placed {
    /// A value and the segments of its path.
    pub fn new(value: Value, path: impl IntoIterator<Item = impl Into<String>>) -> Self {
        Self { value, path: path.into_iter().map(Into::into).collect() }
    }

    /// The path as documents write it: `main.omnibus.pillai.p`, with every segment that is neither a
    /// plain name nor a number in back-quotes; empty where the value has no path.
    #[must_use]
    pub fn path_text(&self) -> String {
        let segments: Vec<String> = self.path.iter().map(|segment| path_segment(segment)).collect();
        segments.join(".")
    }
}

/// A value that documents cannot refer to.
impl From<Value> for Placed {
    fn from(value: Value) -> Self {
        Self { value, path: Vec::new() }
    }
}

fn path_segment(segment: &str) -> String {
    let is_number = !segment.is_empty() && segment.bytes().all(|byte| byte.is_ascii_digit());
    let mut characters = segment.chars();
    let is_name = characters.next().is_some_and(|first| first == '_' || first.is_alphabetic())
        && characters.all(|character| character == '_' || character.is_alphanumeric());
    if is_number || is_name { segment.to_owned() } else { format!("`{segment}`") }
}
