//! The units of a one-factor comparison: several outcomes and one group code each.

use nalgebra::DMatrix;

use crate::centring::{Centred, centre};
use crate::error::AnalysisError;
use crate::groups::{check_values, group_sizes};

/// Units measured on one or more outcomes, each in one group.
#[derive(Clone, Debug)]
pub struct Sample {
    outcomes: DMatrix<f64>,
    groups: Vec<usize>,
    group_sizes: Vec<usize>,
}

impl Sample {
    /// Takes outcomes as an N x p matrix and a group code from `0..group_count` for every row.
    ///
    /// # Errors
    ///
    /// There are no outcomes ([`NoOutcomes`](AnalysisError::NoOutcomes)); rows and codes differ in
    /// number ([`Shape`](AnalysisError::Shape)); fewer than two groups
    /// ([`TooFewGroups`](AnalysisError::TooFewGroups)); a code beyond them
    /// ([`GroupCode`](AnalysisError::GroupCode)); a group without units
    /// ([`EmptyGroup`](AnalysisError::EmptyGroup)); a value that is infinite or not a number
    /// ([`NotFinite`](AnalysisError::NotFinite)) or beyond 1e150
    /// ([`TooLarge`](AnalysisError::TooLarge)).
    pub fn new(
        outcomes: DMatrix<f64>,
        groups: Vec<usize>,
        group_count: usize,
    ) -> Result<Sample, AnalysisError> {
        if outcomes.ncols() == 0 {
            return Err(AnalysisError::NoOutcomes);
        }
        let group_sizes = group_sizes(outcomes.nrows(), &groups, group_count)?;
        let sample = Sample { outcomes, groups, group_sizes };
        for outcome in 0..sample.outcome_count() {
            check_values(sample.outcome(outcome), outcome)?;
        }
        Ok(sample)
    }

    /// Number of units, N.
    pub fn units(&self) -> usize {
        self.groups.len()
    }

    /// Number of outcomes, p.
    pub fn outcome_count(&self) -> usize {
        self.outcomes.ncols()
    }

    /// Number of groups, k.
    pub fn group_count(&self) -> usize {
        self.group_sizes.len()
    }

    /// Units in each group; none is empty.
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

    /// The values of every outcome in turn.
    pub(crate) fn outcomes(&self) -> impl Iterator<Item = &[f64]> {
        self.outcomes.as_slice().chunks_exact(self.units())
    }

    /// Every outcome split into grand mean, group effects and residuals.
    pub(crate) fn centred(&self) -> Vec<Centred> {
        self.outcomes().map(|values| centre(values, &self.groups, &self.group_sizes)).collect()
    }

    /// The units of one group, as row indices.
    pub(crate) fn members(&self, group: usize) -> Vec<usize> {
        let rows = self.groups.iter().enumerate();
        rows.filter(|(_, code)| **code == group).map(|(row, _)| row).collect()
    }
}
