//! `unknown-level`: see the page beside this file.

use super::mentions::{expression, place, suggest, table};
use super::{Context, Finder, Rule};
use crate::ast::{Expression, ExpressionKind, Operator, Statement, StatementKind};
use crate::diagnostic::{Diagnostic, Severity};
use crate::facts::{ColumnFact, ColumnKind, Page};
use crate::model::Located;
use crate::nearest::nearest;
use crate::span::Span;

pub(super) const RULE: Rule = Rule {
    page: Page::new("unknown-level", include_str!("unknown-level.md")),
    severity: Severity::Error,
    finder: Finder::Check(check),
};

fn check(context: &Context<'_>) -> Vec<Diagnostic> {
    let mut found = Vec::new();
    for statement in &context.model.statements {
        let Some(table) = table(&statement.value) else { continue };
        let Some(columns) = context.facts.columns(&table.value) else { continue };
        let look = Look { context, statement, table: &table.value, columns };
        if let StatementKind::Levels(levels) = &statement.value.kind {
            let column = &levels.column.column.value;
            let order = levels.order.iter();
            found.extend(order.filter_map(|level| look.name(column, &level.value, level.span)));
        }
        if let Some(expression) = expression(&statement.value) {
            for part in expression.parts() {
                found.extend(look.comparison(part));
            }
        }
    }
    found
}

/// The check of one statement.
struct Look<'a> {
    context: &'a Context<'a>,
    statement: &'a Located<Statement>,
    table: &'a str,
    columns: Vec<ColumnFact>,
}

impl Look<'_> {
    /// The levels that a comparison of a column with names or texts mentions.
    fn comparison(&self, expression: &Expression) -> Vec<Diagnostic> {
        match &expression.kind {
            ExpressionKind::Binary {
                left,
                operator: Operator::Equal | Operator::Unequal,
                right,
            } => {
                // The column is the side that names one; where both do, no level is meant.
                match (self.column(left), self.column(right)) {
                    (Some(column), None) => self.level(column, right).into_iter().collect(),
                    (None, Some(column)) => self.level(column, left).into_iter().collect(),
                    _ => Vec::new(),
                }
            }
            ExpressionKind::In { value, list, .. } => match self.column(value) {
                Some(column) => list.iter().filter_map(|item| self.level(column, item)).collect(),
                None => Vec::new(),
            },
            ExpressionKind::Number(_)
            | ExpressionKind::Text(_)
            | ExpressionKind::Name(_)
            | ExpressionKind::Negate(_)
            | ExpressionKind::Not(_)
            | ExpressionKind::Binary { .. }
            | ExpressionKind::If { .. }
            | ExpressionKind::Call { .. } => Vec::new(),
        }
    }

    fn column<'e>(&self, expression: &'e Expression) -> Option<&'e str> {
        let ExpressionKind::Name(name) = &expression.kind else { return None };
        self.columns.iter().any(|column| column.name == *name).then_some(name)
    }

    #[expect(clippy::wildcard_enum_match_arm, reason = "only names and texts stand for levels")]
    fn level(&self, column: &str, expression: &Expression) -> Option<Diagnostic> {
        match &expression.kind {
            ExpressionKind::Name(name) => self.name(column, name, expression.span),
            ExpressionKind::Text(text) => self.text(column, text, expression.span),
            _ => None,
        }
    }

    /// A name stands for a level, so there must be one.
    fn name(&self, column: &str, name: &str, span: Span) -> Option<Diagnostic> {
        let levels = self.levels(column)?;
        if levels.iter().any(|level| level == name) {
            return None;
        }
        let message = format!("`{}.{column}` has no level `{name}`", self.table);
        let diagnostic = Diagnostic::error("unknown-level", place(self.statement, span), message);
        let known = levels.iter().map(String::as_str);
        Some(suggest(diagnostic, name, known, "its levels are"))
    }

    /// A text may be any, but one that is nearly a level is probably a slip.
    fn text(&self, column: &str, text: &str, span: Span) -> Option<Diagnostic> {
        let levels = self.levels(column)?;
        if levels.iter().any(|level| level == text) {
            return None;
        }
        let near = nearest(text, levels.iter().map(String::as_str))?;
        let message = format!("no row of `{}.{column}` says \"{text}\"", self.table);
        let written = near.replace('\\', "\\\\").replace('"', "\\\"");
        Some(
            Diagnostic::warning("unknown-level", place(self.statement, span), message)
                .help(format!("did you mean \"{near}\"?"))
                .replace_by(format!("Write \"{near}\""), format!("\"{written}\"")),
        )
    }

    /// The levels of a column that has any: a column of numbers has none.
    fn levels(&self, column: &str) -> Option<Vec<String>> {
        let fact = self.columns.iter().find(|fact| fact.name == column)?;
        match fact.kind {
            ColumnKind::Number => None,
            ColumnKind::Text => self.context.facts.levels(self.table, column),
        }
    }
}
