//! Means, standard deviations and their precision.

use crate::centring::centre_total;
use crate::distribution::student_t;
use crate::sample::Sample;
use crate::test::Interval;

/// One outcome in one group, or in all groups together.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Descriptive {
    /// Units.
    pub n: usize,
    /// Their mean.
    pub mean: f64,
    /// Their standard deviation (divisor n - 1); absent for a single unit.
    pub sd: Option<f64>,
    /// Standard error of the mean; absent for a single unit.
    pub se: Option<f64>,
    /// Interval of the mean by Student's t on n - 1 degrees of freedom; absent for a single unit.
    pub interval: Option<Interval>,
}

/// Describes every outcome in every group: `[group][outcome]`. `level` is that of the intervals.
pub fn describe(sample: &Sample, level: f64) -> Vec<Vec<Descriptive>> {
    let describe_group = |group| {
        let members = sample.members(group);
        let own = |values: &[f64]| -> Vec<f64> {
            members.iter().filter_map(|&row| values.get(row).copied()).collect()
        };
        sample.outcomes().map(|values| describe_values(&own(values), level)).collect()
    };
    (0..sample.group_count()).map(describe_group).collect()
}

/// Describes every outcome over all units.
pub fn describe_total(sample: &Sample, level: f64) -> Vec<Descriptive> {
    sample.outcomes().map(|values| describe_values(values, level)).collect()
}

fn describe_values(values: &[f64], level: f64) -> Descriptive {
    let n = values.len();
    let centred = centre_total(values);
    let mean = centred.grand_mean;
    if n < 2 {
        return Descriptive { n, mean, sd: None, se: None, interval: None };
    }
    let df = (n - 1) as f64;
    let sd = centred.norm_within() / df.sqrt();
    let se = sd / (n as f64).sqrt();
    let half_width = student_t::quantile(0.5 + level / 2.0, df) * se;
    let interval = Interval { lower: mean - half_width, upper: mean + half_width };
    Descriptive { n, mean, sd: Some(sd), se: Some(se), interval: Some(interval) }
}
