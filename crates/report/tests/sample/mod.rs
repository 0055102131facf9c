//! Invented tables and a document, for the tests and the gallery.
#![allow(dead_code, unreachable_pub, reason = "each test file uses a part of it")]

use tussock_report::citation::Citation;
use tussock_report::page::{Block, Page, Severity};
use tussock_report::rich::Rich;
use tussock_report::table::{Column, Placed, Row, Table};
use tussock_report::value::Value;

/// Four criteria of one test; an interval, a p value below the floor.
pub fn omnibus() -> Table {
    Table::new("Multivariate tests of duty roster")
        .label("Table 2")
        .columns([
            Column::row_head("Criterion"),
            Column::value("Value"),
            Column::value("*F*"),
            Column::value("*df*~1~"),
            Column::value("*df*~2~"),
            Column::value("*p*"),
            Column::value("η^2^"),
            Column::value("90% CI"),
        ])
        .rows([
            criterion("Wilks's Λ", "wilks", [0.6345, 9.2135, 8.0, 288.0, 1.2e-11], [0.142, 0.266]),
            criterion(
                "Pillai's *V*",
                "pillai",
                [0.3812, 8.5193, 8.0, 290.0, 1.4e-10],
                [0.119, 0.243],
            ),
            criterion(
                "Hotelling's *U*",
                "hotelling",
                [0.5512, 9.853, 8.0, 286.0, 0.034],
                [0.151, 0.2755],
            ),
            criterion("Roy's θ", "roy", [0.3331, 18.11, 4.0, 145.0, 0.0009999], [0.0021, 0.4]),
        ])
        .note("The criterion was fixed in advance.")
        .note("*F* is exact for Wilks's Λ and Roy's θ is an upper bound.")
}

fn criterion(name: &str, key: &str, numbers: [f64; 5], limits: [f64; 2]) -> Row {
    let placed = |value, last| Placed::new(value, ["main", "omnibus", "roster", key, last]);
    let [value, f, df1, df2, p] = numbers;
    let [lower, upper] = limits;
    Row::headed(name)
        .number(placed(Value::bounded(value), "value"))
        .number(placed(Value::statistic(f), "F"))
        .number(placed(Value::df(df1), "df1"))
        .number(placed(Value::df(df2), "df2"))
        .number(placed(Value::p(p, p.ln()), "p"))
        .number(placed(Value::bounded((lower + upper) / 2.0), "eta2"))
        .interval(
            placed(Value::bounded(lower), "eta2_lower"),
            placed(Value::bounded(upper), "eta2_upper"),
        )
}

/// Spanned columns, blocks of rows, a dash, an empty cell, words.
pub fn groups() -> Table {
    let roster = ["Fixed", "Forward", "Backward"];
    let mut table = Table::new("Means and standard deviations of the outcomes by duty roster")
        .column(Column::row_head("Outcome"))
        .column(Column::row_head("Ship"));
    for (name, n) in roster.iter().zip([54, 50, 46]) {
        let spanner = || Rich::plain(*name).then(" (*n* = ").then(Rich::plain(format!("{n})")));
        table = table
            .column(Column::value("*M*").under(spanner()))
            .column(Column::value("*SD*").under(spanner()));
    }
    table = table.column(Column::words("Better"));
    for (index, (outcome, better)) in
        [("Alertness", "high"), ("Attention lapses", "low")].into_iter().enumerate()
    {
        for (ship, shift) in [("Gannet", 0.0), ("Storm petrel", 1.375)] {
            let first = shift == 0.0;
            let mut row =
                if first { Row::headed(outcome).opening_block() } else { Row::new().empty() };
            row = row.text(ship);
            for (group, level) in roster.iter().enumerate() {
                let mean = 12.3456 * (group as f64 + 1.0) - 20.0 * index as f64 + shift;
                let path = |key| ["main", "groups", level, outcome, key];
                row = row.number(Placed::new(Value::statistic(mean), path("mean")));
                row = if first || group > 0 {
                    row.number(Placed::new(Value::statistic(2.25 + shift), path("sd")))
                } else {
                    row.undefined()
                };
            }
            table = table.row(if first { row.text(better) } else { row.empty() });
        }
    }
    table.note(
        "On *Storm petrel* one watch was kept under the fixed roster, so that there is no *SD*.",
    )
}

/// Text that tries to be more than text, and numbers that are none.
pub const HOSTILE: [&str; 14] = [
    "a|b",
    "*x* _y_ **z** ~~s~~",
    "<script>alert(1)</script>",
    "\"><img src=x onerror=alert(1)>",
    "`code` ``` ~~~",
    "[link](javascript:alert(1)) ![i](x) [r]: y",
    "# head\n- item\n1. one\n> quote",
    "back\\slash \\| \\*",
    "$x$ \\(y\\) $$z$$",
    "&lt; &#42; &amp",
    "{{main.omnibus}} {k}",
    "\u{1b}[31mred\u{7} \u{202e}abc",
    "ok 語 é e\u{301} 👩‍🔬",
    "|---|\n| a |",
];

/// The text in every place of a table that takes text.
pub fn hostile_table(text: &str) -> Table {
    let plain = || Rich::plain(text);
    Table::new(plain())
        .label(plain())
        .column(Column::row_head(plain()))
        .column(Column::value(plain()).under(plain()))
        .column(Column::words(plain()).under(plain()))
        .row(
            Row::headed(plain())
                .number(Placed::new(Value::statistic(1.5), [text, "key"]))
                .text(plain()),
        )
        .note(plain())
        .note(Rich::parse("*M* of ").then(plain()).then("^2^"))
}

/// A whole document.
pub fn page() -> Page {
    let citation = Citation::new()
        .value("*V*", Value::bounded(0.3812))
        .test("*F*", [Value::df(8.0), Value::df(290.0)], Value::statistic(8.5193))
        .value("*p*", Value::p(1.4e-10, -22.7));
    let prose = format!(
        "# Duty rosters on Skerry Ferries\n\n\
         Three rosters (fixed, forward, backward) were compared on four outcomes taken together. \
         The rosters differed, {}. All data are *invented*.\n\n\
         ## What was asked\n\n\
         1. Do the profiles differ as a set?\n\
         2. Along which composite?\n   - structure coefficients\n   - standardized coefficients\n\n\
         > Group results say nothing certain about one person.\n\n\
         | outcome | unit | scale |\n| :-- | :-- | --: |\n| alertness | points | 1–9 |\n\
         | lapses | per 10 min | 0–40 |\n\nSee the [protocol](https://example.org/protocol).\n",
        citation.rich().markdown()
    );
    let code = "compare alertness, mood, lapses, sleep across roster in served as main\n\
                show omnibus of main\nshow groups of main\n";
    Page::new("Duty rosters on Skerry Ferries")
        .block(Block::Prose(prose))
        .block(Block::Code { text: code.to_owned(), language: "tussock".to_owned() })
        .block(Block::Note(Rich::plain("served: 150 of 157 rows of crew.")))
        .block(Block::Table(omnibus()))
        .block(Block::Paragraph(
            Rich::parse("On the first function *R*~c~^2^ was .33; the rosters differed, ")
                .then(citation)
                .then("."),
        ))
        .block(Block::Problem {
            severity: Severity::Warning,
            title: "Box's M is significant and the groups are unequal.".to_owned(),
            lines: vec![
                "rosters.tus:12".to_owned(),
                "12 | show omnibus of main".to_owned(),
                "   |      ^^^^^^^".to_owned(),
            ],
        })
        .block(Block::Table(groups()))
        .block(Block::Problem {
            severity: Severity::Error,
            title: "there is no view `functons`; did you mean `functions`?".to_owned(),
            lines: Vec::new(),
        })
        .block(Block::Problem {
            severity: Severity::Information,
            title: "Two spellings of a level were merged.".to_owned(),
            lines: Vec::new(),
        })
}

/// The text in every place of a document that takes text, but for prose, which is the author's.
pub fn hostile_page(text: &str) -> Page {
    Page::new(text)
        .block(Block::Code { text: text.to_owned(), language: text.to_owned() })
        .block(Block::Table(hostile_table(text)))
        .block(Block::Paragraph(Rich::plain(text)))
        .block(Block::Note(Rich::plain(text)))
        .block(Block::Problem {
            severity: Severity::Error,
            title: text.to_owned(),
            lines: vec![text.to_owned()],
        })
}
