//! Both tails of a distribution at one point.

use crate::test::PValue;

/// Both tails of a distribution at one point.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Tails {
    /// The probability of the point or less.
    pub lower: PValue,
    /// The probability of more than the point.
    pub upper: PValue,
}

impl Tails {
    /// All probability at the point or below it.
    pub(super) const ALL_BELOW: Self = Self {
        lower: PValue { p: 1.0, ln_p: 0.0 },
        upper: PValue { p: 0.0, ln_p: f64::NEG_INFINITY },
    };

    /// All probability above the point.
    pub(super) const ALL_ABOVE: Self = Self::ALL_BELOW.swapped();

    /// What an argument that is not a number leads to.
    pub(super) const UNDEFINED: Self = {
        let nan = PValue { p: f64::NAN, ln_p: f64::NAN };
        Self { lower: nan, upper: nan }
    };

    /// Both tails from the logarithm of the lower one.
    pub(super) fn from_ln_lower(ln_lower: f64) -> Self {
        // Rounding may push the logarithm of a probability of 1 above 0.
        let ln_lower = if ln_lower > 0.0 { 0.0 } else { ln_lower };
        let lower = PValue { p: ln_lower.exp(), ln_p: ln_lower };
        let complement = -ln_lower.exp_m1();
        let ln_complement = if lower.p < 0.5 { (-lower.p).ln_1p() } else { complement.ln() };
        Self { lower, upper: PValue { p: complement, ln_p: ln_complement } }
    }

    /// Both tails from the logarithm of the upper one.
    pub(super) fn from_ln_upper(ln_upper: f64) -> Self {
        Self::from_ln_lower(ln_upper).swapped()
    }

    /// The tails of the reflected variable.
    pub(super) const fn swapped(self) -> Self {
        Self { lower: self.upper, upper: self.lower }
    }
}
