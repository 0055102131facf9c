//! The units of a one-factor comparison: several outcomes and one group code each.

use nalgebra::DMatrix;

use crate::error::AnalysisError;

/// Units measured on one or more outcomes, each in one group.
#[derive(Clone, Debug)]
pub struct Sample {
    outcomes: DMatrix<f64>,
    groups: Vec<usize>,
    group_sizes: Vec<usize>,
}

impl Sample {
    /// Takes outcomes as an N x p matrix and a code from `0..group_count` for every row.
    pub fn new(
        outcomes: DMatrix<f64>,
        groups: Vec<usize>,
        group_count: usize,
    ) -> Result<Sample, AnalysisError> {
        let _ = (outcomes, groups, group_count);
        unimplemented!()
    }

    /// Number of units.
    pub fn units(&self) -> usize {
        self.groups.len()
    }

    /// Number of outcomes.
    pub fn outcome_count(&self) -> usize {
        self.outcomes.ncols()
    }

    /// Number of groups.
    pub fn group_count(&self) -> usize {
        self.group_sizes.len()
    }

    /// Units in each group.
    pub fn group_sizes(&self) -> &[usize] {
        &self.group_sizes
    }

    /// The group code of every unit.
    pub fn groups(&self) -> &[usize] {
        &self.groups
    }

    /// The values of one outcome, in the order of the units; empty beyond the last outcome.
    pub fn outcome(&self, outcome: usize) -> &[f64] {
        let n = self.units();
        self.outcomes.as_slice().get(outcome * n..(outcome + 1) * n).unwrap_or_default()
    }
}
