//! `unexplained-allowance`: see the page beside this file.

use super::mentions::place;
use super::{Context, Finder, Rule};
use crate::diagnostic::{Diagnostic, Severity};
use crate::facts::Page;

pub(super) const RULE: Rule = Rule {
    page: Page::new("unexplained-allowance", include_str!("unexplained-allowance.md")),
    severity: Severity::Warning,
    finder: Finder::Check(check),
};

fn check(context: &Context<'_>) -> Vec<Diagnostic> {
    let mut found = Vec::new();
    for statement in &context.model.statements {
        for allowance in &statement.value.allowed {
            if !allowance.reason.is_empty() {
                continue;
            }
            let rule = allowance.rule.value.as_str();
            let message = format!("`{rule}` is allowed without a reason");
            found.push(
                Diagnostic::warning(
                    "unexplained-allowance",
                    place(statement, allowance.rule.span),
                    message,
                )
                .help(format!("say why: `# allow {rule}: the reason`")),
            );
        }
    }
    found
}
