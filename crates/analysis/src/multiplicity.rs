//! Adjusted p values of a family of tests. Every p is adjusted on the log scale too, so that values
//! that underflow keep their order.

use crate::test::PValue;

/// Bonferroni: every p value times the number of tests, at most 1.
pub fn bonferroni(family: &[PValue]) -> Vec<PValue> {
    family.iter().map(|p| times(p, family.len())).collect()
}

/// Holm (1979, Scandinavian Journal of Statistics 6): the smallest p value times m, the next times
/// m - 1, and so on; each at least as large as the one before and at most 1.
pub fn holm(family: &[PValue]) -> Vec<PValue> {
    let mut order: Vec<(usize, PValue)> = family.iter().copied().enumerate().collect();
    order.sort_by(|(_, a), (_, b)| a.ln_p.total_cmp(&b.ln_p));
    let mut least = PValue { p: 0.0, ln_p: f64::NEG_INFINITY };
    for (rank, (_, p)) in order.iter_mut().enumerate() {
        let own = times(p, family.len() - rank);
        least = PValue { p: own.p.max(least.p), ln_p: own.ln_p.max(least.ln_p) };
        *p = least;
    }
    order.sort_by_key(|(position, _)| *position);
    order.into_iter().map(|(_, p)| p).collect()
}

fn times(p: &PValue, tests: usize) -> PValue {
    let tests = tests as f64;
    PValue { p: (p.p * tests).min(1.0), ln_p: (p.ln_p + tests.ln()).min(0.0) }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn values(p: &[f64]) -> Vec<PValue> {
        p.iter().map(|&p| PValue { p, ln_p: p.ln() }).collect()
    }

    fn assert_p(adjusted: &[PValue], expected: &[f64]) {
        assert_eq!(adjusted.len(), expected.len());
        for (found, expected) in adjusted.iter().zip(expected) {
            assert!((found.p - expected).abs() < 1e-15, "{adjusted:?}");
            assert!((found.ln_p - expected.ln()).abs() < 1e-14, "{adjusted:?}");
        }
    }

    #[test]
    fn bonferroni_multiplies_and_stops_at_one() {
        assert_p(&bonferroni(&values(&[0.01, 0.4, 0.2])), &[0.03, 1.0, 0.6]);
        assert_eq!(bonferroni(&[]), []);
    }

    #[test]
    fn holm_steps_down_and_never_falls() {
        // 4 x .01, then 3 x .02 = .06, then 2 x .022 = .044 raised to .06, then .8.
        assert_p(&holm(&values(&[0.022, 0.01, 0.8, 0.02])), &[0.06, 0.04, 0.8, 0.06]);
        assert_p(&holm(&values(&[0.6, 0.9])), &[1.0, 1.0]);
        assert_eq!(holm(&[]), []);
    }

    #[test]
    fn p_values_that_underflow_are_still_ordered_and_adjusted() {
        let tiny = |ln_p| PValue { p: 0.0, ln_p };
        let adjusted = holm(&[tiny(-900.0), tiny(-1000.0)]);
        assert!((adjusted[0].ln_p + 900.0).abs() < 1e-12);
        assert!((adjusted[1].ln_p + 1000.0 - 2.0_f64.ln()).abs() < 1e-12);
    }
}
