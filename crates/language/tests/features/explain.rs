//! The manual.

use std::collections::BTreeSet;

use tussock_language::features::explain::{EntryKind, index, nearest, page};
use tussock_language::terms;
use tussock_language::verbs::VERBS;

use crate::facts::MadeUp;

#[track_caller]
fn check(name: &str, start: &str) {
    let page = page(name, &MadeUp).expect("the word has a page");
    assert!(page.starts_with(start), "{name}: {page}");
}

#[track_caller]
fn check_near(name: &str, expected: &str) {
    assert_eq!(page(name, &MadeUp), None, "{name}");
    let near = nearest(name, &MadeUp);
    assert!(near.iter().any(|word| word == expected), "{name}: {near:?}");
}

#[test]
fn every_sort_of_word_has_a_page() {
    check("compare", "# compare");
    check("omnibus", "# omnibus");
    check("structure-coefficient", "# Structure coefficient");
    check("log", "# log");
    check("ferry", "# ferry");
}

#[test]
fn words_and_keys_lead_to_the_page_of_their_term() {
    check("structure", "# Structure coefficient");
    check("pillai", "# Pillai");
    check("g", "# Hedges");
    check("mean_abs_effect", "# Mean absolute effect");
    check("functions.share", "# Share of a function");
}

#[test]
fn a_clause_has_a_page() {
    check("across", "**`across FACTOR, ...`**");
    check("scores alpha", "**`scores alpha RATE`**");
    let both = page("missing", &MadeUp).expect("a clause of two verbs");
    assert!(both.contains("`read`") && both.contains("`policy`"), "{both}");
}

#[test]
fn a_word_with_two_meanings_gets_both() {
    let both = page("mean", &MadeUp).expect("a term and a function");
    assert!(both.contains("# Mean\n") && both.contains("# mean\n"), "{both}");
}

#[test]
fn a_slip_finds_its_neighbours() {
    check_near("piilai", "pillai");
    check_near("compair", "compare");
    check_near("coefficient", "structure-coefficient");
    assert_eq!(nearest("qqqqqqqqqqqqqqqqq", &MadeUp), Vec::<String>::new());
}

#[test]
fn the_index_holds_every_page_once() {
    let index = index(&MadeUp);
    let sorted = index.windows(2).all(|pair| pair[0].kind <= pair[1].kind);
    assert!(sorted, "sort by sort");
    let names: BTreeSet<_> = index.iter().map(|entry| (entry.kind, entry.page.name)).collect();
    assert_eq!(names.len(), index.len());
    let of = |kind| index.iter().filter(|entry| entry.kind == kind).count();
    assert_eq!(of(EntryKind::Verb), VERBS.len());
    assert_eq!(of(EntryKind::Term), terms::all().len());
    for entry in &index {
        assert!(page(entry.page.name, &MadeUp).is_some(), "{}", entry.page.name);
    }
}
