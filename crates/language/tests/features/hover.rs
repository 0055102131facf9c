//! Hover.

use tussock_language::document::Document;
use tussock_language::features::hover::{Hover, hover};
use tussock_language::span::SourceId;

use crate::facts::MadeUp;
use crate::fixture::Fixture;

const MAIN: &str =
    "read \"crew.csv\" as crew\ncompare alertness, mood across roster in crew as main\n";

fn found(fixture: &Fixture) -> Option<Hover> {
    hover(&fixture.document, fixture.source, fixture.offset, &MadeUp)
}

/// The words that the hover is about, and pieces of what it says, in their order.
#[track_caller]
fn check(marked: &str, words: &str, pieces: &[&str]) {
    check_in(&Fixture::script(marked), words, pieces);
}

#[track_caller]
fn check_in(fixture: &Fixture, words: &str, pieces: &[&str]) {
    let hover = found(fixture).expect("the word has a hover");
    assert_eq!(hover.span.of(fixture.text()), words);
    let mut rest = hover.markdown.as_str();
    for piece in pieces {
        let after = rest.find(piece).and_then(|at| rest.get(at + piece.len()..));
        assert!(after.is_some(), "{piece:?} is not in its place in\n{}", hover.markdown);
        rest = after.unwrap_or_default();
    }
}

#[track_caller]
fn check_none(marked: &str) {
    assert_eq!(found(&Fixture::script(marked)), None, "{marked}");
}

#[test]
fn a_verb_shows_its_page() {
    check("com$0pare mood across roster in crew as main", "compare", &["# compare"]);
    check("$0show omnibus of main", "show", &["# show"]);
}

#[test]
fn a_clause_shows_its_form_and_its_choices() {
    check(
        "show omnibus o$0f main",
        "of",
        &["**`of COMPARISON`**: the comparison", "`show`; required"],
    );
    check("policy pa$0irs holm", "pairs", &["pairs", "- `bonferroni`", "- `holm`"]);
    check("policy alp$0ha .05", "alpha", &["**`alpha RATE`**", "# Alpha", "**How to read it.**"]);
    check(
        "policy scores al$0pha .001",
        "scores alpha",
        &["**`scores alpha RATE`**", "# Discriminant score"],
    );
    check("levels crew.roster merging \"fxd\" in$0to fixed", "into", &["merging"]);
    check("read sam$0ple ferry as crew", "sample", &["# read"]);
}

#[test]
fn a_chosen_word_shows_its_page() {
    check("policy pairs ho$0lm", "holm", &["# Holm"]);
    check("policy effect g$0", "g", &["# Hedges' g"]);
    check("label crew.mood \"Mood\" better lo$0w", "low", &["lower values are better"]);
}

#[test]
fn a_coefficient_word_shows_its_page_with_the_values_of_this_analysis() {
    check(
        &format!("{MAIN}show coefficients of main coefficients struc$0ture"),
        "structure",
        &[
            "# Structure coefficient",
            "**In `main`**",
            "| mood | .71 |",
            "**How it is computed.**",
            "**How to read it.**",
            "**When it misleads.**",
            "**Reference.**",
        ],
    );
    check(
        &format!("{MAIN}pin main.coefficients.str$0ucture.mood.1 at .71"),
        "structure",
        &["# Structure coefficient", "**In `main`**", "| mood | .71 |"],
    );
    let other = Fixture::script("show coefficients of other coefficients ra$0w");
    let hover = found(&other).expect("the word has a page");
    assert!(!hover.markdown.contains("**In"), "{}", hover.markdown);
}

#[test]
fn a_view_a_sample_and_a_function_show_their_pages() {
    check("show omni$0bus of main", "omnibus", &["# omnibus"]);
    check("read sample fer$0ry as crew", "ferry", &["# ferry"]);
    check("derive crew.x = lo$0g(mood)", "log", &["# log"]);
    check("derive crew.x = mean(mood, alertness) an$0d 1", "and", &["both sides hold"]);
}

#[test]
fn a_rule_shows_its_page() {
    check(
        "# allow small$0-groups: a pilot\nshow omnibus of main",
        "small-groups",
        &["# small-groups"],
    );
    check_none("# allow small-groups: a pi$0lot\nshow omnibus of main");
}

#[test]
fn a_table_shows_its_definition_and_columns() {
    let pieces =
        ["**`crew`**, a table", "read \"crew.csv\" as crew", "| mood | number | Mood \\| 1 to 7 |"];
    check(&format!("{MAIN}admit cr$0ew where mood > 2"), "crew", &pieces);
    check("read \"crew.csv\" as cr$0ew", "crew", &pieces);
    check("read \"cr$0ew.csv\" as crew", "\"crew.csv\"", &pieces);
}

#[test]
fn a_column_shows_its_kind_and_detail() {
    check(
        "label crew.mo$0od \"Mood\"",
        "mood",
        &["**`mood`**, a number column of `crew`", "1 to 7"],
    );
    check(
        "compare mood, `Reaction$0 time (ms)` across roster in crew as main",
        "`Reaction time (ms)`",
        &["180 to 900"],
    );
    check("compare mood across ros$0ter in crew as main", "roster", &["a text column", "4 levels"]);
    check("admit crew where mo$0od > 3", "mood", &["a number column of `crew`"]);
    check(
        "read \"a.csv\" as crew\nderive crew.deck = mood - 2\nlabel crew.de$0ck \"Deck\"",
        "deck",
        &["**`deck`**", "derive crew.deck = mood - 2"],
    );
}

#[test]
fn a_level_shows_its_place() {
    check(
        "levels crew.roster fi$0xed, forward",
        "fixed",
        &[
            "**`fixed`**, level 1 of 4 of `roster`, the reference",
            "**fixed**, forward, backward, on call",
        ],
    );
    check("admit crew where roster = for$0ward", "forward", &["level 2 of 4 of `roster`"]);
    check("admit crew where roster in [`on c$0all`]", "`on call`", &["level 4 of 4"]);
}

#[test]
fn a_comparison_shows_what_it_compares_and_what_came_out() {
    check(
        &format!("{MAIN}show omnibus of ma$0in"),
        "main",
        &[
            "**`main`**, a comparison",
            "compare alertness, mood across roster in crew as main",
            "Outcomes: alertness, mood",
            "Groups: by roster (fixed, forward, backward, on call)",
            "Table: crew",
            "**V = .38, F(8, 290) = 8.52, p < .001**",
        ],
    );
    check(&format!("{MAIN}show omnibus of main for ros$0ter"), "roster", &["a term of `main`"]);
}

#[test]
fn each_segment_of_a_path_shows_its_value_and_its_meaning() {
    let pin = |path: &str| format!("{MAIN}pin {path} at .38");
    check(&pin("ma$0in.omnibus.pillai.value"), "main", &["a comparison"]);
    check(&pin("main.omni$0bus.pillai.value"), "omnibus", &["- `wilks`: Λ = .61", "# omnibus"]);
    check(
        &pin("main.omnibus.pil$0lai.value"),
        "pillai",
        &["`main.omnibus.pillai`: **V = .38, F(8, 290) = 8.52, p < .001**", "# Pillai's trace"],
    );
    check(
        &pin("main.omnibus.pillai.val$0ue"),
        "value",
        &["`main.omnibus.pillai.value`: **.38**", "# Pillai's trace"],
    );
    check(&pin("main.omnibus.pillai.et$0a2"), "eta2", &["**.19**", "# Eta squared"]);
    check(&pin("main.functions.1$0.share"), "1", &["# Discriminant function"]);
    check(&pin("main.functions.1.sha$0re"), "share", &["**.92**", "# Share of a function"]);
    check(
        &pin("main.coefficients.sha$0re.mood.1"),
        "share",
        &["# Share of an outcome", "**In `main`**"],
    );
    check(&pin("main.groups.fix$0ed.mood.mean"), "fixed", &["level 1 of 4"]);
    check(&pin("main.groups.fixed.mo$0od.mean"), "mood", &["a number column"]);
    check(&pin("main.groups.fixed.mood.me$0an"), "mean", &["**4.12**", "# Mean"]);
    check(&pin("main.groups.fixed.odd$0ity"), "oddity", &["**7**", "# groups"]);
    check(&pin("main.pairs.fixed.forward.mood.g$0"), "g", &["# Hedges' g"]);
}

#[test]
fn live_values_in_a_paragraph_are_paths_too() {
    check(
        &format!("{MAIN}write \"So, {{{{main.omnibus.pil$0lai}}}}.\""),
        "pillai",
        &["**V = .38, F(8, 290)"],
    );
    check(
        &format!("{MAIN}write \"\"\"\n  😀 {{{{main.omnibus.pillai.value$0 3}}}}.\n\"\"\""),
        "value",
        &["**.38**"],
    );
    check_none(&format!("{MAIN}write \"S$0o, {{{{main.omnibus.pillai}}}}.\""));
}

#[test]
fn markdown_prose_has_hovers() {
    let file = format!(
        "# Crews 🚢\r\n\r\nThey differed, {{{{main.omnibus.pil$0lai}}}}.\r\n\r\n```tussock\r\n{MAIN}```\r\n"
    );
    check_in(&Fixture::markdown(&file), "pillai", &["**V = .38, F(8, 290)"]);
    let file = format!("# Cre$0ws\n\n```tussock\n{MAIN}```\n");
    assert_eq!(found(&Fixture::markdown(&file)), None);
    let file = format!("# Crews\n\n```tussock\n{MAIN}show omni$0bus of main\n```\n");
    check_in(&Fixture::markdown(&file), "omnibus", &["# omnibus"]);
}

#[test]
fn a_notebook_cell_sees_definitions_of_the_others() {
    let fixture = Fixture::cells(&[MAIN, "show omnibus of mai$0n"]);
    check_in(&fixture, "main", &["a comparison", "Outcomes: alertness, mood"]);
}

#[test]
fn the_newest_definition_is_shown() {
    let again = "compare mood across roster in crew as main\n";
    let fixture = Fixture::cells(&[MAIN, again, "show omnibus of mai$0n"]);
    check_in(&fixture, "main", &["Outcomes: mood\n"]);
}

#[test]
fn blanks_unknown_names_and_empty_documents_have_no_hover() {
    check_none("$0");
    check_none("show omnibus of nowhere$0");
    check_none("# just a $0remark\n");
    check_none("show  $0 omnibus of main");
    check_none("frobnicate$0 omnibus");
}

#[test]
fn a_half_typed_statement_still_explains_its_words() {
    check("com$0pare", "compare", &["# compare"]);
    check("show omni$0bus", "omnibus", &["# omnibus"]);
    check("compare mood, mo$0od across in crew", "mood", &["a number column"]);
}

#[test]
fn every_offset_of_a_document_can_be_asked_about() {
    let text = format!(
        "{MAIN}# allow x-y: y\nlevels crew.roster `on c\nwrite \"😀 {{{{main.omnibus.pillai 3}}}}\"\npin main.\r\nshow 😀 of main\n"
    );
    let document = Document::script(text.clone());
    for offset in 0..=text.len() + 2 {
        if let Some(hover) = hover(&document, SourceId(0), offset, &MadeUp) {
            assert!(hover.span.touches(offset), "{offset}: {hover:?}");
            assert!(text.get(hover.span.range()).is_some(), "{offset}: {hover:?}");
            assert!(!hover.markdown.trim().is_empty());
        }
    }
    assert_eq!(hover(&document, SourceId(7), 0, &MadeUp), None);
}
