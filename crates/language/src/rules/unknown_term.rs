//! `unknown-term`: see the page beside this file.

use super::mentions::{place, suggest};
use super::{Context, Finder, Rule};
use crate::ast::StatementKind;
use crate::diagnostic::{Diagnostic, Severity};
use crate::facts::Page;

pub(super) const RULE: Rule = Rule {
    page: Page::new("unknown-term", include_str!("unknown-term.md")),
    severity: Severity::Error,
    finder: Finder::Check(check),
};

fn check(context: &Context<'_>) -> Vec<Diagnostic> {
    let mut found = Vec::new();
    for statement in &context.model.statements {
        let StatementKind::Show(show) = &statement.value.kind else { continue };
        let Some(term) = &show.term else { continue };
        let name = show.comparison.value.as_str();
        let Some(comparison) = context.model.comparisons.get(name) else { continue };
        let factors = comparison.value.factors.iter().map(|factor| factor.value.as_str());
        if factors.clone().any(|factor| factor == term.value) {
            continue;
        }
        let message = format!("the design of `{name}` has no term `{}`", term.value);
        let diagnostic = Diagnostic::error("unknown-term", place(statement, term.span), message);
        found.push(suggest(diagnostic, &term.value, factors, "its terms are"));
    }
    found
}
