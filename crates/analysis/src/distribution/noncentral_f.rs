//! The noncentral F distribution.

use super::{Tails, incomplete_beta};
use crate::test::{Interval, PValue};

/// P(F ≤ f) with `df1` and `df2` degrees of freedom and noncentrality `lambda`.
pub fn cumulative(f: f64, df1: f64, df2: f64, lambda: f64) -> PValue {
    tails(f, df1, df2, lambda).lower
}

/// P(F > f) with `df1` and `df2` degrees of freedom and noncentrality `lambda`.
pub fn survival(f: f64, df1: f64, df2: f64, lambda: f64) -> PValue {
    tails(f, df1, df2, lambda).upper
}

/// The limits of lambda of the equal-tailed interval at `level` for an observed `f`; 0 where the
/// data agree with no positive lambda.
pub fn limits(f: f64, df1: f64, df2: f64, level: f64) -> Interval {
    let tail = (1.0 - level) / 2.0;
    Interval {
        lower: bisect(|lambda| survival(f, df1, df2, lambda).p > tail),
        upper: bisect(|lambda| cumulative(f, df1, df2, lambda).p <= tail),
    }
}

/// Where `reached` turns true as lambda rises from 0.
fn bisect(reached: impl Fn(f64) -> bool) -> f64 {
    if reached(0.0) {
        return 0.0;
    }
    let (mut low, mut high) = (0.0, 1.0);
    while !reached(high) && high < 1e12 {
        low = high;
        high *= 2.0;
    }
    for _ in 0..80 {
        let middle = 0.5 * (low + high);
        if reached(middle) { high = middle } else { low = middle }
    }
    0.5 * (low + high)
}

/// Both tails, as Poisson mixtures of beta tails.
fn tails(f: f64, df1: f64, df2: f64, lambda: f64) -> Tails {
    let ratio = df2 / df1;
    let (x, y) = if f.is_infinite() { (1.0, 0.0) } else { (f / (f + ratio), ratio / (f + ratio)) };
    let half = 0.5 * lambda;
    let reach = 10.0 * half.sqrt() + 30.0;
    let (mut lower, mut upper) = (0.0, 0.0);
    let mut j = (half - reach).floor().max(0.0);
    while j < half + reach {
        let ln_weight = if half > 0.0 {
            j * half.ln() - half - statrs::function::gamma::ln_gamma(j + 1.0)
        } else if j > 0.0 {
            f64::NEG_INFINITY
        } else {
            0.0
        };
        let beta = incomplete_beta::tails(0.5 * df1 + j, 0.5 * df2, x, y);
        lower += ln_weight.exp() * beta.lower.p;
        upper += ln_weight.exp() * beta.upper.p;
        j += 1.0;
    }
    Tails::from_probabilities(lower, upper)
}
