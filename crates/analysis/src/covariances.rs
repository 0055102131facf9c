//! Are the groups equal in covariance and variance?

mod levene;

pub use levene::{Centre, levene};

use crate::centring::{Centred, centre_total, check_varies};
use crate::distribution::{central_f, chi_square};
use crate::error::AnalysisError;
use crate::residuals::ResidualFactor;
use crate::sample::Sample;
use crate::test::{FTest, PValue};

/// c2 and c1² count as equal, and the second degrees of freedom as infinite, within this relative
/// distance: both are sums of a few rounded fractions.
const EQUAL: f64 = 1e-13;

/// Box's test of equal covariance matrices (Box 1949, Biometrika 36). It is as sensitive to
/// distributions that are not normal as to covariances that differ.
#[derive(Clone, Debug, PartialEq)]
pub struct BoxTest {
    /// M = ν ln|S| - Σ ν_g ln|S_g|.
    pub m: f64,
    /// The chi-square approximation, M(1 - c1).
    pub chi_square: f64,
    /// Degrees of freedom of the chi-square approximation, p(p + 1)(k - 1)/2.
    pub df: f64,
    /// p value of the chi-square approximation.
    pub chi_square_p: PValue,
    /// The F approximation, the closer one. Its second degrees of freedom are infinite where c2 = c1²,
    /// and the F itself where M lies beyond the range that the approximation gives it.
    pub f: FTest,
    /// ln|S_g| of every group.
    pub log_determinants: Vec<f64>,
    /// ln|S| of the pooled matrix.
    pub pooled_log_determinant: f64,
}

/// Tests whether the groups have the same covariance matrix. With one outcome it is Bartlett's test.
///
/// # Errors
///
/// [`SmallGroup`](AnalysisError::SmallGroup) where a group has p units or fewer;
/// [`ConstantOutcome`](AnalysisError::ConstantOutcome),
/// [`ConstantWithinGroups`](AnalysisError::ConstantWithinGroups) and
/// [`DependentOutcome`](AnalysisError::DependentOutcome) where the pooled matrix is singular;
/// [`SingularGroup`](AnalysisError::SingularGroup) where that of a group is.
pub fn box_test(sample: &Sample) -> Result<BoxTest, AnalysisError> {
    let p = sample.outcome_count();
    let needed = p + 1;
    for (group, &n) in sample.group_sizes().iter().enumerate() {
        if n < needed {
            return Err(AnalysisError::SmallGroup { group, n, needed });
        }
    }
    let pooled = pooled_spread(sample)?;
    let groups: Vec<Spread> = (0..sample.group_count())
        .map(|group| group_spread(sample, group).ok_or(AnalysisError::SingularGroup { group }))
        .collect::<Result<_, _>>()?;
    // Differences of logarithms of one group at a time cancel less than the difference of the sums.
    let m = groups.iter().map(|group| group.df * pooled.excess_over(group)).sum();
    let approximation = Approximation::new(p as f64, pooled.df, &groups);
    let chi_square = m * (1.0 - approximation.c1);
    Ok(BoxTest {
        m,
        chi_square,
        df: approximation.df1,
        chi_square_p: chi_square::survival(chi_square, approximation.df1),
        f: approximation.f_test(m),
        log_determinants: groups.iter().map(Spread::log_determinant).collect(),
        pooled_log_determinant: pooled.log_determinant(),
    })
}

/// ln|S_g| of every group; absent where S_g is singular, as it is with p units or fewer.
pub fn log_determinants(sample: &Sample) -> Vec<Option<f64>> {
    let groups = 0..sample.group_count();
    groups.map(|group| Some(group_spread(sample, group)?.log_determinant())).collect()
}

/// A covariance matrix as a triangular factor and degrees of freedom.
struct Spread {
    factor: ResidualFactor,
    df: f64,
}

fn pooled_spread(sample: &Sample) -> Result<Spread, AnalysisError> {
    for (outcome, values) in sample.outcomes().enumerate() {
        check_varies(values, sample.groups(), sample.group_count(), outcome)?;
    }
    let df = (sample.units() - sample.group_count()) as f64;
    Ok(Spread { factor: ResidualFactor::new(&sample.centred())?, df })
}

/// The spread of one group; none where its covariance matrix is singular.
fn group_spread(sample: &Sample, group: usize) -> Option<Spread> {
    let members = sample.members(group);
    if members.len() <= sample.outcome_count() {
        return None;
    }
    let one_group = vec![0; members.len()];
    let mut outcomes: Vec<Centred> = Vec::new();
    for (outcome, values) in sample.outcomes().enumerate() {
        let own: Vec<f64> = members.iter().filter_map(|&row| values.get(row).copied()).collect();
        check_varies(&own, &one_group, 1, outcome).ok()?;
        outcomes.push(centre_total(&own));
    }
    let factor = ResidualFactor::new(&outcomes).ok()?;
    Some(Spread { factor, df: (members.len() - 1) as f64 })
}

impl Spread {
    /// ln|S|.
    fn log_determinant(&self) -> f64 {
        let scales = self.factor.norms().iter().map(|norm| (norm / self.df.sqrt()).ln());
        self.factor.log_determinant() + 2.0 * scales.sum::<f64>()
    }

    /// ln|S| of this minus ln|S| of the other.
    fn excess_over(&self, other: &Spread) -> f64 {
        let df_ratio = (self.df / other.df).sqrt();
        let ratios = self.factor.norms().iter().zip(other.factor.norms());
        let scales = ratios.map(|(own, others)| (own / others / df_ratio).ln());
        self.factor.log_determinant() - other.factor.log_determinant() + 2.0 * scales.sum::<f64>()
    }
}

/// Box's approximations to the distribution of M.
struct Approximation {
    c1: f64,
    c2: f64,
    df1: f64,
}

impl Approximation {
    fn new(p: f64, df: f64, groups: &[Spread]) -> Self {
        let others = groups.len() as f64 - 1.0;
        let firsts = groups.iter().map(|group| 1.0 / group.df).sum::<f64>() - 1.0 / df;
        let seconds = groups.iter().map(|group| (group.df * group.df).recip()).sum::<f64>()
            - (df * df).recip();
        Approximation {
            c1: firsts * (2.0 * p * p + 3.0 * p - 1.0) / (6.0 * (p + 1.0) * others),
            c2: seconds * (p - 1.0) * (p + 2.0) / (6.0 * others),
            df1: p * (p + 1.0) * others / 2.0,
        }
    }

    fn f_test(&self, m: f64) -> FTest {
        let &Approximation { c1, c2, df1 } = self;
        let excess = c2 - c1 * c1;
        if excess.abs() <= EQUAL * c1 * c1 {
            let f = m * (1.0 - c1) / df1;
            return FTest {
                f,
                df1,
                df2: f64::INFINITY,
                p: chi_square::survival(m * (1.0 - c1), df1),
            };
        }
        let df2 = (df1 + 2.0) / excess.abs();
        let f = if excess > 0.0 {
            m * (1.0 - c1 - df1 / df2) / df1
        } else {
            let part = m * (1.0 - c1 + 2.0 / df2) / df2;
            if part >= 1.0 {
                let p = PValue { p: 0.0, ln_p: f64::NEG_INFINITY };
                return FTest { f: f64::INFINITY, df1, df2, p };
            }
            df2 * part / (df1 * (1.0 - part))
        };
        FTest { f, df1, df2, p: central_f::survival(f, df1, df2) }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn both_branches_of_the_f_approximation_meet_where_c2_is_the_square_of_c1() {
        let at = |c2: f64| Approximation { c1: 0.1, c2, df1: 6.0 }.f_test(9.0);
        let meeting = at(0.1 * 0.1);
        assert_eq!(meeting.df2, f64::INFINITY);
        assert!((meeting.f - 9.0 * 0.9 / 6.0).abs() < 1e-15);
        for near in [0.01 + 1e-9, 0.01 - 1e-9] {
            let beside = at(near);
            assert!(beside.df2 > 1e9 && beside.df2.is_finite());
            assert!((beside.f / meeting.f - 1.0).abs() < 1e-7, "{beside:?}");
            assert!((beside.p.p / meeting.p.p - 1.0).abs() < 1e-6, "{beside:?}");
        }
    }

    #[test]
    fn an_m_beyond_the_range_of_the_second_branch_has_no_probability_left() {
        let approximation = Approximation { c1: 0.3, c2: 0.01, df1: 3.0 };
        let limit = approximation.f_test(1e6);
        assert_eq!((limit.f, limit.p.p), (f64::INFINITY, 0.0));
        assert!(approximation.f_test(10.0).f.is_finite());
    }
}
