//! The noncentral t distribution.
//!
//! Each tail is one integral of a positive function, P(T ≤ t) = E Φ(t S − δ) with S² = χ²/df.
//! Nothing cancels in it, wherever the point lies, which cannot be said of the series in powers of
//! δ: for a t and a δ of opposite signs their terms alternate.

use std::f64::consts::PI;

use super::root::Bracket;
use super::stirling::{exp_gap, stirling_error};
use super::{Tails, incomplete_gamma, normal};
use crate::test::{Interval, PValue};

/// The ratio of |δ| to the larger of 1 and √df from which the normal part of T does not spread it.
const NO_SPREAD_FROM: f64 = 1e10;

/// The relative change at which an integral counts as settled. It is small because the error can
/// pass through 0 from one step to the next by chance.
const SETTLED: f64 = 1e-13;

/// The size of the logarithm of the peak from which the shape of the integrand changes none of its
/// digits.
const ONLY_PEAK_FROM: f64 = 1e15;

/// The largest delta from which a limit is sought; twice as much must not overflow.
const LARGEST_START: f64 = 1e300;

/// P(T ≤ t) with `df` degrees of freedom and noncentrality `delta`.
pub fn cumulative(t: f64, df: f64, delta: f64) -> PValue {
    tails(t, df, delta).lower
}

/// P(T > t) with `df` degrees of freedom and noncentrality `delta`.
pub fn survival(t: f64, df: f64, delta: f64) -> PValue {
    tails(t, df, delta).upper
}

/// Both tails of the noncentral t law with `df` degrees of freedom, which may be infinite, and
/// noncentrality `delta` at `t`.
///
/// Source: Owen 1965, Biometrika 52:437 (the definition as an integral).
pub fn tails(t: f64, df: f64, delta: f64) -> Tails {
    if t.is_nan() || df.is_nan() || delta.is_nan() || df <= 0.0 {
        Tails::UNDEFINED
    } else if t == f64::INFINITY || (delta == f64::NEG_INFINITY && t.is_finite()) {
        Tails::ALL_BELOW
    } else if t == f64::NEG_INFINITY || delta == f64::INFINITY {
        Tails::ALL_ABOVE
    } else if t * delta > 0.0 && delta.abs() > NO_SPREAD_FROM * df.sqrt().max(1.0) {
        // T ≤ t where S ≥ δ/t, or S ≤ δ/t for negative t.
        let chi_square = incomplete_gamma::tails(0.5 * df, 0.5 * df * (delta / t) * (delta / t));
        if t > 0.0 { chi_square.swapped() } else { chi_square }
    } else if t < delta {
        Tails::from_ln_lower(ln_lower(t, df, delta))
    } else {
        Tails::from_ln_upper(ln_lower(-t, df, -delta))
    }
}

/// The limits of delta that go with an observed `t`: the equal-tailed interval at `level`.
///
/// At the lower limit the chance of a larger t is (1 − level)/2, at the upper limit the chance of a
/// smaller one (Steiger & Fouladi 1997, in Harlow, Mulaik & Steiger, What if there were no
/// significance tests?, ch. 9).
pub fn limits(t: f64, df: f64, level: f64) -> Interval {
    if t.is_nan() || df.is_nan() || df <= 0.0 || !(0.0..=1.0).contains(&level) {
        return Interval { lower: f64::NAN, upper: f64::NAN };
    }
    let ln_tail = (0.5 * (1.0 - level)).ln();
    Interval { lower: -upper_limit(-t, df, ln_tail), upper: upper_limit(t, df, ln_tail) }
}

/// The delta at which the logarithm of the chance of at most `t` is `ln_tail`.
fn upper_limit(t: f64, df: f64, ln_tail: f64) -> f64 {
    if t.is_infinite() || ln_tail == f64::NEG_INFINITY {
        return if t == f64::NEG_INFINITY { t } else { f64::INFINITY };
    }
    let excess = |delta: f64| cumulative(t, df, delta).ln_p - ln_tail;
    // About the standard error of t as an estimate of delta.
    let step = 1.0_f64.hypot(t / (2.0 * df).sqrt()).min(LARGEST_START);
    let start = t.clamp(-LARGEST_START, LARGEST_START);
    let (step, bound) =
        if excess(start) > 0.0 { (step, f64::INFINITY) } else { (-step, f64::NEG_INFINITY) };
    Bracket::reaching(start, step, bound, excess).map_or(bound, |bracket| bracket.zero(excess))
}

/// ln P(T ≤ t).
fn ln_lower(t: f64, df: f64, delta: f64) -> f64 {
    if df.is_infinite() {
        return normal::ln_cumulative(t - delta);
    }
    if t == 0.0 {
        return normal::ln_cumulative(-delta);
    }
    Integrand { t, df, delta }.ln_integral()
}

/// The density of v = ln S times Φ(t S − δ), without the constant of the density.
#[derive(Clone, Copy, Debug)]
struct Integrand {
    t: f64,
    df: f64,
    delta: f64,
}

impl Integrand {
    /// The logarithm of the integrand.
    fn ln_value(self, v: f64) -> f64 {
        -0.5 * self.df * exp_gap(2.0 * v) + normal::ln_cumulative(self.normal_argument(v))
    }

    /// t eᵛ − δ.
    fn normal_argument(self, v: f64) -> f64 {
        if v.abs() < 0.5 {
            self.t * v.exp_m1() + (self.t - self.delta)
        } else {
            self.t * v.exp() - self.delta
        }
    }

    /// The slope of the logarithm. It changes its sign once, because the integrand is log-concave
    /// in S.
    fn slope(self, v: f64) -> f64 {
        let slope = normal::ln_cumulative_slope(self.normal_argument(v));
        self.t * v.exp() * slope - self.df * (2.0 * v).exp_m1()
    }

    /// Where the integrand is largest.
    fn mode(self) -> f64 {
        let size = self.t.abs();
        // φ/Φ is at most 1 more than its negative argument, which bounds the root of the slope.
        let reach = self.delta.max(0.0) + 1.0;
        let bound = if self.t > 0.0 {
            (size * reach / self.df).ln_1p()
        } else {
            let root = self.df.sqrt();
            let linear = size * reach;
            let radical = linear.hypot(2.0 * root * root.hypot(size));
            (2.0 * self.df / (linear + radical)).ln().min(0.0)
        };
        Bracket::reaching(0.0, bound, bound, |v| self.slope(v))
            .map_or(bound, |bracket| bracket.zero(|v| self.slope(v)))
    }

    /// The finest scale of the integrand near its mode: its own width there, from the curvature of
    /// the logarithm, or the width of the edge that Φ makes, if that is sharper.
    fn scale(self, mode: f64) -> f64 {
        let z = self.normal_argument(mode);
        let slope = normal::ln_cumulative_slope(z);
        let bend = (slope * (z + slope)).clamp(0.0, 1.0);
        let sharpness = (self.t * mode.exp()).abs();
        let curvature = self.df * ((2.0 * mode).exp() + 1.0) + sharpness * sharpness * bend;
        curvature.sqrt().max(sharpness).recip()
    }

    /// The logarithm of the integral with the constant of the density.
    ///
    /// The trapezoidal rule after v = mode + scale sinh u, which resolves a sharp edge near the mode
    /// and reaches far on its flat side. For such an integrand the error falls exponentially with the
    /// number of points (Trefethen & Weideman 2014, SIAM Rev. 56:385), so the last change of
    /// [`SETTLED`] from one halving of the step to the next leaves an error far below that change.
    fn ln_integral(self) -> f64 {
        let mode = self.mode();
        let scale = self.scale(mode);
        let peak = self.ln_value(mode);
        let constant = 0.5 * (self.df / PI).ln() - stirling_error(0.5 * self.df);
        if peak.abs() > ONLY_PEAK_FROM {
            return constant + peak + scale.ln();
        }
        let height = |u: f64| {
            let (rise, fall) = (u.exp(), (-u).exp());
            let (sinh, cosh) = (0.5 * (rise - fall), 0.5 * (rise + fall));
            (self.ln_value(mode + scale * sinh) - peak).exp() * cosh
        };
        // Rounding in the logarithm of a far tail or at a very sharp edge can be larger than that.
        let noise = 4.0 * f64::EPSILON * (peak.abs() + self.delta.abs());
        let tolerance = noise.max(SETTLED);
        let mut step = 0.5;
        let mut sum = 1.0 + both_sides(step, step, height);
        for _ in 0..12 {
            let finer = sum + both_sides(0.5 * step, step, height);
            step *= 0.5;
            let settled = (finer - 2.0 * sum).abs() <= tolerance * finer;
            sum = finer;
            if settled {
                break;
            }
        }
        constant + peak + (sum * step * scale).ln()
    }
}

/// The sum of `height` at ±`first`, ±(`first` + `step`), … until it vanishes.
fn both_sides(first: f64, step: f64, height: impl Fn(f64) -> f64) -> f64 {
    let side = |sign: f64| {
        let mut u = first;
        let mut term = height(sign * u);
        let mut sum = term;
        // Past 1 the heights fall, faster and faster.
        while u <= 1.0 || term > 1e-20 {
            u += step;
            term = height(sign * u);
            sum += term;
        }
        sum
    };
    side(1.0) + side(-1.0)
}
