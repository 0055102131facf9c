//! Which outcomes are refused as functions of others, and how the relation is named.

use tussock_analysis::covariances::box_test;
use tussock_analysis::error::AnalysisError;
use tussock_analysis::hypothesis::one_way;
use tussock_analysis::sample::Sample;

use crate::support::{Scatter, Table, columns, sample};

/// The dependent outcome of a sample, and the others with their weights.
#[track_caller]
fn dependence(sample: &Sample) -> (usize, Vec<(usize, f64)>) {
    let error = one_way(sample).unwrap_err();
    let AnalysisError::DependentOutcome { outcome, of } = error else { panic!("{error}") };
    (outcome, of.into_iter().map(|weight| (weight.outcome, weight.weight)).collect())
}

#[track_caller]
fn assert_weights(found: &[(usize, f64)], expected: &[(usize, f64)], tolerance: f64) {
    assert_eq!(found.len(), expected.len(), "{found:?}");
    for (found, expected) in found.iter().zip(expected) {
        assert_eq!(found.0, expected.0);
        assert!((found.1 / expected.1 - 1.0).abs() < tolerance, "{found:?} {expected:?}");
    }
}

/// Values with three decimals, as they are typed.
fn typed(x: f64) -> f64 {
    format!("{x:.3}").parse().unwrap()
}

#[test]
fn the_sum_of_two_outcomes_is_named_with_its_parts() {
    let sample = Table::read("hard/exact_collinear.csv").sample("g").unwrap();
    let (outcome, of) = dependence(&sample);
    assert_eq!(outcome, 2);
    assert_weights(&of, &[(0, 1.0), (1, 1.0)], 1e-13);
    assert_eq!(box_test(&sample).unwrap_err(), one_way(&sample).unwrap_err());
}

#[test]
fn a_duplicate_a_multiple_and_a_complement_are_named() {
    let base = Scatter::new(7).sample(&[6, 7, 8], 3);
    // Derived as weight times the outcome plus a constant.
    let relations = [(1.0, 0.0), (2.54, 0.0), (-1.0, 100.0), (1.8, 32.0)];
    for (weight, constant) in relations {
        let mut outcomes = columns(&base);
        let derived = outcomes[1].iter().map(|y| weight * y + constant).collect();
        outcomes.push(derived);
        let (outcome, of) = dependence(&sample(&outcomes, base.groups().to_vec(), 3).unwrap());
        assert_eq!(outcome, 3);
        assert_weights(&of, &[(1, weight)], 1e-12);
    }
}

#[test]
fn outcomes_that_sum_to_a_constant_are_named() {
    let base = Scatter::new(8).sample(&[10, 10], 3);
    let mut outcomes = columns(&base);
    let rest = (0..20).map(|unit| 100.0 - outcomes.iter().map(|column| column[unit]).sum::<f64>());
    outcomes.push(rest.collect());
    let (outcome, of) = dependence(&sample(&outcomes, base.groups().to_vec(), 2).unwrap());
    assert_eq!(outcome, 3);
    assert_weights(&of, &[(0, -1.0), (1, -1.0), (2, -1.0)], 1e-12);
}

#[test]
fn a_total_of_rounded_numbers_is_found_at_every_size_and_offset() {
    let designs = [
        (12, 2, 0.0),
        (30, 2, 100.0),
        (30, 2, 1e6),
        (400, 11, 0.0),
        (400, 11, 1e4),
        (20_000, 2, 0.0),
        (200_000, 2, 0.0),
    ];
    for (units, parts, offset) in designs {
        for seed in 1..=(if units < 100_000 { 5 } else { 1 }) {
            let mut scatter = Scatter::new(seed);
            let mut outcomes: Vec<Vec<f64>> = (0..parts)
                .map(|_| (0..units).map(|_| typed(offset + scatter.roughly_normal())).collect())
                .collect();
            let total = (0..units).map(|unit| typed(outcomes.iter().map(|y| y[unit]).sum()));
            outcomes.push(total.collect());
            let groups = (0..units).map(|unit| unit % 3).collect();
            let (outcome, of) = dependence(&sample(&outcomes, groups, 3).unwrap());
            assert_eq!(outcome, parts);
            let ones: Vec<(usize, f64)> = (0..parts).map(|part| (part, 1.0)).collect();
            assert_weights(&of, &ones, 1e-14 * (1.0 + offset) * 100.0);
        }
    }
}

#[test]
fn what_differs_from_a_sum_by_more_than_rounding_is_accepted() {
    for name in ["nearsing_1e-4", "nearsing_1e-7", "nearsing_1e-10"] {
        let sample = Table::read(&format!("hard/{name}.csv")).sample("g").unwrap();
        let independence = one_way(&sample).unwrap().independence();
        assert!(independence.remainder > 100.0 * independence.tolerance, "{independence:?}");
    }
}

#[test]
fn the_tolerance_grows_with_the_distance_from_zero_because_rounding_does() {
    let tolerance = |offset: f64| {
        let base = Scatter::new(9).sample(&[10, 10], 2);
        let moved: Vec<Vec<f64>> = columns(&base)
            .into_iter()
            .map(|column| column.into_iter().map(|y| y + offset).collect())
            .collect();
        let moved = sample(&moved, base.groups().to_vec(), 2).unwrap();
        one_way(&moved).unwrap().independence().tolerance
    };
    assert!(tolerance(0.0) < 1e-13);
    let ratio = tolerance(1e9) / tolerance(1e6);
    assert!((900.0..1100.0).contains(&ratio), "{ratio}");
}

#[test]
fn outcomes_of_very_different_units_are_no_reason_to_refuse() {
    let base = Scatter::new(10).sample(&[9, 9, 9], 4);
    let scales = [1e-100, 1e-8, 1e8, 1e100];
    let scaled: Vec<Vec<f64>> = columns(&base)
        .into_iter()
        .zip(scales)
        .map(|(column, scale)| column.into_iter().map(|y| y * scale).collect())
        .collect();
    let scaled = one_way(&sample(&scaled, base.groups().to_vec(), 3).unwrap()).unwrap();
    let plain = one_way(&base).unwrap();
    for (a, b) in scaled.roots().iter().zip(plain.roots()) {
        assert!((a / b - 1.0).abs() < 1e-12);
    }
}
