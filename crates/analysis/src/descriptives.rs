//! Means, standard deviations and their precision.

use crate::sample::Sample;
use crate::test::Interval;

/// One outcome in one group, or in all groups together.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Descriptive {
    /// Units.
    pub n: usize,
    /// Their mean.
    pub mean: f64,
    /// Their standard deviation (divisor n - 1); absent for a single unit.
    pub sd: Option<f64>,
    /// Standard error of the mean; absent for a single unit.
    pub se: Option<f64>,
    /// Interval of the mean by Student's t on n - 1 degrees of freedom; absent for a single unit.
    pub interval: Option<Interval>,
}

/// Describes every outcome in every group: `[group][outcome]`.
pub fn describe(sample: &Sample, level: f64) -> Vec<Vec<Descriptive>> {
    let _ = (sample, level);
    unimplemented!()
}

/// Describes every outcome over all units.
pub fn describe_total(sample: &Sample, level: f64) -> Vec<Descriptive> {
    let _ = (sample, level);
    unimplemented!()
}
