//! The chi-square distribution.

use super::incomplete_gamma;
use crate::test::PValue;

/// The probability that a chi-square variable with `df` degrees of freedom exceeds `x`.
///
/// Source: Q(df/2, x/2) (Abramowitz & Stegun 1964, 26.4.19).
pub fn survival(x: f64, df: f64) -> PValue {
    incomplete_gamma::tails(0.5 * df, 0.5 * x).upper
}
