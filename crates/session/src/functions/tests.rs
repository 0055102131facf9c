use super::*;

fn call(name: &str, arguments: &[Vector]) -> Result<Vector, String> {
    find(name).unwrap().call(arguments)
}

fn numbers(values: &[f64]) -> Vector {
    Vector::number(values.iter().copied())
}

#[test]
fn a_missing_value_makes_a_row_missing() {
    let Vector::Number(sums) =
        call("sum", &[numbers(&[1.0, f64::NAN]), numbers(&[2.0, 2.0])]).unwrap()
    else {
        panic!("numbers")
    };
    assert_eq!(sums[0], 3.0);
    assert!(sums[1].is_nan());
}

#[test]
fn a_logarithm_of_zero_is_missing() {
    let Vector::Number(logs) = call("log", &[numbers(&[1.0, 0.0, -2.0])]).unwrap() else {
        panic!("numbers")
    };
    assert_eq!(logs[0], 0.0);
    assert!(logs[1].is_nan() && logs[2].is_nan());
}

#[test]
fn rounding_takes_decimals() {
    assert_eq!(
        call("round", &[numbers(&[2.346, -0.5]), numbers(&[2.0, 0.0])]),
        Ok(numbers(&[2.35, -1.0]))
    );
}

#[test]
fn zscores_have_mean_zero_and_unit_variance() {
    assert_eq!(call("zscore", &[numbers(&[1.0, 2.0, 3.0])]), Ok(numbers(&[-1.0, 0.0, 1.0])));
    assert_eq!(
        call("zscore", &[numbers(&[2.0, 2.0])]),
        Err("needs a column that varies".to_owned())
    );
}

#[test]
fn every_function_has_a_page_with_an_example() {
    for function in FUNCTIONS {
        let page = function.page();
        assert!(page.text.starts_with(&format!("# {}\n", page.name)), "{}", page.name);
        assert!(page.text.contains("```tussock\n"), "{} has no example", page.name);
        assert!(page.summary.starts_with(page.name), "{}", page.name);
    }
}
