//! A multivariate linear hypothesis, reduced to roots and vectors.

use nalgebra::DMatrix;

use crate::centring::{Centred, check_varies};
use crate::error::AnalysisError;
use crate::numeric::ROUNDOFF;
use crate::numeric::jacobi::singular;
use crate::residuals::ResidualFactor;
use crate::sample::Sample;

pub use crate::residuals::Independence;

/// A root counts as zero where its square root is below this many times what rounding can produce.
const ROOT_ROUNDINGS: f64 = 4.0;

/// Two standardized coefficients count as equally large within this relative distance, so that
/// rounding does not choose which of them fixes the sign.
const EQUALLY_LARGE: f64 = 1e-9;

/// A multivariate hypothesis against its error: what every design hands to the criteria, the
/// discriminant functions and the coefficients.
///
/// With H and E the cross products of hypothesis and error, the roots are those of E^-1 H and the
/// vectors solve (H - λE)v = 0 with v'Sv = 1, where S = E / df of the error. Neither H nor E is
/// formed: the effects, in units of the residual norms, are whitened by the triangular factor of the
/// residuals, and the squared singular values of what results are the roots.
#[derive(Clone, Debug)]
pub struct Hypothesis {
    residuals: ResidualFactor,
    effects: DMatrix<f64>,
    df_hypothesis: usize,
    df_error: usize,
    units: usize,
    roots: Vec<f64>,
    /// Orthonormal directions in the whitened space, p x s, one for each root.
    directions: DMatrix<f64>,
    standardized: DMatrix<f64>,
}

impl Hypothesis {
    /// Reduces effects to roots.
    ///
    /// `effects` has p columns, one for each outcome in its own units, and its cross product is H.
    pub(crate) fn new(
        residuals: ResidualFactor,
        effects: DMatrix<f64>,
        df_hypothesis: usize,
        df_error: usize,
        units: usize,
    ) -> Hypothesis {
        let mut scaled = effects.transpose();
        for (mut row, norm) in scaled.row_iter_mut().zip(residuals.norms()) {
            row /= *norm;
        }
        let whitened = residuals.whiten(&scaled);
        let found = singular(&whitened.transpose());
        let dimensions = residuals.outcome_count().min(df_hypothesis);
        let roots = roots(&found.values, dimensions, residuals.whitened_rounding());
        let mut directions = found.right.columns(0, roots.len()).clone_owned();
        let mut standardized = residuals.back_solve(&directions);
        for (mut direction, mut weights) in
            directions.column_iter_mut().zip(standardized.column_iter_mut())
        {
            if points_down(weights.as_slice()) {
                direction.neg_mut();
                weights.neg_mut();
            }
        }
        Hypothesis {
            residuals,
            effects,
            df_hypothesis,
            df_error,
            units,
            roots,
            directions,
            standardized,
        }
    }

    /// Number of outcomes, p.
    pub fn outcome_count(&self) -> usize {
        self.residuals.outcome_count()
    }

    /// Degrees of freedom of the hypothesis.
    pub fn df_hypothesis(&self) -> usize {
        self.df_hypothesis
    }

    /// Degrees of freedom of the error.
    pub fn df_error(&self) -> usize {
        self.df_error
    }

    /// Number of units, N.
    pub fn units(&self) -> usize {
        self.units
    }

    /// Number of dimensions, s = min(p, df of the hypothesis).
    pub fn dimensions(&self) -> usize {
        self.roots.len()
    }

    /// The s largest roots of E^-1 H, descending. A root that rounding of the data alone can produce
    /// is exactly zero; the direction that goes with it is arbitrary.
    pub fn roots(&self) -> &[f64] {
        &self.roots
    }

    /// The vectors of the roots, p x s, for outcomes in their own units, with v'Sv = 1. The sign makes
    /// the largest standardized coefficient positive.
    pub fn vectors(&self) -> DMatrix<f64> {
        let mut vectors = self.standardized.clone();
        for (mut row, sd) in vectors.row_iter_mut().zip(self.within_sd()) {
            row /= sd;
        }
        vectors
    }

    /// The vectors for outcomes in pooled within-group standard deviations, p x s.
    pub fn standardized(&self) -> &DMatrix<f64> {
        &self.standardized
    }

    /// Pooled within-group correlations of outcomes and scores, p x s.
    pub fn structure(&self) -> DMatrix<f64> {
        // With outcomes in within-group standard deviations S is R'R and v is R^-1 u for a direction
        // u, so the covariance Sv of outcomes and score is R'u.
        self.residuals.factor().tr_mul(&self.directions)
    }

    /// Pooled within-group standard deviations of the outcomes.
    pub fn within_sd(&self) -> Vec<f64> {
        let df = self.df_error as f64;
        self.residuals.norms().iter().map(|norm| norm / df.sqrt()).collect()
    }

    /// Rows whose cross product is H, with a column for every outcome in its own units.
    pub fn effects(&self) -> &DMatrix<f64> {
        &self.effects
    }

    /// The upper triangular matrix whose cross product is E, p x p, for outcomes in their own units.
    pub fn error_factor(&self) -> DMatrix<f64> {
        let mut factor = self.residuals.factor().clone();
        for (mut column, norm) in factor.column_iter_mut().zip(self.residuals.norms()) {
            column *= *norm;
        }
        factor
    }

    /// The outcome nearest to being refused as a linear function of others.
    pub fn independence(&self) -> Independence {
        self.residuals.independence()
    }
}

/// Squares the singular values, after those that rounding can produce are set to zero.
fn roots(singular_values: &[f64], dimensions: usize, input_rounding: f64) -> Vec<f64> {
    let largest = singular_values.first().copied().unwrap_or_default();
    let own_rounding = ROUNDOFF * largest * (dimensions as f64).sqrt();
    let zero = ROOT_ROUNDINGS * (input_rounding + own_rounding);
    let kept = singular_values.iter().take(dimensions);
    kept.map(|&value| if value > zero { value * value } else { 0.0 }).collect()
}

/// Whether the first of the largest weights is negative.
fn points_down(weights: &[f64]) -> bool {
    let largest = weights.iter().fold(0.0, |largest: f64, weight| largest.max(weight.abs()));
    let first = weights.iter().find(|weight| weight.abs() >= largest * (1.0 - EQUALLY_LARGE));
    first.is_some_and(|weight| *weight < 0.0)
}

/// The hypothesis that all groups have the same means on every outcome.
///
/// # Errors
///
/// [`NoErrorDf`](AnalysisError::NoErrorDf) where every group has one unit;
/// [`ConstantOutcome`](AnalysisError::ConstantOutcome) and
/// [`ConstantWithinGroups`](AnalysisError::ConstantWithinGroups) for an outcome that does not vary (the
/// second separates the groups perfectly);
/// [`TooManyOutcomes`](AnalysisError::TooManyOutcomes) where df of the error < p;
/// [`DependentOutcome`](AnalysisError::DependentOutcome) for an outcome that is, within groups, a
/// linear function of others.
pub fn one_way(sample: &Sample) -> Result<Hypothesis, AnalysisError> {
    let (units, groups, outcomes) = (sample.units(), sample.group_count(), sample.outcome_count());
    let df_error = units - groups;
    if df_error == 0 {
        return Err(AnalysisError::NoErrorDf);
    }
    for (outcome, values) in sample.outcomes().enumerate() {
        check_varies(values, sample.groups(), groups, outcome)?;
    }
    if df_error < outcomes {
        return Err(AnalysisError::TooManyOutcomes { outcomes, df_error });
    }
    let centred = sample.centred();
    let residuals = ResidualFactor::new(&centred)?;
    let effects = effect_rows(&centred, sample.group_sizes());
    Ok(Hypothesis::new(residuals, effects, groups - 1, df_error, units))
}

/// One row for each group: its size's root times the distance of its means from the grand means.
fn effect_rows(outcomes: &[Centred], sizes: &[usize]) -> DMatrix<f64> {
    let entries = outcomes.iter().flat_map(|outcome| outcome.weighted_effects(sizes));
    DMatrix::from_iterator(sizes.len(), outcomes.len(), entries)
}
