//! The residuals of a fitted model, reduced to a triangular factor.

use nalgebra::{DMatrix, DVector};

use crate::centring::Centred;
use crate::error::{AnalysisError, Weight};
use crate::numeric::ROUNDOFF;
use crate::numeric::householder::{PivotedFactor, RowFactor};

/// Rows folded at once: a block of a hundred outcomes stays in a processor's cache.
const BLOCK: usize = 256;

/// An outcome is refused where less is left of it than this many times what rounding of its values
/// and of those it depends on can add up to.
const INPUT_ROUNDINGS: f64 = 10.0;

/// The same for the rounding of the factorization itself, relative to the residuals and for each unit
/// of the square root of the rows. What it leaves of a column that depends exactly on others was
/// below 1.1 roundings up to a thousand rows, 4 at twenty thousand and 19 at two hundred thousand.
const OWN_ROUNDINGS: f64 = 10.0;

/// A relation counts an outcome in whose scaled weight is more than this part of the largest.
const NEGLIGIBLE_WEIGHT: f64 = 1e-9;

/// The triangular factor of a matrix of residuals with columns scaled to unit norm.
///
/// With D the diagonal matrix of the norms and R the factor, the error cross products are
/// E = D R'R D; they are never formed, since that would square the condition of the data.
#[derive(Clone, Debug)]
pub(crate) struct ResidualFactor {
    norms: Vec<f64>,
    factor: DMatrix<f64>,
    input_ratios: Vec<f64>,
    independence: Independence,
}

/// How far the outcome most nearly dependent on the others is from being refused.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Independence {
    /// Index of the outcome.
    pub outcome: usize,
    /// The part of its within-group norm that is left outside the span of outcomes less dependent.
    pub remainder: f64,
    /// What would have been too little.
    pub tolerance: f64,
}

impl ResidualFactor {
    /// Factors residuals and decides their rank.
    ///
    /// Outcomes are taken in the order of pivoting, each time the one with the largest part left
    /// outside the span of those before it. Let w be its weights on those (1 for itself), all in
    /// columns of unit norm, and b an outcome's input norm over its residual norm. Rounding of the
    /// input can fake a remainder of u Σ|w|b, where u = 2^-53, and the factorization of N rows one of
    /// less than u Σ|w| √N. An outcome is refused where its remainder is not ten times that, 10 u
    /// Σ|w|(b + √N): not one digit of it would be right. Data far from zero compared with their spread
    /// are rounded more coarsely, so more must be left of them.
    ///
    /// # Errors
    ///
    /// [`DependentOutcome`](AnalysisError::DependentOutcome) with the relation.
    pub(crate) fn new(outcomes: &[Centred]) -> Result<Self, AnalysisError> {
        let norms: Vec<f64> = outcomes.iter().map(Centred::norm_within).collect();
        let factor = fold(outcomes, &norms);
        let input_ratios: Vec<f64> =
            outcomes.iter().zip(&norms).map(|(outcome, norm)| outcome.input_norm / norm).collect();
        let rows = outcomes.first().map_or(0, |outcome| outcome.residuals.len());
        let independence = decide_rank(&factor, rows, &norms, &input_ratios)?;
        Ok(ResidualFactor { norms, factor, input_ratios, independence })
    }

    /// Number of outcomes.
    pub(crate) fn outcome_count(&self) -> usize {
        self.norms.len()
    }

    /// The norm of every residual column: the square root of its sum of squares.
    pub(crate) fn norms(&self) -> &[f64] {
        &self.norms
    }

    /// R, upper triangular, p x p, with columns of unit norm.
    pub(crate) fn factor(&self) -> &DMatrix<f64> {
        &self.factor
    }

    /// The outcome nearest to being refused as dependent.
    pub(crate) fn independence(&self) -> Independence {
        self.independence
    }

    /// ln|R'R|.
    pub(crate) fn log_determinant(&self) -> f64 {
        2.0 * self.factor.diagonal().iter().map(|x| x.abs().ln()).sum::<f64>()
    }

    /// Solves R'X = B: columns of B, in units of the residual norms, become uncorrelated.
    pub(crate) fn whiten(&self, columns: &DMatrix<f64>) -> DMatrix<f64> {
        self.factor.tr_solve_upper_triangular(columns).expect("the rank decision leaves no zero")
    }

    /// Solves RX = B.
    pub(crate) fn back_solve(&self, columns: &DMatrix<f64>) -> DMatrix<f64> {
        self.factor.solve_upper_triangular(columns).expect("the rank decision leaves no zero")
    }

    /// The largest whitened effect that rounding of the input alone can produce.
    pub(crate) fn whitened_rounding(&self) -> f64 {
        let p = self.outcome_count();
        let inverse = self.back_solve(&DMatrix::identity(p, p));
        let rounding = DVector::from_column_slice(&self.input_ratios) * ROUNDOFF;
        inverse.abs().tr_mul(&rounding).norm()
    }
}

/// The triangular factor of the residual columns, each divided by its norm.
fn fold(outcomes: &[Centred], norms: &[f64]) -> DMatrix<f64> {
    let rows = outcomes.first().map_or(0, |outcome| outcome.residuals.len());
    let mut factor = RowFactor::new(outcomes.len());
    for start in (0..rows).step_by(BLOCK) {
        let size = BLOCK.min(rows - start);
        let block = outcomes.iter().zip(norms).flat_map(|(outcome, norm)| {
            outcome.residuals.iter().skip(start).take(size).map(move |residual| residual / norm)
        });
        factor.fold(DMatrix::from_iterator(size, outcomes.len(), block));
    }
    factor.into_factor()
}

#[allow(clippy::indexing_slicing, reason = "the steps are those of the square factor")]
fn decide_rank(
    factor: &DMatrix<f64>,
    rows: usize,
    norms: &[f64],
    input_ratios: &[f64],
) -> Result<Independence, AnalysisError> {
    let pivoted = PivotedFactor::new(factor);
    let own_roundings = OWN_ROUNDINGS * (rows as f64).sqrt();
    let ratios: Vec<f64> = pivoted.order.iter().map(|&j| at(input_ratios, j)).collect();
    let mut nearest: Option<Independence> = None;
    for (step, &outcome) in pivoted.order.iter().enumerate() {
        let weights = leading_weights(&pivoted.factor, step);
        let tolerance = ROUNDOFF
            * weights
                .iter()
                .chain([&1.0])
                .zip(&ratios)
                .map(|(weight, ratio)| weight.abs() * (INPUT_ROUNDINGS * ratio + own_roundings))
                .sum::<f64>();
        let remainder = pivoted.factor[(step, step)].abs();
        // The first column has its full norm left; whether it varies at all is decided elsewhere.
        if step > 0 && remainder <= tolerance {
            return Err(name_dependence(&pivoted.order, &weights, outcome, norms));
        }
        let candidate = Independence { outcome, remainder, tolerance };
        if nearest.is_none_or(|n| remainder * n.tolerance < n.remainder * tolerance) {
            nearest = Some(candidate);
        }
    }
    Ok(nearest.expect("a sample has an outcome"))
}

/// The weights of the columns before `step` in their best approximation of column `step`.
fn leading_weights(factor: &DMatrix<f64>, step: usize) -> Vec<f64> {
    let leading = factor.view((0, 0), (step, step));
    let column = factor.view((0, step), (step, 1)).clone_owned();
    let weights = leading.solve_upper_triangular(&column).expect("earlier remainders are not zero");
    weights.as_slice().to_vec()
}

/// Turns "column = weights of earlier columns" into "the last of these outcomes = weights of the
/// others", in the units of the outcomes: of a total and its parts, the last is usually the total.
fn name_dependence(
    order: &[usize],
    weights: &[f64],
    outcome: usize,
    norms: &[f64],
) -> AnalysisError {
    let largest = weights.iter().fold(1.0, |largest: f64, weight| largest.max(weight.abs()));
    let mut relation: Vec<Weight> = order
        .iter()
        .zip(weights)
        .map(|(&outcome, &weight)| Weight { outcome, weight })
        .chain([Weight { outcome, weight: -1.0 }])
        .filter(|term| term.weight.abs() > NEGLIGIBLE_WEIGHT * largest)
        .map(|term| Weight { weight: term.weight / at(norms, term.outcome), ..term })
        .collect();
    relation.sort_by_key(|term| term.outcome);
    let last = relation.pop().expect("the outcome itself is in the relation");
    let of = relation
        .into_iter()
        .map(|term| Weight { weight: -term.weight / last.weight, ..term })
        .collect();
    AnalysisError::DependentOutcome { outcome: last.outcome, of }
}

fn at(values: &[f64], outcome: usize) -> f64 {
    values.get(outcome).copied().unwrap_or_default()
}
