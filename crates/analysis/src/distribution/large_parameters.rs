//! Incomplete beta and gamma functions near the centre of the law where the parameters are so
//! large that a continued fraction would take thousands of steps.

use std::f64::consts::{FRAC_1_SQRT_2, PI, SQRT_2};

use super::normal::scaled_erfc;
use super::stirling::stirling_error;

/// The smaller parameter from which the expansion is used.
const SMALLEST: f64 = 3000.0;
/// How far from the centre, as a part of the smaller parameter, the expansion is used.
const REACH: f64 = 0.03;
/// The most terms of the expansion that are taken.
const TERMS: usize = 20;

/// Whether the expansion applies, for the smaller parameter and the distance from the centre
/// (n x − a for the beta law with n = a + b, x − a for the gamma law).
pub(super) fn applies(smaller: f64, excess: f64) -> bool {
    smaller >= SMALLEST && excess.abs() <= REACH * smaller
}

/// ln I_x(a, b) for x at or below the centre, from the deviance
/// f = −ln[(n x/a)ᵃ (n y/b)ᵇ] ≥ 0; one of the parameters may be infinite, which gives the
/// incomplete gamma functions.
///
/// Source: DiDonato & Morris 1992, ACM Trans. Math. Softw. 18:360, section 9 (algorithm BASYM).
pub(super) fn ln_tail(a: f64, b: f64, deviance: f64) -> f64 {
    let below = a < b;
    let (smaller, larger) = if below { (a, b) } else { (b, a) };
    let ratio = smaller / larger;
    let shape = Shape { ratio, symmetry: if below { 1.0 - ratio } else { ratio - 1.0 } };
    let scale = (smaller * (1.0 + ratio)).sqrt().recip();
    let correction = finite_error(a) + finite_error(b) - finite_error(a + b);
    let factor = 2.0 / PI.sqrt() * expansion(shape, scale, deviance);
    factor.ln() - deviance - correction
}

/// The error of Stirling's formula, which vanishes at infinity.
fn finite_error(z: f64) -> f64 {
    if z.is_infinite() { 0.0 } else { stirling_error(z) }
}

/// The two parameters relative to each other.
#[derive(Clone, Copy, Debug)]
struct Shape {
    /// The smaller over the larger.
    ratio: f64,
    /// (b − a) over the larger.
    symmetry: f64,
}

/// The sum of the expansion; `scale` is its small quantity.
fn expansion(shape: Shape, scale: f64, deviance: f64) -> f64 {
    let root = deviance.sqrt();
    let half_power = 0.5 * FRAC_1_SQRT_2;
    // What the latest two coefficients are multiplied by, apart from the power of the scale.
    let mut previous = 0.25 * PI.sqrt() * scaled_erfc(root);
    let mut latest = half_power;
    // Powers of √(2 deviance).
    let mut power = 1.0;
    let mut sum = previous;
    let mut last_term = f64::INFINITY;
    let mut weight = scale;
    for (order, coefficient) in (1_u32..).zip(Coefficients::new(shape)) {
        let term = coefficient * weight * latest;
        sum += term;
        // Where both parameters are equal every second term is 0, so two must be negligible.
        if term.abs() + last_term <= 1e-18 * sum {
            break;
        }
        last_term = term.abs();
        power *= SQRT_2 * root;
        weight *= scale;
        (previous, latest) = (latest, half_power * power + f64::from(order) * previous);
    }
    sum
}

/// The coefficients of the expansion, d₁, d₂, …, each computed when it is asked for, because the
/// later ones are dear and seldom needed.
struct Coefficients {
    shape: Shape,
    /// The coefficients of the series that is reverted.
    series: Vec<f64>,
    /// The coefficients of the reversion.
    reverted: Vec<f64>,
    /// The coefficients that were given out.
    given: Vec<f64>,
    /// The ratio of the parameters to the power of the latest even order.
    power: f64,
    /// The sum of these powers.
    sum: f64,
}

impl Coefficients {
    fn new(shape: Shape) -> Self {
        let empty = || Vec::with_capacity(TERMS);
        Self { shape, series: empty(), reverted: empty(), given: empty(), power: 1.0, sum: 0.0 }
    }

    /// The coefficient of the series that is reverted, of the given `order`, the first being 0.
    fn series_term(&mut self, order: usize) -> f64 {
        let Shape { ratio, symmetry } = self.shape;
        let divisor = order as f64 + 3.0;
        if order.is_multiple_of(2) {
            self.sum += self.power;
            2.0 * symmetry * self.sum / divisor
        } else {
            self.power *= ratio * ratio;
            2.0 * (1.0 + ratio * self.power) / ((1.0 + ratio) * divisor)
        }
    }
}

impl Iterator for Coefficients {
    type Item = f64;

    fn next(&mut self) -> Option<f64> {
        let order = self.given.len() + 1;
        if order > TERMS {
            return None;
        }
        let term = self.series_term(order - 1);
        self.series.push(term);
        let exponent = -0.5 * (order as f64 + 1.0);
        let reverted = last_power_coefficient(&self.series, exponent) / (order as f64 + 1.0);
        let products: f64 =
            self.given.iter().rev().zip(&self.reverted).map(|(one, other)| one * other).sum();
        self.reverted.push(reverted);
        self.given.push(-(products + reverted));
        self.given.last().copied()
    }
}

/// The last coefficient of 1 + the series, raised to the power `exponent`, as far as the series is
/// given.
fn last_power_coefficient(series: &[f64], exponent: f64) -> f64 {
    let mut powers: Vec<f64> = Vec::with_capacity(series.len());
    for (order, term) in (1_u32..).zip(series) {
        let products: f64 = (1_u32..)
            .zip(series.iter().zip(powers.iter().rev()))
            .map(|(j, (one, other))| (f64::from(j) * exponent - f64::from(order - j)) * one * other)
            .sum();
        powers.push(exponent * term + products / f64::from(order));
    }
    powers.last().copied().unwrap_or(1.0)
}
