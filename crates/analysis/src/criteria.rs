//! The four multivariate criteria.

use crate::hypothesis::Hypothesis;
use crate::test::{FTest, Interval};

/// How far the p value of a test can be trusted under its model.
#[derive(Clone, Copy, Debug, Eq, PartialEq)]
pub enum Exactness {
    /// The statistic has exactly this distribution.
    Exact,
    /// The distribution is an approximation.
    Approximate,
    /// The F is an upper bound, so the p value is a lower bound.
    Bound,
}

/// Which approximation tests the Hotelling-Lawley trace.
#[derive(Clone, Copy, Debug, Eq, PartialEq)]
pub enum TraceApproximation {
    /// McKeon (1974).
    McKeon,
    /// Pillai & Samson (1959).
    PillaiSamson,
}

/// One criterion and its test.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Criterion {
    /// The criterion.
    pub value: f64,
    /// Its natural logarithm.
    pub ln_value: f64,
    /// Its test.
    pub test: FTest,
    /// Whether the test is exact.
    pub exactness: Exactness,
    /// The effect size of this criterion.
    pub eta2: f64,
    /// Interval of the effect size; absent where no pivot exists.
    pub eta2_interval: Option<Interval>,
}

/// The four criteria of one hypothesis.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Criteria {
    /// Wilks' lambda.
    pub wilks: Criterion,
    /// Pillai's trace.
    pub pillai: Criterion,
    /// The Hotelling-Lawley trace.
    pub hotelling: Criterion,
    /// Which approximation tests the Hotelling-Lawley trace.
    pub hotelling_approximation: TraceApproximation,
    /// Roy's criterion as the largest root.
    pub roy: Criterion,
    /// Roy's criterion as theta = root / (1 + root).
    pub roy_theta: f64,
}

/// Computes the four criteria; `level` is the level of the intervals of the effect sizes.
pub fn criteria(hypothesis: &Hypothesis, level: f64) -> Criteria {
    let _ = (hypothesis, level);
    unimplemented!()
}
