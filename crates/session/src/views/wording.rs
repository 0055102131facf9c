//! Words that several views print.

use tussock_analysis::criteria::Exactness;
use tussock_report::rich::Rich;
use tussock_report::value::{NumberStyle, Value};

use crate::comparison::{Comparison, Outcome};

/// A confidence such as `95%`.
pub(super) fn percent(level: f64) -> String {
    let percent = (level * 1e4).round() / 1e2;
    format!("{percent}%")
}

/// The head of an interval's column.
pub(super) fn interval_head(level: f64) -> Rich {
    Rich::plain(format!("{} CI", percent(level)))
}

/// Whether a test is exact.
pub(super) fn exactness(exactness: Exactness) -> Rich {
    Rich::plain(match exactness {
        Exactness::Exact => "exact",
        Exactness::Approximate => "approximate",
        Exactness::Bound => "upper bound",
    })
}

/// `A − B` for the difference of two levels, never broken at the sign.
pub(super) fn pair(first: &str, second: &str) -> Rich {
    Rich::plain(format!("{first}\u{a0}−\u{a0}{second}"))
}

/// An outcome's label with its unit.
pub(super) fn outcome_head(outcome: &Outcome) -> Rich {
    match &outcome.unit {
        Some(unit) => outcome.label.clone().then(Rich::plain(format!(" ({unit})"))),
        None => outcome.label.clone(),
    }
}

/// A mean, SD or difference of an outcome: one decimal more than its raw values have.
pub(super) fn measured(number: f64, outcome: &Outcome) -> Value {
    Value::new(number, NumberStyle::Statistic(outcome.decimals.saturating_add(1).min(4)))
}

/// `N = 170 in 3 groups of roster.`
pub(super) fn size_note(comparison: &Comparison) -> Rich {
    Rich::fill(
        "*N* = {n} in {k} groups of {factor}.",
        &[
            ("n", Rich::plain(comparison.sample.units().to_string())),
            ("k", Rich::plain(comparison.levels.len().to_string())),
            ("factor", comparison.factor_label.clone()),
        ],
    )
}

/// Names in a sentence: `a`, `a and b`, `a, b and c`.
pub(super) fn listed(names: &[Rich]) -> Rich {
    match names {
        [] => Rich::default(),
        [only] => only.clone(),
        [first @ .., last] => {
            Rich::join(first.to_vec(), ", ").then(Rich::plain(" and ")).then(last.clone())
        }
    }
}

/// A refusal as a sentence below a table, where names stand as they are.
pub(super) fn refusal_note(message: &str) -> Rich {
    Rich::plain(format!("{}.", message.replace('`', "")))
}
