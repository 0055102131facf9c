//! Discriminant functions and the tests of their dimensions.

use crate::criteria::{Exactness, bartlett_multiplier, ln_wilks, rao};
use crate::hypothesis::Hypothesis;
use crate::test::FTest;

/// One discriminant function.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct DiscriminantFunction {
    /// The root λ of this function.
    pub eigenvalue: f64,
    /// Its share of the sum of the roots; NaN where every root is zero.
    pub share: f64,
    /// The canonical correlation, √(λ/(1 + λ)).
    pub canonical: f64,
    /// Wilks' Λ of this function and all later ones.
    pub wilks: f64,
    /// The test of this function and all later ones jointly; no test is of one function alone.
    pub test: FTest,
    /// Whether that test is exact: only the first can be, where s <= 2.
    pub exactness: Exactness,
}

/// The discriminant functions, strongest first.
///
/// The test of the functions after the first r is Rao's F on p - r and df of the hypothesis - r, with
/// the multiplier of the whole hypothesis, as Bartlett (1947, Journal of the Royal Statistical
/// Society, Supplement 9) keeps it. Read the tests in order and stop at the first that does not
/// reject.
pub fn functions(hypothesis: &Hypothesis) -> Vec<DiscriminantFunction> {
    let (p, q) = (hypothesis.outcome_count() as f64, hypothesis.df_hypothesis() as f64);
    let multiplier = bartlett_multiplier(p, q, hypothesis.df_error() as f64);
    let roots = hypothesis.roots();
    let sum: f64 = roots.iter().sum();
    let describe = |(earlier, &root): (usize, &f64)| {
        let ln_lambda = ln_wilks(roots.get(earlier..).unwrap_or_default());
        let gone = earlier as f64;
        let exact = earlier == 0 && roots.len() <= 2;
        DiscriminantFunction {
            eigenvalue: root,
            share: root / sum,
            canonical: (root / (1.0 + root)).sqrt(),
            wilks: ln_lambda.exp(),
            test: rao(ln_lambda, p - gone, q - gone, multiplier).test,
            exactness: if exact { Exactness::Exact } else { Exactness::Approximate },
        }
    };
    roots.iter().enumerate().map(describe).collect()
}
