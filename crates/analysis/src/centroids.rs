//! Discriminant scores and where the groups lie on them.

use nalgebra::DMatrix;

use crate::centring::centre_total;
use crate::coefficients::Coefficients;
use crate::sample::Sample;

/// One group on one discriminant function.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Centroid {
    /// Units.
    pub n: usize,
    /// Mean score, in pooled within-group standard deviations from the mean of all units.
    pub mean: f64,
    /// Standard deviation of the scores (divisor n - 1); absent for a single unit.
    pub sd: Option<f64>,
}

/// Scores of every unit, N x s: zero is the mean of all units, and the pooled within-group variance
/// is 1. They are computed from centred outcomes, so that outcomes far from zero lose nothing.
///
/// The coefficients must be those of this sample, or have as many rows as it has outcomes.
pub fn scores(sample: &Sample, coefficients: &Coefficients) -> DMatrix<f64> {
    let mut scores = DMatrix::zeros(sample.units(), coefficients.raw.ncols());
    for (centred, weights) in sample.centred().iter().zip(coefficients.raw.row_iter()) {
        let parts = centred.residuals.iter().zip(sample.groups());
        for (row, (residual, &group)) in parts.enumerate() {
            let effect = centred.effects.get(group).copied().unwrap_or_default();
            let deviation = effect + residual;
            scores.row_mut(row).zip_apply(&weights, |score, weight| *score += deviation * weight);
        }
    }
    scores
}

/// Mean scores: `[group][function]`. The scores must have a row for every unit of the sample.
pub fn centroids(sample: &Sample, scores: &DMatrix<f64>) -> Vec<Vec<Centroid>> {
    let describe_group = |group| {
        let members = sample.members(group);
        let n = members.len();
        let describe = |column: nalgebra::DVectorView<'_, f64>| {
            let own: Vec<f64> =
                members.iter().filter_map(|&row| column.get(row).copied()).collect();
            let centred = centre_total(&own);
            let sd = (n > 1).then(|| centred.norm_within() / ((n - 1) as f64).sqrt());
            Centroid { n, mean: centred.grand_mean, sd }
        };
        scores.column_iter().map(describe).collect()
    };
    (0..sample.group_count()).map(describe_group).collect()
}
