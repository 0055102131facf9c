//! Data that break naive formulas. Values with references are in `reference_values`; here is what has
//! to hold besides.

use tussock_analysis::centroids::{centroids, scores};
use tussock_analysis::coefficients::coefficients;
use tussock_analysis::criteria::{Exactness, criteria};
use tussock_analysis::functions::functions;
use tussock_analysis::hypothesis::one_way;
use tussock_analysis::sample::Sample;

use crate::support::{Table, columns, sample};

fn hard(name: &str) -> Sample {
    Table::read(&format!("hard/{name}.csv")).sample("g").unwrap()
}

#[test]
fn equal_means_give_no_effect_exactly() {
    let hypothesis = one_way(&hard("zero_effect")).unwrap();
    assert_eq!(hypothesis.roots(), [0.0, 0.0]);
    let found = criteria(&hypothesis, 0.9);
    assert_eq!((found.wilks.value, found.wilks.ln_value), (1.0, 0.0));
    assert!(found.wilks.ln_value.is_sign_positive());
    for criterion in [found.wilks, found.pillai, found.hotelling.unwrap(), found.roy] {
        assert_eq!((criterion.test.f, criterion.test.p.p, criterion.eta2), (0.0, 1.0, 0.0));
        assert_eq!(criterion.test.p.ln_p, 0.0);
        if let Some(interval) = criterion.eta2_interval {
            assert_eq!((interval.lower, interval.upper), (0.0, 0.0));
        }
    }
    for function in functions(&hypothesis) {
        assert!(function.share.is_nan());
        assert_eq!((function.canonical, function.wilks, function.test.p.p), (0.0, 1.0, 1.0));
    }
    // The directions are arbitrary, but still of unit variance and uncorrelated.
    let found = coefficients(&hypothesis);
    let products = found.standardized.tr_mul(&found.structure);
    assert!((products - nalgebra::DMatrix::identity(2, 2)).amax() < 1e-14);
}

#[test]
fn means_on_a_line_leave_the_second_root_zero_and_not_noise() {
    let sample = hard("rank1_means");
    let hypothesis = one_way(&sample).unwrap();
    assert_eq!(hypothesis.roots()[1], 0.0);
    assert!((hypothesis.roots()[0] - 5.0).abs() < 1e-14);
    let found = criteria(&hypothesis, 0.9);
    assert!((found.wilks.value - 1.0 / 6.0).abs() < 1e-16);
    let functions = functions(&hypothesis);
    assert_eq!((functions[0].share, functions[1].share), (1.0, 0.0));
    assert_eq!((functions[1].test.f, functions[1].test.p.p), (0.0, 1.0));
    let scores = scores(&sample, &coefficients(&hypothesis));
    for group in centroids(&sample, &scores) {
        assert!(group[1].mean.abs() < 1e-14, "{group:?}");
    }
}

#[test]
fn means_on_a_line_in_rounded_decimals_far_from_zero_too() {
    let base = hard("rank1_means");
    for offset in [0.1, 1000.3, 1e6 + 0.7] {
        let moved: Vec<Vec<f64>> = columns(&base)
            .into_iter()
            .map(|column| column.into_iter().map(|y| 0.1 * y + offset).collect())
            .collect();
        let moved = sample(&moved, base.groups().to_vec(), base.group_count()).unwrap();
        assert_eq!(one_way(&moved).unwrap().roots()[1], 0.0, "offset {offset}");
    }
}

#[test]
fn a_p_value_below_the_range_of_doubles_keeps_its_logarithm() {
    let found = criteria(&one_way(&hard("huge_effect")).unwrap(), 0.9);
    assert!((found.wilks.value / 1.444_555_4e-11 - 1.0).abs() < 1e-8);
    assert_eq!(found.wilks.test.p.p, 0.0);
    // 2.4456284e-396
    let expected = 2.445_628_443_960_899_f64.ln() - 396.0 * 10.0_f64.ln();
    assert!((found.wilks.test.p.ln_p / expected - 1.0).abs() < 1e-10);
    assert_eq!(found.roy.exactness, Exactness::Bound);
    assert!(found.roy_theta < 1.0 && 1.0 - found.roy_theta < 1e-10);
}

#[test]
fn adding_a_power_of_two_to_integers_changes_nothing_at_all() {
    let base = Table::read("data/jw8.csv").sample("g").unwrap();
    let moved: Vec<Vec<f64>> = columns(&base)
        .into_iter()
        .map(|column| column.into_iter().map(|y| y + 1_099_511_627_776.0).collect())
        .collect();
    let moved = sample(&moved, base.groups().to_vec(), base.group_count()).unwrap();
    let (base, moved) = (one_way(&base).unwrap(), one_way(&moved).unwrap());
    assert_eq!(base.roots(), moved.roots());
    assert_eq!(coefficients(&base), coefficients(&moved));
}
