//! Comparisons of values: numbers with numbers, levels with levels.

use std::cmp::Ordering;
use std::sync::Arc;

use tussock_language::ast::{Expression, Operator};
use tussock_language::diagnostic::Diagnostic;
use tussock_language::names::listed;

use super::Evaluator;
use super::vector::Vector;
use crate::trouble::{Answerable, nearest, trouble};

/// The comparing part of an evaluator.
pub(super) struct Comparing<'a>(pub(super) &'a Evaluator<'a>);

impl Comparing<'_> {
    /// `left < right` and the like. A plain name that is no column is a level of the other side.
    pub(super) fn compare(
        &self,
        left: &Expression,
        operator: Operator,
        right: &Expression,
    ) -> Answerable<Vector> {
        if let Some(level) = self.level(right) {
            return self.with_level(left, operator, level, right);
        }
        if let Some(level) = self.level(left) {
            return self.with_level(right, mirrored(operator), level, left);
        }
        let (first, second) = (self.0.evaluate(left)?, self.0.evaluate(right)?);
        match (&first, &second) {
            (Vector::Number(first), Vector::Number(second)) => {
                let pairs = first.iter().zip(second.iter());
                Ok(Vector::truth(
                    pairs.map(|(a, b)| a.partial_cmp(b).map(|order| holds(operator, order))),
                ))
            }
            (Vector::Text(first), Vector::Text(second)) if is_equality(operator) => {
                let pairs = first.iter().zip(second.iter());
                Ok(Vector::truth(
                    pairs.map(|(a, b)| Some(holds(operator, a.as_ref()?.cmp(b.as_ref()?)))),
                ))
            }
            (Vector::Text(_), Vector::Text(_)) => Err(self.unordered(left)),
            (Vector::Number(_) | Vector::Text(_) | Vector::Truth(_), _) => {
                Err(self.0.wrong_kind(right.span, first.kind(), &second))
            }
        }
    }

    /// `value in [a, b]`.
    pub(super) fn membership(
        &self,
        value: &Expression,
        list: &[Expression],
        negated: bool,
    ) -> Answerable<Vector> {
        let mut found: Vec<Option<bool>> = vec![Some(false); self.0.columns.rows()];
        for item in list {
            let equal = match item.name().or(item.text()) {
                Some(level) => self.with_level(value, Operator::Equal, level, item)?,
                None => self.compare(value, Operator::Equal, item)?,
            };
            let Vector::Truth(equal) = equal else { continue };
            for (one, other) in found.iter_mut().zip(equal.iter()) {
                *one = one.zip(*other).map(|(one, other)| one || other);
            }
        }
        Ok(Vector::truth(found.into_iter().map(|one| one.map(|one| one != negated))))
    }

    /// The level that an operand means, where it is no column.
    fn level<'e>(&self, operand: &'e Expression) -> Option<&'e str> {
        operand.text().or(operand.name().filter(|name| !self.0.columns.has(name)))
    }

    fn with_level(
        &self,
        column: &Expression,
        operator: Operator,
        level: &str,
        written: &Expression,
    ) -> Answerable<Vector> {
        let texts = self.texts(column)?;
        if !is_equality(operator) {
            return Err(self.unordered(column));
        }
        // A bare name that is no level is a slip; a text in quotation marks may occur or not.
        if written.name().is_some() && !texts.iter().flatten().any(|text| text == level) {
            return Err(self.unknown_level(column, level, written, &texts));
        }
        Ok(Vector::truth(
            texts.iter().map(|text| Some(holds(operator, text.as_deref()?.cmp(level)))),
        ))
    }

    fn texts(&self, column: &Expression) -> Answerable<Arc<Vec<Option<String>>>> {
        let location = self.0.location(column.span);
        let vector = match column.name() {
            Some(name) => self.0.columns.texts(name, location)?,
            None => self.0.evaluate(column)?,
        };
        match vector {
            Vector::Text(texts) => Ok(texts),
            other @ (Vector::Number(_) | Vector::Truth(_)) => {
                Err(self.0.wrong_kind(column.span, "text", &other))
            }
        }
    }

    fn unknown_level(
        &self,
        column: &Expression,
        level: &str,
        written: &Expression,
        texts: &[Option<String>],
    ) -> Box<Diagnostic> {
        let name = column.name().map_or("the left side".to_owned(), |name| format!("`{name}`"));
        let mut levels: Vec<String> = texts.iter().flatten().cloned().collect();
        levels.sort();
        levels.dedup();
        let columns = self.0.columns.names();
        let message = format!("`{level}` is neither a level of {name} nor a column");
        let location = self.0.location(written.span);
        let found = Diagnostic::error("unknown-level", location, message);
        let candidates = levels.iter().chain(&columns).map(String::as_str);
        trouble(match nearest(level, candidates) {
            Some(near) => found.help(format!("did you mean `{near}`?")),
            None => {
                let some = levels.iter().map(String::as_str).take(8);
                let more = if levels.len() > 8 { ", among others" } else { "" };
                found.help(format!("{name} has {}{more}", listed(some)))
            }
        })
    }

    fn unordered(&self, column: &Expression) -> Box<Diagnostic> {
        let message = "levels have no order by size: they can be equal, unequal or `in [...]`";
        trouble(Diagnostic::error("wrong-kind", self.0.location(column.span), message))
    }
}

fn is_equality(operator: Operator) -> bool {
    matches!(operator, Operator::Equal | Operator::Unequal)
}

fn mirrored(operator: Operator) -> Operator {
    match operator {
        Operator::Less => Operator::Greater,
        Operator::LessOrEqual => Operator::GreaterOrEqual,
        Operator::Greater => Operator::Less,
        Operator::GreaterOrEqual => Operator::LessOrEqual,
        Operator::Add
        | Operator::Subtract
        | Operator::Multiply
        | Operator::Divide
        | Operator::Power
        | Operator::Equal
        | Operator::Unequal
        | Operator::And
        | Operator::Or => operator,
    }
}

fn holds(operator: Operator, order: Ordering) -> bool {
    match operator {
        Operator::Equal => order.is_eq(),
        Operator::Unequal => order.is_ne(),
        Operator::Less => order.is_lt(),
        Operator::LessOrEqual => order.is_le(),
        Operator::Greater => order.is_gt(),
        Operator::GreaterOrEqual => order.is_ge(),
        Operator::Add
        | Operator::Subtract
        | Operator::Multiply
        | Operator::Divide
        | Operator::Power
        | Operator::And
        | Operator::Or => false,
    }
}
