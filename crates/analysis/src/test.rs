//! Test results that every procedure shares.

/// A p value that survives underflow.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PValue {
    /// The probability; 0 where it underflows.
    pub p: f64,
    /// Its natural logarithm.
    pub ln_p: f64,
}

/// An F test.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct FTest {
    /// The statistic.
    pub f: f64,
    /// Degrees of freedom of the numerator.
    pub df1: f64,
    /// Degrees of freedom of the denominator.
    pub df2: f64,
    /// Its p value.
    pub p: PValue,
}

/// Both ends of an interval.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Interval {
    /// The lower limit.
    pub lower: f64,
    /// The upper limit.
    pub upper: f64,
}
