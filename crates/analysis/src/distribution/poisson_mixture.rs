//! Poisson mixtures of beta or gamma laws: the noncentral F and chi-square distributions.
//!
//! With p(j) the Poisson weights and L(j) a tail of the law whose first parameter is raised by j,
//! the tail of the mixture is the sum of p(j) L(j). All terms are positive. They are summed outwards
//! from where they are large and on a scale of their own, so that nothing underflows.

use super::incomplete_beta::BetaPoint;
use super::root::Bracket;
use super::stirling::ln_poisson;
use super::{Tails, incomplete_gamma};

/// The count up to which every term is taken; beyond, one in so many.
const EVERY_TERM_UP_TO: f64 = 1e4;
/// The mean from which the relative spread of the counts is below the last digit.
const NO_SPREAD_FROM: f64 = 1e28;
/// Part of the largest weight, or of the sum, below which terms are left out.
const NEGLIGIBLE: f64 = 1e-20;

/// The law that is mixed, at one point, with its first parameter for a count of 0.
#[derive(Clone, Copy, Debug)]
pub(super) enum Law {
    /// Beta laws with a common second parameter.
    Beta(BetaPoint),
    /// Gamma laws with scale 1.
    Gamma {
        /// The shape.
        a: f64,
        /// The point.
        x: f64,
    },
}

impl Law {
    /// The law with its first parameter raised by `count`.
    fn raised(self, count: f64) -> Self {
        match self {
            Self::Beta(point) => Self::Beta(BetaPoint {
                a: point.a + count,
                excess: point.excess - count * point.y,
                ..point
            }),
            Self::Gamma { a, x } => Self::Gamma { a: a + count, x },
        }
    }

    /// Both tails at the point.
    fn tails(self) -> Tails {
        match self {
            Self::Beta(point) => point.tails(),
            Self::Gamma { a, x } => incomplete_gamma::tails(a, x),
        }
    }

    /// The logarithm of what the lower tail loses when the first parameter is raised by 1
    /// (Abramowitz & Stegun 1964, 26.5.16 and 6.5.21).
    fn ln_step(self) -> f64 {
        match self {
            Self::Beta(point) => point.ln_density() - point.a.ln(),
            Self::Gamma { a, x } => incomplete_gamma::ln_density(a, x) - a.ln(),
        }
    }

    /// The next such step over this one.
    fn step_ratio(self) -> f64 {
        match self {
            Self::Beta(point) => point.x * ((point.a + point.b) / (point.a + 1.0)),
            Self::Gamma { a, x } => x / (a + 1.0),
        }
    }
}

/// Which tail is summed.
#[derive(Clone, Copy, Debug)]
pub(super) enum Side {
    /// The point and what is below it.
    Lower,
    /// What is above the point.
    Upper,
}

/// A mixture and the tail of it that is summed, which should be the smaller one.
#[derive(Clone, Copy, Debug)]
pub(super) struct PoissonMixture {
    /// The law at a count of 0.
    pub(super) law: Law,
    /// The mean of the counts.
    pub(super) mean: f64,
    /// The tail to sum.
    pub(super) side: Side,
}

impl PoissonMixture {
    /// Both tails of the mixture.
    pub(super) fn tails(self) -> Tails {
        if self.mean >= NO_SPREAD_FROM {
            return self.law.raised(self.mean).tails();
        }
        let peak = self.product_peak();
        let ln_tail = match self.side {
            Side::Lower if peak <= EVERY_TERM_UP_TO => self.lower_by_recurrence(peak),
            Side::Upper if peak <= EVERY_TERM_UP_TO => self.upper_by_recurrence(peak),
            Side::Lower | Side::Upper => self.by_stride(),
        };
        match self.side {
            Side::Lower => Tails::from_ln_lower(ln_tail),
            Side::Upper => Tails::from_ln_upper(ln_tail),
        }
    }

    /// The next product of weight and step over the one at `count`.
    fn product_ratio(self, count: f64) -> f64 {
        self.mean / (count + 1.0) * self.law.raised(count).step_ratio()
    }

    /// The count at which the product of weight and step is largest: where its ratio passes 1.
    fn product_peak(self) -> f64 {
        let (linear, constant) = match self.law {
            Law::Beta(BetaPoint { a, b, x, .. }) => {
                (a + 2.0 - self.mean * x, a + 1.0 - self.mean * x * (a + b))
            }
            Law::Gamma { a, x } => (a + 2.0, a + 1.0 - self.mean * x),
        };
        if constant >= 0.0 {
            return 0.0;
        }
        let half = 0.5 * linear;
        let radical = half.hypot((-constant).sqrt());
        let root = if half < 0.0 { radical - half } else { -constant / (half + radical) };
        root.ceil()
    }

    /// The logarithm of the sum of weight times lower tail.
    ///
    /// With t the steps of [`Law::ln_step`], lower(j)/t(j) = 1 + lower(j + 1)/t(j + 1) · t(j + 1)/t(j):
    /// downwards in j only positive numbers are added.
    fn lower_by_recurrence(self, peak: f64) -> f64 {
        let mut count = peak;
        let mut product = 1.0;
        loop {
            let next = product * self.product_ratio(count);
            if next < NEGLIGIBLE {
                break;
            }
            product = next;
            count += 1.0;
        }
        let top = self.law.raised(count);
        let mut tail = (top.tails().lower.ln_p - top.ln_step()).exp();
        let mut sum = product * tail;
        while count > 0.0 {
            count -= 1.0;
            product /= self.product_ratio(count);
            tail = 1.0 + tail * self.law.raised(count).step_ratio();
            let term = product * tail;
            sum += term;
            if count < peak && term < NEGLIGIBLE * sum {
                break;
            }
        }
        sum.ln() + self.ln_product(peak)
    }

    /// The logarithm of the sum of weight times upper tail.
    ///
    /// Here upper(j + 1) = upper(j) + t(j): upwards in j only positive numbers are added.
    fn upper_by_recurrence(self, peak: f64) -> f64 {
        let mut count = peak;
        let mut product = 1.0;
        while count > 0.0 {
            let next = product / self.product_ratio(count - 1.0);
            if next < NEGLIGIBLE {
                break;
            }
            product = next;
            count -= 1.0;
        }
        let bottom = self.law.raised(count);
        let mut tail = (bottom.tails().upper.ln_p - bottom.ln_step()).exp();
        let mut sum = product * tail;
        loop {
            product *= self.product_ratio(count);
            tail = (tail + 1.0) / self.law.raised(count).step_ratio();
            count += 1.0;
            let term = product * tail;
            sum += term;
            if count > peak && term < NEGLIGIBLE * sum {
                return sum.ln() + self.ln_product(peak);
            }
        }
    }

    /// The logarithm of weight times step.
    fn ln_product(self, count: f64) -> f64 {
        ln_poisson(count, self.mean) + self.law.raised(count).ln_step()
    }

    /// The logarithm of the sum, from one term in so many.
    ///
    /// The terms are smooth in the count, and a sum over a smooth function with a stride well below
    /// its width differs from the whole sum by less than the last digit, by the same argument as the
    /// trapezoidal rule (Trefethen & Weideman 2014, SIAM Rev. 56:385). A third of the root of the
    /// count is at most half of the width.
    fn by_stride(self) -> f64 {
        let mode = self.term_peak();
        let stride = (mode.sqrt() / 3.0).floor().max(1.0);
        let peak = self.ln_term(mode);
        let mut sum = 1.0;
        for direction in [-stride, stride] {
            let mut count = mode + direction;
            while count >= 0.0 {
                let term = (self.ln_term(count) - peak).exp();
                sum += term;
                if term < NEGLIGIBLE {
                    break;
                }
                count += direction;
            }
        }
        peak + (stride * sum).ln()
    }

    /// The logarithm of weight times tail.
    fn ln_term(self, count: f64) -> f64 {
        ln_poisson(count, self.mean) + self.ln_tail(self.law.raised(count))
    }

    /// The logarithm of the tail of one law.
    fn ln_tail(self, law: Law) -> f64 {
        match self.side {
            Side::Lower => law.tails().lower.ln_p,
            Side::Upper => law.tails().upper.ln_p,
        }
    }

    /// The whole count near which weight times tail is largest.
    fn term_peak(self) -> f64 {
        // The logarithm of the next term over the one at `count`.
        let slope = |count: f64| {
            let law = self.law.raised(count);
            let relative_step = (law.ln_step() - self.ln_tail(law)).exp();
            let tail_growth = match self.side {
                Side::Lower => -relative_step.min(1.0),
                Side::Upper => relative_step,
            };
            (self.mean / (count + 1.0)).ln() + tail_growth.ln_1p()
        };
        let step = self.mean.sqrt();
        let (step, bound) = match self.side {
            Side::Lower => (-step, 0.0),
            Side::Upper => (step, f64::INFINITY),
        };
        let start = self.mean;
        Bracket::reaching(start, step, bound, slope)
            .map_or(bound.min(start), |bracket| bracket.zero(slope))
            .round()
    }
}
