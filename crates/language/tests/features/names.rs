//! Go to definition, references, rename.

use tussock_language::features::definition::definition;
use tussock_language::features::references::references;
use tussock_language::features::rename::{RenameError, renamable, rename};

use crate::fixture::Fixture;

const WHOLE: &str = "read \"crew.csv\" as crew
derive crew.gain = mood - 2
admit crew where gain > 0 as served because \"protocol\"
compare gain, mood across roster in served as main
show groups of main for roster
write \"😀 It was {{main.groups.fixed.gain.mean 1}}.\"
pin main.omnibus.pillai.value at .38
";

/// The line on which the name under the cursor is defined.
#[track_caller]
fn check_definition(marked: &str, expected: Option<&str>) {
    let fixture = Fixture::script(marked);
    let found = definition(&fixture.document, fixture.source, fixture.offset);
    let line = found.map(|location| {
        let text = fixture.text();
        let start = text[..location.span.start].rfind('\n').map_or(0, |at| at + 1);
        format!("{} in {}", location.span.of(text), text[start..].lines().next().unwrap_or(""))
    });
    assert_eq!(line.as_deref(), expected, "{marked}");
}

/// The text after the name under the cursor has been changed.
#[track_caller]
fn renamed(fixture: &Fixture, new_name: &str) -> Result<String, RenameError> {
    let mut edits = rename(&fixture.document, fixture.source, fixture.offset, new_name)?;
    edits.sort_by_key(|edit| edit.location.span);
    let mut text = fixture.text().to_owned();
    for edit in edits.iter().rev().filter(|edit| edit.location.source == fixture.source) {
        text.replace_range(edit.location.span.range(), &edit.text);
    }
    Ok(text)
}

/// `WHOLE` with the cursor in the first occurrence of `before`, at its bar.
fn at(before: &str) -> String {
    let place = before.replace('|', "");
    WHOLE.replacen(&place, &before.replace('|', "$0"), 1)
}

#[test]
fn tables_comparisons_and_derived_columns_lead_to_their_definitions() {
    check_definition(&at("admit cr|ew"), Some("crew in read \"crew.csv\" as crew"));
    check_definition(
        &at("in serv|ed"),
        Some("served in admit crew where gain > 0 as served because \"protocol\""),
    );
    let main = "main in compare gain, mood across roster in served as main";
    check_definition(&at("of mai|n"), Some(main));
    check_definition(&at("{{ma|in"), Some(main));
    check_definition(&at("pin ma|in"), Some(main));
    let gain = "gain in derive crew.gain = mood - 2";
    check_definition(&at("where ga|in"), Some(gain));
    check_definition(&at("compare ga|in"), Some(gain));
    check_definition(&at("fixed.ga|in"), Some(gain));
}

#[test]
fn a_column_of_the_file_leads_to_the_table_that_is_read() {
    check_definition(&at("= mo|od"), Some("crew in read \"crew.csv\" as crew"));
    check_definition(&at("for ros|ter"), Some("crew in read \"crew.csv\" as crew"));
}

#[test]
fn other_words_lead_nowhere() {
    check_definition(&at("show gro|ups"), None);
    check_definition(&at("sh|ow groups"), None);
    check_definition("show groups of now$0here", None);
    check_definition("$0", None);
}

#[test]
fn references_are_found_in_code_texts_and_paths() {
    let fixture = Fixture::script(&at("as ma|in"));
    let found = references(&fixture.document, fixture.source, fixture.offset);
    let words: Vec<_> = found
        .iter()
        .map(|reference| (reference.location.span.of(fixture.text()), reference.defines))
        .collect();
    assert_eq!(words, [("main", true), ("main", false), ("main", false), ("main", false)]);
}

#[test]
fn a_column_of_admitted_rows_is_the_column_of_their_table() {
    let fixture = Fixture::script(&at("crew.ga|in"));
    let found = references(&fixture.document, fixture.source, fixture.offset);
    assert_eq!(found.iter().filter(|one| one.defines).count(), 1);
    assert_eq!(found.len(), 4, "{found:?}");
}

#[test]
fn references_cross_cells_and_prose() {
    let fixture = Fixture::cells(&[
        "read \"crew.csv\" as crew",
        "admit cr$0ew where x > 1 as y because \"z\"",
    ]);
    assert_eq!(references(&fixture.document, fixture.source, fixture.offset).len(), 2);
    let text = "So {{ma$0in.omnibus.pillai}}.\r\n\r\n```tussock\r\ncompare x across y in t as main\r\n```\r\n";
    let fixture = Fixture::markdown(text);
    assert_eq!(references(&fixture.document, fixture.source, fixture.offset).len(), 2);
}

#[test]
fn a_name_is_changed_wherever_it_stands() {
    let fixture = Fixture::script(&at("of ma|in"));
    assert_eq!(renamed(&fixture, "rosters"), Ok(WHOLE.replace("main", "rosters")));
    let fixture = Fixture::script(&at("where ga|in"));
    assert_eq!(renamed(&fixture, "net gain"), Ok(WHOLE.replace("gain", "`net gain`")));
    let fixture = Fixture::script(&at("where ga|in"));
    assert_eq!(renamed(&fixture, "not"), Ok(WHOLE.replace("gain", "`not`")));
}

#[test]
fn a_name_is_not_changed_to_one_that_cannot_be_or_is_taken() {
    let main = Fixture::script(&at("of ma|in"));
    assert_eq!(renamed(&main, " "), Err(RenameError::NotAName));
    assert_eq!(renamed(&main, "a`b"), Err(RenameError::NotAName));
    assert_eq!(renamed(&main, "crew"), Err(RenameError::Taken("crew".to_owned())));
    let gain = Fixture::script(&at("where ga|in"));
    assert_eq!(renamed(&gain, "mood"), Err(RenameError::Taken("mood".to_owned())));
}

#[test]
fn only_what_the_document_defines_can_be_renamed() {
    let place = |marked: &str| {
        let fixture = Fixture::script(marked);
        renamable(&fixture.document, fixture.source, fixture.offset)
            .map(|span| span.of(fixture.text()).to_owned())
    };
    assert_eq!(place(&at("in serv|ed")), Ok("served".to_owned()));
    assert_eq!(place(&at("= mo|od")), Err(RenameError::FromFile("mood".to_owned())));
    assert_eq!(
        place("show groups of now$0here"),
        Err(RenameError::NotDefined("nowhere".to_owned()))
    );
    assert_eq!(place("sh$0ow groups of main"), Err(RenameError::NothingToRename));
}
