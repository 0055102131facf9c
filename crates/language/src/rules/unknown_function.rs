//! `unknown-function`: see the page beside this file.

use super::mentions::{expression, place, suggest};
use super::{Context, Finder, Rule};
use crate::ast::ExpressionKind;
use crate::diagnostic::{Diagnostic, Severity};
use crate::facts::Page;

pub(super) const RULE: Rule = Rule {
    page: Page::new("unknown-function", include_str!("unknown-function.md")),
    severity: Severity::Error,
    finder: Finder::Check(check),
};

fn check(context: &Context<'_>) -> Vec<Diagnostic> {
    let functions = context.facts.functions();
    if functions.is_empty() {
        return Vec::new();
    }
    let known = functions.iter().map(|page| page.name);
    let mut found = Vec::new();
    for statement in &context.model.statements {
        let Some(expression) = expression(&statement.value) else { continue };
        for part in expression.parts() {
            let ExpressionKind::Call { function, .. } = &part.kind else { continue };
            if known.clone().any(|name| name == function.value) {
                continue;
            }
            let message = format!("there is no function `{}`", function.value);
            let location = place(statement, function.span);
            let diagnostic = Diagnostic::error("unknown-function", location, message);
            found.push(suggest(diagnostic, &function.value, known.clone(), "the functions are"));
        }
    }
    found
}
