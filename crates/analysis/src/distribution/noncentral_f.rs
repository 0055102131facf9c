//! The noncentral F distribution.
//!
//! Each tail is a Poisson mixture of tails of beta laws, a sum of positive terms.

use super::poisson_mixture::{Law, PoissonMixture, Side};
use super::root::Bracket;
use super::{Tails, central_f};
use crate::test::{Interval, PValue};

/// The largest mean of the Poisson counts; beyond it intermediate values would overflow.
const LARGEST_MEAN: f64 = 1e305;

/// P(F ≤ f) with `df1` and `df2` degrees of freedom and noncentrality `lambda`.
pub fn cumulative(f: f64, df1: f64, df2: f64, lambda: f64) -> PValue {
    tails(f, df1, df2, lambda).lower
}

/// P(F > f) with `df1` and `df2` degrees of freedom and noncentrality `lambda`.
pub fn survival(f: f64, df1: f64, df2: f64, lambda: f64) -> PValue {
    tails(f, df1, df2, lambda).upper
}

/// Both tails of the noncentral F law at `f`; `df2` may be infinite.
///
/// Source: Johnson, Kotz & Balakrishnan 1995, Continuous Univariate Distributions 2, ch. 30.
pub fn tails(f: f64, df1: f64, df2: f64, lambda: f64) -> Tails {
    if lambda.is_nan() || lambda < 0.0 {
        return Tails::UNDEFINED;
    }
    let central = central_f::tails(f, df1, df2);
    let mean = (0.5 * lambda).min(LARGEST_MEAN);
    if central.lower.p.is_nan() || f <= 0.0 || f.is_infinite() || mean == 0.0 || df1.is_infinite() {
        return central;
    }
    if lambda.is_infinite() {
        return Tails::ALL_ABOVE;
    }
    let law = if df2.is_infinite() {
        Law::Gamma { a: 0.5 * df1, x: 0.5 * df1 * f }
    } else {
        Law::Beta(central_f::beta_point(f, df1, df2))
    };
    if law.is_at_end() {
        // The point is so close to an end that only its rounded place, the end, is known.
        return central;
    }
    let side = if f * df1 < df1 + lambda { Side::Lower } else { Side::Upper };
    PoissonMixture { law, mean, side }.tails()
}

/// The limits of lambda that go with an observed `f`: the equal-tailed interval at `level`.
///
/// At the lower limit the chance of a larger F is (1 − level)/2, at the upper limit the chance of a
/// smaller one; a limit is 0 where no lambda makes that chance so small (Steiger 2004, Psych.
/// Methods 9:164).
pub fn limits(f: f64, df1: f64, df2: f64, level: f64) -> Interval {
    let valid = !f.is_nan() && df1 > 0.0 && df2 > 0.0 && (0.0..=1.0).contains(&level);
    if !valid {
        return Interval { lower: f64::NAN, upper: f64::NAN };
    }
    let ln_tail = (0.5 * (1.0 - level)).ln();
    if f == f64::INFINITY {
        return Interval { lower: f, upper: f };
    }
    if ln_tail == f64::NEG_INFINITY {
        return Interval { lower: 0.0, upper: f64::INFINITY };
    }
    Interval {
        lower: limit(f, df1, df2, |lambda| ln_tail - survival(f, df1, df2, lambda).ln_p),
        upper: limit(f, df1, df2, |lambda| cumulative(f, df1, df2, lambda).ln_p - ln_tail),
    }
}

/// Where a function of lambda that falls turns negative; 0 where it starts so.
fn limit(f: f64, df1: f64, df2: f64, falling: impl Fn(f64) -> f64) -> f64 {
    if falling(0.0) <= 0.0 {
        return 0.0;
    }
    if df1.is_infinite() {
        // No finite lambda is felt beside the degrees of freedom.
        return f64::INFINITY;
    }
    let centre = (df1 * (f - 1.0)).clamp(0.0, LARGEST_MEAN);
    // About the standard error of the estimate of lambda.
    let spread = (2.0 * df1 + 4.0 * centre).sqrt().hypot((df1 + centre) * (2.0 / df2).sqrt());
    let (step, bound) =
        if falling(centre) > 0.0 { (spread, f64::INFINITY) } else { (-spread, 0.0) };
    Bracket::reaching(centre, step, bound, &falling).map_or(bound, |bracket| bracket.zero(&falling))
}
