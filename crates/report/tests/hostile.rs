//! Text that tries to be more than text, in every place that takes text.
#![allow(
    clippy::indexing_slicing,
    clippy::panic,
    clippy::unwrap_used,
    clippy::wildcard_enum_match_arm,
    reason = "a test stops where it fails"
)]

mod sample;

use pulldown_cmark::{Event, Options, Parser, Tag, TagEnd};
use tussock_report::render::{FORMATS, html, markdown, text};
use tussock_report::rich::Rich;
use tussock_report::table::Table;

fn markdown_events(text: &str) -> Vec<Event<'_>> {
    Parser::new_ext(text, Options::ENABLE_TABLES | Options::ENABLE_STRIKETHROUGH).collect()
}

/// The cells of the first table in a Markdown text, row by row.
fn markdown_cells(markdown: &str) -> Vec<Vec<String>> {
    let mut rows: Vec<Vec<String>> = Vec::new();
    let mut in_cell = false;
    for event in markdown_events(markdown) {
        match event {
            Event::Start(Tag::TableHead | Tag::TableRow) => rows.push(Vec::new()),
            Event::Start(Tag::TableCell) => {
                rows.last_mut().unwrap().push(String::new());
                in_cell = true;
            }
            Event::End(TagEnd::TableCell) => in_cell = false,
            Event::Text(text) if in_cell => {
                rows.last_mut().unwrap().last_mut().unwrap().push_str(&text);
            }
            _ => {}
        }
    }
    rows
}

/// What a reader sees of a text: one line, single spaces.
fn seen(text: &str) -> String {
    text.split_whitespace().collect::<Vec<_>>().join(" ")
}

#[test]
fn in_html_text_opens_no_tag_and_ends_no_attribute() {
    for hostile in sample::HOSTILE {
        let harmless = html::table(&sample::hostile_table("harmless"));
        let out = html::table(&sample::hostile_table(hostile));
        assert_eq!(out.matches('<').count(), harmless.matches('<').count(), "{hostile}: {out}");
        assert_eq!(out.matches('"').count(), harmless.matches('"').count(), "{hostile}: {out}");
        for format in FORMATS.iter().filter(|format| format.name == "html") {
            let harmless = (format.page)(&sample::hostile_page("harmless"));
            let page = (format.page)(&sample::hostile_page(hostile));
            // Program text between back-quotes in a problem's title is marked as such.
            let count =
                |page: &str| page.replace("<code>", "").replace("</code>", "").matches('<').count();
            assert_eq!(count(&page), count(&harmless), "{hostile}: {page}");
            assert_eq!(page.matches('"').count(), harmless.matches('"').count(), "{hostile}");
        }
    }
}

#[test]
fn in_markdown_text_is_text_and_a_cell_stays_a_cell() {
    for hostile in sample::HOSTILE {
        let table = sample::hostile_table(hostile);
        let out = markdown::table(&table);
        let shown = seen(&Rich::plain(hostile).text());
        let cells = markdown_cells(&out);
        assert_eq!(cells.len(), 2, "{hostile}: {out}");
        let seen_cells: Vec<String> = cells[1].iter().map(|cell| seen(cell)).collect();
        assert_eq!(seen_cells, [shown.clone(), "1.50".to_owned(), shown.clone()], "{out}");
        assert_eq!(seen(&cells[0][1]), format!("{shown}: {shown}"), "{out}");
    }
}

#[test]
fn in_markdown_text_becomes_no_link_tag_list_or_head() {
    for hostile in sample::HOSTILE {
        for lead in ["", "before "] {
            let rich = Rich::plain(lead).then(Rich::plain(hostile));
            let out = rich.markdown();
            let mut text = String::new();
            for event in markdown_events(&out) {
                match event {
                    Event::Text(part) => text.push_str(&part),
                    Event::Start(Tag::Paragraph) | Event::End(TagEnd::Paragraph) => {}
                    other => panic!("{hostile:?} became {other:?} in {out:?}"),
                }
            }
            assert_eq!(seen(&text), seen(&rich.text()), "{out}");
        }
    }
}

#[test]
fn no_control_character_reaches_a_terminal() {
    for hostile in sample::HOSTILE {
        for format in FORMATS {
            for out in [
                (format.table)(&sample::hostile_table(hostile)),
                (format.page)(&sample::hostile_page(hostile)),
            ] {
                let stray = out.chars().find(|c| c.is_control() && *c != '\n');
                // Program text and lines of problems are the only text that HTML, Markdown and
                // JSON pass on as it is; the last escapes it.
                if format.name == "text" || format.name == "json" {
                    assert_eq!(stray, None, "{}: {out:?}", format.name);
                }
            }
        }
        let table = html::table(&sample::hostile_table(hostile));
        assert!(!table.trim_end().contains('\u{1b}'), "{table:?}");
    }
}

#[test]
fn a_label_cannot_break_the_lines_of_a_text_table() {
    let height =
        |table: &Table| text::table(table).lines().filter(|line| line.contains("1.50")).count();
    for hostile in sample::HOSTILE {
        assert_eq!(height(&sample::hostile_table(hostile)), 1);
        let rules = text::table(&sample::hostile_table(hostile));
        assert!(rules.lines().filter(|line| line.starts_with("────")).count() >= 3, "{rules}");
    }
}
