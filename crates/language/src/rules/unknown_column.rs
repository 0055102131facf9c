//! `unknown-column`: see the page beside this file.

use super::mentions::{columns, expression, place, suggest, table};
use super::{Context, Finder, Rule};
use crate::ast::{ColumnSelection, Expression, ExpressionKind, Operator, Statement, StatementKind};
use crate::diagnostic::{Diagnostic, Severity};
use crate::facts::{ColumnFact, Page};
use crate::model::Located;
use crate::names::NumberRange;
use crate::span::Span;

pub(super) const RULE: Rule = Rule {
    page: Page::new("unknown-column", include_str!("unknown-column.md")),
    severity: Severity::Error,
    finder: Finder::Check(check),
};

fn check(context: &Context<'_>) -> Vec<Diagnostic> {
    let mut found = Vec::new();
    for statement in &context.model.statements {
        let Some(table) = table(&statement.value) else { continue };
        let Some(known) = context.facts.columns(&table.value) else { continue };
        let mut look = Look { statement, table: &table.value, known: &known, found: &mut found };
        for column in columns(&statement.value) {
            look.name(&column.value, column.span);
        }
        look.ranges();
        if let Some(expression) = expression(&statement.value) {
            look.expression(expression);
        }
    }
    found
}

/// The check of one statement.
struct Look<'a> {
    statement: &'a Located<Statement>,
    table: &'a str,
    known: &'a [ColumnFact],
    found: &'a mut Vec<Diagnostic>,
}

impl Look<'_> {
    fn is_column(&self, name: &str) -> bool {
        self.known.iter().any(|column| column.name == name)
    }

    fn name(&mut self, name: &str, span: Span) {
        if self.is_column(name) {
            return;
        }
        let message = format!("`{}` has no column `{name}`", self.table);
        let location = place(self.statement, span);
        let diagnostic = Diagnostic::error("unknown-column", location, message);
        let known = self.known.iter().map(|column| column.name.as_str());
        self.found.push(suggest(diagnostic, name, known, "its columns are"));
    }

    /// A range needs one column at least.
    fn ranges(&mut self) {
        let StatementKind::Compare(compare) = &self.statement.value.kind else { return };
        for outcome in &compare.outcomes {
            let ColumnSelection::Range { first, last } = outcome else { continue };
            let Some(range) = NumberRange::new(&first.value, &last.value) else { continue };
            if self.known.iter().any(|column| range.contains(&column.name)) {
                continue;
            }
            let (table, first_name, last_name) = (self.table, &first.value, &last.value);
            let message = format!("`{table}` has no column from `{first_name}` to `{last_name}`");
            let span = Span::new(first.span.start, last.span.end);
            let location = place(self.statement, span);
            self.found.push(Diagnostic::error("unknown-column", location, message));
        }
    }

    fn expression(&mut self, expression: &Expression) {
        match &expression.kind {
            ExpressionKind::Name(name) => self.name(name, expression.span),
            ExpressionKind::Binary {
                left,
                operator: Operator::Equal | Operator::Unequal,
                right,
            } => self.equality(left, right),
            // What stands in the list are levels.
            ExpressionKind::In { value, .. } => self.expression(value),
            ExpressionKind::Number(_)
            | ExpressionKind::Text(_)
            | ExpressionKind::Negate(_)
            | ExpressionKind::Not(_)
            | ExpressionKind::Binary { .. }
            | ExpressionKind::If { .. }
            | ExpressionKind::Call { .. } => {
                for operand in expression.operands() {
                    self.expression(operand);
                }
            }
        }
    }

    /// In `roster = fixed` one of the names is the column, and the other may be its level.
    fn equality(&mut self, left: &Expression, right: &Expression) {
        match (&left.kind, &right.kind) {
            (ExpressionKind::Name(one), ExpressionKind::Name(other)) => {
                if !self.is_column(one) && !self.is_column(other) {
                    self.name(one, left.span);
                }
            }
            _ => {
                self.expression(left);
                self.expression(right);
            }
        }
    }
}
