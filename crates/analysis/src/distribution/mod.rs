//! Probability distributions, one file each. Every tail is returned with its logarithm.

pub mod central_f;
pub mod chi_square;
pub mod hedges;
pub mod incomplete_beta;
pub mod incomplete_gamma;
pub mod noncentral_f;
pub mod noncentral_t;
pub mod student_t;

use crate::test::PValue;

/// Both tails of a distribution at one point.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Tails {
    /// The probability of the point or less.
    pub lower: PValue,
    /// The probability of more than the point.
    pub upper: PValue,
}

impl Tails {
    /// Both tails from the lower and the upper probability.
    pub(crate) fn from_probabilities(lower: f64, upper: f64) -> Self {
        let value = |p: f64| PValue { p, ln_p: p.ln() };
        Self { lower: value(lower), upper: value(upper) }
    }
}
