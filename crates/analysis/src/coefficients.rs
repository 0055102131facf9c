//! What the outcomes contribute to each discriminant function.

use nalgebra::DMatrix;

use crate::hypothesis::Hypothesis;

/// Coefficients of the discriminant functions, p x s each.
///
/// The sign of a function is arbitrary; here its largest standardized coefficient is positive. The
/// function of a root that is zero has an arbitrary direction.
#[derive(Clone, Debug, PartialEq)]
pub struct Coefficients {
    /// Weights of the outcomes in their own units; not comparable across outcomes. Scaled so that
    /// the scores have pooled within-group variance 1.
    pub raw: DMatrix<f64>,
    /// Weights of the outcomes in pooled within-group standard deviations: what an outcome adds
    /// given the others.
    pub standardized: DMatrix<f64>,
    /// Pooled within-group correlations of outcome and score (Huberty 1984, Psychological Bulletin
    /// 95).
    pub structure: DMatrix<f64>,
    /// Standardized times structure; the shares of one function sum to 1 (Thomas 1992, Multivariate
    /// Behavioral Research 27). A negative share marks a suppressor.
    pub share: DMatrix<f64>,
}

/// The coefficients of every discriminant function.
pub fn coefficients(hypothesis: &Hypothesis) -> Coefficients {
    let standardized = hypothesis.standardized().clone();
    let structure = hypothesis.structure();
    let share = standardized.component_mul(&structure);
    Coefficients { raw: hypothesis.vectors(), standardized, structure, share }
}
