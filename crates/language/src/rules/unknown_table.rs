//! `unknown-table`: see the page beside this file.

use super::mentions::{place, suggest, table};
use super::{Context, Finder, Rule};
use crate::diagnostic::{Diagnostic, Severity};
use crate::facts::Page;

pub(super) const RULE: Rule = Rule {
    page: Page::new("unknown-table", include_str!("unknown-table.md")),
    severity: Severity::Error,
    finder: Finder::Check(check),
};

fn check(context: &Context<'_>) -> Vec<Diagnostic> {
    let model = context.model;
    let mut found = Vec::new();
    for statement in &model.statements {
        let Some(name) = table(&statement.value) else { continue };
        let wanted = name.value.as_str();
        if model.tables.contains_key(wanted) || model.broken.contains(wanted) {
            continue;
        }
        let location = place(statement, name.span);
        if model.comparisons.contains_key(wanted) {
            let message = format!("`{wanted}` is a comparison, not a table");
            found.push(Diagnostic::error("unknown-table", location, message));
            continue;
        }
        let message = format!("there is no table `{wanted}`");
        let diagnostic = Diagnostic::error("unknown-table", location, message);
        let known = model.tables.keys().map(String::as_str);
        found.push(if model.tables.is_empty() {
            diagnostic.help(format!("define it: `read \"{wanted}.csv\" as {wanted}`"))
        } else {
            suggest(diagnostic, wanted, known, "the tables are")
        });
    }
    found
}
