//! Every pair of groups on one outcome.

use crate::error::AnalysisError;
use crate::test::{Interval, PValue};

/// The difference between two groups.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Pair {
    /// Index of the first group.
    pub first: usize,
    /// Index of the second group.
    pub second: usize,
    /// Mean of the first minus mean of the second.
    pub difference: f64,
    /// Interval of the difference.
    pub interval: Interval,
    /// Student's t.
    pub t: f64,
    /// Degrees of freedom of the pooled error.
    pub df: f64,
    /// Two-sided p value.
    pub p: PValue,
    /// Difference in pooled standard deviations.
    pub d: f64,
    /// d without its small-sample bias (Hedges 1981).
    pub g: f64,
    /// Limits of the population effect by the noncentral t; not multiplied by the correction.
    pub effect_interval: Interval,
}

/// All pairs of groups, with the error pooled over all groups.
#[derive(Clone, Debug, PartialEq)]
pub struct Pairs {
    /// The pairs: 0 with 1, 0 with 2, ..., 1 with 2, ...
    pub list: Vec<Pair>,
    /// Mean of |d| over the pairs.
    pub mean_abs_d: f64,
    /// Mean of |g| over the pairs.
    pub mean_abs_g: f64,
    /// Pooled within-group standard deviation.
    pub pooled_sd: f64,
    /// Degrees of freedom of the pooled error.
    pub df: f64,
    /// The factor that turns d into g.
    pub correction: f64,
}

/// Compares every pair of groups. An error names the outcome as outcome 0.
pub fn pairs(
    values: &[f64],
    groups: &[usize],
    group_count: usize,
    level: f64,
) -> Result<Pairs, AnalysisError> {
    let _ = (values, groups, group_count, level);
    unimplemented!()
}
