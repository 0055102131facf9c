//! What can make an analysis impossible, named by group, outcome or row index so that the caller
//! can put words to it.

use thiserror::Error;

/// Why an analysis cannot be done.
#[derive(Clone, Debug, Error, PartialEq)]
pub enum AnalysisError {
    /// The parts of the input do not fit each other.
    #[error("the input has {rows} rows but {groups} group codes")]
    Shape {
        /// Rows of outcomes.
        rows: usize,
        /// Group codes.
        groups: usize,
    },
    /// No outcomes at all.
    #[error("there are no outcomes")]
    NoOutcomes,
    /// A group code beyond the number of groups.
    #[error("row {row} has group code {code}, but there are {groups} groups")]
    GroupCode {
        /// Index of the row.
        row: usize,
        /// Its code.
        code: usize,
        /// Number of groups.
        groups: usize,
    },
    /// A value is infinite or not a number.
    #[error("outcome {outcome} is not finite in row {row}")]
    NotFinite {
        /// Index of the outcome.
        outcome: usize,
        /// Index of the row.
        row: usize,
    },
    /// A value too large to be squared.
    #[error("outcome {outcome} is beyond 1e150 in row {row}")]
    TooLarge {
        /// Index of the outcome.
        outcome: usize,
        /// Index of the row.
        row: usize,
    },
    /// Fewer than two groups.
    #[error("a comparison needs two groups or more, here are {groups}")]
    TooFewGroups {
        /// How many there are.
        groups: usize,
    },
    /// A group without units.
    #[error("group {group} is empty")]
    EmptyGroup {
        /// Index of the group.
        group: usize,
    },
    /// A group too small for what was asked.
    #[error("group {group} has {n} units, {needed} are needed")]
    SmallGroup {
        /// Index of the group.
        group: usize,
        /// Its size.
        n: usize,
        /// The least size that would do.
        needed: usize,
    },
    /// No degrees of freedom are left for error.
    #[error("no degrees of freedom are left for error")]
    NoErrorDf,
    /// An outcome that does not vary at all.
    #[error("outcome {outcome} is constant")]
    ConstantOutcome {
        /// Index of the outcome.
        outcome: usize,
    },
    /// An outcome that does not vary inside any group.
    #[error("outcome {outcome} is constant within groups")]
    ConstantWithinGroups {
        /// Index of the outcome.
        outcome: usize,
    },
    /// An outcome that is a linear function of others within groups.
    #[error("outcome {outcome} is a linear function of others")]
    DependentOutcome {
        /// Index of the outcome.
        outcome: usize,
        /// The outcomes that it is a function of, with their weights.
        of: Vec<Weight>,
    },
    /// The covariance matrix of one group is singular.
    #[error("the covariance matrix of group {group} is singular")]
    SingularGroup {
        /// Index of the group.
        group: usize,
    },
    /// More outcomes than degrees of freedom for error.
    #[error(
        "{outcomes} outcomes need at least as many degrees of freedom for error, here are {df_error}"
    )]
    TooManyOutcomes {
        /// How many outcomes.
        outcomes: usize,
        /// Degrees of freedom for error.
        df_error: usize,
    },
}

/// The weight of one outcome in a linear relation.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Weight {
    /// Index of the outcome.
    pub outcome: usize,
    /// Its weight.
    pub weight: f64,
}
