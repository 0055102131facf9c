//! The manual: every word that has a page.

use super::markdown::stacked;
use crate::facts::{Facts, Page};
use crate::{terms, verbs};

/// What a list of pages says about one of them.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Entry {
    /// What sort of page.
    pub kind: EntryKind,
    /// The page.
    pub page: Page,
}

/// Sorts of pages, in the order of the manual.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum EntryKind {
    /// The word that a statement starts with.
    Verb,
    /// A view of a comparison.
    View,
    /// A term of the trade.
    Term,
    /// A function of expressions.
    Function,
    /// A built-in table.
    Sample,
    /// A rule that diagnostics name.
    Rule,
}

/// Every page, sort by sort.
#[must_use]
pub fn index(facts: &dyn Facts) -> Vec<Entry> {
    let entry = |kind| move |page: &Page| Entry { kind, page: *page };
    let mut index: Vec<Entry> = Vec::new();
    index.extend(verbs::VERBS.iter().map(|verb| &verb.page).map(entry(EntryKind::Verb)));
    index.extend(facts.views().iter().map(entry(EntryKind::View)));
    index.extend(terms::all().iter().map(|term| &term.page).map(entry(EntryKind::Term)));
    index.extend(facts.functions().iter().map(entry(EntryKind::Function)));
    index.extend(facts.samples().iter().map(entry(EntryKind::Sample)));
    index.extend(rules(facts).iter().map(entry(EntryKind::Rule)));
    index
}

/// The pages of all rules: those that the text alone decides, and those that need data or results.
pub(super) fn rules(facts: &dyn Facts) -> Vec<Page> {
    crate::rules::pages().copied().chain(facts.rules().iter().copied()).collect()
}

/// The page of a word: a verb, a clause, a view, a term, a function, a sample, a rule. A word with
/// several meanings gets all of them.
#[must_use]
pub fn page(name: &str, facts: &dyn Facts) -> Option<String> {
    let name = name.trim();
    let mut pages: Vec<String> = index(facts)
        .into_iter()
        .filter(|entry| entry.page.name == name)
        .map(|entry| entry.page.text.to_owned())
        .collect();
    if pages.is_empty() {
        pages = clauses(name);
    }
    if pages.is_empty() {
        pages.extend(terms_of(name).map(|term| term.page.text.to_owned()));
    }
    let pages = stacked(pages.iter().map(String::as_str));
    (!pages.is_empty()).then_some(pages)
}

/// The words with a page that are nearest to a word without one, the nearest first.
#[must_use]
pub fn nearest(name: &str, facts: &dyn Facts) -> Vec<String> {
    const MOST: usize = 5;
    let wanted = name.trim().to_lowercase();
    let mut near: Vec<(usize, String)> = known(facts)
        .into_iter()
        .filter_map(|word| {
            let lower = word.to_lowercase();
            let edits = strsim::damerau_levenshtein(&wanted, &lower);
            let holds = wanted.chars().count() > 2 && lower.contains(&wanted);
            let allowed = (wanted.chars().count() / 3).max(1);
            (edits <= allowed || holds).then_some((if holds { 0 } else { edits }, word))
        })
        .collect();
    near.sort();
    near.dedup();
    near.into_iter().take(MOST).map(|(_, word)| word).collect()
}

/// Every word that leads to a page.
fn known(facts: &dyn Facts) -> Vec<String> {
    let mut words: Vec<String> =
        index(facts).into_iter().map(|entry| entry.page.name.to_owned()).collect();
    for term in terms::all() {
        words.extend(term.words.iter().map(|word| plain(word).to_owned()));
    }
    for verb in verbs::VERBS {
        words.extend(verb.clauses.iter().map(verbs::Clause::name));
    }
    words.sort();
    words.dedup();
    words
}

/// The terms that a word of the language leads to; `functions.share` may be asked for as `share`.
fn terms_of(name: &str) -> impl Iterator<Item = &'static terms::Term> {
    terms::all()
        .iter()
        .filter(move |term| term.words.iter().any(|word| *word == name || plain(word) == name))
}

fn plain(word: &'static str) -> &'static str {
    word.rsplit('.').next().unwrap_or(word)
}

fn clauses(name: &str) -> Vec<String> {
    let mut pages = Vec::new();
    for verb in verbs::VERBS {
        for clause in verb.clauses.iter().filter(|clause| clause.name() == name) {
            pages.push(super::describe::clause(verb, clause));
        }
    }
    pages
}
