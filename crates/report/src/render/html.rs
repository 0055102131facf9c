//! A table as a fragment of HTML that looks right wherever it is put.
//!
//! Notebooks that were opened but not run strip style sheets and scripts, keep inline styles, and
//! bring a style sheet of their own that stripes rows and sets cells right. So everything that the
//! look needs is said inline, and nothing names a colour: rules follow the text, and the table
//! reads on a light page and on a dark one.

use maud::{Markup, html};

use super::Format;
use super::page_html;
use crate::rich::printable;
use crate::table::{Cell, ColumnKind, Placed, Row, Spanner, Table};

/// HTML, for notebooks and the web.
pub const FORMAT: Format = Format {
    name: "html",
    media_type: "text/html",
    extension: "html",
    table,
    page: page_html::page,
};

/// Shrinks to the table, so that the notes are no wider than it is.
const FRAME: &str = "display:inline-block;max-width:100%;text-align:left";
const OUTER: &str = "margin:0 0 1em";
const SCROLLER: &str = "overflow-x:auto";
const TABLE: &str = "border-collapse:collapse;border-spacing:0;border:none;margin:0;width:auto;\
                     min-width:20em;line-height:1.4;font-variant-numeric:tabular-nums lining-nums";
const CAPTION: &str = "caption-side:top;text-align:left;padding:0 0 .5em;margin:0;\
                       font-weight:normal";
const NOTES: &str =
    "width:0;min-width:100%;margin:.5em 0 0;padding:0;font-size:.9em;line-height:1.4";

/// Notebooks stripe the rows; journals do not.
const ROW: &str = "background:transparent;border:none";
const HEAD: &str = "border:none;vertical-align:bottom;font-weight:normal";
const CELL: &str = "border:none;vertical-align:baseline";

/// The heavy rules above and below the table, and the light one under the heads.
const TOP_RULE: &str = "border-top:2px solid";
const HEAD_RULE: &str = "border-bottom:1px solid";
const BOTTOM_RULE: &str = "border-bottom:2px solid";

/// The table, ending in a line break. Contains no style sheet, no script and no identifier.
#[must_use]
pub fn table(table: &Table) -> String {
    let mut out = fragment(table).into_string();
    out.push('\n');
    out
}

pub(super) fn fragment(table: &Table) -> Markup {
    html! {
        // The second and third class keep typesetters from reading a dollar sign as a formula.
        div class="tussock-table tex2jax_ignore mathjax_ignore" style=(OUTER) {
            div style=(FRAME) {
                @if table.width() > 0 { div style=(SCROLLER) { (grid(table)) } }
                @else if let Some(caption) = table.caption() { p style=(NOTES) { (caption) } }
                @if let Some(notes) = table.notes_paragraph() {
                    p style=(NOTES) { (notes) }
                }
            }
        }
    }
}

fn grid(table: &Table) -> Markup {
    html! {
        table style=(TABLE) {
            @if let Some(caption) = table.caption() {
                caption style=(CAPTION) { (caption) }
            }
            (column_groups(table))
            (heads(table))
            tbody {
                @for (index, row) in table.rows.iter().enumerate() {
                    (body_row(table, row, Position::of(index, table.rows.len())))
                }
            }
        }
    }
}

/// Tells a screen reader which columns a head above the heads belongs to.
fn column_groups(table: &Table) -> Markup {
    html! {
        @if table.is_spanned() {
            @for spanner in table.spanners() { colgroup span=(spanner.columns) {} }
        }
    }
}

fn heads(table: &Table) -> Markup {
    html! {
        thead style="border:none" {
            @if table.is_spanned() {
                tr style=(ROW) {
                    @for spanner in table.spanners() { (spanner_head(table, spanner)) }
                }
                tr style=(ROW) {
                    @for spanner in table.spanners() {
                        @if spanner.text.is_some() {
                            @for column in spanner.first..spanner.first + spanner.columns {
                                (head(table, column, HeadPlace::Below))
                            }
                        }
                    }
                }
            } @else {
                tr style=(ROW) {
                    @for column in 0..table.width() { (head(table, column, HeadPlace::Alone)) }
                }
            }
        }
    }
}

fn spanner_head(table: &Table, spanner: Spanner<'_>) -> Markup {
    let style =
        format!("{HEAD};{TOP_RULE};text-align:center;padding:.35em .5em 0;white-space:nowrap");
    html! {
        @match spanner.text {
            None => { (head(table, spanner.first, HeadPlace::Beside)) }
            Some(text) => {
                th scope="colgroup" colspan=(spanner.columns) style=(style) {
                    // The rule is the text's own, so that the rules of neighbours do not touch.
                    div style=(format!("{HEAD_RULE};padding:0 0 .2em")) { (text) }
                }
            }
        }
    }
}

/// Where the head of a column stands.
#[derive(Clone, Copy, PartialEq, Eq)]
enum HeadPlace {
    /// In a single row of heads.
    Alone,
    /// In the first of two rows, as high as both.
    Beside,
    /// In the second of two rows.
    Below,
}

fn head(table: &Table, column: usize, place: HeadPlace) -> Markup {
    let rules = match place {
        HeadPlace::Alone | HeadPlace::Beside => format!("{TOP_RULE};{HEAD_RULE}"),
        HeadPlace::Below => HEAD_RULE.to_owned(),
    };
    let align = alignment(table.kind(column));
    let padding = padding(table, column, ".35em", ".35em");
    let style = format!("{HEAD};{rules};{align};padding:{padding}");
    let rows = (place == HeadPlace::Beside).then_some(2);
    let text = table.head(column);
    html! {
        @if text.is_empty() {
            td rowspan=[rows] style=(style) {}
        } @else {
            th scope="col" rowspan=[rows] style=(style) { (text) }
        }
    }
}

/// Where a row stands in the table.
struct Position {
    is_first: bool,
    is_last: bool,
}

impl Position {
    fn of(index: usize, rows: usize) -> Self {
        Self { is_first: index == 0, is_last: index + 1 == rows }
    }
}

fn body_row(table: &Table, row: &Row, position: Position) -> Markup {
    let above = match (position.is_first, row.opens_block) {
        (true, _) => ".4em",
        (false, true) => ".9em",
        (false, false) => ".25em",
    };
    let below = if position.is_last { ".4em" } else { ".25em" };
    html! {
        tr style=(ROW) {
            @for column in 0..table.width() {
                @let cell = row.cells.get(column).unwrap_or(&Cell::Empty);
                @let padding = padding(table, column, above, below);
                (body_cell(table.kind(column), cell, &padding, position.is_last))
            }
        }
    }
}

fn body_cell(kind: ColumnKind, cell: &Cell, padding: &str, is_last: bool) -> Markup {
    let mut style = format!("{CELL};{};padding:{padding}", alignment(kind));
    if !matches!(cell, Cell::Text(_) | Cell::Empty) {
        style.push_str(";white-space:nowrap");
    }
    if is_last {
        style = format!("{style};{BOTTOM_RULE}");
    }
    let text = cell.rich();
    html! {
        @if kind == ColumnKind::RowHead && !text.is_empty() {
            th scope="row" style=(format!("{style};font-weight:normal")) title=[title(cell)] {
                (text)
            }
        } @else {
            td style=(style) title=[title(cell)] { (text) }
        }
    }
}

/// What the reader sees on pointing at a number: its path and its full precision.
fn title(cell: &Cell) -> Option<String> {
    let titles: Vec<String> = cell.placed().filter_map(placed_title).collect();
    (!titles.is_empty()).then(|| titles.join("\n"))
}

fn placed_title(placed: &Placed) -> Option<String> {
    if placed.path.is_empty() {
        return None;
    }
    let path = printable(&placed.path_text());
    let number = placed.value.number;
    Some(if number.is_finite() { format!("{path} = {}", full_precision(number)) } else { path })
}

/// The shortest figures that give the same number back; zero has no sign.
fn full_precision(number: f64) -> String {
    let number = number + 0.0;
    let is_legible = number == 0.0 || (1e-5..1e15).contains(&number.abs());
    if is_legible { number.to_string() } else { format!("{number:e}") }
}

fn alignment(kind: ColumnKind) -> &'static str {
    match kind {
        ColumnKind::Value => "text-align:right",
        ColumnKind::RowHead | ColumnKind::Words => "text-align:left",
    }
}

/// The first column begins and the last one ends where the rules do.
fn padding(table: &Table, column: usize, above: &str, below: &str) -> String {
    let left = if column == 0 { ".15em" } else { ".7em" };
    let right = if column + 1 == table.width() { ".15em" } else { ".7em" };
    format!("{above} {right} {below} {left}")
}
