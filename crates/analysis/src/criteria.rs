//! The four multivariate criteria with their tests, effect sizes and intervals.

use crate::distribution::{central_f, noncentral_f};
use crate::hypothesis::Hypothesis;
use crate::test::{FTest, Interval};

/// How far the p value of a test can be trusted under its model.
#[derive(Clone, Copy, Debug, Eq, PartialEq)]
pub enum Exactness {
    /// The statistic has exactly this distribution under the hypothesis.
    Exact,
    /// The distribution is an approximation.
    Approximate,
    /// The F is an upper bound, so the p value is only a lower bound.
    Bound,
}

/// Which approximation tests the Hotelling-Lawley trace.
#[derive(Clone, Copy, Debug, Eq, PartialEq)]
pub enum TraceApproximation {
    /// McKeon (1974, Biometrika 61), which needs df of the error > p + 3.
    McKeon,
    /// Pillai & Samson (1959, Biometrika 46), which rejects somewhat too often.
    PillaiSamson,
}

/// One criterion and its test.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Criterion {
    /// The criterion.
    pub value: f64,
    /// Its natural logarithm, which is more precise where the criterion nears 1 and survives where
    /// it underflows; minus infinity for 0.
    pub ln_value: f64,
    /// Its test.
    pub test: FTest,
    /// Whether the test is exact.
    pub exactness: Exactness,
    /// The effect size of this criterion: 1 - Λ^(1/s), V/s, U/(U + s) or θ (Cramer & Nicewander
    /// 1979, Psychometrika 44). They differ by design.
    pub eta2: f64,
    /// Interval of the effect size; absent for Roy's criterion where s > 1, whose F is no pivot.
    pub eta2_interval: Option<Interval>,
}

/// The four criteria of one hypothesis.
///
/// λ are the roots, s = min(p, df of the hypothesis) their number. Where s = 1 all four give the same
/// exact test.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Criteria {
    /// Wilks' Λ = Π 1/(1 + λ) (1932, Biometrika 24) with the F of Rao (1951, Bulletin of the
    /// International Statistical Institute 33); exact where s <= 2.
    pub wilks: Criterion,
    /// Pillai's trace V = Σ λ/(1 + λ) (1955, Annals of Mathematical Statistics 26) with the F of Pillai
    /// (1960, Statistical Tables for Tests of Multivariate Hypotheses); exact where s = 1, else
    /// somewhat conservative.
    pub pillai: Criterion,
    /// The Hotelling-Lawley trace U = Σ λ (Lawley 1938, Biometrika 30; Hotelling 1951, Proceedings of
    /// the Second Berkeley Symposium); exact where s = 1. Absent where s > 1 and df of the error
    /// = p: neither approximation has degrees of freedom then.
    pub hotelling: Option<Criterion>,
    /// Which approximation tests the Hotelling-Lawley trace; absent where its test is exact or absent.
    pub hotelling_approximation: Option<TraceApproximation>,
    /// Roy's criterion as the largest root λ1 (1953, Annals of Mathematical Statistics 24); exact where
    /// s = 1, else its F is an upper bound and its p a lower bound.
    pub roy: Criterion,
    /// Roy's criterion as θ = λ1/(1 + λ1).
    pub roy_theta: f64,
}

/// Computes the four criteria.
///
/// The intervals, of the given `level`, invert the noncentral F of each test, with the
/// noncentralities of O'Brien & Shieh (1999, manuscript): N s V/(s - V) for Pillai's trace, N U for the
/// Hotelling-Lawley trace and N t (Λ^(-1/t) - 1) for Wilks' Λ, all three of the population. With level
/// 1 - 2α an interval excludes 0 exactly where p < α (Steiger 2004, Psychological Methods 9).
pub fn criteria(hypothesis: &Hypothesis, level: f64) -> Criteria {
    let setting = Setting::of(hypothesis);
    let roots = hypothesis.roots();
    let hotelling = hotelling(roots, &setting, level);
    Criteria {
        wilks: wilks(roots, &setting, level),
        pillai: pillai(roots, &setting, level),
        hotelling: hotelling.map(|trace| trace.criterion),
        hotelling_approximation: hotelling.and_then(|trace| trace.approximation),
        roy: roy(roots, &setting, level),
        roy_theta: roots.first().map_or(0.0, |root| root / (1.0 + root)),
    }
}

/// The sizes that every formula is written in.
struct Setting {
    /// Outcomes, p.
    p: f64,
    /// Degrees of freedom of the hypothesis, q.
    q: f64,
    /// Degrees of freedom of the error, v.
    v: f64,
    /// Roots, s.
    s: f64,
    /// Units, N.
    units: f64,
}

impl Setting {
    fn of(hypothesis: &Hypothesis) -> Self {
        Setting {
            p: hypothesis.outcome_count() as f64,
            q: hypothesis.df_hypothesis() as f64,
            v: hypothesis.df_error() as f64,
            s: hypothesis.dimensions() as f64,
            units: hypothesis.units() as f64,
        }
    }

    fn exact_up_to(&self, dimensions: f64, otherwise: Exactness) -> Exactness {
        if self.s <= dimensions { Exactness::Exact } else { otherwise }
    }
}

fn f_test(f: f64, df1: f64, df2: f64) -> FTest {
    FTest { f, df1, df2, p: central_f::survival(f, df1, df2) }
}

/// Limits of an effect size that grows with the noncentrality of the test.
fn invert(test: FTest, level: f64, effect: impl Fn(f64) -> f64) -> Option<Interval> {
    let limits = noncentral_f::limits(test.f, test.df1, test.df2, level);
    Some(Interval { lower: effect(limits.lower), upper: effect(limits.upper) })
}

/// Rao's F with the t that its formula takes the t-th root of Λ by.
pub(crate) struct RaoTest {
    pub(crate) test: FTest,
    pub(crate) root: f64,
}

/// Rao's F for the product Λ of p x q roots. The `multiplier` is Bartlett's, df of the error -
/// (p - q + 1)/2; the tests of later dimensions keep that of the first.
pub(crate) fn rao(ln_lambda: f64, p: f64, q: f64, multiplier: f64) -> RaoTest {
    let (p2, q2) = (p * p, q * q);
    // With one root of any size or two of two the ratio under the root is 1 or undefined.
    let root = if p2 + q2 > 5.0 { ((p2 * q2 - 4.0) / (p2 + q2 - 5.0)).sqrt() } else { 1.0 };
    let df1 = p * q;
    let df2 = multiplier * root - (p * q - 2.0) / 2.0;
    // (1 - Λ^(1/t)) / Λ^(1/t) without forming the power, which would cancel near 1 and 0.
    let f = (-ln_lambda / root).exp_m1() * df2 / df1;
    RaoTest { test: f_test(f, df1, df2), root }
}

/// Bartlett's multiplier (1938, Proceedings of the Cambridge Philosophical Society 34).
pub(crate) fn bartlett_multiplier(p: f64, q: f64, df_error: f64) -> f64 {
    df_error - (p - q + 1.0) / 2.0
}

/// ln Λ of these roots.
pub(crate) fn ln_wilks(roots: &[f64]) -> f64 {
    // Adding 0 turns the -0 of no effect at all into 0.
    0.0 - roots.iter().map(|root| root.ln_1p()).sum::<f64>()
}

fn wilks(roots: &[f64], setting: &Setting, level: f64) -> Criterion {
    let &Setting { p, q, v, s, units } = setting;
    let ln_value = ln_wilks(roots);
    let RaoTest { test, root } = rao(ln_value, p, q, bartlett_multiplier(p, q, v));
    // The noncentrality gives Λ^(1/t); the effect size is stated by the s-th root.
    let effect =
        |noncentrality: f64| -(-root / s * (noncentrality / (units * root)).ln_1p()).exp_m1();
    Criterion {
        value: ln_value.exp(),
        ln_value,
        test,
        exactness: setting.exact_up_to(2.0, Exactness::Approximate),
        eta2: -(ln_value / s).exp_m1(),
        eta2_interval: invert(test, level, effect),
    }
}

fn pillai(roots: &[f64], setting: &Setting, level: f64) -> Criterion {
    let &Setting { p, q, v, s, units } = setting;
    let value: f64 = roots.iter().map(|root| root / (1.0 + root)).sum();
    let rest: f64 = roots.iter().map(|root| 1.0 / (1.0 + root)).sum();
    let (larger, error) = (p.max(q), v - p + s);
    let test = f_test(error / larger * value / rest, s * larger, s * error);
    Criterion {
        value,
        ln_value: value.ln(),
        test,
        exactness: setting.exact_up_to(1.0, Exactness::Approximate),
        eta2: value / s,
        eta2_interval: invert(test, level, |x| x / (x + units * s)),
    }
}

#[derive(Clone, Copy)]
struct Trace {
    criterion: Criterion,
    approximation: Option<TraceApproximation>,
}

fn hotelling(roots: &[f64], setting: &Setting, level: f64) -> Option<Trace> {
    let &Setting { p, q, v, s, units } = setting;
    let value: f64 = roots.iter().sum();
    let (test, approximation) = if s == 1.0 {
        (largest_root_test(roots, setting), None)
    } else if v > p + 3.0 {
        let df1 = p * q;
        let b = (v + q - p - 1.0) * (v - 1.0) / ((v - p - 3.0) * (v - p));
        let df2 = 4.0 + (df1 + 2.0) / (b - 1.0);
        let f = value * df2 * (v - p - 1.0) / (df1 * (df2 - 2.0));
        (f_test(f, df1, df2), Some(TraceApproximation::McKeon))
    } else {
        let df1 = s * p.max(q);
        let df2 = s * (v - p - 1.0) + 2.0;
        if df2 <= 0.0 {
            return None;
        }
        (f_test(df2 * value / (s * df1), df1, df2), Some(TraceApproximation::PillaiSamson))
    };
    let criterion = Criterion {
        value,
        ln_value: value.ln(),
        test,
        exactness: setting.exact_up_to(1.0, Exactness::Approximate),
        eta2: value / (value + s),
        eta2_interval: invert(test, level, |x| x / (x + units * s)),
    };
    Some(Trace { criterion, approximation })
}

/// The F of a single root, which is exact, or the upper bound that the largest of several gives.
fn largest_root_test(roots: &[f64], setting: &Setting) -> FTest {
    let &Setting { p, q, v, .. } = setting;
    let root = roots.first().copied().unwrap_or_default();
    let larger = p.max(q);
    let df2 = v + q - larger;
    f_test(root * df2 / larger, larger, df2)
}

fn roy(roots: &[f64], setting: &Setting, level: f64) -> Criterion {
    let units = setting.units;
    let value = roots.first().copied().unwrap_or_default();
    let test = largest_root_test(roots, setting);
    let exactness = setting.exact_up_to(1.0, Exactness::Bound);
    let eta2_interval = match exactness {
        Exactness::Exact => invert(test, level, |x| x / (x + units)),
        Exactness::Approximate | Exactness::Bound => None,
    };
    Criterion {
        value,
        ln_value: value.ln(),
        test,
        exactness,
        eta2: value / (1.0 + value),
        eta2_interval,
    }
}
