//! A table as JSON: numbers at full precision, each with its path, its style and how it prints.

use serde_json::{Map, Value as Json, json};

use super::Format;
use super::page_json;
use crate::page::Page;
use crate::rich::Rich;
use crate::table::{Cell, Column, ColumnKind, Placed, Row, Table};
use crate::value::NumberStyle;

/// JSON, for programs.
pub const FORMAT: Format = Format {
    name: "json",
    media_type: "application/json",
    extension: "json",
    table,
    page: page_json::page,
};

/// The table as indented JSON, ending in a line break.
#[must_use]
pub fn table(table: &Table) -> String {
    format!("{:#}\n", value(table))
}

/// The table as a JSON value, to be part of a larger one.
///
/// A number that does not exist is `null` with a `reason`; a number that JSON has no form for
/// likewise. A p value that underflows has its natural logarithm beside it in `ln`.
#[must_use]
pub fn value(table: &Table) -> Json {
    json!({
        "label": table.label.as_ref().map(Rich::text),
        "title": table.title.text(),
        "columns": table.columns.iter().map(column).collect::<Vec<_>>(),
        "rows": table.rows.iter().map(row).collect::<Vec<_>>(),
        "notes": table.notes.iter().map(Rich::text).collect::<Vec<_>>(),
    })
}

/// A document as a JSON value, to be part of a larger one.
#[must_use]
pub fn page_value(page: &Page) -> Json {
    super::page_json::value(page)
}

fn column(column: &Column) -> Json {
    let kind = match column.kind {
        ColumnKind::RowHead => "row-head",
        ColumnKind::Value => "value",
        ColumnKind::Words => "words",
    };
    json!({
        "head": column.head.text(),
        "spanner": column.spanner.as_ref().map(Rich::text),
        "kind": kind,
    })
}

fn row(row: &Row) -> Json {
    json!({
        "opens_block": row.opens_block,
        "cells": row.cells.iter().map(cell).collect::<Vec<_>>(),
    })
}

fn cell(cell: &Cell) -> Json {
    match cell {
        Cell::Empty => Json::Null,
        Cell::Text(text) => json!({ "text": text.text() }),
        Cell::Number(number) => placed(number, number.value.text()),
        Cell::Interval { lower, upper } => json!({
            "lower": placed(lower, lower.value.limit_text()),
            "upper": placed(upper, upper.value.limit_text()),
        }),
        Cell::Undefined => {
            json!({ "number": null, "reason": "does not exist here; see the notes" })
        }
    }
}

fn placed(placed: &Placed, printed: String) -> Json {
    let value = placed.value;
    let mut object = Map::new();
    object.insert("number".to_owned(), number(value.number));
    if let Some(reason) = reason(value.number) {
        object.insert("reason".to_owned(), reason.into());
    }
    if let Some(ln) = value.ln {
        object.insert("ln".to_owned(), number(ln));
    }
    object.insert("printed".to_owned(), printed.into());
    object.insert("style".to_owned(), style_name(value.style).into());
    if !placed.path.is_empty() {
        object.insert("path".to_owned(), placed.path_text().into());
    }
    Json::Object(object)
}

/// The shortest figures that give the same `f64` back; `null` where JSON has none. Zero has no sign.
fn number(number: f64) -> Json {
    serde_json::Number::from_f64(number + 0.0).map_or(Json::Null, Json::Number)
}

/// Why a number is `null`.
fn reason(number: f64) -> Option<&'static str> {
    if number.is_nan() {
        Some("undefined")
    } else if number == f64::INFINITY {
        Some("grows without bound")
    } else if number == f64::NEG_INFINITY {
        Some("falls without bound")
    } else {
        None
    }
}

fn style_name(style: NumberStyle) -> &'static str {
    match style {
        NumberStyle::Count => "count",
        NumberStyle::Df => "degrees-of-freedom",
        NumberStyle::P => "p",
        NumberStyle::Bounded(_) => "bounded",
        NumberStyle::Statistic(_) => "statistic",
        NumberStyle::Standardized(_) => "standardized",
        NumberStyle::Percent(_) => "share",
    }
}
