//! `unknown-comparison`: see the page beside this file.

use super::mentions::{paths, place, suggest};
use super::{Context, Finder, Rule};
use crate::ast::StatementKind;
use crate::diagnostic::{Diagnostic, Severity};
use crate::facts::Page;
use crate::span::{Location, Name};

pub(super) const RULE: Rule = Rule {
    page: Page::new("unknown-comparison", include_str!("unknown-comparison.md")),
    severity: Severity::Error,
    finder: Finder::Check(check),
};

fn check(context: &Context<'_>) -> Vec<Diagnostic> {
    let shown = context.model.statements.iter().filter_map(|statement| {
        let StatementKind::Show(show) = &statement.value.kind else { return None };
        unknown(context, &show.comparison, place(statement, show.comparison.span))
    });
    let live = paths(context).into_iter().filter_map(|path| {
        let first = path.value.segments.first()?;
        unknown(context, first, place(&path, first.span))
    });
    shown.chain(live).collect()
}

fn unknown(context: &Context<'_>, name: &Name, location: Location) -> Option<Diagnostic> {
    let model = context.model;
    let wanted = name.value.as_str();
    if model.comparisons.contains_key(wanted) || model.broken.contains(wanted) {
        return None;
    }
    if model.tables.contains_key(wanted) {
        let message = format!("`{wanted}` is a table, not a comparison");
        let help = format!("define one: `compare ... across ... in {wanted} as main`");
        return Some(Diagnostic::error("unknown-comparison", location, message).help(help));
    }
    let message = format!("there is no comparison `{wanted}`");
    let diagnostic = Diagnostic::error("unknown-comparison", location, message);
    let known = model.comparisons.keys().map(String::as_str);
    Some(if model.comparisons.is_empty() {
        diagnostic.help(format!("define it: `compare ... across ... in ... as {wanted}`"))
    } else {
        suggest(diagnostic, wanted, known, "the comparisons are")
    })
}
