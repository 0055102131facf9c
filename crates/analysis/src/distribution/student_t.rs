//! Student's t distribution.

use super::incomplete_beta::BetaPoint;
use super::root::Bracket;
use super::{Tails, normal};
use crate::test::PValue;

/// Beyond this point the square of t would overflow, and the tail is a power of t to the last digit.
const POWER_LAW_FROM: f64 = 1e150;

/// The probability that a t variable with `df` degrees of freedom is farther from 0 than `t`;
/// infinite degrees of freedom give the normal law.
pub fn two_sided(t: f64, df: f64) -> PValue {
    let t = t.abs();
    if t > POWER_LAW_FROM && t.is_finite() && df.is_finite() {
        let ln_p = central(POWER_LAW_FROM, df).upper.ln_p - df * (t / POWER_LAW_FROM).ln();
        return PValue { p: ln_p.exp(), ln_p };
    }
    central(t, df).upper
}

/// The value that a t variable with `df` degrees of freedom stays below with `probability`.
///
/// The smaller of the tail beyond the value and the mass between 0 and the value is inverted, both
/// on log scales, where they are nearly straight lines.
pub fn quantile(probability: f64, df: f64) -> f64 {
    if !(0.0..=1.0).contains(&probability) || df.is_nan() || df <= 0.0 {
        return f64::NAN;
    }
    if probability < 0.5 {
        return -upper_quantile(probability, df);
    }
    upper_quantile(1.0 - probability, df)
}

/// The value that is exceeded with probability `tail`, which is at most ½.
fn upper_quantile(tail: f64, df: f64) -> f64 {
    let middle = 0.5 - tail;
    if middle <= 0.0 {
        return 0.0;
    }
    let shortfall = |ln_t: f64| {
        let t = ln_t.exp();
        if tail < 0.25 {
            (2.0 * tail).ln() - two_sided(t, df).ln_p
        } else {
            central(t, df).lower.ln_p - (2.0 * middle).ln()
        }
    };
    let (step, bound) = if shortfall(0.0) < 0.0 { (0.5, f64::MAX.ln()) } else { (-0.5, -800.0) };
    match Bracket::reaching(0.0, step, bound, shortfall) {
        Some(bracket) => bracket.zero(shortfall).exp(),
        None if step > 0.0 => f64::INFINITY,
        None => 0.0,
    }
}

/// The probabilities of |T| ≤ t and |T| > t.
///
/// Source: I_x(½, df/2) with x = t²/(t² + df) (Abramowitz & Stegun 1964, 26.7.1).
fn central(t: f64, df: f64) -> Tails {
    if t.is_nan() || df.is_nan() || df <= 0.0 {
        return Tails::UNDEFINED;
    }
    if t.is_infinite() {
        return Tails::ALL_BELOW;
    }
    if df.is_infinite() {
        return normal::central(t);
    }
    let square = t * t;
    let (x, y) = (square / (square + df), df / (square + df));
    let excess = 0.5 * y * ((t - 1.0) * (t + 1.0));
    BetaPoint { a: 0.5, b: 0.5 * df, x, y, excess }.tails()
}
