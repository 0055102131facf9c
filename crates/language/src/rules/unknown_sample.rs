//! `unknown-sample`: see the page beside this file.

use super::mentions::{place, suggest};
use super::{Context, Finder, Rule};
use crate::ast::{ReadSource, StatementKind};
use crate::diagnostic::{Diagnostic, Severity};
use crate::facts::Page;

pub(super) const RULE: Rule = Rule {
    page: Page::new("unknown-sample", include_str!("unknown-sample.md")),
    severity: Severity::Error,
    finder: Finder::Check(check),
};

fn check(context: &Context<'_>) -> Vec<Diagnostic> {
    let samples = context.facts.samples();
    let mut found = Vec::new();
    for statement in &context.model.statements {
        let StatementKind::Read(read) = &statement.value.kind else { continue };
        let ReadSource::Sample(name) = &read.source else { continue };
        if samples.is_empty() || samples.iter().any(|page| page.name == name.value) {
            continue;
        }
        let message = format!("there is no sample `{}`", name.value);
        let diagnostic = Diagnostic::error("unknown-sample", place(statement, name.span), message);
        let known = samples.iter().map(|page| page.name);
        found.push(suggest(diagnostic, &name.value, known, "the samples are"));
    }
    found
}
