//! `factor-as-outcome`: see the page beside this file.

use super::mentions::place;
use super::{Context, Finder, Rule};
use crate::ast::{ColumnSelection, StatementKind};
use crate::diagnostic::{Diagnostic, Severity};
use crate::facts::Page;
use crate::names::NumberRange;

pub(super) const RULE: Rule = Rule {
    page: Page::new("factor-as-outcome", include_str!("factor-as-outcome.md")),
    severity: Severity::Error,
    finder: Finder::Check(check),
};

fn check(context: &Context<'_>) -> Vec<Diagnostic> {
    let mut found = Vec::new();
    for statement in &context.model.statements {
        let StatementKind::Compare(compare) = &statement.value.kind else { continue };
        for factor in &compare.factors {
            let is_outcome = compare.outcomes.iter().any(|outcome| match outcome {
                ColumnSelection::One(name) => name.value == factor.value,
                ColumnSelection::Range { first, last } => {
                    NumberRange::new(&first.value, &last.value)
                        .is_some_and(|range| range.contains(&factor.value))
                }
            });
            if is_outcome {
                let message = format!("`{}` is both the factor and an outcome", factor.value);
                let location = place(statement, factor.span);
                found.push(
                    Diagnostic::error("factor-as-outcome", location, message)
                        .help("groups differ on what forms them by definition: leave it out"),
                );
            }
        }
    }
    found
}
