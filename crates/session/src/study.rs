//! A comparison and its analyses, each done when first asked for.

use std::sync::OnceLock;

use nalgebra::DMatrix;
use tussock_analysis::centroids::scores;
use tussock_analysis::coefficients::{Coefficients, coefficients};
use tussock_analysis::error::AnalysisError;
use tussock_analysis::hypothesis::{Hypothesis, one_way};
use tussock_language::diagnostic::Diagnostic;

use crate::comparison::Comparison;
use crate::fingerprint::Fingerprint;
use crate::refusal::{Names, refusal};
use crate::trouble::Answerable;

/// A comparison under study.
#[derive(Debug)]
pub(crate) struct Study {
    /// A hash of everything that it rests on.
    pub(crate) fingerprint: Fingerprint,
    /// The data.
    pub(crate) comparison: Comparison,
    hypothesis: OnceLock<Result<Hypothesis, AnalysisError>>,
    discriminant: OnceLock<Discriminant>,
}

/// The coefficients of the functions and every unit's scores.
#[derive(Debug)]
pub(crate) struct Discriminant {
    /// The coefficients.
    pub(crate) coefficients: Coefficients,
    /// The scores, units by functions.
    pub(crate) scores: DMatrix<f64>,
}

impl Study {
    /// A study of a comparison, nothing done yet.
    pub(crate) fn new(comparison: Comparison, fingerprint: Fingerprint) -> Self {
        let (hypothesis, discriminant) = (OnceLock::new(), OnceLock::new());
        Self { fingerprint, comparison, hypothesis, discriminant }
    }

    /// The hypothesis that the groups do not differ.
    pub(crate) fn hypothesis(&self) -> Answerable<&Hypothesis> {
        let found = self.hypothesis.get_or_init(|| one_way(&self.comparison.sample));
        found.as_ref().map_err(|error| self.refuse(error))
    }

    /// The discriminant functions of that hypothesis.
    pub(crate) fn discriminant(&self) -> Answerable<&Discriminant> {
        let hypothesis = self.hypothesis()?;
        Ok(self.discriminant.get_or_init(|| {
            let coefficients = coefficients(hypothesis);
            let scores = scores(&self.comparison.sample, &coefficients);
            Discriminant { coefficients, scores }
        }))
    }

    /// A refusal of the analysis in the analyst's own names.
    pub(crate) fn refuse(&self, error: &AnalysisError) -> Box<Diagnostic> {
        refusal(
            error,
            &Names {
                outcomes: &self.comparison.outcomes,
                levels: &self.comparison.levels,
                factor: self.comparison.factor_location,
            },
        )
    }

    /// A refusal of an analysis of one outcome alone, in the analyst's own names.
    pub(crate) fn refuse_outcome(&self, error: &AnalysisError, outcome: usize) -> Box<Diagnostic> {
        let outcomes = self.comparison.outcomes.get(outcome..=outcome).unwrap_or_default();
        refusal(
            error,
            &Names {
                outcomes,
                levels: &self.comparison.levels,
                factor: self.comparison.factor_location,
            },
        )
    }
}
