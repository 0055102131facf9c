//! What the distributions must satisfy at any point.

use tussock_analysis::distribution::{
    Tails, central_f, chi_square, hedges, incomplete_beta, incomplete_gamma, noncentral_f,
    noncentral_t, student_t,
};
use tussock_analysis::test::PValue;

const DFS: [f64; 9] = [0.4, 1.0, 2.5, 8.0, 76.0, 999.5, 2e4, 1e6, f64::INFINITY];
const FS: [f64; 13] = [1e-9, 1e-3, 0.1, 0.6, 0.97, 1.0, 1.001, 1.05, 1.7, 4.0, 30.0, 2e3, 1e8];
const TS: [f64; 11] = [-2e3, -40.0, -6.0, -1.5, -0.02, 0.0, 0.3, 2.0, 9.0, 33.0, 1e4];
const DELTAS: [f64; 9] = [-70.0, -9.0, -2.0, -0.01, 0.0, 0.5, 3.0, 20.0, 120.0];
const LAMBDAS: [f64; 9] = [0.0, 1e-12, 0.3, 4.0, 60.0, 1e3, 1.9e4, 3e5, 1e8];

fn relative_error(value: f64, truth: f64) -> f64 {
    if value == truth { 0.0 } else { (value / truth - 1.0).abs() }
}

/// Every finite triple of degrees of freedom and a point of F.
fn f_points() -> impl Iterator<Item = (f64, f64, f64)> {
    DFS.into_iter().flat_map(|df1| {
        DFS.into_iter().flat_map(move |df2| FS.into_iter().map(move |f| (f, df1, df2)))
    })
}

/// Checks one pair of tails for itself.
fn assert_sound(tails: Tails, at: &str) {
    let (lower, upper) = (tails.lower, tails.upper);
    assert!((lower.p + upper.p - 1.0).abs() <= f64::EPSILON, "{at}: {tails:?} do not add up to 1");
    for tail in [lower, upper] {
        assert!((0.0..=1.0).contains(&tail.p), "{at}: {tail:?} is no probability");
        assert!(tail.ln_p <= 0.0, "{at}: {tail:?} is no logarithm of a probability");
        if tail.p > 1e-300 {
            let error = (tail.ln_p.exp() / tail.p - 1.0).abs();
            assert!(error <= 1e-13, "{at}: {tail:?} disagree by {error:e}");
        }
    }
}

#[test]
fn both_tails_are_probabilities_and_add_up_to_one() {
    for (f, df1, df2) in f_points() {
        assert_sound(central_f::tails(f, df1, df2), &format!("F {f} {df1} {df2}"));
        for lambda in LAMBDAS {
            let tails = noncentral_f::tails(f, df1, df2, lambda);
            assert_sound(tails, &format!("noncentral F {f} {df1} {df2} {lambda}"));
        }
    }
    for df in DFS {
        for t in TS {
            for delta in DELTAS {
                let tails = noncentral_t::tails(t, df, delta);
                assert_sound(tails, &format!("noncentral t {t} {df} {delta}"));
            }
        }
        for x in FS {
            assert_sound(incomplete_gamma::tails(0.5 * df.min(1e9), x * 10.0), "gamma");
        }
    }
}

/// Checks that the logarithms fall along a sequence, up to rounding.
fn assert_falling(values: impl Iterator<Item = f64>, what: &str) {
    let mut previous = f64::INFINITY;
    for (index, value) in values.enumerate() {
        let slack = if value.is_finite() { 4e-15 * (1.0 + value.abs()) } else { 0.0 };
        assert!(value <= previous + slack, "{what} rises at {index}: {previous} to {value}");
        previous = value;
    }
}

/// Points closely around a centre and wide of it, rising.
fn ladder(centre: f64, spread: f64) -> impl Iterator<Item = f64> {
    (-400..=400).map(move |step| {
        let u = f64::from(step) / 50.0;
        centre * (spread * u.sinh() / 20.0).exp()
    })
}

#[test]
fn tails_of_f_fall_as_f_rises_across_every_change_of_method() {
    for df1 in DFS {
        for df2 in DFS {
            let spread = (2.0 / df1 + 2.0 / df2).sqrt().min(2.0);
            let upper = ladder(1.0, spread).map(|f| central_f::survival(f, df1, df2).ln_p);
            assert_falling(upper, &format!("the upper tail of F {df1} {df2}"));
            let lower = ladder(1.0, -spread).map(|f| central_f::tails(f, df1, df2).lower.ln_p);
            assert_falling(lower, &format!("the lower tail of F {df1} {df2}"));
        }
    }
}

#[test]
fn noncentral_tails_fall_with_the_statistic_and_rise_with_the_noncentrality() {
    for (df1, df2, lambda) in [
        (1.0, 10.0, 3.0),
        (4.0, 95.0, 40.0),
        (30.0, 1e5, 900.0),
        (2.0, 5e3, 4.1e4),
        (3.5, 7.5, 1e9),
    ] {
        let what = format!("noncentral F {df1} {df2} {lambda}");
        let centre = 1.0 + lambda / df1;
        let upper = ladder(centre, 0.3).map(|f| noncentral_f::survival(f, df1, df2, lambda).ln_p);
        assert_falling(upper, &what);
        let lower = ladder(lambda, 0.3)
            .map(|lambda| noncentral_f::cumulative(centre, df1, df2, lambda).ln_p);
        assert_falling(lower, &what);
    }
    for (df, delta) in [(3.0, 2.0), (38.0, -1.0), (1e6, 4.0), (12.5, 90.0)] {
        let points = |sign: f64| (-300..=300).map(move |k| sign * f64::from(k) / 10.0);
        let upper = points(1.0).map(|t| noncentral_t::survival(delta + t, df, delta).ln_p);
        assert_falling(upper, &format!("noncentral t {df} {delta}"));
        let lower =
            points(1.0).map(|shift| noncentral_t::cumulative(delta, df, delta + shift).ln_p);
        assert_falling(lower, &format!("noncentral t {df} {delta} in delta"));
    }
}

/// Checks that two routes to the same tail agree.
fn assert_same(one: PValue, other: PValue, at: &str) {
    // Of a tail near 1 the logarithm is as uncertain as the other tail.
    let close = if one.p < 0.5 {
        relative_error(one.ln_p, other.ln_p) <= 1e-13
    } else {
        (one.p - other.p).abs() <= 1e-14
    };
    assert!(close, "{at}: {one:?} and {other:?}");
}

#[test]
fn f_and_its_reciprocal_exchange_tails_and_degrees_of_freedom() {
    for (f, df1, df2) in f_points().filter(|(_, df1, df2)| df1.is_finite() || df2.is_finite()) {
        // Powers of two have exact reciprocals.
        let f = f.log2().round().exp2();
        let (one, other) = (central_f::tails(f, df1, df2), central_f::tails(1.0 / f, df2, df1));
        assert_same(one.lower, other.upper, &format!("F {f} {df1} {df2}"));
        assert_same(one.upper, other.lower, &format!("F {f} {df1} {df2}"));
    }
}

#[test]
fn the_square_of_t_is_f_with_one_df_above() {
    for df in DFS {
        for t in TS {
            let (t_tail, f_tail) =
                (student_t::two_sided(t, df), central_f::survival(t * t, 1.0, df));
            assert_same(t_tail, f_tail, &format!("t {t} {df}"));
        }
    }
}

#[test]
fn noncentral_t_without_noncentrality_is_t() {
    for df in DFS {
        for t in TS {
            let one_sided = noncentral_t::tails(-t.abs(), df, 0.0).lower.ln_p;
            let two_sided = student_t::two_sided(t, df).ln_p;
            let error = relative_error(one_sided + std::f64::consts::LN_2, two_sided);
            let absolute = (one_sided + std::f64::consts::LN_2 - two_sided).abs();
            assert!(error <= 1e-13 || absolute <= 2e-15, "t {t}, df {df}: error {error:e}");
        }
    }
}

#[test]
fn noncentral_f_without_noncentrality_is_f() {
    for (f, df1, df2) in f_points() {
        let central = central_f::tails(f, df1, df2);
        assert_eq!(noncentral_f::tails(f, df1, df2, 0.0), central, "{f} {df1} {df2}");
        let nearly = noncentral_f::tails(f, df1, df2, 1e-300);
        assert_same(nearly.lower, central.lower, &format!("{f} {df1} {df2}"));
        assert_same(nearly.upper, central.upper, &format!("{f} {df1} {df2}"));
    }
}

#[test]
fn noncentral_t_is_symmetric() {
    for df in DFS {
        for t in TS {
            for delta in DELTAS {
                let (one, other) =
                    (noncentral_t::tails(t, df, delta), noncentral_t::tails(-t, df, -delta));
                if t == delta {
                    // Which tail is computed depends on the side, so the last digits may differ.
                    let error = relative_error(one.lower.p, other.upper.p);
                    assert!(error <= 1e-14, "{t} {df} {delta}: error {error:e}");
                } else {
                    assert_eq!(one.lower, other.upper, "{t} {df} {delta}");
                    assert_eq!(one.upper, other.lower, "{t} {df} {delta}");
                }
            }
        }
    }
}

/// Two unrelated methods, quadrature and a Poisson mixture, for the same probability.
#[test]
fn the_square_of_noncentral_t_is_noncentral_f_with_one_df_above() {
    for df in DFS {
        for t in [0.02, 0.3, 2.0, 9.0, 33.0, 300.0, 1e4] {
            for delta in [0.5, 3.0, 20.0, 120.0, 300.0, 1e4] {
                let f = noncentral_f::tails(t * t, 1.0, df, delta * delta);
                let above = noncentral_t::survival(t, df, delta);
                let below = noncentral_t::cumulative(-t, df, delta);
                let error = if above.p < 0.5 {
                    relative_error(
                        f.upper.ln_p,
                        above.ln_p + (below.ln_p - above.ln_p).exp().ln_1p(),
                    )
                } else {
                    (f.upper.p - above.p - below.p).abs()
                };
                // The square of t, once rounded, moves the point by up to t·10⁻¹⁶ of its spread.
                let allowed = 1e-13 + 1e-16 * t.max(delta);
                assert!(error <= allowed, "t {t}, df {df}, delta {delta}: error {error:e}");
            }
        }
    }
}

#[test]
fn chi_square_is_the_limit_of_f() {
    for df in DFS.into_iter().filter(|df| df.is_finite() && *df < 1e4) {
        for x in [0.1, 1.0, 3.0, 8.0] {
            let f = x / df;
            let limit = chi_square::survival(x, df);
            assert_eq!(central_f::survival(f, df, f64::INFINITY).p, {
                let exact = chi_square::survival(df * f, df);
                exact.p
            });
            let near = central_f::survival(f, df, 1e13);
            assert!((near.p - limit.p).abs() <= 1e-11, "df {df}, x {x}: {near:?} {limit:?}");
            let noncentral = noncentral_f::survival(f, df, f64::INFINITY, 5.0);
            let near = noncentral_f::survival(f, df, 1e13, 5.0);
            assert!((near.p - noncentral.p).abs() <= 1e-11, "df {df}, x {x}");
        }
    }
}

#[test]
fn raising_a_parameter_moves_the_incomplete_beta_by_one_term() {
    // I_x(a, b) = x I_x(a − 1, b) + y I_x(a, b − 1) (Abramowitz & Stegun 1964, 26.5.10).
    for a in [1.3, 4.0, 60.5, 2999.5, 3e5] {
        for b in [1.1, 7.0, 250.0, 4000.0, 1e6] {
            for ratio in [0.2, 0.8, 0.99, 1.0, 1.02, 1.5, 5.0] {
                let (left, right) = (a * ratio, b);
                let (x, y) = (left / (left + right), right / (left + right));
                let whole = incomplete_beta::tails(a, b, x, y);
                let (one, other) = (
                    incomplete_beta::tails(a - 1.0, b, x, y),
                    incomplete_beta::tails(a, b - 1.0, x, y),
                );
                for (value, parts) in [
                    (whole.lower.p, x * one.lower.p + y * other.lower.p),
                    (whole.upper.p, x * one.upper.p + y * other.upper.p),
                ] {
                    let close = relative_error(value, parts) <= 2e-12 || value < 1e-290;
                    assert!(close, "a {a}, b {b}, ratio {ratio}: {value:e} {parts:e}");
                }
            }
        }
    }
}

#[test]
fn limits_of_delta_put_the_tail_where_it_belongs() {
    for df in DFS {
        for t in [-300.0, -4.0, -0.3, 0.0, 1e-3, 2.1, 17.0, 1e5] {
            for level in [0.5, 0.9, 0.95, 0.999_999] {
                let limits = noncentral_t::limits(t, df, level);
                let tail = 0.5 * (1.0 - level);
                assert!(limits.lower < limits.upper, "t {t}, df {df}: {limits:?}");
                let above = noncentral_t::survival(t, df, limits.lower).p;
                let below = noncentral_t::cumulative(t, df, limits.upper).p;
                for value in [above, below] {
                    // A limit is a double, and one unit in its last place moves the tail.
                    let allowed = 1e-12 + 1e-15 * limits.upper.abs().max(limits.lower.abs()) * 10.0;
                    let error = relative_error(value, tail);
                    assert!(error <= allowed, "t {t}, df {df}, level {level}: error {error:e}");
                }
                let mirrored = noncentral_t::limits(-t, df, level);
                assert_eq!((mirrored.lower, mirrored.upper), (-limits.upper, -limits.lower));
            }
        }
    }
}

#[test]
fn limits_of_lambda_put_the_tail_where_it_belongs_or_are_zero() {
    for (f, df1, df2) in f_points().filter(|(f, df1, _)| df1.is_finite() && *f >= 0.1) {
        for level in [0.8, 0.95] {
            let limits = noncentral_f::limits(f, df1, df2, level);
            let tail = 0.5 * (1.0 - level);
            assert!(limits.lower <= limits.upper, "{f} {df1} {df2}: {limits:?}");
            let central = central_f::tails(f, df1, df2);
            let above = noncentral_f::survival(f, df1, df2, limits.lower).p;
            let below = noncentral_f::cumulative(f, df1, df2, limits.upper).p;
            for (limit, is_zero, value) in [
                (limits.lower, central.upper.p >= tail, above),
                (limits.upper, central.lower.p <= tail, below),
            ] {
                assert_eq!(limit == 0.0, is_zero, "{f} {df1} {df2}: {limits:?}");
                // A limit is a double, and one unit in its last place moves the tail.
                let allowed = 1e-12 + 1e-15 * limit.sqrt();
                let close = is_zero || relative_error(value, tail) <= allowed;
                assert!(close, "{f} {df1} {df2}, level {level}: {limits:?} {value}");
            }
        }
    }
}

#[test]
fn limits_exist_for_the_largest_statistics() {
    for f in [1e10, 1e20, 1e100, 1e300] {
        let limits = noncentral_f::limits(f, 3.0, 76.0, 0.9);
        assert!(0.3 * f < limits.lower && limits.lower < 3.0 * f, "{f}: {limits:?}");
        assert!(3.0 * f < limits.upper && limits.upper < 6.0 * f, "{f}: {limits:?}");
        let limits = noncentral_t::limits(f, 76.0, 0.95);
        assert!(0.5 * f < limits.lower && limits.lower < f, "{f}: {limits:?}");
        assert!(f < limits.upper && limits.upper < 2.0 * f, "{f}: {limits:?}");
    }
}

#[test]
fn the_ends_of_the_scale_have_their_limits() {
    let infinity = f64::INFINITY;
    assert_eq!(central_f::survival(0.0, 3.0, 20.0).p, 1.0);
    assert_eq!(central_f::survival(-1.0, 3.0, 20.0).p, 1.0);
    let beyond = central_f::survival(infinity, 3.0, 20.0);
    assert_eq!((beyond.p, beyond.ln_p), (0.0, f64::NEG_INFINITY));
    assert_eq!(central_f::survival(0.999, infinity, infinity).p, 1.0);
    assert_eq!(central_f::survival(1.001, infinity, infinity).p, 0.0);
    assert_eq!(chi_square::survival(0.0, 3.0).p, 1.0);
    assert_eq!(chi_square::survival(infinity, 3.0).ln_p, f64::NEG_INFINITY);
    assert_eq!(student_t::two_sided(0.0, 3.0).p, 1.0);
    assert_eq!(student_t::two_sided(-infinity, 3.0).p, 0.0);
    assert_eq!(student_t::quantile(0.0, 3.0), -infinity);
    assert_eq!(student_t::quantile(0.5, 3.0), 0.0);
    assert_eq!(student_t::quantile(1.0, 3.0), infinity);
    assert_eq!(noncentral_t::cumulative(infinity, 3.0, 1.0).p, 1.0);
    assert_eq!(noncentral_t::cumulative(3.0, 3.0, infinity).p, 0.0);
    assert_eq!(noncentral_t::cumulative(3.0, 3.0, -infinity).p, 1.0);
    assert_eq!(noncentral_f::survival(3.0, 3.0, 9.0, infinity).p, 1.0);
    assert_eq!(noncentral_f::survival(infinity, 3.0, 9.0, 5.0).p, 0.0);
    assert_eq!(noncentral_t::limits(infinity, 3.0, 0.9).lower, infinity);
    assert_eq!(noncentral_t::limits(2.0, 3.0, 1.0).upper, infinity);
    assert_eq!(noncentral_t::limits(2.0, 3.0, 1.0).lower, -infinity);
    assert_eq!(noncentral_f::limits(2.0, 3.0, 9.0, 1.0).lower, 0.0);
    assert_eq!(noncentral_f::limits(2.0, 3.0, 9.0, 1.0).upper, infinity);
    assert_eq!(noncentral_f::limits(infinity, 3.0, 9.0, 0.9).lower, infinity);
    assert_eq!(hedges::correction(1.0), 0.0);
    assert_eq!(hedges::correction(infinity), 1.0);
}

#[test]
fn only_an_undefined_argument_gives_an_undefined_result() {
    let nan = f64::NAN;
    assert!(central_f::survival(nan, 1.0, 2.0).p.is_nan());
    assert!(central_f::survival(1.0, nan, 2.0).ln_p.is_nan());
    assert!(central_f::survival(1.0, 1.0, 0.0).p.is_nan());
    assert!(chi_square::survival(nan, 1.0).p.is_nan());
    assert!(student_t::two_sided(1.0, nan).p.is_nan());
    assert!(student_t::quantile(1.5, 3.0).is_nan());
    assert!(noncentral_t::survival(1.0, 2.0, nan).p.is_nan());
    assert!(noncentral_f::survival(1.0, 2.0, 3.0, nan).p.is_nan());
    assert!(noncentral_f::survival(1.0, 2.0, 3.0, -1.0).p.is_nan());
    assert!(noncentral_t::limits(1.0, nan, 0.9).lower.is_nan());
    assert!(noncentral_f::limits(1.0, 2.0, 3.0, 1.2).upper.is_nan());
    assert!(hedges::correction(nan).is_nan());
    let extremes = [0.0, 5e-324, 1e-300, 1e-20, 1.0, 1e20, 1e150, 1e300, f64::MAX, f64::INFINITY];
    let dfs = [1e-3, 1.0, 77.0, 1e9, f64::INFINITY];
    for point in extremes {
        for df1 in dfs {
            assert!(!student_t::two_sided(point, df1).ln_p.is_nan(), "t {point} {df1}");
            assert!(!chi_square::survival(point, df1).ln_p.is_nan(), "chi-square {point} {df1}");
            for shift in extremes {
                for sign in [-1.0, 1.0] {
                    let p = noncentral_t::survival(point, df1, sign * shift);
                    assert!(!p.ln_p.is_nan(), "noncentral t {point} {df1} {sign} {shift}");
                }
                for df2 in dfs {
                    let p = noncentral_f::survival(point, df1, df2, shift);
                    assert!(!p.ln_p.is_nan(), "noncentral F {point} {df1} {df2} {shift}");
                }
            }
            for df2 in dfs {
                assert!(!central_f::survival(point, df1, df2).ln_p.is_nan(), "{point} {df1} {df2}");
                let limits = noncentral_f::limits(point, df1, df2, 0.9);
                assert!(!limits.lower.is_nan() && !limits.upper.is_nan(), "{point} {df1} {df2}");
            }
            let limits = noncentral_t::limits(point, df1, 0.9);
            assert!(!limits.lower.is_nan() && !limits.upper.is_nan(), "{point} {df1}");
        }
    }
}
