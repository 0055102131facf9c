//! What may stand at a cursor, shown as `¦`.

use tussock_language::span::Span;
use tussock_language::syntax::{Expectation, Expected, expected_at};

#[track_caller]
fn at(marked: &str) -> Expectation {
    let offset = marked.find('¦').expect("the text has a cursor");
    let text = marked.replacen('¦', "", 1);
    expected_at(&text, Span::new(0, text.len()), offset)
}

fn shown(expectation: &Expectation) -> Vec<String> {
    let one = |expected: &Expected| match expected {
        Expected::Verb => "verb".to_owned(),
        Expected::Slot(slot) => slot.noun.to_owned(),
        Expected::Clause(clause) => format!("{} ...", clause.name()),
        Expected::Word(word) => (*word).to_owned(),
        Expected::Sign(sign) => (*sign).to_owned(),
        Expected::Column => "column".to_owned(),
        Expected::Level(column) => format!("level of {column}"),
        Expected::Operand => "operand".to_owned(),
        Expected::Operator => "operator".to_owned(),
        Expected::Key(path) => format!("key of {}", path.join(".")),
    };
    expectation.expected.iter().map(one).collect()
}

#[track_caller]
fn check(marked: &str, expected: &[&str]) {
    let expectation = at(marked);
    assert_eq!(shown(&expectation), expected, "{marked}");
}

#[test]
fn a_statement_starts_with_a_verb() {
    check("¦", &["verb"]);
    check("sh¦", &["verb"]);
    check("show groups of main\n¦", &["verb"]);
    check("  show groups of main\n  ¦", &["verb"]);
    check("# a comment\nre¦ad", &["verb"]);
}

#[test]
fn slots_come_in_their_order() {
    check("show ¦", &["a view"]);
    check("show gr¦", &["a view"]);
    check("show groups of ¦", &["a comparison"]);
    check("compare ¦", &["an outcome"]);
    check("compare a, ¦ across f in t as m", &["an outcome"]);
    check("read ¦", &["sample", "a file"]);
    check("read sample ¦", &["a sample"]);
    check("levels crew¦", &["a factor"]);
    check("label crew.¦", &["column"]);
    check("label crew.mood \"Mood\" better ¦", &["a direction"]);
    check("pin main.¦", &["key of main"]);
    check("pin main.omnibus.pi¦ at 3", &["key of main.omnibus"]);
    check("derive t.x ¦", &["="]);
}

#[test]
fn only_clauses_that_are_still_open_are_offered() {
    check("compare a across f ¦", &[",", "in ...", "where ...", "as ..."]);
    check("compare a ¦ across f as m", &[",", "in ...", "where ..."]);
    check("compare a across f in t\n  ¦\n  as m", &["where ..."]);
    check("levels t.f a merging \"b\" into a ¦", &["merging ..."]);
    check("levels t.f a merging \"b\" ¦", &[",", "into"]);
    let clauses = shown(&at("show groups of main alpha .05 ¦"));
    assert!(clauses.contains(&"scores alpha ...".to_owned()), "{clauses:?}");
    assert!(!clauses.contains(&"alpha ...".to_owned()), "{clauses:?}");
}

#[test]
fn a_clause_that_is_being_typed_is_offered_itself() {
    check("compare a acr¦", &[",", "across ...", "in ...", "where ...", "as ..."]);
    check("compare a across¦ f", &[",", "across ...", "in ...", "where ...", "as ..."]);
}

#[test]
fn expressions_expect_values_and_operators() {
    check("admit t where ¦", &["a condition", "operand"]);
    check("admit t where a ¦", &["operator", "as ...", "because ..."]);
    check("admit t where a = ¦", &["level of a", "operand"]);
    check("admit t where f in [¦", &["level of f"]);
    check("admit t where f in [x, y¦", &["level of f"]);
    check("derive t.x = if a ¦", &["operator", "then"]);
    check("derive t.x = log(¦", &["operand"]);
}

#[test]
fn the_table_is_known_wherever_it_is_named() {
    let expectation = at("compare a, ¦\n  across f in crew as m\nshow groups of m");
    assert_eq!(expectation.table.as_deref(), Some("crew"));
    let expectation = at("levels `my crew`.`on duty` ¦");
    assert_eq!(expectation.table.as_deref(), Some("my crew"));
    assert_eq!(expectation.column.as_deref(), Some("on duty"));
    assert_eq!(at("show groups of m\ncompare ¦").table, None);
}

#[test]
fn the_word_that_is_typed_is_known() {
    let text = "show grö¦up of m";
    assert_eq!(at(text).word, Span::new(5, 11));
    assert_eq!(at("show `two w¦ords` of m").word, Span::new(5, 16));
    assert!(at("read \"da¦ta.csv\" as t").in_text);
    assert!(at("write \"so {{main.¦").in_text);
    assert!(!at("read \"data.csv\"¦ as t").in_text);
    assert!(at("show a of b # al¦low").in_text);
}

#[test]
fn any_offset_has_an_answer() {
    let text = "read \"🦭.csv\" as `ö\r\nshow é of ";
    for offset in 0..text.len() + 5 {
        let _ = expected_at(text, Span::new(0, text.len()), offset);
    }
}
