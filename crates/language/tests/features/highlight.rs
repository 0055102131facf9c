//! Words by meaning.

use tussock_language::document::Document;
use tussock_language::features::highlight::highlights;
use tussock_language::span::SourceId;

use crate::fixture::Fixture;

/// Each word with what it is, one a line.
#[track_caller]
fn check(fixture: &Fixture, expected: &[&str]) {
    let text = fixture.text();
    let lines: Vec<String> = highlights(&fixture.document, fixture.source)
        .iter()
        .map(|highlight| format!("{:?} {}", highlight.kind, highlight.span.of(text)))
        .collect();
    assert_eq!(lines, expected);
}

#[test]
fn every_word_has_its_meaning() {
    check(
        &Fixture::script("admit crew where `on deck` = 2 as served because \"x\" # why\r\n$0"),
        &[
            "Verb admit",
            "Table crew",
            "Keyword where",
            "Column `on deck`",
            "Operator =",
            "Number 2",
            "Keyword as",
            "Table served",
            "Keyword because",
            "Text \"x\"",
            "Comment # why",
        ],
    );
}

#[test]
fn a_live_value_divides_the_text_around_it() {
    check(
        &Fixture::script("write \"😀 {{main.omnibus.pillai 3}}.\"$0"),
        &["Verb write", "Text \"😀 ", "Comparison main", "Key omnibus", "Key pillai", "Text .\""],
    );
}

#[test]
fn a_path_and_a_view_are_told_apart_from_names() {
    check(
        &Fixture::script("pin main.functions.1.share at .92\nshow functions of main$0"),
        &[
            "Verb pin",
            "Comparison main",
            "Key functions",
            "Key 1",
            "Key share",
            "Keyword at",
            "Number .92",
            "Verb show",
            "View functions",
            "Keyword of",
            "Comparison main",
        ],
    );
}

#[test]
fn highlights_do_not_overlap_whatever_the_text() {
    let texts = [
        "",
        "show 😀 of `half\nwrite \"{{a.b}} {{c.d}}\"\n levels . , =\r\n\"\"\"{{main.x",
        "write \"\"\"\n  {{a.b}}\n  {{c.`d e`.1 2}}\n\"\"\"\ncompare a.. x b",
    ];
    for text in texts {
        let document = Document::script(text);
        let found = highlights(&document, SourceId(0));
        for pair in found.windows(2) {
            assert!(pair[0].span.end <= pair[1].span.start, "{pair:?}");
        }
        assert!(found.iter().all(|highlight| text.get(highlight.span.range()).is_some()));
    }
}
