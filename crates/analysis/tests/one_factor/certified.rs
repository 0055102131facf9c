//! One-way analyses of variance with certified values: NIST Statistical Reference Datasets.
//!
//! SiRstv and AtmWtAg are measured; the SmLs series is that of Simon & Lesage (1989, Computational
//! Statistics & Data Analysis 8), made to break programs: all of its values share leading digits.

use nalgebra::DMatrix;
use tussock_analysis::criteria::criteria;
use tussock_analysis::hypothesis::one_way;
use tussock_analysis::sample::Sample;
use tussock_analysis::univariate::{Anova, anova};

use crate::support::{Table, codes, number, read_json};

struct Data {
    values: Vec<f64>,
    groups: Vec<usize>,
    group_count: usize,
}

fn measured(name: &str) -> Data {
    let table = Table::read(&format!("data/{name}.csv"));
    let groups = codes(&table.column("instrument"));
    let group_count = groups.iter().max().unwrap() + 1;
    Data { values: table.numbers("y"), groups, group_count }
}

/// Nine treatments: a value, then values .1 below and above it in turn, as many as `replicates`.
fn constructed(leading_digits: &str, replicates: usize) -> Data {
    let tenths = [4, 3, 5, 3, 5, 3, 5, 3, 5];
    let mut data = Data { values: Vec::new(), groups: Vec::new(), group_count: 9 };
    for (treatment, tenth) in tenths.into_iter().enumerate() {
        for replicate in 0..replicates {
            let shifted = match replicate {
                0 => tenth,
                odd if odd % 2 == 1 => tenth - 1,
                _ => tenth + 1,
            };
            data.values.push(format!("{leading_digits}.{shifted}").parse().unwrap());
            data.groups.push(treatment);
        }
    }
    data
}

fn every_set() -> Vec<(&'static str, Data)> {
    vec![
        ("SiRstv", measured("SiRstv")),
        ("AtmWtAg", measured("AtmWtAg")),
        ("SmLs01", constructed("1", 21)),
        ("SmLs02", constructed("1", 201)),
        ("SmLs03", constructed("1", 2001)),
        ("SmLs04", constructed("1000000", 21)),
        ("SmLs05", constructed("1000000", 201)),
        ("SmLs06", constructed("1000000", 2001)),
        ("SmLs07", constructed("1000000000000", 21)),
        ("SmLs08", constructed("1000000000000", 201)),
        ("SmLs09", constructed("1000000000000", 2001)),
    ]
}

fn analyse(data: &Data) -> Anova {
    anova(&data.values, &data.groups, data.group_count).unwrap()
}

/// The number of correct digits, at most 15.
fn correct_digits(found: f64, certified: f64) -> f64 {
    let error = (found / certified - 1.0).abs();
    if error == 0.0 { 15.0 } else { (-error.log10()).min(15.0) }
}

#[test]
fn f_has_every_digit_that_rounding_the_data_leaves() {
    let certified = read_json("nist_strd_anova.json");
    for (name, data) in every_set() {
        let expected = &certified[name];
        let found = analyse(&data);
        assert_eq!(found.test.df1, number(&expected["df1"]));
        assert_eq!(found.test.df2, number(&expected["df2"]));
        let digits = correct_digits(found.test.f, number(&expected["f"]));
        let possible = expected["digits_possible"].as_f64().unwrap();
        assert!(digits > possible - 0.5, "{name}: {digits} of {possible}");
        let of_doubles = correct_digits(found.test.f, number(&expected["f_of_doubles"]));
        assert!(of_doubles > 13.5, "{name}: {of_doubles} digits of the F of the rounded data");
    }
}

#[test]
fn sums_of_squares_and_their_ratio_agree_where_the_data_are_exact_enough() {
    let certified = read_json("nist_strd_anova.json");
    for (name, data) in every_set() {
        let expected = &certified[name];
        let limit = expected["digits_possible"].as_f64().unwrap().min(14.0) - 0.5;
        let found = analyse(&data);
        let pairs = [
            (found.ss_between, "ss_between"),
            (found.ss_within, "ss_within"),
            (found.ms_within, "ms_within"),
            (found.eta2, "r2"),
        ];
        for (value, key) in pairs {
            let digits = correct_digits(value, number(&expected[key]));
            assert!(digits > limit, "{name}: {digits} digits of {key}");
        }
    }
}

#[test]
fn one_outcome_gives_the_same_f_by_the_multivariate_route() {
    let certified = read_json("nist_strd_anova.json");
    for (name, data) in every_set() {
        let matrix = DMatrix::from_column_slice(data.values.len(), 1, &data.values);
        let sample = Sample::new(matrix, data.groups, data.group_count).unwrap();
        let found = criteria(&one_way(&sample).unwrap(), 0.9);
        let expected = number(&certified[name]["f_of_doubles"]);
        let hotelling = found.hotelling.unwrap();
        for criterion in [found.wilks, found.pillai, hotelling, found.roy] {
            let digits = correct_digits(criterion.test.f, expected);
            assert!(digits > 13.0, "{name}: {digits} digits");
        }
    }
}
