//! One table and what each renderer makes of it.
#![allow(
    clippy::indexing_slicing,
    clippy::panic,
    clippy::unwrap_used,
    clippy::wildcard_enum_match_arm,
    reason = "a test stops where it fails"
)]

mod sample;

use tussock_report::render::{FORMATS, html, json, markdown, text};
use tussock_report::rich::Rich;
use tussock_report::table::{Cell, Column, Placed, Row, Table};
use tussock_report::value::Value;

/// Two groups, a number that does not exist, an interval, a word; every kind of cell.
fn small() -> Table {
    let path = |level, key| ["main", "groups", level, key];
    Table::new("Sleep by *roster*")
        .label("Table 1")
        .column(Column::row_head("Roster"))
        .column(Column::value("*M*").under("Sleep"))
        .column(Column::value("95% CI").under("Sleep"))
        .column(Column::words("Remark"))
        .row(
            Row::headed("fixed")
                .number(Placed::new(Value::statistic(-6.125), path("fixed", "mean")))
                .interval(
                    Placed::new(Value::statistic(-7.5), path("fixed", "lower")),
                    Placed::new(Value::statistic(-0.001), path("fixed", "upper")),
                )
                .text("η^2^ > 0"),
        )
        .row(Row::headed(Rich::plain("a|b")).undefined().empty().opening_block())
        .note("Invented data.")
}

#[test]
fn text_aligns_columns_under_their_heads() {
    assert_eq!(
        text::table(&small()),
        "\
Table 1. Sleep by roster
─────────────────────────────────────────
                  Sleep
         ───────────────────────
Roster       M            95% CI   Remark
─────────────────────────────────────────
fixed    −6.12   [−7.50, −0.001]   η² > 0

a|b          —
─────────────────────────────────────────
Note. Invented data.
"
    );
}

#[test]
fn markdown_has_one_row_of_heads() {
    assert_eq!(
        markdown::table(&small()),
        r"**Table 1.** Sleep by *roster*

| Roster | Sleep: *M* |   Sleep: 95% CI | Remark |
| :----- | ---------: | --------------: | :----- |
| fixed  |      −6.12 | [−7.50, −0.001] | η² > 0 |
| a\|b   |          — |                 |        |

*Note.* Invented data.
"
    );
}

#[test]
fn html_says_its_look_inline_and_names_no_colour() {
    const HEAD: &str = "border:none;vertical-align:bottom;font-weight:normal";
    const CELL: &str = "border:none;vertical-align:baseline";
    const ROW: &str = "<tr style=\"background:transparent;border:none\">";
    let expected = [
        "<div class=\"tussock-table tex2jax_ignore mathjax_ignore\" style=\"margin:0 0 1em\">",
        "<div style=\"display:inline-block;max-width:100%;text-align:left\">",
        "<div style=\"overflow-x:auto\">",
        "<table style=\"border-collapse:collapse;border-spacing:0;border:none;margin:0;width:auto;\
         min-width:20em;line-height:1.4;font-variant-numeric:tabular-nums lining-nums\">",
        "<caption style=\"caption-side:top;text-align:left;padding:0 0 .5em;margin:0;\
         font-weight:normal\"><strong>Table 1.</strong> Sleep by <i>roster</i></caption>",
        "<colgroup span=\"1\"></colgroup><colgroup span=\"2\"></colgroup>\
         <colgroup span=\"1\"></colgroup>",
        "<thead style=\"border:none\">",
        ROW,
        &format!(
            "<th scope=\"col\" rowspan=\"2\" style=\"{HEAD};border-top:2px solid;\
             border-bottom:1px solid;text-align:left;padding:.35em .7em .35em .15em\">Roster</th>"
        ),
        &format!(
            "<th scope=\"colgroup\" colspan=\"2\" style=\"{HEAD};border-top:2px solid;\
             text-align:center;padding:.35em .5em 0;white-space:nowrap\">\
             <div style=\"border-bottom:1px solid;padding:0 0 .2em\">Sleep</div></th>"
        ),
        &format!(
            "<th scope=\"col\" rowspan=\"2\" style=\"{HEAD};border-top:2px solid;\
             border-bottom:1px solid;text-align:left;padding:.35em .15em .35em .7em\">Remark</th>"
        ),
        "</tr>",
        ROW,
        &format!(
            "<th scope=\"col\" style=\"{HEAD};border-bottom:1px solid;text-align:right;\
             padding:.35em .7em .35em .7em\"><i>M</i></th>"
        ),
        &format!(
            "<th scope=\"col\" style=\"{HEAD};border-bottom:1px solid;text-align:right;\
             padding:.35em .7em .35em .7em\">95% CI</th>"
        ),
        "</tr></thead><tbody>",
        ROW,
        &format!(
            "<th scope=\"row\" style=\"{CELL};text-align:left;padding:.4em .7em .25em .15em;\
             font-weight:normal\">fixed</th>"
        ),
        &format!(
            "<td style=\"{CELL};text-align:right;padding:.4em .7em .25em .7em;white-space:nowrap\" \
             title=\"main.groups.fixed.mean = -6.125\">−6.12</td>"
        ),
        &format!(
            "<td style=\"{CELL};text-align:right;padding:.4em .7em .25em .7em;white-space:nowrap\" \
             title=\"main.groups.fixed.lower = -7.5\nmain.groups.fixed.upper = -0.001\">\
             [−7.50, −0.001]</td>"
        ),
        &format!(
            "<td style=\"{CELL};text-align:left;padding:.4em .15em .25em .7em\">\
             η<sup style=\"line-height:0;font-size:.75em\">2</sup> &gt; 0</td>"
        ),
        "</tr>",
        ROW,
        &format!(
            "<th scope=\"row\" style=\"{CELL};text-align:left;padding:.9em .7em .4em .15em;\
             border-bottom:2px solid;font-weight:normal\">a|b</th>"
        ),
        &format!(
            "<td style=\"{CELL};text-align:right;padding:.9em .7em .4em .7em;white-space:nowrap;\
             border-bottom:2px solid\">—</td>"
        ),
        &format!(
            "<td style=\"{CELL};text-align:right;padding:.9em .7em .4em .7em;\
             border-bottom:2px solid\"></td>"
        ),
        &format!(
            "<td style=\"{CELL};text-align:left;padding:.9em .15em .4em .7em;\
             border-bottom:2px solid\"></td>"
        ),
        "</tr></tbody></table></div>",
        "<p style=\"width:0;min-width:100%;margin:.5em 0 0;padding:0;font-size:.9em;\
         line-height:1.4\"><i>Note.</i> Invented data.</p>",
        "</div></div>\n",
    ];
    assert_eq!(html::table(&small()), expected.concat());
}

#[test]
fn json_keeps_full_precision_and_says_why_a_number_is_missing() {
    let expected = serde_json::json!({
        "label": "Table 1",
        "title": "Sleep by roster",
        "columns": [
            { "head": "Roster", "spanner": null, "kind": "row-head" },
            { "head": "M", "spanner": "Sleep", "kind": "value" },
            { "head": "95% CI", "spanner": "Sleep", "kind": "value" },
            { "head": "Remark", "spanner": null, "kind": "words" },
        ],
        "rows": [
            {
                "opens_block": false,
                "cells": [
                    { "text": "fixed" },
                    {
                        "number": -6.125,
                        "printed": "−6.12",
                        "style": "statistic",
                        "path": "main.groups.fixed.mean",
                    },
                    {
                        "lower": {
                            "number": -7.5,
                            "printed": "−7.50",
                            "style": "statistic",
                            "path": "main.groups.fixed.lower",
                        },
                        "upper": {
                            "number": -0.001,
                            "printed": "−0.001",
                            "style": "statistic",
                            "path": "main.groups.fixed.upper",
                        },
                    },
                    { "text": "η² > 0" },
                ],
            },
            {
                "opens_block": true,
                "cells": [
                    { "text": "a|b" },
                    { "number": null, "reason": "does not exist here; see the notes" },
                    null,
                ],
            },
        ],
        "notes": ["Invented data."],
    });
    assert_eq!(json::value(&small()), expected);
    let written: serde_json::Value = serde_json::from_str(&json::table(&small())).unwrap();
    assert_eq!(written, expected);
}

#[test]
fn a_number_that_is_none_is_null_with_a_reason() {
    let cell = |number: f64| {
        let table = Table::new("").row(Row::new().number(Value::p(number, -812.25)));
        json::value(&table)["rows"][0]["cells"][0].clone()
    };
    assert_eq!(
        cell(f64::NAN),
        serde_json::json!({
            "number": null, "reason": "undefined", "ln": -812.25, "printed": "—", "style": "p",
        })
    );
    assert_eq!(cell(f64::INFINITY)["reason"], "grows without bound");
    assert_eq!(cell(f64::NEG_INFINITY)["reason"], "falls without bound");
    assert_eq!(cell(0.0)["number"].to_string(), "0.0");
    assert_eq!(cell(-0.0)["number"].to_string(), "0.0");
}

#[test]
fn wide_and_combining_characters_keep_the_columns_aligned() {
    let row = |head: &str| Row::headed(Rich::plain(head)).number(Value::statistic(1.0));
    let table = Table::new("")
        .column(Column::row_head(""))
        .column(Column::value("*M*"))
        .rows(["日本", "e\u{301}te\u{301}", "abc"].map(row));
    assert_eq!(
        text::table(&table),
        "\
───────────
          M
───────────
日本   1.00
e\u{301}te\u{301}    1.00
abc    1.00
───────────
"
    );
}

#[test]
fn a_row_that_is_longer_or_shorter_than_the_heads_loses_no_cell() {
    let table = Table::new("Ragged")
        .column(Column::row_head("A"))
        .column(Column::value("B"))
        .row(Row::headed("short"))
        .row(Row::headed("long").number(Value::count(2)).number(Value::count(34567)));
    assert_eq!(markdown::table(&table).lines().nth(2).unwrap(), "| A     |   B |       |");
    for format in FORMATS {
        let out = (format.table)(&table);
        assert!(out.contains("34567") && out.contains("short"), "{}: {out}", format.name);
    }
}

#[test]
fn a_table_without_columns_or_rows_is_its_caption_and_notes() {
    let empty = Table::new("Nothing yet").note("No rows were admitted.");
    assert_eq!(text::table(&empty), "Nothing yet\nNote. No rows were admitted.\n");
    assert_eq!(markdown::table(&empty), "**Nothing yet**\n\n*Note.* No rows were admitted.\n");
    assert!(!html::table(&empty).contains("<table"));
    assert!(html::table(&empty).contains("Nothing yet"));
    for format in FORMATS {
        assert!(!(format.table)(&Table::default()).contains("Note"), "{}", format.name);
    }
}

#[test]
fn a_spanner_covers_its_neighbours_alone() {
    let out = html::table(&sample::groups());
    assert_eq!(out.matches("scope=\"colgroup\" colspan=\"2\"").count(), 3);
    assert_eq!(out.matches("rowspan=\"2\"").count(), 3);
    assert_eq!(out.matches("<colgroup span=\"2\"></colgroup>").count(), 3);
    let text = text::table(&sample::groups());
    let rules = text.lines().nth(3).unwrap();
    assert_eq!(rules.split_whitespace().count(), 3, "{rules}");
}

#[test]
fn captions_and_notes_wrap_without_breaking_a_statistic() {
    let long = "The rosters differed on the outcomes taken together, as it was foreseen, ";
    let table = Table::new("").note(Rich::plain(format!("{long}F(8, 290) = 8.52, p < .001.")));
    assert_eq!(
        text::table(&table),
        "Note. The rosters differed on the outcomes taken together, as it was\n\
         foreseen, F(8, 290) = 8.52, p < .001.\n"
    );
}

#[test]
fn every_value_has_its_path_and_an_interval_has_two() {
    let table = small();
    let paths: Vec<String> = table.placed().map(Placed::path_text).collect();
    assert_eq!(
        paths,
        ["main.groups.fixed.mean", "main.groups.fixed.lower", "main.groups.fixed.upper"]
    );
    let path = ["main", "centroids", "fixed day", "1", "2nd", "größe", ""];
    let placed = Placed::new(Value::df(1.0), path);
    assert_eq!(placed.path_text(), "main.centroids.`fixed day`.1.`2nd`.größe.``");
    assert_eq!(Placed::from(Value::df(1.0)).path_text(), "");
    assert_eq!(Cell::Undefined.placed().count(), 0);
}
