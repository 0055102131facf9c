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
/// The size of the logarithm of the largest term from which the others change none of its digits.
const ONE_TERM_FROM: f64 = 1e15;
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
    /// Whether the point is an end of the range of the law.
    pub(super) fn is_at_end(self) -> bool {
        match self {
            Self::Beta(point) => point.x <= 0.0 || point.y <= 0.0,
            Self::Gamma { x, .. } => x <= 0.0 || x.is_infinite(),
        }
    }

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

    /// The logarithm of one tail.
    fn ln_tail(self, side: Side) -> f64 {
        let tails = self.tails();
        match side {
            Side::Lower => tails.lower.ln_p,
            Side::Upper => tails.upper.ln_p,
        }
    }

    /// Both tails at the point.
    fn tails(self) -> Tails {
        match self {
            Self::Beta(point) => point.tails(),
            Self::Gamma { a, x } => incomplete_gamma::tails(a, x),
        }
    }

    /// The logarithm of the step: what the lower tail loses when the first parameter is raised by 1
    /// (Abramowitz & Stegun 1964, 26.5.16 and 6.5.21).
    fn ln_step(self) -> f64 {
        match self {
            Self::Beta(point) => point.ln_density() - point.a.ln(),
            Self::Gamma { a, x } => incomplete_gamma::ln_density(a, x) - a.ln(),
        }
    }

    /// One tail over the step.
    fn tail_over_step(self, side: Side) -> f64 {
        match (self, side) {
            (Self::Beta(point), Side::Lower) => point.a * point.lower_over_density(),
            (Self::Beta(point), Side::Upper) => point.a * point.upper_over_density(),
            (Self::Gamma { a, x }, Side::Lower) => a * incomplete_gamma::lower_over_density(a, x),
            (Self::Gamma { a, x }, Side::Upper) => a * incomplete_gamma::upper_over_density(a, x),
        }
    }

    /// The next step over this one.
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
        let peak = self.product_peak();
        let ln_tail = match self.side {
            Side::Lower if peak <= EVERY_TERM_UP_TO => self.lower_by_recurrence(peak),
            Side::Upper if peak <= EVERY_TERM_UP_TO => self.upper_by_recurrence(peak),
            Side::Lower | Side::Upper => self.by_stride(peak),
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
    /// With t(j) the steps, lower(j)/t(j) = 1 + lower(j + 1)/t(j + 1) · t(j + 1)/t(j):
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
        let mut tail = self.law.raised(count).tail_over_step(Side::Lower);
        let mut term = product * tail;
        let mut sum = term;
        while count > 0.0 && (count >= peak || term >= NEGLIGIBLE * sum) {
            count -= 1.0;
            product /= self.product_ratio(count);
            tail = 1.0 + tail * self.law.raised(count).step_ratio();
            term = product * tail;
            sum += term;
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
        let mut tail = self.law.raised(count).tail_over_step(Side::Upper);
        let mut term = product * tail;
        let mut sum = term;
        while count <= peak || term >= NEGLIGIBLE * sum {
            product *= self.product_ratio(count);
            tail = (tail + 1.0) / self.law.raised(count).step_ratio();
            count += 1.0;
            term = product * tail;
            sum += term;
        }
        sum.ln() + self.ln_product(peak)
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
    fn by_stride(self, product_peak: f64) -> f64 {
        let mode = self.term_peak(product_peak);
        let stride = (mode.sqrt() / 3.0).floor().max(1.0);
        let peak = self.ln_term(mode);
        if peak.abs() > ONE_TERM_FROM {
            return peak;
        }
        if self.mean >= NO_SPREAD_FROM {
            return self.law.raised(self.mean).ln_tail(self.side);
        }
        let mut sum = 1.0;
        for direction in [-stride, stride] {
            let mut count = mode + direction;
            let mut term = 1.0;
            while count >= 0.0 && term >= NEGLIGIBLE {
                term = (self.ln_term(count) - peak).exp();
                sum += term;
                count += direction;
            }
        }
        peak + (stride * sum).ln()
    }

    /// The logarithm of weight times tail.
    fn ln_term(self, count: f64) -> f64 {
        ln_poisson(count, self.mean) + self.law.raised(count).ln_tail(self.side)
    }

    /// The whole count near which weight times tail is largest, which is not far from where weight
    /// times step is, or from the mean.
    fn term_peak(self, product_peak: f64) -> f64 {
        // The logarithm of the next term over the one at `count`.
        let slope = |count: f64| {
            let relative_step = self.law.raised(count).tail_over_step(self.side).recip();
            let growth = match self.side {
                Side::Lower => -relative_step.min(1.0),
                Side::Upper => relative_step,
            };
            (self.mean / (count + 1.0)).ln() + growth.ln_1p()
        };
        // At the mean the lower terms fall already; a count before it the upper terms still rise.
        let step = self.mean.sqrt();
        let (start, step, bound) = match self.side {
            Side::Lower => (self.mean, -step, 0.0),
            Side::Upper => ((self.mean - 1.0).max(0.0), step, 1e3 * self.mean.max(product_peak)),
        };
        Bracket::reaching(start, step, bound, slope)
            .map_or(bound.min(start), |bracket| bracket.zero(slope))
            .round()
    }
}
