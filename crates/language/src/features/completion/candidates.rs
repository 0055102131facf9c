//! For each thing that the grammar expects, what there is of it.

use super::{Completion, CompletionKind, Request, columns, from_page, paths};
use crate::features::describe::{self, EXPRESSION_WORDS};
use crate::features::scope::Defines;
use crate::names::quoted;
use crate::span::Span;
use crate::syntax::Expected;
use crate::terms;
use crate::verbs::{Choice, Clause, Slot, VERBS, What};

/// Everything that is expected, in the order of the grammar.
pub(super) fn all(request: &Request<'_>) -> Vec<Completion> {
    let mut found: Vec<Completion> = Vec::new();
    for expected in &request.expectation.expected {
        for completion in expected_one(request, expected) {
            if !found.iter().any(|known| known.label == completion.label) {
                found.push(completion);
            }
        }
    }
    found
}

fn expected_one(request: &Request<'_>, expected: &Expected) -> Vec<Completion> {
    let replace = request.expectation.word;
    let facts = request.names.facts;
    match expected {
        Expected::Verb => {
            VERBS.iter().map(|verb| from_page(&verb.page, CompletionKind::Verb, replace)).collect()
        }
        Expected::Slot(slot) => slot_filled(request, slot),
        Expected::Clause(clause) => vec![clause_words(request, clause, replace)],
        Expected::Word(word) => vec![fixed_word(word, replace)],
        Expected::Sign(_) => Vec::new(),
        Expected::Column => columns::after_dot(request),
        Expected::Level(column) => columns::compared_levels(request, column),
        Expected::Operand => {
            let functions = facts.functions().iter().map(|page| Completion {
                insert: format!("{}(", page.name),
                ..from_page(page, CompletionKind::Function, replace)
            });
            let mut found = columns::in_file_order(request);
            found.extend(functions);
            found.extend(expression_words(&["not", "if"], replace));
            found
        }
        Expected::Operator => expression_words(&["and", "or", "in", "not"], replace),
        Expected::Key(before) => paths::keys(request.names, before, replace),
    }
}

fn slot_filled(request: &Request<'_>, slot: &Slot) -> Vec<Completion> {
    let replace = request.expectation.word;
    let facts = request.names.facts;
    match slot.what {
        What::Table => tables(request, ""),
        What::Comparison => comparisons(request, ""),
        What::Path => comparisons(request, "."),
        What::ColumnPath | What::NewColumnPath => tables(request, "."),
        What::Sample => facts
            .samples()
            .iter()
            .map(|page| from_page(page, CompletionKind::Sample, replace))
            .collect(),
        What::View => facts
            .views()
            .iter()
            .map(|page| from_page(page, CompletionKind::View, replace))
            .collect(),
        What::Column => columns::groups_first(request),
        What::Columns => columns::numbers_first(request),
        What::Level => columns::slot_levels(request),
        What::Term => terms_of_design(request),
        What::OneOf(choices) => choices.iter().map(|one| choice(one, replace)).collect(),
        What::File => super::texts::quoted_files(request),
        What::NewTable
        | What::NewComparison
        | What::Number
        | What::Text
        | What::TextOrNumber
        | What::Expression => Vec::new(),
    }
}

/// The tables of the document, followed by `sign`.
fn tables(request: &Request<'_>, sign: &str) -> Vec<Completion> {
    let names = request.names.scope.names(Defines::Table);
    let describe = |name: &str| request.names.table(name);
    defined(request, names, sign, CompletionKind::Table, &describe)
}

/// The comparisons of the document, followed by `sign`.
fn comparisons(request: &Request<'_>, sign: &str) -> Vec<Completion> {
    paths::comparisons(request.names, request.expectation.word, sign)
}

fn defined(
    request: &Request<'_>,
    names: Vec<String>,
    sign: &str,
    kind: CompletionKind,
    describe: &dyn Fn(&str) -> Option<String>,
) -> Vec<Completion> {
    names
        .into_iter()
        .map(|name| Completion {
            insert: format!("{}{sign}", quoted(&name)),
            replace: request.expectation.word,
            kind,
            detail: request.names.first_line(Defines::Table, &name),
            page: describe(&name),
            label: name,
        })
        .collect()
}

fn terms_of_design(request: &Request<'_>) -> Vec<Completion> {
    let Some(name) = request.comparison() else { return Vec::new() };
    let Some(compare) = request.names.scope.comparison(&name) else { return Vec::new() };
    compare
        .factors
        .iter()
        .map(|factor| Completion {
            label: factor.value.clone(),
            insert: quoted(&factor.value),
            replace: request.expectation.word,
            kind: CompletionKind::Term,
            detail: format!("a term of {name}"),
            page: request.names.term(&name, &factor.value),
        })
        .collect()
}

fn clause_words(request: &Request<'_>, clause: &Clause, replace: Span) -> Completion {
    let verb = request.expectation.verb;
    Completion {
        label: clause.name(),
        insert: clause.name(),
        replace,
        kind: CompletionKind::Clause,
        detail: clause.summary.to_owned(),
        page: verb.map(|verb| describe::clause(verb, clause)),
    }
}

fn choice(choice: &Choice, replace: Span) -> Completion {
    let page = terms::of_word(choice.word).map(|term| term.page.text.to_owned());
    Completion {
        label: choice.word.to_owned(),
        insert: choice.word.to_owned(),
        replace,
        kind: CompletionKind::Word,
        detail: choice.summary.to_owned(),
        page,
    }
}

fn expression_words(words: &[&str], replace: Span) -> Vec<Completion> {
    EXPRESSION_WORDS
        .iter()
        .filter(|known| words.contains(&known.word))
        .map(|known| Completion { page: None, ..choice(known, replace) })
        .collect()
}

fn fixed_word(word: &str, replace: Span) -> Completion {
    let known = EXPRESSION_WORDS.iter().find(|known| known.word == word);
    Completion {
        label: word.to_owned(),
        insert: word.to_owned(),
        replace,
        kind: CompletionKind::Word,
        detail: known.map(|known| known.summary.to_owned()).unwrap_or_default(),
        page: None,
    }
}
