//! `broken-range`: see the page beside this file.

use super::mentions::place;
use super::{Context, Finder, Rule};
use crate::ast::{ColumnSelection, StatementKind};
use crate::diagnostic::{Diagnostic, Severity};
use crate::facts::Page;
use crate::names::NumberRange;
use crate::span::Span;

pub(super) const RULE: Rule = Rule {
    page: Page::new("broken-range", include_str!("broken-range.md")),
    severity: Severity::Error,
    finder: Finder::Check(check),
};

fn check(context: &Context<'_>) -> Vec<Diagnostic> {
    let mut found = Vec::new();
    for statement in &context.model.statements {
        let StatementKind::Compare(compare) = &statement.value.kind else { continue };
        for outcome in &compare.outcomes {
            let ColumnSelection::Range { first, last } = outcome else { continue };
            if NumberRange::new(&first.value, &last.value).is_some() {
                continue;
            }
            let message = format!("`{}..{}` is no range of columns", first.value, last.value);
            let span = Span::new(first.span.start, last.span.end);
            found
                .push(Diagnostic::error("broken-range", place(statement, span), message).help(
                    "both ends need the same stem and a number, the smaller first: `q1..q9`",
                ));
        }
    }
    found
}
