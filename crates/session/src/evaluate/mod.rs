//! Expressions over the columns of one table, row by row. A missing value makes what rests on it
//! missing; a condition that it leaves open is neither true nor false (Kleene 1952, three-valued
//! logic).

mod comparison;
pub(crate) mod vector;

use tussock_language::ast::{Expression, ExpressionKind, Operator};
use tussock_language::diagnostic::Diagnostic;
use tussock_language::span::{Location, SourceId, Span};

use crate::functions;
use crate::trouble::{Answerable, trouble};
use comparison::Comparing;
use vector::Vector;

/// Where an expression finds its columns.
pub(crate) trait Columns {
    /// How many rows there are.
    fn rows(&self) -> usize;
    /// Whether there is a column of this name.
    fn has(&self, name: &str) -> bool;
    /// The column, as numbers where it is numeric.
    fn column(&self, name: &str, location: Location) -> Answerable<Vector>;
    /// The column as text, whatever it holds.
    fn texts(&self, name: &str, location: Location) -> Answerable<Vector>;
    /// The names of all columns.
    fn names(&self) -> Vec<String>;
}

/// Evaluates expressions of one source text over one table.
#[derive(Clone, Copy)]
pub(crate) struct Evaluator<'a> {
    /// The source that spans refer to.
    pub(crate) source: SourceId,
    /// The table.
    pub(crate) columns: &'a dyn Columns,
}

impl Evaluator<'_> {
    /// The value of an expression in every row.
    pub(crate) fn evaluate(&self, expression: &Expression) -> Answerable<Vector> {
        let rows = self.columns.rows();
        match &expression.kind {
            ExpressionKind::Number(number) => Ok(Vector::number(vec![*number; rows])),
            ExpressionKind::Text(text) => Ok(Vector::text(vec![Some(text.clone()); rows])),
            ExpressionKind::Name(name) => self.columns.column(name, self.location(expression.span)),
            ExpressionKind::Negate(inner) => {
                let values = self.numbers(inner)?;
                Ok(Vector::number(values.iter().map(|value| -value)))
            }
            ExpressionKind::Not(inner) => {
                let values = self.truths(inner)?;
                Ok(Vector::truth(values.iter().map(|value| value.map(|value| !value))))
            }
            ExpressionKind::Binary { left, operator, right } => self.binary(left, *operator, right),
            ExpressionKind::If { condition, then, otherwise } => {
                self.choice(condition, then, otherwise)
            }
            ExpressionKind::In { value, list, negated } => {
                Comparing(self).membership(value, list, *negated)
            }
            ExpressionKind::Call { function, arguments } => self.call(function, arguments),
        }
    }

    /// The value of a condition in every row.
    pub(crate) fn truths(&self, expression: &Expression) -> Answerable<Vec<Option<bool>>> {
        match self.evaluate(expression)? {
            Vector::Truth(values) => Ok(values.to_vec()),
            other @ (Vector::Number(_) | Vector::Text(_)) => {
                Err(self.wrong_kind(expression.span, "a condition", &other))
            }
        }
    }

    /// The value of a numeric expression in every row.
    pub(crate) fn numbers(&self, expression: &Expression) -> Answerable<Vec<f64>> {
        match self.evaluate(expression)? {
            Vector::Number(values) => Ok(values.to_vec()),
            other @ (Vector::Text(_) | Vector::Truth(_)) => {
                Err(self.wrong_kind(expression.span, "numbers", &other))
            }
        }
    }

    /// A place in the source.
    pub(crate) fn location(&self, span: Span) -> Location {
        Location { source: self.source, span }
    }

    fn wrong_kind(&self, span: Span, wanted: &str, found: &Vector) -> Box<Diagnostic> {
        let message = format!("{wanted} must stand here, and this is {}", found.kind());
        let help = match (wanted, found) {
            ("a condition", _) => "write a comparison, such as `age >= 18`",
            (_, Vector::Text(_)) => "compare text with `=` or `in [...]`, or repair the column",
            (_, Vector::Number(_) | Vector::Truth(_)) => {
                "choose between two values with `if ... then ... else ...`"
            }
        };
        trouble(Diagnostic::error("wrong-kind", self.location(span), message).help(help))
    }

    fn binary(
        &self,
        left: &Expression,
        operator: Operator,
        right: &Expression,
    ) -> Answerable<Vector> {
        match operator {
            Operator::Add => self.arithmetic(left, right, |a, b| a + b),
            Operator::Subtract => self.arithmetic(left, right, |a, b| a - b),
            Operator::Multiply => self.arithmetic(left, right, |a, b| a * b),
            Operator::Divide => self.arithmetic(left, right, |a, b| a / b),
            Operator::Power => self.arithmetic(left, right, f64::powf),
            Operator::And => self.logic(left, right, |a, b| match (a, b) {
                (Some(false), _) | (_, Some(false)) => Some(false),
                (Some(true), Some(true)) => Some(true),
                (None, _) | (_, None) => None,
            }),
            Operator::Or => self.logic(left, right, |a, b| match (a, b) {
                (Some(true), _) | (_, Some(true)) => Some(true),
                (Some(false), Some(false)) => Some(false),
                (None, _) | (_, None) => None,
            }),
            Operator::Equal
            | Operator::Unequal
            | Operator::Less
            | Operator::LessOrEqual
            | Operator::Greater
            | Operator::GreaterOrEqual => Comparing(self).compare(left, operator, right),
        }
    }

    /// Results that are not finite, such as a division by zero, are missing.
    fn arithmetic(
        &self,
        left: &Expression,
        right: &Expression,
        operation: impl Fn(f64, f64) -> f64,
    ) -> Answerable<Vector> {
        let (left, right) = (self.numbers(left)?, self.numbers(right)?);
        let results = left.iter().zip(&right).map(|(&a, &b)| operation(a, b));
        Ok(Vector::number(results.map(|x| if x.is_finite() { x } else { f64::NAN })))
    }

    fn logic(
        &self,
        left: &Expression,
        right: &Expression,
        operation: impl Fn(Option<bool>, Option<bool>) -> Option<bool>,
    ) -> Answerable<Vector> {
        let (left, right) = (self.truths(left)?, self.truths(right)?);
        Ok(Vector::truth(left.iter().zip(&right).map(|(&a, &b)| operation(a, b))))
    }

    fn choice(
        &self,
        condition: &Expression,
        then: &Expression,
        otherwise: &Expression,
    ) -> Answerable<Vector> {
        let condition = self.truths(condition)?;
        let (yes, no) = (self.evaluate(then)?, self.evaluate(otherwise)?);
        let pick = |row: usize| condition.get(row).copied().flatten();
        let rows = 0..condition.len();
        match (&yes, &no) {
            (Vector::Number(yes), Vector::Number(no)) => Ok(Vector::number(rows.map(|row| {
                let side = pick(row).map(|which| if which { yes } else { no });
                side.and_then(|side| side.get(row)).copied().unwrap_or(f64::NAN)
            }))),
            (Vector::Text(yes), Vector::Text(no)) => Ok(Vector::text(rows.map(|row| {
                let side = pick(row).map(|which| if which { yes } else { no });
                side.and_then(|side| side.get(row)).cloned().flatten()
            }))),
            (Vector::Truth(yes), Vector::Truth(no)) => Ok(Vector::truth(rows.map(|row| {
                let side = pick(row).map(|which| if which { yes } else { no });
                side.and_then(|side| side.get(row)).copied().flatten()
            }))),
            (Vector::Number(_) | Vector::Text(_) | Vector::Truth(_), _) => {
                Err(self.wrong_kind(otherwise.span, yes.kind(), &no))
            }
        }
    }

    fn call(
        &self,
        function: &tussock_language::span::Name,
        arguments: &[Expression],
    ) -> Answerable<Vector> {
        let location = self.location(function.span);
        let Some(found) = functions::find(&function.value) else {
            return Err(functions::unknown(&function.value, location));
        };
        let arguments =
            arguments.iter().map(|one| self.evaluate(one)).collect::<Answerable<Vec<_>>>()?;
        found.call(&arguments).map_err(|refusal| {
            let message = format!("`{}` {refusal}", function.value);
            trouble(
                Diagnostic::error("wrong-argument", location, message).help(found.page().summary),
            )
        })
    }
}
