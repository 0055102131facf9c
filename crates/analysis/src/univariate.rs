//! The one-way analysis of variance of a single outcome.

use crate::centring::{Centred, centre, check_varies};
use crate::distribution::central_f;
use crate::error::AnalysisError;
use crate::groups::{check_values, group_sizes};
use crate::test::FTest;

/// A one-way analysis of variance.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Anova {
    /// The F test on k - 1 and N - k degrees of freedom.
    pub test: FTest,
    /// η², the share of the total sum of squares that lies between groups.
    pub eta2: f64,
    /// ω² = df1 (F - 1) / (df1 F + df2 + 1) (Hays 1963, Statistics for Psychologists); negative
    /// where F < 1, and not truncated.
    pub omega2: f64,
    /// Sum of squares between groups.
    pub ss_between: f64,
    /// Sum of squares within groups.
    pub ss_within: f64,
    /// Mean square within groups.
    pub ms_within: f64,
}

/// Compares the group means of one outcome (Fisher 1925, Statistical Methods for Research Workers).
///
/// # Errors
///
/// Those of [`Sample::new`](crate::sample::Sample::new) that apply;
/// [`NoErrorDf`](AnalysisError::NoErrorDf); [`ConstantOutcome`](AnalysisError::ConstantOutcome) and
/// [`ConstantWithinGroups`](AnalysisError::ConstantWithinGroups), which name outcome 0.
pub fn anova(values: &[f64], groups: &[usize], group_count: usize) -> Result<Anova, AnalysisError> {
    let OneWay { sizes, centred, df_within } = one_way(values, groups, group_count)?;
    Ok(compare(&centred, &sizes, df_within))
}

/// What every comparison of groups on one outcome starts from.
pub(crate) struct OneWay {
    pub(crate) sizes: Vec<usize>,
    pub(crate) centred: Centred,
    pub(crate) df_within: usize,
}

/// Checks one outcome and splits it.
pub(crate) fn one_way(
    values: &[f64],
    groups: &[usize],
    group_count: usize,
) -> Result<OneWay, AnalysisError> {
    let sizes = group_sizes(values.len(), groups, group_count)?;
    check_values(values, 0)?;
    let df_within = values.len() - group_count;
    if df_within == 0 {
        return Err(AnalysisError::NoErrorDf);
    }
    check_varies(values, groups, group_count, 0)?;
    Ok(OneWay { centred: centre(values, groups, &sizes), sizes, df_within })
}

/// The analysis of variance of an outcome that varies within groups.
pub(crate) fn compare(centred: &Centred, sizes: &[usize], df_within: usize) -> Anova {
    let (between, within) = (centred.norm_between(sizes), centred.norm_within());
    let (df1, df2) = ((sizes.len() - 1) as f64, df_within as f64);
    // The ratio of the norms is squared, never the norms: neither can overflow or vanish here.
    let ratio = (between / within).powi(2);
    let f = ratio * df2 / df1;
    let ss_within = within * within;
    Anova {
        test: FTest { f, df1, df2, p: central_f::survival(f, df1, df2) },
        eta2: ratio / (1.0 + ratio),
        omega2: df1 * (f - 1.0) / (df1 * f + df2 + 1.0),
        ss_between: between * between,
        ss_within,
        ms_within: ss_within / df2,
    }
}
