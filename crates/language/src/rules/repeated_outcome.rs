//! `repeated-outcome`: see the page beside this file.

use super::mentions::place;
use super::{Context, Finder, Rule};
use crate::ast::{ColumnSelection, StatementKind};
use crate::diagnostic::{Diagnostic, Severity};
use crate::facts::Page;
use crate::names::NumberRange;
use crate::span::Span;

pub(super) const RULE: Rule = Rule {
    page: Page::new("repeated-outcome", include_str!("repeated-outcome.md")),
    severity: Severity::Error,
    finder: Finder::Check(check),
};

fn check(context: &Context<'_>) -> Vec<Diagnostic> {
    let mut found = Vec::new();
    for statement in &context.model.statements {
        let StatementKind::Compare(compare) = &statement.value.kind else { continue };
        for (index, later) in compare.outcomes.iter().enumerate() {
            let earlier = compare.outcomes.iter().take(index).find(|one| overlap(one, later));
            let Some(earlier) = earlier else { continue };
            let message = match later {
                ColumnSelection::One(name) => format!("`{}` is listed twice", name.value),
                ColumnSelection::Range { first, last } => {
                    let (first, last) = (&first.value, &last.value);
                    format!("`{first}..{last}` holds an outcome that is listed already")
                }
            };
            found.push(
                Diagnostic::error("repeated-outcome", place(statement, span(later)), message)
                    .help("an outcome counts once: keep one of the two")
                    .related(place(statement, span(earlier)), "it is listed here first"),
            );
        }
    }
    found
}

fn span(selection: &ColumnSelection) -> Span {
    match selection {
        ColumnSelection::One(name) => name.span,
        ColumnSelection::Range { first, last } => Span::new(first.span.start, last.span.end),
    }
}

fn overlap(one: &ColumnSelection, other: &ColumnSelection) -> bool {
    match (one, other) {
        (ColumnSelection::One(one), ColumnSelection::One(other)) => one.value == other.value,
        (ColumnSelection::One(name), ColumnSelection::Range { first, last })
        | (ColumnSelection::Range { first, last }, ColumnSelection::One(name)) => {
            NumberRange::new(&first.value, &last.value)
                .is_some_and(|range| range.contains(&name.value))
        }
        (
            ColumnSelection::Range { first, last },
            ColumnSelection::Range { first: other_first, last: other_last },
        ) => {
            let range = NumberRange::new(&first.value, &last.value);
            let other = NumberRange::new(&other_first.value, &other_last.value);
            range.zip(other).is_some_and(|(range, other)| {
                range.contains(&other_first.value) || other.contains(&first.value)
            })
        }
    }
}
