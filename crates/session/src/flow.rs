//! Where the rows went: from the file to the rows that are compared, with the reason at each step.

use tussock_report::rich::Rich;

/// The steps from the file to the analysis.
#[derive(Clone, Debug, Default, PartialEq)]
pub(crate) struct Flow {
    /// In order; the first is the file, the last the rows that are compared.
    pub(crate) steps: Vec<Step>,
    /// For each outcome, how many of the otherwise eligible rows miss it, in all and by group.
    pub(crate) missing: Vec<Missing>,
}

/// One step.
#[derive(Clone, Debug, PartialEq)]
pub(crate) struct Step {
    /// What it is called in paths: `read`, `admitted` and the name of the table that it made,
    /// `selected`, `grouped`, `analysed`.
    pub(crate) keys: Vec<String>,
    /// What the step is.
    pub(crate) label: Rich,
    /// How many rows remain.
    pub(crate) remaining: Count,
    /// How many it left out.
    pub(crate) left_out: Option<usize>,
}

/// Rows in all and by group; by group only where the factor is known at that step.
#[derive(Clone, Debug, Default, PartialEq)]
pub(crate) struct Count {
    /// In all.
    pub(crate) total: usize,
    /// In each group.
    pub(crate) groups: Option<Vec<usize>>,
}

/// Missing values of an outcome.
#[derive(Clone, Debug, PartialEq)]
pub(crate) struct Missing {
    /// The outcome.
    pub(crate) outcome: String,
    /// What tables print for it.
    pub(crate) label: Rich,
    /// How many rows miss it.
    pub(crate) count: Count,
}
