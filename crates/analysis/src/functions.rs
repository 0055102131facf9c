//! Discriminant functions and the tests of their dimensions.

use crate::criteria::Exactness;
use crate::hypothesis::Hypothesis;
use crate::test::FTest;

/// One discriminant function.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct DiscriminantFunction {
    /// The root of this function.
    pub eigenvalue: f64,
    /// Its share of the sum of the roots; NaN where every root is zero.
    pub share: f64,
    /// The canonical correlation.
    pub canonical: f64,
    /// Wilks' lambda of this function and all later ones.
    pub wilks: f64,
    /// The test of this function and all later ones.
    pub test: FTest,
    /// Whether that test is exact.
    pub exactness: Exactness,
}

/// The discriminant functions, strongest first.
pub fn functions(hypothesis: &Hypothesis) -> Vec<DiscriminantFunction> {
    let _ = hypothesis;
    unimplemented!()
}
