//! The regularized incomplete gamma functions.

use std::f64::consts::PI;

use super::incomplete_beta::lentz;
use super::stirling::{deviance, stirling_error};
use super::{Tails, large_parameters};

/// Both tails of the gamma law with shape `a` and scale 1 at `x`.
///
/// Sources: Legendre's continued fraction above the centre and the limit of the continued fraction
/// of the incomplete beta function below it (DiDonato & Morris 1992, ACM Trans. Math. Softw.
/// 18:360); near the centre of a law with a large shape the limit of their expansion for large
/// parameters. DiDonato & Morris 1986, ACM Trans. Math. Softw. 12:377, divide the plane alike.
pub fn tails(a: f64, x: f64) -> Tails {
    if a.is_nan() || x.is_nan() || a <= 0.0 {
        Tails::UNDEFINED
    } else if x <= 0.0 {
        Tails::ALL_ABOVE
    } else if x.is_infinite() {
        Tails::ALL_BELOW
    } else if large_parameters::applies(a, x - a) {
        large_shape(a, x)
    } else if x < a + 1.0 {
        Tails::from_ln_lower(ln_lower(a, x))
    } else {
        Tails::from_ln_upper(ln_upper(a, x))
    }
}

/// ln[xᵃ e⁻ˣ / Γ(a)].
pub(super) fn ln_density(a: f64, x: f64) -> f64 {
    0.5 * (a / (2.0 * PI)).ln() - stirling_error(a) - deviance(a, x - a, x)
}

/// Both tails near the centre of a law with a large shape.
fn large_shape(a: f64, x: f64) -> Tails {
    let excess = x - a;
    let deviance = deviance(a, excess, x);
    if excess <= 0.0 {
        Tails::from_ln_lower(large_parameters::ln_tail(a, f64::INFINITY, deviance))
    } else {
        Tails::from_ln_upper(large_parameters::ln_tail(f64::INFINITY, a, deviance))
    }
}

/// The logarithm of the lower tail, for x not far above a.
fn ln_lower(a: f64, x: f64) -> f64 {
    let excess = x - a;
    let denominator = |m: f64| {
        let middle = if m > 0.0 { m * x / (a + 2.0 * m - 1.0) } else { 0.0 };
        m + middle + (a + m) * (1.0 - excess + 2.0 * m) / (a + 2.0 * m + 1.0)
    };
    let numerator = |m: f64| {
        let scale = a + 2.0 * m - 1.0;
        (a + m - 1.0) * m * (x / scale) * (x / scale)
    };
    ln_density(a, x) - lentz(numerator, denominator).ln()
}

/// The logarithm of the upper tail, for x above a.
fn ln_upper(a: f64, x: f64) -> f64 {
    let excess = x - a;
    let fraction = lentz(|m| m * (a - m), |m| excess + 1.0 + 2.0 * m);
    ln_density(a, x) - fraction.ln()
}
