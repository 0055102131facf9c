//! The one-way analysis of variance of a single outcome.

use crate::error::AnalysisError;
use crate::test::FTest;

/// A one-way analysis of variance.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Anova {
    /// The F test.
    pub test: FTest,
    /// Share of the total sum of squares that lies between groups.
    pub eta2: f64,
    /// Omega squared; may be negative and is not truncated.
    pub omega2: f64,
    /// Sum of squares between groups.
    pub ss_between: f64,
    /// Sum of squares within groups.
    pub ss_within: f64,
    /// Mean square within groups.
    pub ms_within: f64,
}

/// Compares the group means of one outcome. An error names it as outcome 0.
pub fn anova(
    values: &[f64],
    groups: &[usize],
    group_count: usize,
) -> Result<Anova, AnalysisError> {
    let _ = (values, groups, group_count);
    unimplemented!()
}
