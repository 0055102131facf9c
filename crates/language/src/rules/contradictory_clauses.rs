//! `contradictory-clauses`: see the page beside this file.

use super::mentions::place;
use super::{Context, Finder, Rule};
use crate::ast::{Levels, Read, ReadSource, Statement, StatementKind};
use crate::diagnostic::{Diagnostic, Severity};
use crate::facts::Page;
use crate::model::Located;

pub(super) const RULE: Rule = Rule {
    page: Page::new("contradictory-clauses", include_str!("contradictory-clauses.md")),
    severity: Severity::Error,
    finder: Finder::Check(check),
};

fn check(context: &Context<'_>) -> Vec<Diagnostic> {
    let mut found = Vec::new();
    for statement in &context.model.statements {
        match &statement.value.kind {
            StatementKind::Read(read) => found.extend(look_at_read(statement, read)),
            StatementKind::Levels(levels) => found.extend(look_at_levels(statement, levels)),
            StatementKind::Admit(_)
            | StatementKind::Derive(_)
            | StatementKind::Label(_)
            | StatementKind::Policy(_)
            | StatementKind::Compare(_)
            | StatementKind::Show(_)
            | StatementKind::Write(_)
            | StatementKind::Pin(_)
            | StatementKind::Broken { .. } => {}
        }
    }
    found
}

fn look_at_read(statement: &Located<Statement>, read: &Read) -> Vec<Diagnostic> {
    let error = |span, message: String| {
        Diagnostic::error("contradictory-clauses", place(statement, span), message)
    };
    if let ReadSource::Sample(sample) = &read.source {
        let clauses = [
            ("missing", read.missing.first().map(|text| text.span)),
            ("separator", read.separator.as_ref().map(|separator| separator.span)),
            ("decimal", read.decimal.as_ref().map(|decimal| decimal.span)),
            ("encoding", read.encoding.as_ref().map(|encoding| encoding.span)),
        ];
        let stated = clauses.into_iter().filter_map(|(clause, span)| Some((clause, span?)));
        return stated
            .map(|(clause, span)| {
                let message = format!("`{clause}` is about a file, and `{}` is none", sample.value);
                error(span, message).help("leave the clause out")
            })
            .collect();
    }
    match (&read.separator, &read.decimal) {
        (Some(separator), Some(decimal)) if separator.value == decimal.value => {
            let message = "one sign cannot separate both columns and decimals".to_owned();
            vec![
                error(decimal.span, message)
                    .related(place(statement, separator.span), "the separator is stated here"),
            ]
        }
        _ => Vec::new(),
    }
}

/// One spelling can mean one level.
fn look_at_levels(statement: &Located<Statement>, levels: &Levels) -> Vec<Diagnostic> {
    let spellings: Vec<_> = levels
        .merging
        .iter()
        .flat_map(|merging| merging.spellings.iter().map(move |spelling| (spelling, merging)))
        .collect();
    let mut found = Vec::new();
    for (index, (later, merging)) in spellings.iter().enumerate() {
        let mut before = spellings.iter().take(index);
        let Some((earlier, _)) = before.find(|(one, other)| {
            one.value == later.value && other.level.value != merging.level.value
        }) else {
            continue;
        };
        let message = format!("\"{}\" is merged into two levels", later.value);
        found.push(
            Diagnostic::error("contradictory-clauses", place(statement, later.span), message)
                .help("a spelling means one level: keep one of the two")
                .related(place(statement, earlier.span), "it is merged here first"),
        );
    }
    found
}
