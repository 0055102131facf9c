//! What the outcomes contribute to each discriminant function.

use nalgebra::DMatrix;

use crate::hypothesis::Hypothesis;

/// Coefficients of the discriminant functions, p x s each.
#[derive(Clone, Debug, PartialEq)]
pub struct Coefficients {
    /// Weights of the outcomes in their own units.
    pub raw: DMatrix<f64>,
    /// Weights of the outcomes in pooled within-group standard deviations.
    pub standardized: DMatrix<f64>,
    /// Pooled within-group correlations of outcome and score.
    pub structure: DMatrix<f64>,
    /// Standardized times structure: columns sum to 1.
    pub share: DMatrix<f64>,
}

/// The coefficients of every discriminant function.
pub fn coefficients(hypothesis: &Hypothesis) -> Coefficients {
    let _ = hypothesis;
    unimplemented!()
}
