//! Every pair of groups on one outcome.

use crate::distribution::{hedges, noncentral_t, student_t};
use crate::error::AnalysisError;
use crate::test::{Interval, PValue};
use crate::univariate::{OneWay, one_way};

/// The difference between two groups.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Pair {
    /// Index of the first group.
    pub first: usize,
    /// Index of the second group.
    pub second: usize,
    /// Mean of the first minus mean of the second.
    pub difference: f64,
    /// Interval of the difference, for this pair alone.
    pub interval: Interval,
    /// Student's t.
    pub t: f64,
    /// Degrees of freedom of the error, N - k.
    pub df: f64,
    /// Two-sided p value, for this pair alone.
    pub p: PValue,
    /// The difference in pooled within-group standard deviations (Cohen 1988, Statistical Power
    /// Analysis for the Behavioral Sciences).
    pub d: f64,
    /// d without its small-sample bias (Hedges 1981, Journal of Educational Statistics 6).
    pub g: f64,
    /// Limits of the standardized difference in the population, by the noncentral t (Steiger &
    /// Fouladi 1997, in Harlow et al., What If There Were No Significance Tests?). They are not
    /// multiplied by the correction that turns d into g: that would cost coverage.
    pub effect_interval: Interval,
}

/// All pairs of groups, with the error pooled over all groups.
#[derive(Clone, Debug, PartialEq)]
pub struct Pairs {
    /// The pairs: 0 with 1, 0 with 2, ..., 1 with 2, ...
    pub list: Vec<Pair>,
    /// Mean of |d| over the pairs; a mean of absolute values, and so biased upwards.
    pub mean_abs_d: f64,
    /// Mean of |g| over the pairs.
    pub mean_abs_g: f64,
    /// Pooled within-group standard deviation.
    pub pooled_sd: f64,
    /// Degrees of freedom of the error, N - k.
    pub df: f64,
    /// The factor that turns d into g, Γ(ν/2) / (√(ν/2) Γ((ν - 1)/2)); 0 where ν = 1.
    pub correction: f64,
}

/// Compares every pair of groups; `level` is that of both intervals.
///
/// # Errors
///
/// Those of [`anova`](crate::univariate::anova).
pub fn pairs(
    values: &[f64],
    groups: &[usize],
    group_count: usize,
    level: f64,
) -> Result<Pairs, AnalysisError> {
    let OneWay { sizes, centred, df_within } = one_way(values, groups, group_count)?;
    let df = df_within as f64;
    let common = Common {
        pooled_sd: centred.norm_within() / df.sqrt(),
        df,
        correction: hedges::correction(df),
        quantile: student_t::quantile(0.5 + level / 2.0, df),
        level,
    };
    let numbered: Vec<Group> = centred
        .effects
        .iter()
        .zip(sizes)
        .enumerate()
        .map(|(index, (&effect, n))| Group { index, effect, n: n as f64 })
        .collect();
    let list: Vec<Pair> = numbered
        .iter()
        .enumerate()
        .flat_map(|(i, first)| numbered.iter().skip(i + 1).map(move |second| (first, second)))
        .map(|(first, second)| common.compare(first, second))
        .collect();
    let count = list.len() as f64;
    Ok(Pairs {
        mean_abs_d: list.iter().map(|pair| pair.d.abs()).sum::<f64>() / count,
        mean_abs_g: list.iter().map(|pair| pair.g.abs()).sum::<f64>() / count,
        list,
        pooled_sd: common.pooled_sd,
        df,
        correction: common.correction,
    })
}

/// A group with its mean as distance from the mean of all units.
struct Group {
    index: usize,
    effect: f64,
    n: f64,
}

/// What all pairs share.
struct Common {
    pooled_sd: f64,
    df: f64,
    correction: f64,
    quantile: f64,
    level: f64,
}

impl Common {
    fn compare(&self, first: &Group, second: &Group) -> Pair {
        let difference = first.effect - second.effect;
        // t = d / per_unit, and so is the noncentrality of t the standardized difference / per_unit.
        let per_unit = (1.0 / first.n + 1.0 / second.n).sqrt();
        let d = difference / self.pooled_sd;
        let t = d / per_unit;
        let half_width = self.quantile * self.pooled_sd * per_unit;
        let limits = noncentral_t::limits(t, self.df, self.level);
        Pair {
            first: first.index,
            second: second.index,
            difference,
            interval: Interval { lower: difference - half_width, upper: difference + half_width },
            t,
            df: self.df,
            p: student_t::two_sided(t, self.df),
            d,
            g: self.correction * d,
            effect_interval: Interval {
                lower: limits.lower * per_unit,
                upper: limits.upper * per_unit,
            },
        }
    }
}
