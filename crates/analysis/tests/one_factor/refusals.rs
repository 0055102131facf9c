//! Every kind of impossible input gets the error that names what is wrong with it.

use nalgebra::DMatrix;
use tussock_analysis::correlations::correlate;
use tussock_analysis::covariances::{Centre, box_test, levene, log_determinants};
use tussock_analysis::criteria::{Exactness, criteria};
use tussock_analysis::descriptives::describe;
use tussock_analysis::error::AnalysisError;
use tussock_analysis::hypothesis::one_way;
use tussock_analysis::pairs::pairs;
use tussock_analysis::sample::Sample;
use tussock_analysis::univariate::anova;

use crate::support::{Scatter, Table, columns, sample};

fn hard(name: &str) -> Sample {
    Table::read(&format!("hard/{name}.csv")).sample("g").unwrap()
}

fn two_columns() -> Vec<Vec<f64>> {
    vec![vec![1.0, 2.0, 3.0, 5.0], vec![2.0, 1.0, 4.0, 3.0]]
}

#[test]
fn a_sample_needs_outcomes_codes_groups_and_numbers() {
    let refuse = |outcomes: &[Vec<f64>], groups: Vec<usize>, count: usize| {
        sample(outcomes, groups, count).unwrap_err()
    };
    assert_eq!(refuse(&[], vec![0, 0, 1, 1], 2), AnalysisError::NoOutcomes);
    let shape = Sample::new(DMatrix::zeros(3, 1), vec![0, 1], 2).unwrap_err();
    assert_eq!(shape, AnalysisError::Shape { rows: 3, groups: 2 });
    assert_eq!(
        refuse(&two_columns(), vec![0, 0, 0, 0], 1),
        AnalysisError::TooFewGroups { groups: 1 }
    );
    assert_eq!(refuse(&two_columns(), vec![0, 0, 2, 2], 3), AnalysisError::EmptyGroup { group: 1 });
    assert_eq!(
        refuse(&two_columns(), vec![0, 0, 1, 2], 2),
        AnalysisError::GroupCode { row: 3, code: 2, groups: 2 }
    );
    for bad in [f64::NAN, f64::INFINITY, f64::NEG_INFINITY] {
        let mut outcomes = two_columns();
        outcomes[1][2] = bad;
        let error = refuse(&outcomes, vec![0, 0, 1, 1], 2);
        assert_eq!(error, AnalysisError::NotFinite { outcome: 1, row: 2 });
    }
    let mut outcomes = two_columns();
    outcomes[0][3] = -1e151;
    assert_eq!(
        refuse(&outcomes, vec![0, 0, 1, 1], 2),
        AnalysisError::TooLarge { outcome: 0, row: 3 }
    );
    assert_eq!(refuse(&[Vec::new()], Vec::new(), 2), AnalysisError::EmptyGroup { group: 0 });
}

#[test]
fn one_group_is_not_a_comparison() {
    let error = Table::read("hard/one_group.csv").sample("g").unwrap_err();
    assert_eq!(error, AnalysisError::TooFewGroups { groups: 1 });
}

#[test]
fn a_single_outcome_is_checked_as_a_sample_is() {
    let values = [1.0, 2.0, f64::NAN, 4.0];
    let groups = [0, 0, 1, 1];
    let not_finite = AnalysisError::NotFinite { outcome: 0, row: 2 };
    assert_eq!(anova(&values, &groups, 2).unwrap_err(), not_finite);
    assert_eq!(pairs(&values, &groups, 2, 0.95).unwrap_err(), not_finite);
    let shape = AnalysisError::Shape { rows: 3, groups: 4 };
    assert_eq!(anova(&values[..3], &groups, 2).unwrap_err(), shape);
    assert_eq!(anova(&[1.0, 2.0], &[0, 1], 2).unwrap_err(), AnalysisError::NoErrorDf);
    let within = AnalysisError::ConstantWithinGroups { outcome: 0 };
    assert_eq!(anova(&[1.0, 1.0, 2.0, 2.0], &groups, 2).unwrap_err(), within);
    assert_eq!(pairs(&[1.0, 1.0, 2.0, 2.0], &groups, 2, 0.95).unwrap_err(), within);
    let constant = AnalysisError::ConstantOutcome { outcome: 0 };
    assert_eq!(anova(&[3.0; 4], &groups, 2).unwrap_err(), constant);
}

#[test]
fn groups_of_one_leave_no_degrees_of_freedom() {
    let lonely = sample(&[vec![1.0, 2.0, 4.0]], vec![0, 1, 2], 3).unwrap();
    assert_eq!(one_way(&lonely).unwrap_err(), AnalysisError::NoErrorDf);
    assert_eq!(levene(&lonely, 0, Centre::Mean).unwrap_err(), AnalysisError::NoErrorDf);
    assert_eq!(correlate(&lonely).df_within, 0);
}

#[test]
fn a_constant_outcome_is_named() {
    let sample = hard("constant_outcome");
    let constant = AnalysisError::ConstantOutcome { outcome: 1 };
    assert_eq!(one_way(&sample).unwrap_err(), constant);
    assert_eq!(box_test(&sample).unwrap_err(), constant);
    assert_eq!(levene(&sample, 1, Centre::Median).unwrap_err(), constant);
    assert_eq!(log_determinants(&sample), [None, None, None]);
    let found = correlate(&sample);
    assert!(found.within[(0, 1)].is_nan() && found.total[(1, 1)].is_nan());
    assert_eq!((found.within_sd[1], found.total_sd[1]), (0.0, 0.0));
    assert!(found.within[(0, 2)].abs() < 1.0 && found.within[(0, 0)] == 1.0);
}

#[test]
fn an_outcome_that_separates_the_groups_perfectly_is_named() {
    let sample = hard("constant_within");
    let within = AnalysisError::ConstantWithinGroups { outcome: 1 };
    assert_eq!(one_way(&sample).unwrap_err(), within);
    assert_eq!(box_test(&sample).unwrap_err(), within);
    assert_eq!(levene(&sample, 1, Centre::Mean).unwrap_err(), within);
    let found = correlate(&sample);
    assert!(found.within[(0, 1)].is_nan());
    assert!(found.total[(0, 1)].abs() <= 1.0 && found.total_sd[1] > 0.0);
}

#[test]
fn values_that_differ_by_their_last_digit_only_are_constant() {
    let tenth = 0.1_f64;
    let values = [tenth + 0.2, 0.3, 0.3, 0.7, 0.1 * 7.0, 0.7];
    assert_ne!(values[0], values[1]);
    assert_eq!(
        anova(&values, &[0, 0, 0, 1, 1, 1], 2).unwrap_err(),
        AnalysisError::ConstantWithinGroups { outcome: 0 }
    );
}

#[test]
fn integers_far_from_zero_are_not_mistaken_for_a_constant() {
    let values = [1e15, 1e15 + 1.0, 1e15 + 2.0, 1e15 + 2.0, 1e15 + 3.0, 1e15 + 4.0];
    let found = anova(&values, &[0, 0, 0, 1, 1, 1], 2).unwrap();
    assert!((found.test.f - 6.0).abs() < 1e-14);
}

#[test]
fn more_outcomes_than_degrees_of_freedom_are_refused_and_as_many_are_not() {
    assert_eq!(
        one_way(&hard("p_gt_dfe")).unwrap_err(),
        AnalysisError::TooManyOutcomes { outcomes: 10, df_error: 6 }
    );
    let equal = one_way(&hard("p_eq_dfe")).unwrap();
    assert_eq!((equal.outcome_count(), equal.df_error()), (6, 6));
    let found = criteria(&equal, 0.9);
    assert_eq!(found.wilks.test.df2, 1.0);
    assert_eq!(found.wilks.exactness, Exactness::Exact);
}

#[test]
fn the_trace_has_no_test_where_neither_approximation_exists() {
    let sample = Scatter::new(3).sample(&[3, 2, 2], 4);
    let hypothesis = one_way(&sample).unwrap();
    assert_eq!((hypothesis.df_error(), hypothesis.dimensions()), (4, 2));
    let found = criteria(&hypothesis, 0.9);
    assert_eq!((found.hotelling, found.hotelling_approximation), (None, None));
    assert!(found.wilks.test.df2 > 0.0 && found.pillai.test.df2 > 0.0 && found.roy.test.df2 > 0.0);
}

#[test]
fn a_group_of_one_is_part_of_the_comparison_but_has_no_spread() {
    let sample = hard("singleton_group");
    assert_eq!(sample.group_sizes(), [5, 5, 1]);
    assert!(one_way(&sample).is_ok());
    assert_eq!(
        box_test(&sample).unwrap_err(),
        AnalysisError::SmallGroup { group: 2, n: 1, needed: 3 }
    );
    let logs = log_determinants(&sample);
    assert!(logs[0].is_some() && logs[1].is_some() && logs[2].is_none());
    let lonely = describe(&sample, 0.95)[2][0];
    assert_eq!((lonely.n, lonely.sd, lonely.se, lonely.interval), (1, None, None, None));
}

#[test]
fn groups_no_larger_than_the_number_of_outcomes_have_no_covariance_test() {
    let sample = hard("small_groups");
    assert!(one_way(&sample).is_ok());
    let small = AnalysisError::SmallGroup { group: 0, n: 3, needed: 4 };
    assert_eq!(box_test(&sample).unwrap_err(), small);
    assert_eq!(log_determinants(&sample), [None, None, None]);
}

#[test]
fn the_group_of_two_among_the_pottery_refuses_the_covariance_test_only_as_a_whole() {
    let sample = Table::read("data/pottery.csv").sample("Site").unwrap();
    assert_eq!(sample.group_sizes(), [14, 2, 5, 5]);
    let small = AnalysisError::SmallGroup { group: 1, n: 2, needed: 6 };
    assert_eq!(box_test(&sample).unwrap_err(), small);
    let known: Vec<bool> = log_determinants(&sample).iter().map(Option::is_some).collect();
    assert_eq!(known, [true, false, false, false]);
}

#[test]
fn a_group_that_is_large_enough_but_singular_is_named() {
    let whole = Scatter::new(5).sample(&[8, 8, 8], 3);
    let mut outcomes = columns(&whole);
    let bent: Vec<f64> = (8..16).map(|unit| outcomes[0][unit] - outcomes[1][unit]).collect();
    outcomes[2][8..16].copy_from_slice(&bent);
    let groups = whole.groups().to_vec();
    let bent = sample(&outcomes, groups.clone(), 3).unwrap();
    assert!(one_way(&bent).is_ok());
    assert_eq!(box_test(&bent).unwrap_err(), AnalysisError::SingularGroup { group: 1 });
    assert!(log_determinants(&bent)[1].is_none());
    outcomes[2][8..16].fill(4.0);
    let flat = sample(&outcomes, groups, 3).unwrap();
    assert_eq!(box_test(&flat).unwrap_err(), AnalysisError::SingularGroup { group: 1 });
}

#[test]
fn distances_that_do_not_vary_within_groups_have_no_test_of_variances() {
    // In groups of two both distances from the mean are equal.
    let pairs_only = sample(&[vec![1.1, 2.3, 4.7, 8.9]], vec![0, 0, 1, 1], 2).unwrap();
    for centre in [Centre::Mean, Centre::Median] {
        assert_eq!(
            levene(&pairs_only, 0, centre).unwrap_err(),
            AnalysisError::ConstantWithinGroups { outcome: 0 }
        );
    }
}
