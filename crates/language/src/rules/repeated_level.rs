//! `repeated-level`: see the page beside this file.

use super::mentions::place;
use super::{Context, Finder, Rule};
use crate::ast::StatementKind;
use crate::diagnostic::{Diagnostic, Severity};
use crate::facts::Page;

pub(super) const RULE: Rule = Rule {
    page: Page::new("repeated-level", include_str!("repeated-level.md")),
    severity: Severity::Error,
    finder: Finder::Check(check),
};

fn check(context: &Context<'_>) -> Vec<Diagnostic> {
    let mut found = Vec::new();
    for statement in &context.model.statements {
        let StatementKind::Levels(levels) = &statement.value.kind else { continue };
        for (index, later) in levels.order.iter().enumerate() {
            let before = levels.order.iter().take(index);
            let earlier = before.into_iter().find(|one| one.value == later.value);
            let Some(earlier) = earlier else { continue };
            let message = format!("the level `{}` is listed twice", later.value);
            found.push(
                Diagnostic::error("repeated-level", place(statement, later.span), message)
                    .help("a level has one place in the order: keep one of the two")
                    .related(place(statement, earlier.span), "it is listed here first"),
            );
        }
    }
    found
}
