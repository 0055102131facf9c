//! A multivariate linear hypothesis, reduced to roots and vectors.

use nalgebra::DMatrix;

use crate::error::AnalysisError;
use crate::sample::Sample;

/// A multivariate hypothesis against its error.
#[derive(Clone, Debug)]
pub struct Hypothesis {
    df_hypothesis: usize,
    df_error: usize,
    units: usize,
    roots: Vec<f64>,
    vectors: DMatrix<f64>,
}

impl Hypothesis {
    /// Number of outcomes, p.
    pub fn outcome_count(&self) -> usize {
        self.vectors.nrows()
    }

    /// Degrees of freedom of the hypothesis.
    pub fn df_hypothesis(&self) -> usize {
        self.df_hypothesis
    }

    /// Degrees of freedom of the error.
    pub fn df_error(&self) -> usize {
        self.df_error
    }

    /// Number of units, N.
    pub fn units(&self) -> usize {
        self.units
    }

    /// Number of dimensions, s = min(p, df of the hypothesis).
    pub fn dimensions(&self) -> usize {
        self.roots.len()
    }

    /// The s largest roots of E^-1 H, descending.
    pub fn roots(&self) -> &[f64] {
        &self.roots
    }

    /// Their vectors, p x s, scaled so that v'Sv = 1 for the pooled within covariance S.
    pub fn vectors(&self) -> &DMatrix<f64> {
        &self.vectors
    }
}

/// The hypothesis that all group means are equal.
pub fn one_way(sample: &Sample) -> Result<Hypothesis, AnalysisError> {
    let _ = sample;
    unimplemented!()
}
