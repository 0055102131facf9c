//! What may be typed next, from the grammar, the document, the real data and the real results.

mod candidates;
mod columns;
mod paths;
mod texts;

use super::describe::Describe;
use super::explain::rules;
use super::place::{allowed_rule_start, name_in, region_at, statement_at, token_at};
use super::scope::Scope;
use crate::document::{Document, Region, RegionKind};
use crate::facts::Facts;
use crate::span::{SourceId, Span};
use crate::syntax::{Expectation, SyntaxKind, expected_at};

/// Something that may be typed.
#[derive(Clone, Debug, PartialEq)]
pub struct Completion {
    /// What a list shows.
    pub label: String,
    /// What is typed: the label, with back-quotes or closing signs where they are needed.
    pub insert: String,
    /// What it replaces: the word under the cursor.
    pub replace: Span,
    /// What sort of thing it is.
    pub kind: CompletionKind,
    /// One line about it.
    pub detail: String,
    /// More about it, in Markdown.
    pub page: Option<String>,
}

/// Sorts of completions, which editors show as symbols.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum CompletionKind {
    /// The word that a statement starts with.
    Verb,
    /// A clause of a statement.
    Clause,
    /// A fixed word, or one of a few words to choose from.
    Word,
    /// A table.
    Table,
    /// A comparison.
    Comparison,
    /// A column.
    Column,
    /// A level of a factor.
    Level,
    /// A factor of a comparison.
    Term,
    /// A view.
    View,
    /// A built-in table.
    Sample,
    /// A function of expressions.
    Function,
    /// A data file.
    File,
    /// A key of a live value.
    Key,
    /// A rule.
    Rule,
}

/// Everything that may be typed at `offset`, best first. What does not fit the letters before the
/// cursor is left out.
#[must_use]
pub fn complete(
    document: &Document,
    source: SourceId,
    offset: usize,
    facts: &dyn Facts,
) -> Vec<Completion> {
    let text = document.text(source);
    let offset = floor_to_character(text, offset);
    let Some(region) = region_at(document, source, offset) else { return Vec::new() };
    let names = Describe { scope: Scope::of(document), facts };
    let found = match region.kind {
        RegionKind::Prose => paths::in_braces(&names, text, region.span, offset),
        RegionKind::Code => in_code(&names, text, region, offset),
    };
    ranked(found, text, offset)
}

fn in_code(names: &Describe<'_>, text: &str, region: Region, offset: usize) -> Vec<Completion> {
    let expectation = expected_at(text, region.span, offset);
    if expectation.in_text && expectation.expected.is_empty() {
        return in_comment(names.facts, text, region, offset);
    }
    let request = Request { names, expectation, text, region: region.span, offset };
    if request.expectation.in_text { texts::inside(&request) } else { candidates::all(&request) }
}

/// A completion that is asked for in code.
struct Request<'a> {
    names: &'a Describe<'a>,
    expectation: Expectation,
    text: &'a str,
    region: Span,
    offset: usize,
}

impl Request<'_> {
    /// The comparison that the statement asks about.
    fn comparison(&self) -> Option<String> {
        let parse = crate::syntax::parse(self.text, self.region);
        name_in(&statement_at(&parse, self.offset)?, SyntaxKind::ComparisonName)
    }
}

/// Rules, after `# allow`.
fn in_comment(facts: &dyn Facts, text: &str, region: Region, offset: usize) -> Vec<Completion> {
    let Some(cursor) = token_at(text, region, offset) else { return Vec::new() };
    let comment = cursor.parse.token_span(&cursor.token);
    let Some(start) = allowed_rule_start(cursor.token.text(), offset.saturating_sub(comment.start))
    else {
        return Vec::new();
    };
    let start = comment.start + start;
    let typed = text.get(start..comment.end).unwrap_or_default();
    let length = typed
        .find(|character: char| !(character.is_ascii_alphanumeric() || character == '-'))
        .unwrap_or(typed.len());
    let replace = Span::new(start, (start + length).max(offset));
    let rules = rules(facts);
    rules.iter().map(|page| from_page(page, CompletionKind::Rule, replace)).collect()
}

/// A completion that inserts the name of a page.
fn from_page(page: &crate::facts::Page, kind: CompletionKind, replace: Span) -> Completion {
    Completion {
        label: page.name.to_owned(),
        insert: page.name.to_owned(),
        replace,
        kind,
        detail: page.summary.trim_end_matches('.').to_owned(),
        page: Some(page.text.to_owned()),
    }
}

/// What fits the letters before the cursor; what starts with them comes first.
fn ranked(found: Vec<Completion>, text: &str, offset: usize) -> Vec<Completion> {
    let mut fitting: Vec<(Fit, Completion)> = found
        .into_iter()
        .filter_map(|completion| {
            let typed = text.get(completion.replace.start..offset).unwrap_or_default();
            let typed = typed.trim_start_matches('`').to_lowercase();
            Some((fit(&completion.label.to_lowercase(), &typed)?, completion))
        })
        .collect();
    fitting.sort_by_key(|(fit, _)| *fit);
    fitting.into_iter().map(|(_, completion)| completion).collect()
}

/// How a label holds what is typed, the best first.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
enum Fit {
    AtStart,
    AtStartOfWord,
    Inside,
}

fn fit(label: &str, typed: &str) -> Option<Fit> {
    /// Fewer letters stand inside too many labels.
    const LEAST_INSIDE: usize = 3;
    if label.starts_with(typed) {
        return Some(Fit::AtStart);
    }
    let mut words = label.split(|character: char| !character.is_alphanumeric());
    if words.any(|word| word.starts_with(typed)) {
        return Some(Fit::AtStartOfWord);
    }
    (typed.chars().count() >= LEAST_INSIDE && label.contains(typed)).then_some(Fit::Inside)
}

fn floor_to_character(text: &str, offset: usize) -> usize {
    let offset = offset.min(text.len());
    (0..=offset).rev().find(|offset| text.is_char_boundary(*offset)).unwrap_or(0)
}
