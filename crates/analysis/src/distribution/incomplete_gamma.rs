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
    } else if x <= 0.0 || (a.is_infinite() && x.is_finite()) {
        Tails::ALL_ABOVE
    } else if x.is_infinite() {
        Tails::ALL_BELOW
    } else if large_parameters::applies(a, x - a) {
        large_shape(a, x)
    } else if x < a + 1.0 {
        Tails::from_ln_lower(ln_density(a, x) - lower_fraction(a, x).ln())
    } else {
        Tails::from_ln_upper(ln_density(a, x) - upper_fraction(a, x).ln())
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

/// The lower tail over xᵃ e⁻ˣ / Γ(a), without cancellation far out.
pub(super) fn lower_over_density(a: f64, x: f64) -> f64 {
    if x < a + 1.0 && !large_parameters::applies(a, x - a) {
        lower_fraction(a, x).recip()
    } else {
        (tails(a, x).lower.ln_p - ln_density(a, x)).exp()
    }
}

/// The upper tail over the same quantity.
pub(super) fn upper_over_density(a: f64, x: f64) -> f64 {
    if x < a + 1.0 || large_parameters::applies(a, x - a) {
        (tails(a, x).upper.ln_p - ln_density(a, x)).exp()
    } else {
        upper_fraction(a, x).recip()
    }
}

/// xᵃ e⁻ˣ / (Γ(a) P(a, x)), for x not far above a.
fn lower_fraction(a: f64, x: f64) -> f64 {
    let excess = x - a;
    let denominator = |m: f64| {
        let middle = if m > 0.0 { m * x / (a + 2.0 * m - 1.0) } else { 0.0 };
        m + middle + (a + m) / (a + 2.0 * m + 1.0) * (1.0 - excess + 2.0 * m)
    };
    let numerator = |m: f64| {
        let scale = a + 2.0 * m - 1.0;
        (a + m - 1.0) / scale * m * x * (x / scale)
    };
    lentz(numerator, denominator)
}

/// xᵃ e⁻ˣ / (Γ(a) Q(a, x)), for x above a.
fn upper_fraction(a: f64, x: f64) -> f64 {
    lentz(|m| m * (a - m), |m| x - a + 1.0 + 2.0 * m)
}
