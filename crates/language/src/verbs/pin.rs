//! `pin main.omnibus.pillai.value at .381 within .001`

use super::{Clause, Presence, Verb, What, one};
use crate::ast::{Pin, StatementKind};
use crate::facts::Page;
use crate::lower::Lowering;
use crate::syntax::SyntaxKind;

pub(super) static PIN: Verb = Verb {
    page: Page::new("pin", include_str!("pin.md")),
    head: &[one("a path", What::Path)],
    clauses: &[
        Clause {
            words: &["at"],
            summary: "the value that it must have",
            parts: &[one("a value", What::Number)],
            presence: Presence::Required,
        },
        Clause {
            words: &["within"],
            summary: "how far it may be off",
            parts: &[one("a distance", What::Number)],
            presence: Presence::Optional,
        },
    ],
    lower,
};

fn lower(statement: &mut Lowering<'_>) -> Option<StatementKind> {
    let head = statement.head();
    let path = statement.path(&head)?;
    let at = statement.clause("at")?;
    let value = statement.number(&at)?;
    let rounding = half_a_unit_of_the_last_digit(&statement.written(&at, SyntaxKind::NumberValue)?);
    let within = match statement.clause("within") {
        Some(clause) => Some(statement.number(&clause)?),
        None => None,
    };
    Some(StatementKind::Pin(Pin { path, value, within, rounding }))
}

/// `.381` may stand for anything from .3805 to .3815.
fn half_a_unit_of_the_last_digit(number: &str) -> f64 {
    let (number, percent) = match number.strip_suffix('%') {
        Some(number) => (number, -2),
        None => (number, 0),
    };
    let (digits, exponent) = number.split_once(['e', 'E']).unwrap_or((number, "0"));
    let decimals = digits.split_once('.').map_or(0, |(_, decimals)| decimals.len());
    let decimals = i32::try_from(decimals).unwrap_or(i32::MAX);
    let exponent: i32 = exponent.parse().unwrap_or(0);
    let power = exponent.saturating_add(percent).saturating_sub(decimals);
    // The decimal form is parsed so that the result is the nearest double to the exact value.
    format!("5e{}", power.saturating_sub(1)).parse().unwrap_or(0.0)
}

#[cfg(test)]
mod tests {
    use super::half_a_unit_of_the_last_digit as half;

    #[test]
    fn the_rounding_follows_the_number_as_written() {
        assert_eq!(half(".381"), 0.0005);
        assert_eq!(half("12"), 0.5);
        assert_eq!(half("12.0"), 0.05);
        assert_eq!(half("1.5e-3"), 0.000_05);
        assert_eq!(half("38%"), 0.005);
        assert_eq!(half("-.38"), 0.005);
    }
}
