//! A table as Markdown: a caption, a table in the GitHub dialect, notes.

use unicode_width::UnicodeWidthStr;

use super::Format;
use super::page_markdown;
use crate::rich::{Rich, Style};
use crate::table::{ColumnKind, Table};

/// Markdown, for documents and issue trackers.
pub const FORMAT: Format = Format {
    name: "markdown",
    media_type: "text/markdown",
    extension: "md",
    table,
    page: page_markdown::page,
};

/// The table, ending in a line break.
///
/// Markdown has one row of heads: a head above the heads goes before each of those below it.
#[must_use]
pub fn table(table: &Table) -> String {
    let mut parts: Vec<String> = Vec::new();
    if let Some(caption) = caption(table) {
        parts.push(caption.markdown());
    }
    if table.width() > 0 {
        parts.push(grid(table));
    }
    if let Some(notes) = table.notes_paragraph() {
        parts.push(notes.markdown());
    }
    format!("{}\n", parts.join("\n\n"))
}

/// Strong, also where the table has no number, so that it does not read as running text.
fn caption(table: &Table) -> Option<Rich> {
    if table.label.is_some() {
        return table.caption();
    }
    let mut strong = Rich::default();
    for run in table.caption()?.runs {
        let style = if run.style == Style::Plain { Style::Strong } else { run.style };
        strong.push(run.text, style);
    }
    Some(strong)
}

fn grid(table: &Table) -> String {
    let columns: Vec<ColumnKind> = (0..table.width()).map(|column| table.kind(column)).collect();
    let heads: Vec<String> =
        (0..columns.len()).map(|column| head(table, column).markdown()).collect();
    let mut lines = vec![heads];
    for row in &table.rows {
        let cells = row.cells.iter().map(|cell| cell.rich().markdown());
        let missing = std::iter::repeat_n(String::new(), columns.len() - row.cells.len());
        lines.push(cells.chain(missing).collect());
    }
    let widths: Vec<usize> = (0..columns.len())
        .map(|column| {
            lines.iter().filter_map(|line| line.get(column)).map(|cell| cell.width()).max()
        })
        .map(|width| width.unwrap_or(0).max(3))
        .collect();
    let mut out: Vec<String> =
        lines.iter().map(|line| grid_line(line, &widths, &columns)).collect();
    out.insert(1, ruler(&widths, &columns));
    out.join("\n")
}

fn head(table: &Table, column: usize) -> Rich {
    let head = table.head(column);
    match table.columns.get(column).and_then(|column| column.spanner.clone()) {
        None => head,
        Some(spanner) if head.is_empty() => spanner,
        Some(spanner) => spanner.then(Rich::plain(": ")).then(head),
    }
}

fn grid_line(cells: &[String], widths: &[usize], columns: &[ColumnKind]) -> String {
    let mut line = String::from("|");
    for ((cell, width), kind) in cells.iter().zip(widths).zip(columns) {
        let gap = " ".repeat(width.saturating_sub(cell.width()));
        let padded = match kind {
            ColumnKind::Value => format!(" {gap}{cell} |"),
            ColumnKind::RowHead | ColumnKind::Words => format!(" {cell}{gap} |"),
        };
        line.push_str(&padded);
    }
    line
}

fn ruler(widths: &[usize], columns: &[ColumnKind]) -> String {
    let mut line = String::from("|");
    for (width, kind) in widths.iter().zip(columns) {
        let dashes = "-".repeat(width - 1);
        let padded = match kind {
            ColumnKind::Value => format!(" {dashes}: |"),
            ColumnKind::RowHead | ColumnKind::Words => format!(" :{dashes} |"),
        };
        line.push_str(&padded);
    }
    line
}
