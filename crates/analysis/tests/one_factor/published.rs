//! Figures printed in books and papers, to the digits that they are printed with.

use tussock_analysis::coefficients::coefficients;
use tussock_analysis::covariances::box_test;
use tussock_analysis::criteria::{Criteria, criteria};
use tussock_analysis::functions::functions;
use tussock_analysis::hypothesis::{Hypothesis, one_way};
use tussock_analysis::pairs::pairs;
use tussock_analysis::sample::Sample;
use tussock_analysis::univariate::anova;

use crate::support::{Table, sample};

/// Asserts that a number rounds to what was printed.
#[track_caller]
fn prints(found: f64, printed: &str) {
    let decimals = printed.split_once('.').map_or(0, |(_, fraction)| fraction.len());
    let expected: f64 = printed.parse().unwrap();
    let half_unit = 0.5 * 10.0_f64.powi(-(decimals as i32));
    assert!((found - expected).abs() <= half_unit * (1.0 + 1e-9), "{found} is not {printed}");
}

fn data(name: &str, factor: &str) -> Sample {
    Table::read(&format!("data/{name}.csv")).sample(factor).unwrap()
}

fn hypothesis(name: &str, factor: &str) -> Hypothesis {
    one_way(&data(name, factor)).unwrap()
}

fn four(name: &str, factor: &str) -> Criteria {
    criteria(&hypothesis(name, factor), 0.9)
}

/// Johnson & Wichern, Applied Multivariate Statistical Analysis, the small one-way example: 8 units,
/// Λ = 239/6215, which the book rounds to .0385. It prints F = 8.19 from the rounded value; the
/// exact one is 8.1989.
#[test]
fn johnson_and_wichern_small_example() {
    let found = four("jw8", "g");
    assert!((found.wilks.value - 239.0 / 6215.0).abs() < 1e-16);
    prints(found.wilks.test.f, "8.1989");
    assert_eq!((found.wilks.test.df1, found.wilks.test.df2), (4.0, 8.0));
    let sample = data("jw8", "g");
    let outcomes = [(78.0, 10.0), (48.0, 24.0)];
    for (j, (between, within)) in outcomes.into_iter().enumerate() {
        let found = anova(sample.outcome(j), sample.groups(), 3).unwrap();
        assert!((found.ss_between / between - 1.0).abs() < 1e-14);
        assert!((found.ss_within / within - 1.0).abs() < 1e-14);
    }
}

/// Stevens, Applied Multivariate Statistics for the Social Sciences: three groups, two outcomes.
#[test]
fn stevens_three_groups() {
    let found = four("stevens12", "g");
    prints(found.wilks.value, "0.0897");
    prints(found.wilks.test.f, "9.36");
    assert_eq!((found.wilks.test.df1, found.wilks.test.df2), (4.0, 16.0));
    let sample = data("stevens12", "g");
    for (j, (between, within)) in [("61.87", "14.8"), ("19.05", "9.2")].into_iter().enumerate() {
        let found = anova(sample.outcome(j), sample.groups(), 3).unwrap();
        prints(found.ss_between, between);
        prints(found.ss_within, within);
    }
}

/// Apple trees on six rootstocks (Andrews & Herzberg 1985, Data, table 48): Rencher, Methods of
/// Multivariate Analysis, chapter 6.
#[test]
fn rencher_rootstock() {
    let found = four("rootstock", "rootstock");
    prints(found.wilks.value, "0.1540");
    prints(found.wilks.test.f, "4.937");
    assert_eq!(found.wilks.test.df1, 20.0);
    prints(found.wilks.test.df2, "130.3");
    prints(found.pillai.value, "1.305");
    prints(found.hotelling.unwrap().value, "2.921");
    prints(found.roy_theta, "0.652");
    let roots = functions(&hypothesis("rootstock", "rootstock"));
    for (root, printed) in roots.iter().zip(["1.876", "0.791", "0.229", "0.026"]) {
        prints(root.eigenvalue, printed);
    }
    let sample = data("rootstock", "rootstock");
    let first = anova(sample.outcome(0), sample.groups(), 6).unwrap();
    prints(first.ss_between, "0.074");
    prints(first.ss_within, "0.320");
}

/// The same data with the approximations of Pillai (1960) and McKeon (1974), and the bound for Roy's
/// criterion, recomputed from the printed roots.
#[test]
fn rootstock_with_every_approximation() {
    let found = four("rootstock", "rootstock");
    prints(found.pillai.test.f, "4.070");
    assert_eq!((found.pillai.test.df1, found.pillai.test.df2), (20.0, 168.0));
    let hotelling = found.hotelling.unwrap();
    prints(hotelling.value, "2.9214");
    prints(hotelling.test.f, "5.546");
    assert_eq!(hotelling.test.df1, 20.0);
    prints(hotelling.test.df2, "78.6");
    prints(found.roy.test.p.p * 1e8, "1.0");
}

/// Fisher (1936, Annals of Eugenics 7), two species: cross products within, and the coefficients of
/// the discriminant function, which were worked by hand and agree to six decimals.
#[test]
fn fisher_two_species() {
    let iris = data("iris", "species");
    let two: Vec<usize> = iris.groups().iter().copied().filter(|&code| code < 2).collect();
    let kept = |j: usize| iris.outcome(j)[..two.len()].to_vec();
    let outcomes: Vec<Vec<f64>> = (0..4).map(kept).collect();
    let pooled = ["19.1434", "11.8658", "12.2978", "2.4604"];
    for (outcome, printed) in outcomes.iter().zip(pooled) {
        prints(anova(outcome, &two, 2).unwrap().ss_within, printed);
    }
    let hypothesis = one_way(&sample(&outcomes, two, 2).unwrap()).unwrap();
    let raw = coefficients(&hypothesis).raw;
    let printed = [-0.031_151_1, -0.183_907_5, 0.222_104_4, 0.314_737_0];
    // The printed function has another scale: that of the inverse of the cross products.
    let scale = printed.iter().zip(raw.column(0).iter()).map(|(a, b)| a * b).sum::<f64>()
        / raw.norm_squared();
    for (printed, weight) in printed.iter().zip(raw.column(0).iter()) {
        assert!((weight * scale - printed).abs() < 1e-6, "{} {printed}", weight * scale);
    }
}

/// Fisher's three species of iris, as they are printed in many multivariate textbooks.
#[test]
fn fisher_three_species() {
    let found = four("iris", "species");
    prints(found.wilks.value, "0.0234");
    prints(found.wilks.test.f, "199.15");
    assert_eq!((found.wilks.test.df1, found.wilks.test.df2), (8.0, 288.0));
    prints(found.pillai.value, "1.192");
    prints(found.hotelling.unwrap().value, "32.477");
    let roots = functions(&hypothesis("iris", "species"));
    prints(roots[0].eigenvalue, "32.192");
    prints(roots[1].eigenvalue, "0.285");
    prints(roots[0].canonical, "0.985");
    prints(roots[1].canonical, "0.471");
    let found = box_test(&data("iris", "species")).unwrap();
    prints(found.chi_square, "140.94");
    assert_eq!(found.df, 20.0);
}

/// The same data in more detail: values that two independent computations agree on.
#[test]
fn iris_in_detail() {
    let found = four("iris", "species");
    prints(found.wilks.value, "0.023439");
    prints(found.wilks.test.f, "199.145");
    prints(found.pillai.value, "1.191899");
    prints(found.pillai.test.f, "53.466");
    assert_eq!((found.pillai.test.df1, found.pillai.test.df2), (8.0, 290.0));
    let hotelling = found.hotelling.unwrap();
    prints(hotelling.value, "32.47732");
    prints(hotelling.test.f, "582.197");
    assert_eq!(hotelling.test.df1, 8.0);
    prints(hotelling.test.df2, "203.4");

    let hypothesis = hypothesis("iris", "species");
    let found = functions(&hypothesis);
    prints(found[0].eigenvalue, "32.19193");
    prints(found[1].eigenvalue, "0.28539");
    prints(100.0 * found[0].share, "99.12");
    prints(100.0 * found[1].share, "0.88");
    prints(found[0].canonical, "0.98482");
    prints(found[1].canonical, "0.47120");
    prints(found[1].wilks, "0.77797");
    prints(found[1].test.f, "13.794");
    assert_eq!((found[1].test.df1, found[1].test.df2), (3.0, 145.0));

    let found = coefficients(&hypothesis);
    let standardized = ["-0.427", "-0.521", "0.947", "0.575"];
    let structure = ["0.223", "-0.119", "0.706", "0.633"];
    let share = ["-0.095", "0.062", "0.669", "0.364"];
    for i in 0..4 {
        prints(found.standardized[(i, 0)], standardized[i]);
        prints(found.structure[(i, 0)], structure[i]);
        prints(found.share[(i, 0)], share[i]);
    }

    let found = box_test(&data("iris", "species")).unwrap();
    prints(found.m, "146.663");
    prints(found.chi_square, "140.943");
    prints(found.f.f, "7.045");
    assert_eq!(found.f.df1, 20.0);
    prints(found.f.df2, "77566.75");
}

/// Egyptian skulls of five periods (Thomson & Randall-Maciver 1905, The Ancient Races of the
/// Thebaid): Manly, Multivariate Statistical Methods.
#[test]
fn manly_egyptian_skulls() {
    let found = four("skulls", "epoch");
    prints(found.wilks.value, "0.664");
    prints(found.wilks.test.f, "3.90");
    assert_eq!(found.wilks.test.df1, 16.0);
    prints(found.wilks.test.df2, "434.5");
    prints(found.pillai.value, "0.353");
    prints(found.hotelling.unwrap().value, "0.482");
    prints(found.roy.value, "0.425");
    let found = box_test(&data("skulls", "epoch")).unwrap();
    prints(found.f.f, "1.14");
    assert_eq!(found.f.df1, 40.0);
    // The book prints 46379; the exact value is 46378.68.
    prints(found.f.df2, "46379");
}

/// NIST/SEMATECH e-Handbook of Statistical Methods, section 7.4.3: three levels, five units each.
#[test]
fn handbook_one_way_analysis() {
    let values = [6.9, 5.4, 5.8, 4.6, 4.0, 8.3, 6.8, 7.8, 9.2, 6.5, 8.0, 10.5, 8.1, 6.9, 9.3];
    let groups: Vec<usize> = (0..15).map(|unit| unit / 5).collect();
    let found = anova(&values, &groups, 3).unwrap();
    prints(found.ss_between, "27.897");
    prints(found.ss_within, "17.452");
    prints(found.test.f, "9.59");
    assert_eq!((found.test.df1, found.test.df2), (2.0, 12.0));
}

/// Hedges (1981), table 1: the correction c(m) to four decimals.
#[test]
fn hedges_corrections() {
    let printed = [
        (2, "0.5642"),
        (3, "0.7236"),
        (4, "0.7979"),
        (6, "0.8686"),
        (8, "0.9027"),
        (12, "0.9359"),
        (20, "0.9619"),
        (30, "0.9748"),
        (50, "0.9849"),
    ];
    for (df, expected) in printed {
        // Two groups of which only the sizes matter.
        let groups: Vec<usize> = (0..df + 2).map(|unit| usize::from(unit >= 1)).collect();
        let values: Vec<f64> = (0..df + 2).map(|unit| f64::from(unit * unit % 7)).collect();
        prints(pairs(&values, &groups, 2, 0.95).unwrap().correction, expected);
    }
}
