//! Every quantity against `reference/one_way.json`, which has 20 digits and its generating script.

use nalgebra::DMatrix;
use serde_json::Value;
use tussock_analysis::centroids::{centroids, scores};
use tussock_analysis::coefficients::coefficients;
use tussock_analysis::correlations::correlate;
use tussock_analysis::covariances::{Centre, box_test, levene, log_determinants};
use tussock_analysis::criteria::{Criterion, TraceApproximation, criteria};
use tussock_analysis::descriptives::{Descriptive, describe, describe_total};
use tussock_analysis::functions::functions;
use tussock_analysis::hypothesis::{Hypothesis, one_way};
use tussock_analysis::pairs::pairs;
use tussock_analysis::sample::Sample;
use tussock_analysis::test::{FTest, Interval, PValue};
use tussock_analysis::univariate::anova;

use crate::precision::Check;
use crate::support::{Table, number, read_json};

/// The level of the intervals of effect sizes in the reference.
const ETA_LEVEL: f64 = 0.90;
/// The level of all other intervals in the reference.
const LEVEL: f64 = 0.95;

/// Cases of which the reference holds every table, not only the multivariate tests.
const FULL: [&str; 13] = [
    "box_second_branch",
    "one_outcome",
    "jw8",
    "stevens12",
    "iris",
    "rootstock",
    "skulls",
    "pottery",
    "wine",
    "scale_mixed",
    "p_eq_dfe",
    "singleton_group",
    "small_groups",
];

struct Case {
    check: Check,
    sample: Sample,
    expected: Value,
}

fn every_case() -> Vec<Case> {
    let Value::Object(cases) = read_json("one_way.json") else { panic!("not an object") };
    assert_eq!(cases.len(), 27);
    cases
        .into_iter()
        .map(|(name, expected)| {
            let text = |key: &str| expected[key].as_str().unwrap().to_owned();
            let sample = Table::read(&text("file")).sample(&text("factor")).unwrap();
            Case { check: Check::new(&name), sample, expected }
        })
        .collect()
}

fn full_cases() -> Vec<Case> {
    let Value::Object(mut cases) = read_json("one_way.json") else { panic!("not an object") };
    let full = FULL.map(|name| {
        let expected = cases.remove(name).unwrap();
        let text = |key: &str| expected[key].as_str().unwrap().to_owned();
        let sample = Table::read(&text("file")).sample(&text("factor")).unwrap();
        Case { check: Check::new(name), sample, expected }
    });
    assert!(cases.values().all(|case| case.get("univariate").is_none()));
    full.into()
}

impl Case {
    fn hypothesis(&self) -> Hypothesis {
        one_way(&self.sample).unwrap()
    }

    /// A relative error of F returns in p multiplied by up to |ln p|.
    #[track_caller]
    fn p(&self, what: &str, found: PValue, expected: &Value) {
        let (p, ln_p) = (number(&expected["p"]), number(&expected["ln_p"]));
        let magnified = ln_p.abs().max(1.0);
        self.check.close_on_scale(&format!("ln p of {what}"), found.ln_p, ln_p, magnified);
        if p > 1e-300 {
            self.check.close_on_scale(&format!("p of {what}"), found.p, p, p * magnified);
        } else {
            assert!(found.p < 1e-300, "{what}: {}", found.p);
        }
    }

    #[track_caller]
    fn f_test(&self, what: &str, found: &FTest, expected: &Value) {
        self.check.close(&format!("F of {what}"), found.f, number(&expected["f"]));
        self.check.close(&format!("df1 of {what}"), found.df1, number(&expected["df1"]));
        self.check.close(&format!("df2 of {what}"), found.df2, number(&expected["df2"]));
        self.p(what, found.p, expected);
    }

    #[track_caller]
    fn interval(&self, what: &str, found: Interval, expected: &Value) {
        let scale = number(&expected[1]).abs().max(number(&expected[0]).abs());
        self.check.close_on_scale(what, found.lower, number(&expected[0]), scale);
        self.check.close_on_scale(what, found.upper, number(&expected[1]), scale);
    }

    #[track_caller]
    fn criterion(&self, what: &str, found: &Criterion, expected: &Value) {
        self.check.close(what, found.value, number(&expected["value"]));
        if let Some(ln_value) = expected.get("ln_value").map(number) {
            let scale = ln_value.abs().max(1.0);
            self.check.close_on_scale(&format!("ln of {what}"), found.ln_value, ln_value, scale);
        }
        self.f_test(what, &found.test, expected);
        self.check.close(&format!("eta2 of {what}"), found.eta2, number(&expected["eta2"]));
        if let Some(interval) = expected.get("eta2_interval") {
            self.interval(&format!("limits of {what}"), found.eta2_interval.unwrap(), interval);
        }
    }

    #[track_caller]
    fn descriptive(&self, what: &str, found: &Descriptive, expected: &Value) {
        assert_eq!(found.n as u64, expected["n"].as_u64().unwrap());
        let mean = number(&expected["mean"]);
        let Some(sd) = expected.get("sd").map(number) else {
            self.check.close(what, found.mean, mean);
            assert_eq!((found.sd, found.se, found.interval), (None, None, None));
            return;
        };
        self.check.close_on_scale(what, found.mean, mean, sd.max(mean.abs()));
        self.check.close(&format!("sd of {what}"), found.sd.unwrap(), sd);
        self.check.close(&format!("se of {what}"), found.se.unwrap(), number(&expected["se"]));
        self.interval(&format!("limits of {what}"), found.interval.unwrap(), &expected["interval"]);
    }

    #[track_caller]
    fn matrix(&self, what: &str, found: &DMatrix<f64>, expected: &Value) {
        for i in 0..found.nrows() {
            for j in 0..found.ncols() {
                let expected = number(&expected[i][j]);
                self.check.close_on_scale(&format!("{what} {i},{j}"), found[(i, j)], expected, 1.0);
            }
        }
    }
}

#[test]
fn roots_and_canonical_correlations_agree() {
    for case in every_case() {
        let hypothesis = case.hypothesis();
        let found = functions(&hypothesis);
        let roots = case.expected["roots"].as_array().unwrap();
        assert_eq!(hypothesis.dimensions(), roots.len());
        for (j, root) in roots.iter().enumerate() {
            case.check.close("a root", hypothesis.roots()[j], number(root));
            case.check.close("a root", found[j].eigenvalue, number(root));
            let canonical = number(&case.expected["canonical"][j]);
            case.check.close("a canonical correlation", found[j].canonical, canonical);
        }
    }
}

#[test]
fn the_four_criteria_agree() {
    for case in every_case() {
        let hypothesis = case.hypothesis();
        assert_eq!(hypothesis.df_hypothesis() as u64, case.expected["df_hypothesis"]);
        assert_eq!(hypothesis.df_error() as u64, case.expected["df_error"]);
        let found = criteria(&hypothesis, ETA_LEVEL);
        case.criterion("Wilks", &found.wilks, &case.expected["wilks"]);
        case.criterion("Pillai", &found.pillai, &case.expected["pillai"]);
        case.criterion("Roy", &found.roy, &case.expected["roy"]);
        case.check.close("theta", found.roy_theta, number(&case.expected["roy"]["eta2"]));
        let hotelling = found.hotelling.unwrap();
        case.criterion("Hotelling", &hotelling, &case.expected["hotelling"]);
        let approximation = match found.hotelling_approximation {
            Some(TraceApproximation::McKeon) => "McKeon",
            Some(TraceApproximation::PillaiSamson) => "PillaiSamson",
            None => "exact",
        };
        let expected = case.expected["hotelling"]["approximation"].as_str().unwrap();
        assert_eq!(approximation, if hypothesis.dimensions() == 1 { "exact" } else { expected });
    }
}

#[test]
fn the_tests_of_dimensions_agree() {
    for case in every_case() {
        let found = functions(&case.hypothesis());
        for (j, function) in found.iter().enumerate() {
            let expected = &case.expected["dimensions"][j];
            case.check.close("Wilks of a dimension", function.wilks, number(&expected["wilks"]));
            case.f_test("a dimension", &function.test, expected);
        }
    }
}

#[test]
fn coefficients_agree_with_their_signs() {
    for case in full_cases() {
        let found = coefficients(&case.hypothesis());
        for (j, function) in case.expected["discriminant"].as_array().unwrap().iter().enumerate() {
            let kinds = [
                ("raw", &found.raw),
                ("standardized", &found.standardized),
                ("structure", &found.structure),
                ("share", &found.share),
            ];
            for (kind, matrix) in kinds {
                let what = format!("a {kind} coefficient");
                for (i, expected) in function[kind].as_array().unwrap().iter().enumerate() {
                    case.check.close(&what, matrix[(i, j)], number(expected));
                }
            }
        }
    }
}

#[test]
fn centroids_agree() {
    for case in full_cases() {
        let hypothesis = case.hypothesis();
        let scores = scores(&case.sample, &coefficients(&hypothesis));
        let found = centroids(&case.sample, &scores);
        for (j, function) in case.expected["discriminant"].as_array().unwrap().iter().enumerate() {
            for (group, expected) in function["centroids"].as_array().unwrap().iter().enumerate() {
                let centroid = found[group][j];
                assert_eq!(centroid.n as u64, expected["n"]);
                case.check.close("a centroid", centroid.mean, number(&expected["mean"]));
                match centroid.sd {
                    Some(sd) => case.check.close("sd of a score", sd, number(&expected["sd"])),
                    None => assert!(expected["sd"].is_null()),
                }
            }
        }
    }
}

#[test]
fn correlations_agree() {
    for case in full_cases() {
        let found = correlate(&case.sample);
        case.matrix("correlation within", &found.within, &case.expected["within"]["r"]);
        case.matrix("correlation in total", &found.total, &case.expected["total"]["r"]);
        for j in 0..case.sample.outcome_count() {
            let expected = |kind: &str| number(&case.expected[kind]["sd"][j]);
            case.check.close("sd within", found.within_sd[j], expected("within"));
            case.check.close("sd in total", found.total_sd[j], expected("total"));
        }
    }
}

#[test]
fn descriptives_agree() {
    for case in full_cases() {
        let groups = describe(&case.sample, LEVEL);
        let total = describe_total(&case.sample, LEVEL);
        for (j, outcome) in case.expected["univariate"].as_array().unwrap().iter().enumerate() {
            case.descriptive("a total mean", &total[j], &outcome["total"]);
            for (group, expected) in outcome["groups"].as_array().unwrap().iter().enumerate() {
                case.descriptive("a group mean", &groups[group][j], expected);
            }
        }
    }
}

#[test]
fn analyses_of_variance_agree() {
    for case in full_cases() {
        for (j, expected) in case.expected["univariate"].as_array().unwrap().iter().enumerate() {
            let (values, groups) = (case.sample.outcome(j), case.sample.groups());
            let found = anova(values, groups, case.sample.group_count()).unwrap();
            case.f_test("an analysis of variance", &found.test, expected);
            case.check.close("eta2", found.eta2, number(&expected["eta2"]));
            case.check.close("omega2", found.omega2, number(&expected["omega2"]));
            case.check.close("SS between", found.ss_between, number(&expected["ss_between"]));
            case.check.close("SS within", found.ss_within, number(&expected["ss_within"]));
            let ms_within = number(&expected["ss_within"]) / found.test.df2;
            case.check.close("MS within", found.ms_within, ms_within);
        }
    }
}

#[test]
fn comparisons_of_pairs_agree() {
    for case in full_cases() {
        for (j, outcome) in case.expected["univariate"].as_array().unwrap().iter().enumerate() {
            let (values, groups) = (case.sample.outcome(j), case.sample.groups());
            let found = pairs(values, groups, case.sample.group_count(), LEVEL).unwrap();
            let expected = outcome["pairs"].as_array().unwrap();
            assert_eq!(found.list.len(), expected.len());
            case.check.close("the pooled sd", found.pooled_sd, number(&outcome["pooled_sd"]));
            case.check.close("J", found.correction, number(&outcome["correction"]));
            let mut sum_of_g = 0.0;
            for (pair, expected) in found.list.iter().zip(expected) {
                assert_eq!(pair.first as u64, expected["first"]);
                assert_eq!(pair.second as u64, expected["second"]);
                // A difference of means may be tiny beside the spread that they are measured with.
                let near = |what: &str, found: f64, key: &str, scale: f64| {
                    case.check.close_on_scale(what, found, number(&expected[key]), scale);
                };
                near("a difference", pair.difference, "difference", found.pooled_sd);
                near("t", pair.t, "t", 1.0_f64.max(pair.t.abs()));
                near("d", pair.d, "d", 1.0_f64.max(pair.d.abs()));
                near("g", pair.g, "g", 1.0_f64.max(pair.d.abs()));
                case.interval("limits of a difference", pair.interval, &expected["interval"]);
                case.p("a pair", pair.p, expected);
                sum_of_g += number(&expected["g"]).abs();
            }
            let mean_abs_g = sum_of_g / expected.len() as f64;
            case.check.close("mean of |g|", found.mean_abs_g, mean_abs_g);
            case.check.close("mean of |d|", found.mean_abs_d * found.correction, mean_abs_g);
        }
    }
}

#[test]
fn tests_of_equal_covariances_agree_or_are_refused_alike() {
    let mut refused = 0;
    for case in full_cases() {
        let expected = &case.expected["box"];
        let Ok(found) = box_test(&case.sample) else {
            assert!(expected.is_null());
            refused += 1;
            continue;
        };
        case.check.close("M", found.m, number(&expected["m"]));
        case.check.close("chi-square", found.chi_square, number(&expected["chi_square"]));
        case.check.close("df", found.df, number(&expected["df"]));
        case.p("chi-square", found.chi_square_p, &expected["chi_square_test"]);
        case.f_test("Box", &found.f, &expected["f"]);
        let pooled = number(&expected["pooled_log_determinant"]);
        case.check.close("ln det of the pooled matrix", found.pooled_log_determinant, pooled);
        let optional = log_determinants(&case.sample);
        for (group, log) in found.log_determinants.iter().enumerate() {
            case.check.close("ln det", *log, number(&expected["log_determinants"][group]));
            assert_eq!(optional[group], Some(*log));
        }
    }
    // jw8, pottery, p_eq_dfe, singleton_group and small_groups have a group no larger than p.
    assert_eq!(refused, 5);
}

#[test]
fn tests_of_equal_variances_agree() {
    for case in full_cases() {
        for (j, outcome) in case.expected["univariate"].as_array().unwrap().iter().enumerate() {
            for (centre, key) in [(Centre::Mean, "levene_mean"), (Centre::Median, "levene_median")]
            {
                match levene(&case.sample, j, centre) {
                    Ok(found) => case.f_test(key, &found, &outcome[key]),
                    Err(_) => assert!(outcome[key].is_null(), "{key} {j}"),
                }
            }
        }
    }
}
