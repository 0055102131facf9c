//! Incomplete beta and gamma functions near the centre of the law where the parameters are so
//! large that a continued fraction would take thousands of steps.

use std::f64::consts::{FRAC_1_SQRT_2, PI};

use super::normal::scaled_erfc;
use super::stirling::stirling_error;

/// The smaller parameter from which the expansion is used.
const SMALLEST: f64 = 3000.0;
/// How far from the centre, as a part of the smaller parameter, the expansion is used.
const REACH: f64 = 0.03;
/// Terms of the expansion, an even number.
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
    let coefficients = coefficients(shape);
    let root = deviance.sqrt();
    let step = 2.0 * deviance;
    let (even_start, odd_start) = (0.5 * PI.sqrt() * 0.5 * scaled_erfc(root), 0.5 * FRAC_1_SQRT_2);
    let (mut even, mut odd) = (even_start, odd_start);
    let (mut even_power, mut odd_power) = (2.0 * FRAC_1_SQRT_2 * root, step);
    let mut power = scale;
    let mut sum = even;
    for (index, coefficient) in coefficients.iter().enumerate() {
        let order = index as f64;
        if index == 0 {
            sum += coefficient * power * odd;
            continue;
        }
        power *= scale;
        let integral = if index % 2 == 1 {
            even = odd_start * even_power + order * even;
            even_power *= step;
            even
        } else {
            odd = odd_start * odd_power + order * odd;
            odd_power *= step;
            odd
        };
        let term = coefficient * power * integral;
        sum += term;
        if index % 2 == 0 && term.abs() <= 1e-18 * sum {
            break;
        }
    }
    sum
}

/// The coefficients d₁, d₂, … of the expansion.
#[allow(clippy::indexing_slicing, reason = "every index stays below the fixed length")]
fn coefficients(shape: Shape) -> [f64; TERMS + 1] {
    let mut series = [0.0; TERMS + 1];
    let mut reverted = [0.0; TERMS + 1];
    let mut result = [0.0; TERMS + 1];
    let square = shape.ratio * shape.ratio;
    let spread = (1.0 + shape.ratio).recip();
    series[0] = 2.0 / 3.0 * shape.symmetry;
    reverted[0] = -0.5 * series[0];
    result[0] = -reverted[0];
    let mut sum = 1.0;
    let mut power = 1.0;
    for n in (2..=TERMS).step_by(2) {
        power *= square;
        let order = n as f64;
        series[n - 1] = 2.0 * spread * (1.0 + shape.ratio * power) / (order + 2.0);
        sum += power;
        series[n] = 2.0 * shape.symmetry * sum / (order + 3.0);
        for i in n..=n + 1 {
            reverted[i - 1] = power_coefficient(&series, i) / (i as f64 + 1.0);
            let products: f64 = (1..i).map(|j| result[i - j - 1] * reverted[j - 1]).sum();
            result[i - 1] = -(products + reverted[i - 1]);
        }
    }
    result
}

/// The coefficient of order `i` of the series raised to the power −(i + 1)/2.
#[allow(clippy::indexing_slicing, reason = "every index stays below the fixed length")]
fn power_coefficient(series: &[f64; TERMS + 1], i: usize) -> f64 {
    let exponent = -0.5 * (i as f64 + 1.0);
    let mut powers = [0.0; TERMS + 1];
    powers[0] = exponent * series[0];
    for m in 2..=i {
        let products: f64 = (1..m)
            .map(|j| {
                let (j_term, rest) = (j as f64, (m - j) as f64);
                (j_term * exponent - rest) * series[j - 1] * powers[m - j - 1]
            })
            .sum();
        powers[m - 1] = exponent * series[m - 1] + products / m as f64;
    }
    powers[i - 1]
}
