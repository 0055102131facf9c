//! The distributions against values of arbitrary precision, closed forms and printed tables.

use serde_json::Value;
use tussock_analysis::distribution::{
    Tails, central_f, chi_square, hedges, incomplete_gamma, noncentral_f, noncentral_t, student_t,
};
use tussock_analysis::test::PValue;

/// What relative error is let pass.
///
/// The arguments of the reference values are decimals, so the nearest double already moves a
/// probability p by up to about 10⁻¹⁶ times the slope of ln p in the logarithm of the argument: some
/// 10⁻¹⁴ at p = 10⁻¹⁰⁰. The logarithm of a tail suffers no more than its last digits.
struct Tolerance {
    /// Of a probability that is larger than 10⁻³⁰⁰.
    p: f64,
    /// Of the logarithm of a tail below ½.
    ln_p: f64,
}

const CENTRAL_F: Tolerance = Tolerance { p: 1e-13, ln_p: 4e-15 };
const CHI_SQUARE: Tolerance = Tolerance { p: 1e-13, ln_p: 4e-15 };
const NORMAL: Tolerance = Tolerance { p: 1e-13, ln_p: 4e-15 };
const NONCENTRAL_F: Tolerance = Tolerance { p: 3e-14, ln_p: 8e-15 };
const NONCENTRAL_T: Tolerance = Tolerance { p: 2e-14, ln_p: 4e-15 };
/// Of a limit of noncentrality.
const LIMIT: f64 = 1e-14;
/// Of the correction of a standardized mean difference.
const HEDGES: f64 = 5e-16;
/// Of a t quantile.
const T_QUANTILE: f64 = 1e-14;
/// Of a tail that has a closed form.
const CLOSED_FORM: f64 = 1e-13;

/// The reference values at ordinary points, with their sources.
fn reference() -> Value {
    serde_json::from_str(include_str!("reference/distributions.json")).expect("valid JSON")
}

/// The reference values far out in the tails, written by the script beside them.
fn far_reference() -> Value {
    serde_json::from_str(include_str!("reference/distributions_tails.json")).expect("valid JSON")
}

/// The rows of one table.
fn rows(table: &Value) -> &[Value] {
    let rows = table.as_array().expect("a table is an array");
    assert!(rows.len() > 5, "a table has at least six rows");
    rows
}

/// A number, which the files keep as text because it is an exact decimal.
fn number(row: &Value, key: &str) -> f64 {
    assert!(row[key].is_string(), "{row}: no {key}");
    row[key].as_str().expect("just asserted").parse().expect("a number")
}

fn relative_error(value: f64, truth: f64) -> f64 {
    if truth == 0.0 { value.abs() } else { (value / truth - 1.0).abs() }
}

/// Compares both tails, and the logarithm of the smaller one, with a row that has `cdf` and `sf`.
fn assert_tails(tails: Tails, row: &Value, tolerance: &Tolerance) {
    let assert_tail = |value: PValue, truth: f64| {
        let error = relative_error(value.p, truth);
        assert!(error <= tolerance.p, "{row}: p = {}, error {error:e}", value.p);
        if truth < 0.5 {
            let error = relative_error(value.ln_p, truth.ln());
            assert!(error <= tolerance.ln_p, "{row}: ln p = {}, error {error:e}", value.ln_p);
        }
    };
    assert_tail(tails.lower, number(row, "cdf"));
    assert_tail(tails.upper, number(row, "sf"));
}

/// Compares one tail with a row that has `ln_p`.
fn assert_far_tail(value: PValue, row: &Value, tolerance: &Tolerance) {
    let truth = number(row, "ln_p");
    let error = relative_error(value.ln_p, truth);
    assert!(error <= tolerance.ln_p, "{row}: ln p = {}, error {error:e}", value.ln_p);
    if truth < -750.0 {
        assert_eq!(value.p, 0.0, "{row}: the probability underflows");
    } else if truth > -690.0 {
        // The exponential of a rounded logarithm carries its absolute error.
        let rounding = truth.abs() * f64::EPSILON;
        let error = relative_error(value.p, truth.exp());
        assert!(error <= tolerance.ln_p * truth.abs() + rounding, "{row}: p error {error:e}");
    }
}

/// The tail that a row names.
fn side(tails: Tails, row: &Value) -> PValue {
    let upper = row["side"] == "upper";
    assert!(upper || row["side"] == "lower", "{row}: no side");
    if upper { tails.upper } else { tails.lower }
}

#[test]
fn central_f_agrees_with_25_digit_values() {
    for row in rows(&reference()["f"]) {
        let tails = central_f::tails(number(row, "x"), number(row, "d1"), number(row, "d2"));
        assert_tails(tails, row, &CENTRAL_F);
    }
}

#[test]
fn noncentral_f_agrees_with_25_digit_values() {
    for row in rows(&reference()["ncf"]) {
        let (df1, df2) = (number(row, "d1"), number(row, "d2"));
        let tails = noncentral_f::tails(number(row, "x"), df1, df2, number(row, "lambda"));
        assert_tails(tails, row, &NONCENTRAL_F);
    }
}

#[test]
fn noncentral_t_agrees_with_25_digit_values() {
    for row in rows(&reference()["nct"]) {
        let tails = noncentral_t::tails(number(row, "t"), number(row, "df"), number(row, "delta"));
        assert_tails(tails, row, &NONCENTRAL_T);
    }
}

#[test]
fn central_f_keeps_its_logarithm_where_the_probability_underflows() {
    for row in rows(&far_reference()["f"]) {
        let tails = central_f::tails(number(row, "x"), number(row, "d1"), number(row, "d2"));
        assert_far_tail(side(tails, row), row, &CENTRAL_F);
    }
}

#[test]
fn chi_square_agrees_with_25_digit_values() {
    for row in rows(&far_reference()["chi_square"]) {
        let tails = incomplete_gamma::tails(0.5 * number(row, "df"), 0.5 * number(row, "x"));
        assert_far_tail(side(tails, row), row, &CHI_SQUARE);
        let survival = chi_square::survival(number(row, "x"), number(row, "df"));
        assert_eq!(survival, tails.upper, "{row}");
    }
}

#[test]
fn t_with_infinite_df_agrees_with_25_digit_values_of_the_normal_law() {
    for row in rows(&far_reference()["normal"]) {
        let value = student_t::two_sided(number(row, "z"), f64::INFINITY);
        assert_far_tail(value, row, &NORMAL);
    }
}

#[test]
fn noncentral_f_keeps_its_logarithm_far_out() {
    for row in rows(&far_reference()["ncf"]) {
        let (df1, df2) = (number(row, "d1"), number(row, "d2"));
        let tails = noncentral_f::tails(number(row, "x"), df1, df2, number(row, "lambda"));
        assert_far_tail(side(tails, row), row, &NONCENTRAL_F);
    }
}

#[test]
fn noncentral_t_keeps_its_logarithm_far_out() {
    for row in rows(&far_reference()["nct"]) {
        let (t, df, delta) = (number(row, "t"), number(row, "df"), number(row, "delta"));
        assert_far_tail(noncentral_t::cumulative(t, df, delta), row, &NONCENTRAL_T);
        assert_far_tail(noncentral_t::survival(-t, df, -delta), row, &NONCENTRAL_T);
    }
}

#[test]
fn limits_of_a_standardized_mean_difference_agree_with_20_digit_values() {
    for row in rows(&reference()["smd"]) {
        let count = |key: &str| number(row, key);
        let root = (count("n1") * count("n2") / (count("n1") + count("n2"))).sqrt();
        let limits = noncentral_t::limits(count("t"), count("df"), count("level"));
        for (limit, key) in [(limits.lower, "delta_lo"), (limits.upper, "delta_hi")] {
            let error = relative_error(limit / root, number(row, key));
            assert!(error <= LIMIT, "{row}: {key} = {}, error {error:e}", limit / root);
        }
        let error = relative_error(hedges::correction(number(row, "df")), number(row, "J"));
        assert!(error <= HEDGES, "{row}: J, error {error:e}");
    }
}

#[test]
fn limits_of_the_noncentrality_of_f_agree_with_20_digit_values() {
    for row in rows(&reference()["eta"]) {
        let (f, df1, df2) = (number(row, "F"), number(row, "df1"), number(row, "df2"));
        let limits = noncentral_f::limits(f, df1, df2, number(row, "level"));
        for (limit, key) in [(limits.lower, "lam_lo"), (limits.upper, "lam_hi")] {
            let error = relative_error(limit, number(row, key));
            assert!(error <= LIMIT, "{row}: {key} = {limit}, error {error:e}");
        }
        let error = relative_error(central_f::survival(f, df1, df2).p, number(row, "p"));
        assert!(error <= CENTRAL_F.p, "{row}: p, error {error:e}");
    }
}

#[test]
fn the_correction_of_hedges_keeps_its_digits_at_any_df() {
    for row in rows(&far_reference()["hedges"]) {
        let value = hedges::correction(number(row, "df"));
        let error = relative_error(value, number(row, "j"));
        assert!(error <= HEDGES, "{row}: {value}, error {error:e}");
    }
}

#[test]
fn f_with_two_df_above_has_a_power_as_its_tail() {
    // P(F > f) = (1 + 2 f/df2)^(−df2/2), by integration of the density.
    for df2 in [0.5, 1.0, 7.3, 60.0, 1e3, 1e6] {
        for f in [1e-6, 0.01, 0.7, 1.0, 3.2, 50.0, 1e4, 1e9] {
            let truth = -0.5 * df2 * f64::ln_1p(2.0 * f / df2);
            let value = central_f::survival(f, 2.0, df2);
            assert!(relative_error(value.ln_p, truth) <= CLOSED_FORM, "f {f}, df2 {df2}");
        }
    }
}

#[test]
fn chi_square_with_two_df_is_exponential() {
    for x in [1e-9, 0.1, 1.0, 2.0, 3.5, 60.0, 1e4, 1e9] {
        let value = chi_square::survival(x, 2.0);
        assert!(relative_error(value.ln_p, -0.5 * x) <= CLOSED_FORM, "x {x}");
    }
}

#[test]
fn t_with_one_and_two_df_has_closed_forms() {
    for t in [1e-8_f64, 0.3, 1.0, 2.5, 40.0, 1e6, 1e15] {
        let cauchy = 2.0 / std::f64::consts::PI * (1.0 / t).atan();
        let error = relative_error(student_t::two_sided(t, 1.0).p, cauchy);
        assert!(error <= CLOSED_FORM, "t {t}, df 1: error {error:e}");
        let root = (t * t + 2.0).sqrt();
        let two = 2.0 / (root * (root + t));
        let error = relative_error(student_t::two_sided(t, 2.0).p, two);
        assert!(error <= CLOSED_FORM, "t {t}, df 2: error {error:e}");
    }
    // Where the square of t overflows.
    let far = student_t::two_sided(1e200, 1.0);
    assert!(relative_error(far.p, 2.0 / std::f64::consts::PI * 1e-200) <= CLOSED_FORM);
}

#[test]
fn quantiles_of_t_have_closed_forms_and_lead_back() {
    for tail in [1e-300, 1e-20, 1e-4, 0.025, 0.2, 0.3, 0.49, 0.499_999] {
        let cauchy = 1.0 / (std::f64::consts::PI * tail).tan();
        let value = -student_t::quantile(tail, 1.0);
        // A quantile is found by its logarithm; near ½ the closed form itself loses digits.
        let far = T_QUANTILE.max(value.ln() * f64::EPSILON);
        let allowed = far.max(T_QUANTILE / (0.5 - tail));
        assert!(relative_error(value, cauchy) <= allowed, "tail {tail}: {value} for {cauchy}");
        let two = (1.0 - 2.0 * tail) / (2.0 * tail * (1.0 - tail)).sqrt();
        let value = -student_t::quantile(tail, 2.0);
        assert!(relative_error(value, two) <= far, "tail {tail}: {value} for {two}");
        // With fewer than 1 df the quantile of the smallest of these tails would overflow.
        for df in [1.7, 3.0, 38.0, 1e5, f64::INFINITY] {
            let t = -student_t::quantile(tail, df);
            let back = student_t::two_sided(t, df).ln_p;
            assert!((back - (2.0 * tail).ln()).abs() <= 2e-12, "tail {tail}, df {df}");
        }
    }
}

/// Checks that a printed critical value is the correctly rounded one: half a unit in its last place
/// below it the tail is at least as large as the level, half a unit above it at most as large.
fn assert_critical(printed: &str, level: f64, survival: impl Fn(f64) -> f64) {
    let decimals = printed.split_once('.').map_or(0, |(_, decimals)| decimals.len());
    let half_unit = 0.5 * 10_f64.powi(-i32::try_from(decimals).expect("few decimals"));
    let value: f64 = printed.parse().expect("a number");
    assert!(survival(value - half_unit) >= level, "{printed} at {level} is printed too small");
    assert!(survival(value + half_unit) <= level, "{printed} at {level} is printed too large");
}

#[test]
fn printed_percentage_points_of_f_are_met() {
    // Abramowitz & Stegun 1964, Handbook of Mathematical Functions, Table 26.9.
    for (printed, level, df1, df2) in [
        ("4.96", 0.05, 1.0, 10.0),
        ("3.10", 0.05, 3.0, 20.0),
        ("2.37", 0.05, 4.0, f64::INFINITY),
        ("1.91", 0.05, 10.0, 120.0),
        ("5.64", 0.01, 5.0, 10.0),
        ("4.02", 0.01, 4.0, 30.0),
        ("9.95", 0.001, 2.0, 20.0),
    ] {
        assert_critical(printed, level, |f| central_f::survival(f, df1, df2).p);
    }
}

#[test]
fn printed_percentage_points_of_chi_square_are_met() {
    // Abramowitz & Stegun 1964, Table 26.8.
    for (printed, level, df) in [
        ("3.84146", 0.05, 1.0),
        ("18.3070", 0.05, 10.0),
        ("124.342", 0.05, 100.0),
        ("37.5662", 0.01, 20.0),
        ("20.515", 0.001, 5.0),
    ] {
        assert_critical(printed, level, |x| chi_square::survival(x, df).p);
    }
}

#[test]
fn printed_percentage_points_of_t_are_met() {
    // Abramowitz & Stegun 1964, Table 26.10: A(t | ν) = 1 − level.
    for (printed, level, df) in [
        ("12.706", 0.05, 1.0),
        ("2.228", 0.05, 10.0),
        ("2.042", 0.05, 30.0),
        ("4.032", 0.01, 5.0),
        ("2.576", 0.01, f64::INFINITY),
        ("3.850", 0.001, 20.0),
    ] {
        assert_critical(printed, level, |t| student_t::two_sided(t, df).p);
        let quantile = student_t::quantile(1.0 - 0.5 * level, df);
        assert_eq!(format!("{quantile:.3}"), printed, "the quantile at {level}, df {df}");
    }
}

#[test]
fn printed_power_of_a_t_test_is_met() {
    // Cohen 1988, Statistical Power Analysis for the Behavioral Sciences, Table 2.3.5: d = .50,
    // n = 64, two-tailed at .05 has the power .80.
    let critical = student_t::quantile(0.975, 126.0);
    let delta = 0.5 * 32_f64.sqrt();
    let power = noncentral_t::survival(critical, 126.0, delta).p
        + noncentral_t::cumulative(-critical, 126.0, delta).p;
    assert_eq!(format!("{power:.2}"), "0.80");
    let as_f = noncentral_f::survival(critical * critical, 1.0, 126.0, delta * delta).p;
    assert!(relative_error(as_f, power) < 1e-13);
}

#[test]
fn printed_corrections_of_hedges_are_met() {
    // Hedges 1981, J. Educ. Stat. 6:107, Table 1: c(m).
    for (printed, df) in [("0.5642", 2.0), ("0.7236", 3.0), ("0.7979", 4.0), ("0.9849", 50.0)] {
        assert_eq!(format!("{:.4}", hedges::correction(df)), printed, "df {df}");
    }
}
