//! `unknown-view`: see the page beside this file.

use super::mentions::{place, suggest};
use super::{Context, Finder, Rule};
use crate::ast::StatementKind;
use crate::diagnostic::{Diagnostic, Severity};
use crate::facts::Page;

pub(super) const RULE: Rule = Rule {
    page: Page::new("unknown-view", include_str!("unknown-view.md")),
    severity: Severity::Error,
    finder: Finder::Check(check),
};

fn check(context: &Context<'_>) -> Vec<Diagnostic> {
    let views = context.facts.views();
    let mut found = Vec::new();
    for statement in &context.model.statements {
        let StatementKind::Show(show) = &statement.value.kind else { continue };
        let wanted = show.view.value.as_str();
        if views.is_empty() || views.iter().any(|page| page.name == wanted) {
            continue;
        }
        let message = format!("there is no view `{wanted}`");
        let diagnostic =
            Diagnostic::error("unknown-view", place(statement, show.view.span), message);
        let known = views.iter().map(|page| page.name);
        found.push(suggest(diagnostic, wanted, known, "the views are"));
    }
    found
}
