//! Levene's test of equal variances, about the mean or the median.

use statrs::statistics::{Data, OrderStatistics};

use crate::centring::{centre, check_varies};
use crate::error::AnalysisError;
use crate::sample::Sample;
use crate::test::FTest;
use crate::univariate::compare;

/// What distances are measured from in Levene's test.
#[derive(Clone, Copy, Debug, Eq, PartialEq)]
pub enum Centre {
    /// The group mean (Levene 1960, in Olkin et al., Contributions to Probability and Statistics).
    Mean,
    /// The group median (Brown & Forsythe 1974, Journal of the American Statistical Association 69),
    /// less easily misled by skew.
    Median,
}

/// Tests whether the groups have the same variance of one outcome: the one-way analysis of variance
/// of the distances from the centre of each group.
///
/// # Errors
///
/// [`NoErrorDf`](AnalysisError::NoErrorDf); [`ConstantOutcome`](AnalysisError::ConstantOutcome);
/// [`ConstantWithinGroups`](AnalysisError::ConstantWithinGroups) where the outcome, or its distances
/// (as in groups of two), do not vary within groups.
pub fn levene(sample: &Sample, outcome: usize, centre_by: Centre) -> Result<FTest, AnalysisError> {
    let (codes, sizes) = (sample.groups(), sample.group_sizes());
    let df_within = sample.units() - sizes.len();
    if df_within == 0 {
        return Err(AnalysisError::NoErrorDf);
    }
    let values = sample.outcome(outcome);
    check_varies(values, codes, sizes.len(), outcome)?;
    let centred = centre(values, codes, sizes);
    let mut distances = match centre_by {
        Centre::Mean => centred.residuals,
        Centre::Median => from_medians(&centred.residuals, codes, sizes.len()),
    };
    distances.iter_mut().for_each(|distance| *distance = distance.abs());
    if distances_are_equal(&distances, values, codes, sizes.len()) {
        return Err(AnalysisError::ConstantWithinGroups { outcome });
    }
    Ok(compare(&centre(&distances, codes, sizes), sizes, df_within).test)
}

/// Whether distances vary within groups by no more than the rounding of the values that they are
/// distances of.
fn distances_are_equal(
    distances: &[f64],
    values: &[f64],
    codes: &[usize],
    group_count: usize,
) -> bool {
    let rounding =
        4.0 * f64::EPSILON * values.iter().fold(0.0, |largest: f64, y| largest.max(y.abs()));
    (0..group_count).all(|group| {
        let own = distances.iter().zip(codes).filter(|(_, code)| **code == group);
        let (low, high) = own.fold((f64::INFINITY, 0.0_f64), |(low, high), (distance, _)| {
            (low.min(*distance), high.max(*distance))
        });
        high - low <= rounding
    })
}

/// Distances from the median of each group, signed.
fn from_medians(residuals: &[f64], codes: &[usize], group_count: usize) -> Vec<f64> {
    let medians: Vec<f64> = (0..group_count)
        .map(|group| {
            let own = residuals.iter().zip(codes).filter(|(_, code)| **code == group);
            let own: Vec<f64> = own.map(|(residual, _)| *residual).collect();
            Data::new(own).median()
        })
        .collect();
    let centre = |code: usize| medians.get(code).copied().unwrap_or_default();
    residuals.iter().zip(codes).map(|(residual, &code)| residual - centre(code)).collect()
}
