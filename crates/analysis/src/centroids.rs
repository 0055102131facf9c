//! Discriminant scores and where the groups lie on them.

use nalgebra::DMatrix;

use crate::coefficients::Coefficients;
use crate::sample::Sample;

/// One group on one discriminant function.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Centroid {
    /// Units.
    pub n: usize,
    /// Mean score.
    pub mean: f64,
    /// Standard deviation of the scores (divisor n - 1); absent for a single unit.
    pub sd: Option<f64>,
}

/// Scores of every unit, N x s, centred on the grand mean.
pub fn scores(sample: &Sample, coefficients: &Coefficients) -> DMatrix<f64> {
    let _ = (sample, coefficients);
    unimplemented!()
}

/// Mean scores: `[group][function]`.
pub fn centroids(sample: &Sample, scores: &DMatrix<f64>) -> Vec<Vec<Centroid>> {
    let _ = (sample, scores);
    unimplemented!()
}
