//! Completion.

use tussock_language::facts::NoFacts;
use tussock_language::features::completion::{Completion, CompletionKind, complete};

use crate::facts::MadeUp;
use crate::fixture::Fixture;

const CREW: &str = "read \"crew.csv\" as crew\n";
const MAIN: &str =
    "read \"crew.csv\" as crew\ncompare alertness, mood across roster in crew as main\n";

fn found(fixture: &Fixture) -> Vec<Completion> {
    complete(&fixture.document, fixture.source, fixture.offset, &MadeUp)
}

fn listed(fixture: &Fixture) -> String {
    found(fixture).iter().map(|one| one.label.clone()).collect::<Vec<_>>().join(" ")
}

/// What is offered at the cursor, in its order.
#[track_caller]
fn check(marked: &str, expected: &str) {
    assert_eq!(listed(&Fixture::script(marked)), expected, "{marked}");
}

/// What the text becomes when the first offer is taken.
#[track_caller]
fn check_taken(marked: &str, expected: &str) {
    let fixture = Fixture::script(marked);
    assert_eq!(taken(&fixture), expected, "{marked}");
}

#[track_caller]
fn taken(fixture: &Fixture) -> String {
    let all = found(fixture);
    let first = all.first().expect("something is offered");
    let mut text = fixture.text().to_owned();
    text.replace_range(first.replace.range(), &first.insert);
    text
}

#[test]
fn an_empty_document_offers_every_verb() {
    check("$0", "policy read admit derive levels label compare show write pin");
    check("# a comment\n\n$0", "policy read admit derive levels label compare show write pin");
}

#[test]
fn a_verb_is_completed_and_brings_its_page() {
    check("com$0", "compare");
    check("sh$0", "show");
    let found = found(&Fixture::script("com$0"));
    assert_eq!(found[0].kind, CompletionKind::Verb);
    assert!(found[0].page.as_deref().unwrap_or_default().starts_with("# compare"));
}

#[test]
fn clauses_that_are_not_used_yet_are_offered() {
    check(
        "show omnibus of main $0",
        "for coefficients alpha interval pairs scores alpha effect missing",
    );
    check("show omnibus of main al$0 ", "alpha scores alpha");
    check("show omnibus of main alpha .01 a$0", "scores alpha");
    check("read \"crew.csv\" \n  $0", "as missing separator decimal encoding");
}

#[test]
fn words_to_choose_from_are_offered_with_their_pages() {
    check("policy pairs $0", "unadjusted bonferroni holm");
    check("policy effect $0", "d g");
    check("label crew.mood \"Mood\" better $0", "high low");
    check("show coefficients of main coefficients st$0", "standardized structure");
    let found = found(&Fixture::script("policy pairs ho$0"));
    assert!(found[0].page.as_deref().unwrap_or_default().starts_with("# Holm"));
}

#[test]
fn outcomes_are_numbers_first_and_each_once() {
    check(
        &format!("{CREW}compare $0 across roster in crew as main"),
        "alertness mood Reaction time (ms) deck",
    );
    check(
        &format!("{CREW}compare mood, $0 across roster in crew as main"),
        "alertness Reaction time (ms) deck",
    );
    check(&format!("{CREW}compare alertness, mo$0"), "mood");
}

#[test]
fn without_a_table_the_newest_one_is_meant() {
    check(&format!("{CREW}compare $0"), "alertness mood Reaction time (ms) deck roster");
}

#[test]
fn factors_are_texts_first() {
    check(
        &format!("{CREW}compare mood across $0 in crew as main"),
        "roster alertness Reaction time (ms) deck",
    );
}

#[test]
fn a_name_that_needs_back_quotes_gets_them() {
    check_taken(
        &format!("{CREW}compare reac$0 in crew as main"),
        &format!("{CREW}compare `Reaction time (ms)` in crew as main"),
    );
    check(&format!("{CREW}compare time$0 in crew as main"), "Reaction time (ms)");
    check_taken(&format!("{CREW}compare `Reac$0"), &format!("{CREW}compare `Reaction time (ms)`"));
}

#[test]
fn the_whole_word_under_the_cursor_is_replaced() {
    check_taken("show omni$0bu of main", "show omnibus of main");
}

#[test]
fn views_and_comparisons_are_offered() {
    check("show $0", "groups omnibus coefficients");
    check(&format!("{MAIN}show omnibus of $0"), "main");
    check(&format!("{MAIN}show omnibus of main for $0"), "roster");
}

#[test]
fn tables_are_offered_where_one_is_mentioned() {
    let tables = format!("{CREW}admit crew where mood > 2 as served because \"protocol\"\n");
    check(&format!("{tables}compare mood across roster in $0"), "crew served");
    check(&format!("{tables}admit $0"), "crew served");
}

#[test]
fn a_column_path_is_a_table_a_dot_and_a_column() {
    check_taken(&format!("{CREW}label cr$0"), &format!("{CREW}label crew."));
    check(&format!("{CREW}label crew.$0"), "alertness mood Reaction time (ms) deck roster");
    check(&format!("{CREW}levels crew.$0"), "roster alertness mood Reaction time (ms) deck");
}

#[test]
fn levels_come_from_the_file() {
    check(&format!("{CREW}levels crew.roster $0"), "fixed forward backward on call merging");
    check(&format!("{CREW}levels crew.roster fixed, $0"), "forward backward on call");
    check_taken(
        &format!("{CREW}levels crew.roster fixed, on$0"),
        &format!("{CREW}levels crew.roster fixed, `on call`"),
    );
    check(
        &format!("{CREW}levels crew.roster merging \"fxd\" into $0"),
        "fixed forward backward on call",
    );
    check(&format!("{CREW}levels crew.roster merging \"$0\""), "fixed forward backward on call");
}

#[test]
fn a_condition_offers_columns_then_levels_of_the_column() {
    check(
        &format!("{CREW}admit crew where $0"),
        "roster alertness mood Reaction time (ms) deck log mean not if",
    );
    check(&format!("{CREW}admit crew where roster = ba$0"), "backward");
    check(&format!("{CREW}admit crew where roster in [fixed, fo$0] as served"), "forward");
    check(&format!("{CREW}admit crew where roster != \"fi$0\""), "fixed");
    check_taken(
        &format!("{CREW}admit crew where roster = on$0"),
        &format!("{CREW}admit crew where roster = `on call`"),
    );
    check_taken(
        &format!("{CREW}admit crew where deck = 2$0"),
        &format!("{CREW}admit crew where deck = 2"),
    );
}

#[test]
fn after_a_value_come_operators_and_the_next_clause() {
    check(&format!("{CREW}admit crew where mood > 3 $0"), "and or not in as because");
    check_taken(&format!("{CREW}derive crew.x = lo$0"), &format!("{CREW}derive crew.x = log("));
}

#[test]
fn samples_and_files_are_offered() {
    check("read sample $0", "ferry");
    check("read $0", "sample crew.csv data/");
    check("read \"$0\" as crew", "crew.csv data/");
    check_taken("read \"cr$0\" as crew", "read \"crew.csv\" as crew");
    check_taken("read \"data/$0", "read \"data/basil.csv\"");
    check_taken("read \"da$0", "read \"data/");
}

#[test]
fn a_path_is_offered_segment_by_segment() {
    check_taken(&format!("{MAIN}pin ma$0"), &format!("{MAIN}pin main."));
    check(&format!("{MAIN}pin main.$0"), "groups omnibus");
    check(&format!("{MAIN}pin main.omnibus.$0"), "wilks pillai");
    check(&format!("{MAIN}pin main.omnibus.pillai.v$0 at .38"), "value");
    check_taken(
        &format!("{MAIN}pin main.groups.on$0"),
        &format!("{MAIN}pin main.groups.`on call`"),
    );
    check_taken(
        &format!("{MAIN}pin main.coefficients.structure.mood.$0"),
        &format!("{MAIN}pin main.coefficients.structure.mood.1"),
    );
    let found = found(&Fixture::script(&format!("{MAIN}pin main.omnibus.pi$0")));
    assert_eq!(found[0].detail, "V = .38");
    assert!(found[0].page.as_deref().unwrap_or_default().starts_with("# Pillai"));
}

#[test]
fn live_values_are_offered_inside_braces_only() {
    check(&format!("{MAIN}write \"They differed, {{{{main.omnibus.$0}}}}.\""), "wilks pillai");
    check(&format!("{MAIN}write \"They differed, {{{{main.omnibus.$0"), "wilks pillai");
    check(&format!("{MAIN}write \"They differed, $0\""), "");
    check(&format!("{MAIN}write \"\"\"They differed,\n  {{{{$0}}}}\"\"\""), "main");
}

#[test]
fn markdown_prose_offers_live_values_and_its_fences_offer_code() {
    let file = |prose: &str, code: &str| {
        format!("# Crews ⛴\n\n{prose}\n\n```tussock\n{MAIN}{code}\n```\n")
    };
    let markdown = |text: &str| listed(&Fixture::markdown(text));
    assert_eq!(markdown(&file("They differed, {{main.omnibus.$0}}.", "")), "wilks pillai");
    assert_eq!(markdown(&file("They $0differed.", "")), "");
    assert_eq!(markdown(&file("", "show $0")), "groups omnibus coefficients");
    assert_eq!(markdown("```tussock\n$0"), listed(&Fixture::script("$0")));
}

#[test]
fn a_notebook_cell_knows_the_names_of_the_others() {
    let fixture = Fixture::cells(&[CREW, "compare mood across roster in $0 as main", "show"]);
    assert_eq!(listed(&fixture), "crew");
    let fixture = Fixture::cells(&[MAIN, "show omnibus of $0"]);
    assert_eq!(listed(&fixture), "main");
}

#[test]
fn the_word_of_a_clause_is_not_taken_for_a_name_while_its_end_is_typed() {
    check(&format!("{CREW}compare mood across $0"), "roster alertness Reaction time (ms) deck");
    check(
        &format!("{CREW}levels crew.roster merging \"fxd\" into $0"),
        "fixed forward backward on call",
    );
    check(
        &format!("{CREW}levels crew.roster fixed merging \"$0"),
        "fixed forward backward on call",
    );
}

#[test]
fn half_typed_statements_around_the_cursor_do_no_harm() {
    check(
        &format!("{CREW}compare mood,\n\nshow $0\n\nadmit crew where"),
        "groups omnibus coefficients",
    );
    check(&format!("{CREW}levels crew.\nshow omnibus of main al$0"), "alpha scores alpha");
    check(
        "read \"crew.csv\" as\n$0",
        "policy read admit derive levels label compare show write pin",
    );
}

#[test]
fn emoji_and_carriage_returns_do_not_shift_the_place() {
    check("# 🚢🚢\r\nread \"crew.csv\" as crew\r\nlabel crew.mood \"Mood 😀\" be$0\r\n", "better");
    check_taken(
        "write \"🚢\"\r\nshow omni$0 of main\r\n",
        "write \"🚢\"\r\nshow omnibus of main\r\n",
    );
}

#[test]
fn rules_are_offered_after_allow() {
    let all = listed(&Fixture::script("# allow $0\nshow omnibus of main"));
    assert!(all.contains("small-groups"), "{all}");
    let first = all.split(' ').next().unwrap_or_default();
    let typed = &first[..3];
    check_taken(&format!("# allow {typed}$0: planned"), &format!("# allow {first}: planned"));
    check("# allow x-y: because $0", "");
    check("# a remark $0", "");
}

#[test]
fn nothing_is_offered_inside_other_texts() {
    check("label crew.mood \"Mo$0\"", "");
    check(&format!("{CREW}admit crew where mood > 2 as served because \"c$0\""), "");
}

#[test]
fn every_offset_of_a_document_can_be_asked_about() {
    let text = format!(
        "{MAIN}# allow x: y\nlevels crew.roster `on c\nwrite \"😀 {{{{main.omnibus.pillai 3}}}}\"\npin main.\r\nshow 😀 of main\n"
    );
    for offset in 0..=text.len() + 2 {
        let fixture = Fixture::script("$0");
        let document = tussock_language::document::Document::script(text.clone());
        for one in complete(&document, fixture.source, offset, &MadeUp) {
            assert!(one.replace.start <= one.replace.end && one.replace.end <= text.len());
            assert!(text.get(one.replace.range()).is_some(), "{offset}: {one:?}");
        }
    }
}

#[test]
fn without_facts_the_grammar_is_still_offered() {
    let fixture = Fixture::script(&format!("{MAIN}show omnibus of main for roster a$0"));
    let found = complete(&fixture.document, fixture.source, fixture.offset, &NoFacts);
    assert!(found.iter().any(|one| one.label == "alpha"));
    let fixture =
        Fixture::script("read \"a.csv\" as crew\nderive crew.gain = mood - 2\nlabel crew.$0");
    let found = complete(&fixture.document, fixture.source, fixture.offset, &NoFacts);
    assert_eq!(found.iter().map(|one| one.label.as_str()).collect::<Vec<_>>(), ["gain"]);
}
