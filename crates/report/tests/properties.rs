//! What holds for every table and every number.
#![allow(
    clippy::indexing_slicing,
    clippy::panic,
    clippy::unwrap_used,
    clippy::wildcard_enum_match_arm,
    reason = "a test stops where it fails"
)]

mod sample;

use proptest::prelude::*;
use pulldown_cmark::{Event, Parser, Tag, TagEnd};
use tussock_report::citation::Citation;
use tussock_report::render::{FORMATS, html, json};
use tussock_report::rich::{Rich, Run, Style};
use tussock_report::table::{Cell, Column, Placed, Row, Table};
use tussock_report::value::{NumberStyle, Value};

fn any_style() -> impl Strategy<Value = NumberStyle> {
    prop_oneof![
        Just(NumberStyle::Count),
        Just(NumberStyle::Df),
        Just(NumberStyle::P),
        (0..5_u8).prop_map(NumberStyle::Bounded),
        (0..5_u8).prop_map(NumberStyle::Statistic),
        (0..3_u8).prop_map(NumberStyle::Percent),
    ]
}

/// Any bit pattern, and the neighbourhood of the numbers at which rules change.
fn any_number() -> impl Strategy<Value = f64> {
    prop_oneof![
        any::<f64>(),
        any::<u64>().prop_map(f64::from_bits),
        -1.5..1.5_f64,
        (-1e-4..1e-4_f64),
        (0.99..1.01_f64),
        Just(-0.0),
        Just(f64::NAN),
        Just(f64::INFINITY),
    ]
}

fn any_value() -> impl Strategy<Value = Value> {
    (any_number(), any_style()).prop_map(|(number, style)| Value::new(number, style))
}

fn one_row(values: &[Value]) -> Table {
    let placed = |index: usize, value| Placed::new(value, ["main".to_owned(), index.to_string()]);
    let mut table = Table::new("Title").column(Column::row_head("Head"));
    let mut row = Row::headed("x");
    for (index, pair) in values.chunks(2).enumerate() {
        table = table.column(Column::value(Rich::plain(format!("c{index}"))));
        row = match *pair {
            [lower, upper] if index % 2 == 1 => {
                row.interval(placed(2 * index, lower), placed(2 * index + 1, upper))
            }
            [first, ..] => row.number(placed(2 * index, first)),
            [] => row,
        };
    }
    table.row(row)
}

/// Whether a printed number says that it is none, or that zero has a sign.
fn is_improper(text: &str) -> bool {
    let lower = text.to_lowercase();
    let signed_zero = |sign: char| {
        lower.split(sign).skip(1).any(|after| {
            let number: String =
                after.chars().take_while(|c| c.is_ascii_digit() || *c == '.').collect();
            number.contains('0')
                && number.chars().all(|c| matches!(c, '0' | '.'))
                && !after.get(number.len()..).unwrap_or_default().starts_with('e')
        })
    };
    lower.contains("nan") || lower.contains("inf") || signed_zero('−')
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 512, failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn json_gives_every_number_back(number in any::<u64>().prop_map(f64::from_bits)) {
        let table = Table::new("").row(Row::new().number(Value::statistic(number)));
        let written: serde_json::Value = serde_json::from_str(&json::table(&table)).unwrap();
        let cell = &written["rows"][0]["cells"][0];
        if number.is_finite() {
            let read = cell["number"].as_f64().unwrap();
            prop_assert_eq!(read.to_bits(), (number + 0.0).to_bits());
        } else {
            prop_assert!(cell["number"].is_null() && cell["reason"].is_string());
        }
    }

    #[test]
    fn the_title_of_a_cell_gives_every_number_back(number in any::<f64>()) {
        let placed = Placed::new(Value::statistic(number), ["a"]);
        let out = html::table(&Table::new("").row(Row::new().number(placed)));
        let shown = out.split("title=\"a = ").nth(1).and_then(|rest| rest.split('"').next());
        prop_assert_eq!(shown.unwrap().parse::<f64>().unwrap().to_bits(), (number + 0.0).to_bits());
    }

    #[test]
    fn no_printed_number_is_improper(value in any_value(), decimals in 0..8_u8) {
        for text in [value.text(), value.text_with(decimals), value.limit_text(), value.equals()] {
            prop_assert!(!is_improper(&text), "{value:?}: {text}");
            prop_assert!(!text.contains('-'), "{value:?}: {text}");
        }
    }

    #[test]
    fn no_number_other_than_zero_prints_as_zero(value in any_value()) {
        let exempt = matches!(value.style, NumberStyle::Count);
        if value.number == 0.0 || !value.number.is_finite() || exempt {
            return Ok(());
        }
        for text in [value.text(), value.limit_text()] {
            let says_zero = text.chars().all(|c| matches!(c, '0' | '.' | '−'));
            // Degrees of freedom within rounding error of a whole number are that number.
            let is_whole_df = value.style == NumberStyle::Df && value.number.abs() < 1e-8;
            prop_assert!(!says_zero || is_whole_df, "{value:?}: {text}");
        }
    }

    #[test]
    fn printing_never_misses_by_more_than_its_last_figure(
        number in -1e6..1e6_f64,
        decimals in 0..6_u8,
    ) {
        let text = Value::new(number, NumberStyle::Statistic(decimals)).text();
        if text.contains('×') {
            return Ok(());
        }
        let read: f64 = text.replace('−', "-").parse().unwrap();
        let half = 0.5 * 10_f64.powi(-i32::from(decimals));
        prop_assert!((read - number).abs() <= half * (1.0 + 1e-6), "{number}: {text}");
    }

    #[test]
    fn a_p_value_below_another_never_prints_above_it(p in 0.0..1.0_f64, q in 0.0..1.0_f64) {
        let read = |p: f64| {
            let text = Value::new(p, NumberStyle::P).text();
            match text.as_bytes().first() {
                Some(b'<') => 0.0,
                Some(b'>') => 1.0,
                _ => text.parse::<f64>().unwrap(),
            }
        };
        prop_assert!(read(p.min(q)) <= read(p.max(q)));
    }

    #[test]
    fn every_placed_number_occurs_in_all_renderers(
        values in prop::collection::vec(any_value(), 1..9),
    ) {
        let table = one_row(&values);
        let cells = &table.rows[0].cells;
        for format in FORMATS {
            let out = (format.table)(&table);
            for cell in cells {
                let expected: Vec<String> = match (cell, format.name) {
                    (Cell::Interval { lower, upper }, "json") => {
                        vec![lower.value.limit_text(), upper.value.limit_text()]
                    }
                    (cell, "html") => vec![cell.rich().html()],
                    (cell, "markdown") => vec![cell.rich().markdown()],
                    (cell, _) => vec![cell.rich().text()],
                };
                for text in expected {
                    prop_assert!(out.contains(&text), "{}: {text} in {out}", format.name);
                }
            }
            prop_assert!(!is_improper(&out), "{}: {out}", format.name);
        }
        prop_assert_eq!(table.placed().count(), cells.iter().flat_map(Cell::placed).count());
    }

    #[test]
    fn markdown_says_what_the_styled_text_says(
        runs in prop::collection::vec((any_text(), any_run_style()), 1..6),
    ) {
        let rich: Rich = runs
            .into_iter()
            .map(|(text, style)| Rich { runs: vec![Run { text, style }] })
            .collect();
        let markdown = format!("x {}", rich.markdown());
        let (mut text, mut style) = (String::new(), Style::Plain);
        let mut emphasized = String::new();
        for event in Parser::new(&markdown) {
            match event {
                Event::Text(part) => {
                    text.push_str(&part);
                    if style != Style::Plain {
                        emphasized.push_str(&part);
                    }
                }
                Event::Start(Tag::Emphasis | Tag::Strong) => style = Style::Italic,
                Event::End(TagEnd::Emphasis | TagEnd::Strong) => style = Style::Plain,
                Event::InlineHtml(tag) if ["<em>", "<strong>"].contains(&&*tag) => {
                    style = Style::Italic;
                }
                Event::InlineHtml(tag) if ["</em>", "</strong>"].contains(&&*tag) => {
                    style = Style::Plain;
                }
                Event::Start(Tag::Paragraph) | Event::End(TagEnd::Paragraph) => {}
                other => prop_assert!(false, "{other:?} in {markdown:?} from {rich:?}"),
            }
        }
        let bare = |text: &str| text.replace([' ', '\u{a0}'], "");
        prop_assert_eq!(bare(&text), bare(&format!("x{}", rich.text())), "{}", markdown);
        let expected: String = rich
            .runs
            .iter()
            .filter(|run| matches!(run.style, Style::Italic | Style::Strong))
            .map(|run| run.text.as_str())
            .collect();
        prop_assert_eq!(bare(&emphasized), bare(&expected), "{}", markdown);
    }

    #[test]
    fn plain_text_comes_back_from_the_notation_when_escaped(text in any_text()) {
        let escaped: String = text.chars().flat_map(|c| ['\\', c]).collect();
        prop_assert_eq!(Rich::parse(&escaped), Rich::plain(text));
    }
}

/// Text rich in characters that mean something in Markdown, HTML or the notation.
fn any_text() -> impl Strategy<Value = String> {
    "[ a-c1é語*_`|~^$#{}<>&;.()!:=+/\\[\\]\\\\-]{1,12}"
}

fn any_run_style() -> impl Strategy<Value = Style> {
    prop_oneof![Just(Style::Plain), Just(Style::Italic), Just(Style::Strong)]
}

#[test]
fn a_citation_is_read_as_journals_print_it() {
    let citation = Citation::new()
        .value("Λ", Value::bounded(1.0 / 3.0))
        .test("χ^2^", [Value::df(8.0)], Value::statistic(f64::NAN))
        .test("*t*", [Value::df(145.37)], Value::statistic(-2.5))
        .value("*p*", Value::p(0.034, -3.38))
        .interval("95% CI", Value::statistic(-0.001), Value::statistic(4.0));
    assert_eq!(
        citation.rich().text(),
        "Λ = .33, χ²(8) = —, t(145.37) = −2.50, p = .034, 95% CI [−0.001, 4.00]"
    );
    assert_eq!(
        citation.rich().html(),
        "Λ = .33, χ<sup style=\"line-height:0;font-size:.75em\">2</sup>(8) = —, \
         <i>t</i>(145.37) = −2.50, <i>p</i> = .034, 95% CI [−0.001, 4.00]"
    );
}

#[test]
fn the_sample_tables_say_no_improper_number_in_any_format() {
    for format in FORMATS {
        for table in [sample::omnibus(), sample::groups()] {
            let out = (format.table)(&table);
            assert!(!is_improper(&out), "{}: {out}", format.name);
            for placed in table.placed() {
                let (text, limit) = (placed.value.text(), placed.value.limit_text());
                let escaped = text.replace('<', "&lt;");
                let shown = [&text, &limit, &escaped].into_iter().any(|text| out.contains(text));
                assert!(shown, "{}: {text}", format.name);
            }
        }
    }
}
