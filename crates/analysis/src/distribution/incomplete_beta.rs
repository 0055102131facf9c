//! The regularized incomplete beta function, both tails.
//!
//! The point is given by x and by y = 1 − x, so that neither side is lost where it is close to 0.

use std::f64::consts::PI;

use super::stirling::{deviance, stirling_error};
use super::{Tails, large_parameters};

/// Both tails of the beta law with the finite parameters `a` and `b` at `x`, with `y` = 1 − x.
///
/// Sources: the continued fraction and the expansion for large parameters of DiDonato & Morris
/// 1992, ACM Trans. Math. Softw. 18:360; the density in the form of Loader 2000, Fast and Accurate
/// Computation of Binomial Probabilities.
pub fn tails(a: f64, b: f64, x: f64, y: f64) -> Tails {
    let product = a * y;
    // b x − a y with one rounding (Kahan's difference of products).
    let excess = b.mul_add(x, -product) - a.mul_add(y, -product);
    BetaPoint { a, b, x, y, excess }.tails()
}

/// A beta law and a point.
#[derive(Clone, Copy, Debug)]
pub(super) struct BetaPoint {
    /// The first parameter.
    pub(super) a: f64,
    /// The second parameter.
    pub(super) b: f64,
    /// The point.
    pub(super) x: f64,
    /// 1 − x.
    pub(super) y: f64,
    /// b x − a y, how far (a + b) x is above a: given because callers know it without cancellation.
    pub(super) excess: f64,
}

impl BetaPoint {
    /// Both tails.
    pub(super) fn tails(self) -> Tails {
        let Self { a, b, x, y, .. } = self;
        if a.is_nan() || b.is_nan() || x.is_nan() || y.is_nan() || a <= 0.0 || b <= 0.0 {
            Tails::UNDEFINED
        } else if x <= 0.0 {
            Tails::ALL_ABOVE
        } else if y <= 0.0 {
            Tails::ALL_BELOW
        } else if self.lies_low() {
            Tails::from_ln_lower(self.ln_lower())
        } else {
            Tails::from_ln_upper(self.reflected().ln_lower())
        }
    }

    /// Whether the lower tail is the one to compute. The continued fractions of the two tails serve
    /// on either side of x = (a + 1)/(a + b + 2).
    fn lies_low(self) -> bool {
        let bound = if self.is_large() { 0.0 } else { 1.0 - 2.0 * self.x };
        self.excess < bound
    }

    /// Whether the expansion for large parameters applies.
    fn is_large(self) -> bool {
        large_parameters::applies(self.a.min(self.b), self.excess)
    }

    /// ln[xᵃ yᵇ / B(a, b)].
    pub(super) fn ln_density(self) -> f64 {
        let Self { a, b, .. } = self;
        let n = a + b;
        let size = 0.5 * (a / n * b / (2.0 * PI)).ln();
        let correction = stirling_error(a) + stirling_error(b) - stirling_error(n);
        size - correction - self.deviance()
    }

    /// −ln[(n x/a)ᵃ (n y/b)ᵇ] with n = a + b.
    fn deviance(self) -> f64 {
        let Self { a, b, x, y, excess } = self;
        let n = a + b;
        deviance(a, excess, n * x) + deviance(b, -excess, n * y)
    }

    /// The same point seen from the other end.
    fn reflected(self) -> Self {
        Self { a: self.b, b: self.a, x: self.y, y: self.x, excess: -self.excess }
    }

    /// The logarithm of the lower tail, for a point that is not far above the centre.
    fn ln_lower(self) -> f64 {
        if self.is_large() {
            large_parameters::ln_tail(self.a, self.b, self.deviance())
        } else {
            self.ln_density() - self.continued_fraction().ln()
        }
    }

    /// The lower tail over xᵃ yᵇ / B(a, b), without cancellation far out.
    pub(super) fn lower_over_density(self) -> f64 {
        if self.lies_low() && !self.is_large() {
            self.continued_fraction().recip()
        } else {
            (self.tails().lower.ln_p - self.ln_density()).exp()
        }
    }

    /// The upper tail over the same quantity.
    pub(super) fn upper_over_density(self) -> f64 {
        if self.lies_low() || self.is_large() {
            (self.tails().upper.ln_p - self.ln_density()).exp()
        } else {
            self.reflected().continued_fraction().recip()
        }
    }

    /// xᵃ yᵇ / (B(a, b) I_x(a, b)), by the modified Lentz method.
    fn continued_fraction(self) -> f64 {
        let Self { a, b, x, excess, .. } = self;
        let denominator = |m: f64| {
            let middle = if m > 0.0 { m * (b - m) * x / (a + 2.0 * m - 1.0) } else { 0.0 };
            m + middle + (a + m) / (a + 2.0 * m + 1.0) * (1.0 - excess + m * (2.0 - x))
        };
        let numerator = |m: f64| {
            let scale = a + 2.0 * m - 1.0;
            (a + m - 1.0) / scale * ((a + b + m - 1.0) * x / scale) * m * ((b - m) * x)
        };
        lentz(numerator, denominator)
    }
}

/// b₀ + a₁/(b₁ + a₂/(b₂ + …)) by the modified Lentz method (Thompson & Barnett 1986, J. Comput.
/// Phys. 64:490).
pub(super) fn lentz(numerator: impl Fn(f64) -> f64, denominator: impl Fn(f64) -> f64) -> f64 {
    let nudge = |value: f64| if value == 0.0 { f64::MIN_POSITIVE } else { value };
    let mut value = nudge(denominator(0.0));
    let mut upper = value;
    let mut lower = 0.0;
    let mut m = 1.0;
    while m < 1e6 {
        let (above, below) = (numerator(m), denominator(m));
        lower = nudge(below + above * lower).recip();
        upper = nudge(below + above / upper);
        let change = upper * lower;
        value *= change;
        if (change - 1.0).abs() <= f64::EPSILON || change.is_nan() {
            break;
        }
        m += 1.0;
    }
    value
}
