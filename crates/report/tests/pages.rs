//! A document and what each renderer makes of it.
#![allow(
    clippy::indexing_slicing,
    clippy::panic,
    clippy::unwrap_used,
    clippy::wildcard_enum_match_arm,
    reason = "a test stops where it fails"
)]

mod sample;

use tussock_report::page::{Block, Page, Severity};
use tussock_report::render::{FORMATS, Format, format};
use tussock_report::rich::Rich;
use tussock_report::table::{Column, Row, Table};
use tussock_report::value::Value;

fn named(name: &str) -> Format {
    format(name).unwrap()
}

fn document() -> Page {
    Page::new("Rosters & sleep")
        .block(Block::Prose("Sleep differed, *p* < .001.\n\n- one\n- two\n".to_owned()))
        .block(Block::Code { text: "show omnibus of main\n".into(), language: "tussock".into() })
        .block(Block::Table(
            Table::new("Counts")
                .column(Column::row_head("Roster"))
                .column(Column::value("*n*"))
                .row(Row::headed("fixed").number(Value::count(54))),
        ))
        .block(Block::Paragraph(Rich::parse("It is *V* = .38.")))
        .block(Block::Note(Rich::plain("150 rows")))
        .block(Block::Problem {
            severity: Severity::Warning,
            title: "`lapses` is constant in one group".to_owned(),
            lines: vec!["a.tus:3".to_owned(), "3 | compare lapses".to_owned()],
        })
}

#[test]
fn a_document_as_markdown() {
    assert_eq!(
        (named("markdown").page)(&document()),
        r"# Rosters & sleep

Sleep differed, *p* < .001.

- one
- two

```tussock
show omnibus of main
```

**Counts**

| Roster | *n* |
| :----- | --: |
| fixed  |  54 |

It is *V* = .38.

> 150 rows

> **Warning:** \`lapses\` is constant in one group
>
> ```
> a.tus:3
> 3 | compare lapses
> ```
"
    );
}

#[test]
fn a_document_as_plain_text() {
    assert_eq!(
        (named("text").page)(&document()),
        "\
Rosters & sleep
═══════════════

Sleep differed, p < .001.

- one
- two

    show omnibus of main

Counts
───────────
Roster    n
───────────
fixed    54
───────────

It is V = .38.

    150 rows

Warning: `lapses` is constant in one group
    a.tus:3
    3 | compare lapses
"
    );
}

#[test]
fn a_document_as_a_web_page() {
    let page = (named("html").page)(&document());
    let (head, body) = page.split_once("<body>").unwrap();
    assert!(head.starts_with("<!DOCTYPE html><html lang=\"en\"><head><meta charset=\"utf-8\">"));
    assert!(head.contains("<title>Rosters &amp; sleep</title>"));
    assert!(head.contains("prefers-color-scheme: dark") && head.contains("@media print"));
    let (before, rest) = body.split_once("<figure class=\"table\">").unwrap();
    let (_, after) = rest.split_once("</figure>").unwrap();
    let shown = |html: &str| html.replace('\u{a0}', "·");
    assert_eq!(
        shown(before),
        "<main><h1>Rosters &amp; sleep</h1>\n\
         <div class=\"prose\"><p>Sleep differed, <em>p</em>·&lt;·.001.</p>\n\
         <ul>\n<li>one</li>\n<li>two</li>\n</ul>\n</div>\n\
         <pre><code class=\"language-tussock\">show omnibus of main</code></pre>\n"
    );
    assert_eq!(
        shown(after),
        "\n<p>It is <i>V</i>·=·.38.</p>\n<p class=\"note\">150 rows</p>\n\
         <aside class=\"problem warning\"><p><strong>Warning:</strong> <code>lapses</code> is \
         constant in one group</p><pre>a.tus:3\n3 | compare lapses</pre></aside>\
         </main></body></html>\n"
    );
}

#[test]
fn a_document_as_json_has_a_kind_for_each_block() {
    let json: serde_json::Value = serde_json::from_str(&(named("json").page)(&document())).unwrap();
    assert_eq!(json["title"], "Rosters & sleep");
    let kinds: Vec<&str> =
        json["blocks"].as_array().unwrap().iter().map(|b| b["kind"].as_str().unwrap()).collect();
    assert_eq!(kinds, ["prose", "code", "table", "paragraph", "note", "problem"]);
    assert_eq!(json["blocks"][2]["table"]["rows"][0]["cells"][1]["number"], 54.0);
    assert_eq!(json["blocks"][5]["severity"], "warning");
}

#[test]
fn a_page_loads_nothing_and_runs_nothing() {
    let page = (named("html").page)(&sample::page());
    for forbidden in ["<script", "<link", "<iframe", "<img", "src=", "@import", "url(", " id="] {
        assert!(!page.contains(forbidden), "{forbidden}");
    }
    assert!(page.contains("default-src 'none'"));
}

#[test]
fn a_title_in_the_prose_takes_the_place_of_the_documents_own() {
    let page = Page::new("A").block(Block::Prose("# B\n\ntext".to_owned()));
    assert_eq!((named("markdown").page)(&page), "# B\n\ntext\n");
    assert_eq!((named("text").page)(&page), "B\n═\n\ntext\n");
    assert!((named("html").page)(&page).contains("<title>A</title>"));
    assert!(!(named("html").page)(&page).contains("<h1>A"));
}

#[test]
fn prose_as_text_keeps_its_lists_quotations_and_tables_apart() {
    let prose = "\
para one *em* `code` a<sup>2</sup>\\
second line

1. first

   more of it
2. second
   - inner one
   - inner two

> quoted
>
> again

```
let x;  # code
```

| a | b |
| :- | -: |
| x\\|y | 2 |

See <https://example.org> and [this](notes.md), ~~not~~.

---
";
    let page = Page::new("").block(Block::Prose(prose.to_owned()));
    assert_eq!(
        (named("text").page)(&page),
        "\
para one em `code` a²
second line

1. first

   more of it
2. second
   - inner one
   - inner two

│ quoted
│
│ again

    let x;  # code

───────
a     b
───────
x|y   2
───────

See https://example.org and this (notes.md), not.

* * *
"
    );
}

#[test]
fn a_code_block_left_open_in_prose_does_not_swallow_the_rest() {
    let page = Page::new("")
        .block(Block::Prose("```\nopen".to_owned()))
        .block(Block::Paragraph(Rich::plain("after")));
    assert_eq!((named("markdown").page)(&page), "```\nopen\n```\n\nafter\n");
}

#[test]
fn a_fence_is_longer_than_any_within_it() {
    let page =
        Page::new("").block(Block::Code { text: "````\nx\n````".into(), language: "".into() });
    assert_eq!((named("markdown").page)(&page), "`````\n````\nx\n````\n`````\n");
}

#[test]
fn every_format_says_what_it_is() {
    for format in FORMATS {
        assert!(!format.extension.starts_with('.') && format.media_type.contains('/'));
        assert!((format.page)(&Page::new("Empty")).contains("Empty"), "{}", format.name);
    }
    assert!(format("docx").is_none());
}
