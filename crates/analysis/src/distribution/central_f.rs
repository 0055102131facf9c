//! The F distribution.

use super::incomplete_beta::BetaPoint;
use super::{Tails, incomplete_gamma};
use crate::test::PValue;

/// The probability that an F variable with `df1` and `df2` degrees of freedom exceeds `f`; either
/// may be infinite.
pub fn survival(f: f64, df1: f64, df2: f64) -> PValue {
    tails(f, df1, df2).upper
}

/// Both tails of the F law with `df1` and `df2` degrees of freedom at `f`.
///
/// Source: I_x(df1/2, df2/2) with x = df1 f/(df1 f + df2) (Abramowitz & Stegun 1964, 26.6.2).
pub fn tails(f: f64, df1: f64, df2: f64) -> Tails {
    if f.is_nan() || df1.is_nan() || df2.is_nan() || df1 <= 0.0 || df2 <= 0.0 {
        Tails::UNDEFINED
    } else if f <= 0.0 {
        Tails::ALL_ABOVE
    } else if f.is_infinite() {
        Tails::ALL_BELOW
    } else if df1.is_infinite() && df2.is_infinite() {
        // All probability is at 1.
        if f < 1.0 { Tails::ALL_ABOVE } else { Tails::ALL_BELOW }
    } else if df2.is_infinite() {
        incomplete_gamma::tails(0.5 * df1, 0.5 * df1 * f)
    } else if df1.is_infinite() {
        incomplete_gamma::tails(0.5 * df2, 0.5 * df2 / f).swapped()
    } else {
        beta_point(f, df1, df2).tails()
    }
}

/// The beta law and the point that stand for a finite `f` > 0 with finite degrees of freedom.
pub(super) fn beta_point(f: f64, df1: f64, df2: f64) -> BetaPoint {
    let (a, b) = (0.5 * df1, 0.5 * df2);
    let ratio = df2 / df1;
    let (x, y) = (f / (f + ratio), ratio / (f + ratio));
    // b x − a y = a y (f − 1) = b x (f − 1)/f.
    let excess = if f < 2.0 { a * y * (f - 1.0) } else { b * x * ((f - 1.0) / f) };
    BetaPoint { a, b, x, y, excess }
}
