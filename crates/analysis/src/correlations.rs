//! Correlations among the outcomes, within groups and over all units.

use nalgebra::DMatrix;

use crate::centring::{Centred, centre_total, check_varies};
use crate::error::AnalysisError;
use crate::numeric::sum::dot;
use crate::sample::Sample;

/// Both correlation matrices with the standard deviations that belong to them.
#[derive(Clone, Debug, PartialEq)]
pub struct Correlations {
    /// Pooled within groups, p x p; NaN beside an outcome that is constant within groups.
    pub within: DMatrix<f64>,
    /// Over all units, p x p; NaN beside a constant outcome.
    pub total: DMatrix<f64>,
    /// Pooled within-group standard deviations (divisor N - k); 0 for an outcome that is constant
    /// within groups, NaN where N = k.
    pub within_sd: Vec<f64>,
    /// Standard deviations over all units (divisor N - 1); 0 for a constant outcome.
    pub total_sd: Vec<f64>,
    /// Degrees of freedom of the pooled matrix: N - k.
    pub df_within: usize,
}

/// Correlates the outcomes.
pub fn correlate(sample: &Sample) -> Correlations {
    let (mut within, mut total) = (Vec::new(), Vec::new());
    let (codes, groups) = (sample.groups(), sample.group_count());
    for ((outcome, values), centred) in sample.outcomes().enumerate().zip(sample.centred()) {
        let verdict = check_varies(values, codes, groups, outcome);
        let constant = matches!(verdict, Err(AnalysisError::ConstantOutcome { .. }));
        within.push(Deviations::new(centred, verdict.is_err()));
        total.push(Deviations::new(centre_total(values), constant));
    }
    let df_within = sample.units() - groups;
    let df_total = sample.units() - 1;
    Correlations {
        within: correlation_matrix(&within),
        total: correlation_matrix(&total),
        within_sd: within.iter().map(|own| own.norm / (df_within as f64).sqrt()).collect(),
        total_sd: total.iter().map(|own| own.norm / (df_total as f64).sqrt()).collect(),
        df_within,
    }
}

/// Deviations from means, scaled to unit norm; NaN where they are all zero.
struct Deviations {
    unit: Vec<f64>,
    norm: f64,
}

impl Deviations {
    fn new(centred: Centred, constant: bool) -> Self {
        let norm = if constant { 0.0 } else { centred.norm_within() };
        let scale = if constant { f64::NAN } else { norm };
        Deviations { unit: centred.residuals.iter().map(|r| r / scale).collect(), norm }
    }
}

#[allow(clippy::indexing_slicing, reason = "rows and columns come from the matrix itself")]
fn correlation_matrix(outcomes: &[Deviations]) -> DMatrix<f64> {
    let mut matrix = DMatrix::zeros(outcomes.len(), outcomes.len());
    for (j, second) in outcomes.iter().enumerate() {
        for (i, first) in outcomes.iter().enumerate().take(j) {
            let correlation = dot(&first.unit, &second.unit).clamp(-1.0, 1.0);
            matrix[(i, j)] = correlation;
            matrix[(j, i)] = correlation;
        }
        matrix[(j, j)] = if second.norm == 0.0 { f64::NAN } else { 1.0 };
    }
    matrix
}
