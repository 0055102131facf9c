//! `unknown-rule`: see the page beside this file.

use super::mentions::place;
use super::{Context, Finder, Rule};
use crate::diagnostic::{Diagnostic, Severity};
use crate::facts::Page;
use crate::nearest::nearest;

pub(super) const RULE: Rule = Rule {
    page: Page::new("unknown-rule", include_str!("unknown-rule.md")),
    severity: Severity::Warning,
    finder: Finder::Check(check),
};

fn check(context: &Context<'_>) -> Vec<Diagnostic> {
    let ours = super::pages().map(|page| page.name);
    let known: Vec<&str> = ours.chain(context.facts.rules().iter().map(|page| page.name)).collect();
    let mut found = Vec::new();
    for statement in &context.model.statements {
        for allowance in &statement.value.allowed {
            let rule = &allowance.rule;
            if known.contains(&rule.value.as_str()) {
                continue;
            }
            let message = format!("there is no rule `{}`", rule.value);
            let location = place(statement, rule.span);
            let diagnostic = Diagnostic::warning("unknown-rule", location, message);
            found.push(match nearest(&rule.value, known.iter().copied()) {
                Some(near) => diagnostic
                    .help(format!("did you mean `{near}`?"))
                    .replace_by(format!("Write `{near}`"), near),
                None => diagnostic.help("a diagnostic shows the name of its rule in brackets"),
            });
        }
    }
    found
}
