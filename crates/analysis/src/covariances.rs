//! Are the groups equal in covariance and variance?

use crate::error::AnalysisError;
use crate::sample::Sample;
use crate::test::{FTest, PValue};

/// Box's test of equal covariance matrices.
#[derive(Clone, Debug, PartialEq)]
pub struct BoxTest {
    /// M.
    pub m: f64,
    /// The chi-square approximation, M(1 - c1).
    pub chi_square: f64,
    /// Degrees of freedom of the chi-square approximation.
    pub df: f64,
    /// p value of the chi-square approximation.
    pub chi_square_p: PValue,
    /// The F approximation.
    pub f: FTest,
    /// ln|S_g| of every group.
    pub log_determinants: Vec<f64>,
    /// ln|S| of the pooled matrix.
    pub pooled_log_determinant: f64,
}

/// What distances are measured from in Levene's test.
#[derive(Clone, Copy, Debug, Eq, PartialEq)]
pub enum Centre {
    /// The group mean (Levene 1960).
    Mean,
    /// The group median (Brown & Forsythe 1974).
    Median,
}

/// Tests whether the covariance matrices are equal.
pub fn box_test(sample: &Sample) -> Result<BoxTest, AnalysisError> {
    let _ = sample;
    unimplemented!()
}

/// ln|S_g| of every group; absent where it does not exist.
pub fn log_determinants(sample: &Sample) -> Vec<Option<f64>> {
    let _ = sample;
    unimplemented!()
}

/// Tests whether the variances of one outcome are equal.
pub fn levene(sample: &Sample, outcome: usize, centre: Centre) -> Result<FTest, AnalysisError> {
    let _ = (sample, outcome, centre);
    unimplemented!()
}
