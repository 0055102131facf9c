//! Correlations among the outcomes, within groups and over all units.

use nalgebra::DMatrix;

use crate::sample::Sample;

/// Both correlation matrices with the standard deviations that belong to them.
#[derive(Clone, Debug, PartialEq)]
pub struct Correlations {
    /// Pooled within groups, p x p; NaN beside an outcome that is constant within groups.
    pub within: DMatrix<f64>,
    /// Over all units, p x p; NaN beside a constant outcome.
    pub total: DMatrix<f64>,
    /// Pooled within-group standard deviations.
    pub within_sd: Vec<f64>,
    /// Standard deviations over all units.
    pub total_sd: Vec<f64>,
    /// Degrees of freedom of the pooled matrix: N - k.
    pub df_within: usize,
}

/// Correlates the outcomes.
pub fn correlate(sample: &Sample) -> Correlations {
    let _ = sample;
    unimplemented!()
}
