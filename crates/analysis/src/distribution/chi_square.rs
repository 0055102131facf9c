//! The chi-square distribution.

use super::incomplete_gamma;
use crate::test::PValue;

/// The probability that a chi-square variable with `df` degrees of freedom exceeds `x`.
pub fn survival(x: f64, df: f64) -> PValue {
    incomplete_gamma::tails(df / 2.0, x / 2.0).upper
}
