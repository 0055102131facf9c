//! The two building blocks that keep the digits of densities with large parameters: the error of
//! Stirling's formula and the gap between a number and the logarithm of 1 plus it.
//!
//! A difference of log-gammas at 10⁶ loses seven digits before the last one is computed, whoever
//! computes it. A density written with these two functions has no large terms to cancel
//! (Loader 2000, Fast and Accurate Computation of Binomial Probabilities).

use std::f64::consts::PI;

/// From here on the asymptotic series of [`stirling_error`] reaches the last digit.
const ASYMPTOTIC_FROM: f64 = 10.0;

/// B₂ₖ / (2k (2k − 1)) for k = 1 … 9 (Abramowitz & Stegun 1964, 6.1.40).
const BERNOULLI_QUOTIENTS: [f64; 9] = [
    1.0 / 12.0,
    -1.0 / 360.0,
    1.0 / 1260.0,
    -1.0 / 1680.0,
    1.0 / 1188.0,
    -691.0 / 360_360.0,
    1.0 / 156.0,
    -3617.0 / 122_400.0,
    43_867.0 / 244_188.0,
];

/// 1/k! for k = 2 … 16.
const INVERSE_FACTORIALS: [f64; 15] = [
    1.0 / 2.0,
    1.0 / 6.0,
    1.0 / 24.0,
    1.0 / 120.0,
    1.0 / 720.0,
    1.0 / 5_040.0,
    1.0 / 40_320.0,
    1.0 / 362_880.0,
    1.0 / 3_628_800.0,
    1.0 / 39_916_800.0,
    1.0 / 479_001_600.0,
    1.0 / 6_227_020_800.0,
    1.0 / 87_178_291_200.0,
    1.0 / 1_307_674_368_000.0,
    1.0 / 20_922_789_888_000.0,
];

/// ln Γ(z) − [(z − ½) ln z − z + ½ ln 2π] for z > 0, to about 10⁻¹⁷ absolutely.
///
/// Below [`ASYMPTOTIC_FROM`] the argument is raised by Gudermann's series, whose terms are all
/// positive.
pub(super) fn stirling_error(z: f64) -> f64 {
    let mut raised = z;
    let mut steps = 0.0;
    while raised < ASYMPTOTIC_FROM {
        steps += stirling_step(raised);
        raised += 1.0;
    }
    let inverse = raised.recip();
    let square = inverse * inverse;
    let series = BERNOULLI_QUOTIENTS.iter().rev().fold(0.0, |sum, term| sum * square + term);
    steps + series * inverse
}

/// The fall of the error of Stirling's formula from `z` to `z + 1`: (z + ½) ln(1 + 1/z) − 1.
fn stirling_step(z: f64) -> f64 {
    if z < 1.0 {
        return (z + 0.5) * z.recip().ln_1p() - 1.0;
    }
    let ratio = (2.0 * z + 1.0).recip();
    atanh_remainder(ratio * ratio)
}

/// u − ln(1 + u) for u > −1, without loss near 0.
pub(super) fn log_gap(u: f64) -> f64 {
    if u.abs() > 0.5 {
        return u - u.ln_1p();
    }
    let ratio = u / (2.0 + u);
    let square = ratio * ratio;
    u * ratio - 2.0 * ratio * atanh_remainder(square)
}

/// atanh(r)/r − 1 = r²/3 + r⁴/5 + … for r² = `square` at most ¼.
fn atanh_remainder(square: f64) -> f64 {
    let mut power = square;
    let mut odd = 3.0;
    let mut sum = 0.0;
    loop {
        let term = power / odd;
        sum += term;
        if term <= sum * 1e-17 {
            return sum;
        }
        power *= square;
        odd += 2.0;
    }
}

/// eᵘ − 1 − u, without loss near 0.
pub(super) fn exp_gap(u: f64) -> f64 {
    if u.abs() > 0.5 {
        return u.exp_m1() - u;
    }
    u * u * INVERSE_FACTORIALS.iter().rev().fold(0.0, |sum, term| sum * u + term)
}

/// The logarithm of the Poisson probability of `count`, which may be fractional, where `mean` is
/// expected (Loader 2000).
pub(super) fn ln_poisson(count: f64, mean: f64) -> f64 {
    if count <= 0.0 {
        return -mean;
    }
    let size = (2.0 * PI).ln() + count.ln();
    -0.5 * size - stirling_error(count) - deviance(count, mean - count, mean)
}

/// e − p − p ln(e/p), the deviance of `expected` e from `parameter` p, with their difference given
/// so that it need not be formed by subtraction.
pub(super) fn deviance(parameter: f64, difference: f64, expected: f64) -> f64 {
    let relative = difference / parameter;
    if relative.abs() <= 0.5 {
        parameter * log_gap(relative)
    } else {
        difference - parameter * (expected / parameter).ln()
    }
}
