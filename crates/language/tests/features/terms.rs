//! Every term has a page that is worth opening.

use std::collections::BTreeSet;

use tussock_language::terms::{self, TermKind};

#[test]
fn every_page_has_a_summary_a_heading_and_a_reference() {
    for term in terms::all() {
        let page = term.page;
        assert!(page.summary.len() >= 20, "{}: summary", page.name);
        assert!(page.summary.ends_with('.'), "{}: the summary is a sentence", page.name);
        assert!(!page.summary.contains('*'), "{}: lists show it as plain text", page.name);
        assert!(page.text.starts_with("# "), "{}: heading", page.name);
        let reference = page.text.split("**Reference.** ").nth(1).unwrap_or_default();
        assert!(has_year(reference), "{}: a reference with a year", page.name);
        assert!(reference.contains('*'), "{}: a journal or book, in italics", page.name);
    }
}

#[test]
fn every_page_says_how_to_read_it_when_it_misleads_and_what_it_leaves_open() {
    for term in terms::all() {
        for part in
            ["**How to read it.**", "**When it misleads.**", "**What it does not tell you.**"]
        {
            assert!(term.page.text.contains(part), "{} lacks {part}", term.page.name);
        }
    }
}

#[test]
fn every_coefficient_page_has_a_formula() {
    for term in terms::all().iter().filter(|term| term.kind == TermKind::Coefficient) {
        let text = term.page.text;
        let computed = text.split("**How it is computed.**").nth(1).unwrap_or_default();
        let paragraph = computed.split("\n\n").next().unwrap_or_default();
        assert!(paragraph.contains('`'), "{}: a formula in code", term.page.name);
        assert!(term.coefficient_word().is_some(), "{}", term.page.name);
    }
}

#[test]
fn pages_are_short_enough_for_a_hover() {
    for term in terms::all() {
        let lines = term.page.text.lines().count();
        assert!((10..=25).contains(&lines), "{}: {lines} lines", term.page.name);
    }
}

#[test]
fn names_are_kebab_case_and_no_word_leads_to_two_pages() {
    let mut seen = BTreeSet::new();
    for term in terms::all() {
        let name = term.page.name;
        assert!(
            name.chars().all(|c| c.is_ascii_lowercase() || c.is_ascii_digit() || c == '-'),
            "{name}"
        );
        assert!(seen.insert(name), "{name} twice");
        for word in term.words {
            assert!(seen.insert(word), "{word} twice");
        }
    }
}

#[test]
fn every_key_of_a_live_value_has_a_page() {
    let keys = [
        ("groups", "n mean sd se lower upper"),
        ("correlations", "within total"),
        (
            "covariances",
            "box M chi2 df chi2_p F df1 df2 p logdet logdet_pooled levene brown_forsythe",
        ),
        (
            "omnibus",
            "wilks pillai hotelling roy theta F df1 df2 p ln_p eta2 eta2_lower eta2_upper p_bound",
        ),
        ("functions", "eigenvalue share canonical wilks F df1 df2 p"),
        ("coefficients", "raw standardized structure share"),
        ("centroids", "mean sd"),
        ("scores", "F df1 df2 p difference d g p_adjusted"),
        ("outcomes", "F df1 df2 p eta2 omega2"),
        (
            "pairs",
            "difference lower upper t df p p_bonferroni p_holm p_adjusted d g d_lower d_upper g_lower g_upper mean_abs_effect",
        ),
    ];
    for (view, keys) in keys {
        for key in keys.split(' ') {
            assert!(terms::of_key(view, key).is_some(), "{view}.{key}");
        }
    }
}

#[test]
fn a_key_may_mean_one_thing_below_one_view_and_another_below_another() {
    let name = |view, key| terms::of_key(view, key).map(|term| term.page.name);
    assert_eq!(name("coefficients", "share"), Some("share"));
    assert_eq!(name("functions", "share"), Some("function-share"));
    assert_eq!(name("omnibus", "wilks"), Some("wilks"));
    assert_eq!(name("functions", "wilks"), Some("remaining-functions"));
    assert_eq!(name("omnibus", "nothing"), None);
}

#[test]
fn the_words_of_settings_lead_to_pages() {
    for word in
        ["alpha", "interval", "bonferroni", "holm", "unadjusted", "d", "g", "listwise", "structure"]
    {
        assert!(terms::of_word(word).is_some(), "{word}");
    }
}

fn has_year(text: &str) -> bool {
    text.split(|c: char| !c.is_ascii_digit())
        .any(|digits| digits.len() == 4 && (digits.starts_with("19") || digits.starts_with("20")))
}
