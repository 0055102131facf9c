//! The noncentral t distribution.

use super::Tails;
use crate::test::{Interval, PValue};

/// P(T ≤ t) with `df` degrees of freedom and noncentrality `delta`.
pub fn cumulative(t: f64, df: f64, delta: f64) -> PValue {
    tails(t, df, delta).lower
}

/// P(T > t) with `df` degrees of freedom and noncentrality `delta`.
pub fn survival(t: f64, df: f64, delta: f64) -> PValue {
    tails(t, df, delta).upper
}

/// The limits of delta of the equal-tailed interval at `level` for an observed `t`.
pub fn limits(t: f64, df: f64, level: f64) -> Interval {
    let tail = (1.0 - level) / 2.0;
    Interval {
        lower: bisect(|delta| survival(t, df, delta).p > tail, t),
        upper: bisect(|delta| cumulative(t, df, delta).p <= tail, t),
    }
}

/// Where `reached` turns true as delta rises.
fn bisect(reached: impl Fn(f64) -> bool, centre: f64) -> f64 {
    let mut reach = 1.0;
    while !(reached(centre + reach) && !reached(centre - reach)) && reach < 1e9 {
        reach *= 2.0;
    }
    let (mut low, mut high) = (centre - reach, centre + reach);
    for _ in 0..80 {
        let middle = 0.5 * (low + high);
        if reached(middle) { high = middle } else { low = middle }
    }
    0.5 * (low + high)
}

/// Both tails, as the mean of Φ(ts − δ) over s = √(χ²/df).
fn tails(t: f64, df: f64, delta: f64) -> Tails {
    let normal = |z: f64| 0.5 * statrs::function::erf::erfc(-z / std::f64::consts::SQRT_2);
    let constant =
        (2.0f64).ln() + 0.5 * df * (0.5 * df).ln() - statrs::function::gamma::ln_gamma(0.5 * df);
    let (mut lower, mut upper) = (0.0, 0.0);
    let width = 0.02 / (df.sqrt() + 1.0);
    for step in -4000..=2000 {
        let v = f64::from(step) * width;
        let weight = width * (constant + df * v - 0.5 * df * (2.0 * v).exp()).exp();
        let z = t * v.exp() - delta;
        lower += weight * normal(z);
        upper += weight * normal(-z);
    }
    Tails::from_probabilities(lower, upper)
}
