//! The outline.

use tussock_language::features::symbols::symbols;

use crate::fixture::Fixture;

/// One line a symbol: kind, name, detail, and in brackets what an editor selects.
#[track_caller]
fn check(text: &str, expected: &[&str]) {
    check_in(&Fixture::script(&format!("{text}$0")), expected);
}

#[track_caller]
fn check_in(fixture: &Fixture, expected: &[&str]) {
    let lines: Vec<String> = symbols(&fixture.document, fixture.source)
        .iter()
        .map(|symbol| {
            let selection = symbol.selection.of(fixture.text());
            assert!(symbol.span.start <= symbol.selection.start, "{symbol:?}");
            assert!(symbol.selection.end <= symbol.span.end, "{symbol:?}");
            format!("{:?} {} ({}) [{selection}]", symbol.kind, symbol.name, symbol.detail)
        })
        .collect();
    assert_eq!(lines, expected);
}

#[test]
fn definitions_and_questions_are_listed_in_order() {
    check(
        "policy alpha .05\n  pairs holm\nread \"crew.csv\" as crew\nderive crew.gain = mood - 2\n\
         levels crew.roster fixed, forward\nlabel crew.mood \"Mood 😀\"\n\
         admit crew where mood > 2 as served because \"protocol\"\n\
         compare mood, `a b` across roster in served as main\nshow omnibus of main\n\
         write \"They differed.\"\npin main.omnibus.pillai.value at .38\n",
        &[
            "Policy policy (alpha .05 pairs holm) [policy]",
            "Table crew (read) [crew]",
            "Column crew.gain (derived) [gain]",
            "Column crew.roster (levels) [roster]",
            "Column crew.mood (Mood 😀) [mood]",
            "Table served (admitted from crew) [served]",
            "Comparison main (across roster in served) [main]",
            "Question omnibus of main (show) [show]",
            "Question They differed. (write) [write]",
            "Question main.omnibus.pillai.value (pin) [pin]",
        ],
    );
}

#[test]
fn a_half_typed_definition_keeps_its_place() {
    check(
        "compare mood, across roster in crew as main\nshow\nread as crew",
        &["Comparison main (incomplete) [main]", "Table crew (incomplete) [crew]"],
    );
}

#[test]
fn an_empty_document_has_an_empty_outline() {
    check("", &[]);
    check("# only a remark\r\n", &[]);
}

#[test]
fn a_markdown_file_lists_the_statements_of_its_fences() {
    let text = "# Crews\r\n\r\n```tussock\r\nread \"crew.csv\" as crew\r\n```\r\n\r\nread me\r\n$0";
    check_in(&Fixture::markdown(text), &["Table crew (read) [crew]"]);
}

#[test]
fn a_cell_lists_its_own_statements() {
    let fixture = Fixture::cells(&["read \"crew.csv\" as crew", "show omnibus of main$0"]);
    check_in(&fixture, &["Question omnibus of main (show) [show]"]);
}
