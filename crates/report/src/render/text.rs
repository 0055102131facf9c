//! A table in monospaced characters, for terminals and for notebooks without HTML.

use unicode_width::UnicodeWidthStr;

use super::Format;
use super::page_text;
use crate::render::unbreakable::{NO_BREAK_SPACE, unbreakable};
use crate::table::{ColumnKind, Table};

/// Plain text, for terminals.
pub const FORMAT: Format = Format {
    name: "text",
    media_type: "text/plain",
    extension: "txt",
    table,
    page: page_text::page,
};

/// Captions and notes are broken into lines of this width, or of the table's own if it is wider.
pub(super) const MEASURE: usize = 72;

/// What separates two columns.
const GAP: &str = "   ";

/// The table, ending in a line break. It is as wide as its columns take: a terminal that is narrower
/// breaks its lines.
#[must_use]
pub fn table(table: &Table) -> String {
    let grid = Grid::of(table);
    let measure = grid.width().max(MEASURE);
    let mut lines: Vec<String> = Vec::new();
    if let Some(caption) = table.caption() {
        lines.extend(wrapped(&caption.text(), measure));
    }
    if table.width() > 0 {
        lines.extend(grid.lines(table));
    }
    if let Some(notes) = table.notes_paragraph() {
        lines.extend(wrapped(&notes.text(), measure));
    }
    format!("{}\n", lines.join("\n"))
}

/// The texts of all cells, and the width of each column on the screen.
struct Grid {
    kinds: Vec<ColumnKind>,
    heads: Vec<String>,
    rows: Vec<Vec<String>>,
    widths: Vec<usize>,
}

impl Grid {
    fn of(table: &Table) -> Self {
        let count = table.width();
        let heads: Vec<String> = (0..count).map(|column| table.head(column).text()).collect();
        let rows: Vec<Vec<String>> = table
            .rows
            .iter()
            .map(|row| row.cells.iter().map(|cell| cell.rich().text()).collect())
            .collect();
        let mut widths: Vec<usize> = heads.iter().map(|head| head.width()).collect();
        for row in &rows {
            for (width, cell) in widths.iter_mut().zip(row) {
                *width = (*width).max(cell.width());
            }
        }
        let kinds = (0..count).map(|column| table.kind(column)).collect();
        let mut grid = Self { kinds, heads, rows, widths };
        grid.make_room_for_spanners(table);
        grid
    }

    /// Widens the last column under a head that is wider than all columns below it.
    fn make_room_for_spanners(&mut self, table: &Table) {
        for spanner in table.spanners() {
            let Some(text) = spanner.text else { continue };
            let lacking = text.text().width().saturating_sub(self.span(&spanner));
            let last = spanner.first + spanner.columns - 1;
            if let Some(width) = self.widths.get_mut(last) {
                *width += lacking;
            }
        }
    }

    /// The width of the columns below a spanner, with the gaps between them.
    fn span(&self, spanner: &crate::table::Spanner<'_>) -> usize {
        let columns = self.widths.iter().skip(spanner.first).take(spanner.columns);
        columns.sum::<usize>() + GAP.len() * (spanner.columns - 1)
    }

    fn width(&self) -> usize {
        self.widths.iter().sum::<usize>() + GAP.len() * self.widths.len().saturating_sub(1)
    }

    fn lines(&self, table: &Table) -> Vec<String> {
        let rule = "─".repeat(self.width());
        let mut lines = vec![rule.clone()];
        if table.is_spanned() {
            lines.extend(self.spanner_lines(table));
        }
        if self.heads.iter().any(|head| !head.is_empty()) || table.is_spanned() {
            lines.push(self.line(&self.heads));
            lines.push(rule.clone());
        }
        for (index, (row, texts)) in table.rows.iter().zip(&self.rows).enumerate() {
            if row.opens_block && index > 0 {
                lines.push(String::new());
            }
            lines.push(self.line(texts));
        }
        lines.push(rule);
        lines
    }

    /// The heads above the heads, each centred above a rule of its own.
    fn spanner_lines(&self, table: &Table) -> [String; 2] {
        let (mut heads, mut rules) = (Vec::new(), Vec::new());
        for spanner in table.spanners() {
            let width = self.span(&spanner);
            match spanner.text {
                None => {
                    heads.push(" ".repeat(width));
                    rules.push(" ".repeat(width));
                }
                Some(text) => {
                    let text = text.text();
                    let left = width.saturating_sub(text.width()) / 2;
                    let right = width.saturating_sub(text.width() + left);
                    heads.push(format!("{}{text}{}", " ".repeat(left), " ".repeat(right)));
                    rules.push("─".repeat(width));
                }
            }
        }
        [heads, rules].map(|parts| parts.join(GAP).trim_end().to_owned())
    }

    fn line(&self, texts: &[String]) -> String {
        let mut parts: Vec<String> = Vec::new();
        for ((text, width), kind) in texts.iter().zip(&self.widths).zip(&self.kinds) {
            let gap = " ".repeat(width.saturating_sub(text.width()));
            parts.push(match kind {
                ColumnKind::Value => format!("{gap}{text}"),
                ColumnKind::RowHead | ColumnKind::Words => format!("{text}{gap}"),
            });
        }
        parts.join(GAP).trim_end().to_owned()
    }
}

/// The text in lines of at most `measure` columns, broken at spaces, but not within a statistic such
/// as `F(8, 290) = 8.52`; a longer piece has a line of its own.
pub(super) fn wrapped(text: &str, measure: usize) -> Vec<String> {
    let mut lines: Vec<String> = Vec::new();
    let mut line = String::new();
    for piece in unbreakable(text).split(' ').filter(|piece| !piece.is_empty()) {
        if !line.is_empty() && line.width() + 1 + piece.width() > measure {
            lines.push(std::mem::take(&mut line));
        }
        if !line.is_empty() {
            line.push(' ');
        }
        line.push_str(&piece.replace(NO_BREAK_SPACE, " "));
    }
    lines.push(line);
    lines
}

/// A line of program text, with what a terminal would obey taken out.
pub(super) fn code_line(line: &str) -> String {
    crate::rich::printable(&line.replace('\t', "    ")).trim_end().to_owned()
}
