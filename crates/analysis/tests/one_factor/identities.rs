//! What must hold for every sample, whatever its numbers.

use nalgebra::{DMatrix, DVector};
use tussock_analysis::centroids::{centroids, scores};
use tussock_analysis::coefficients::coefficients;
use tussock_analysis::correlations::correlate;
use tussock_analysis::covariances::{box_test, log_determinants};
use tussock_analysis::criteria::{Criteria, Criterion, Exactness, criteria};
use tussock_analysis::distribution::noncentral_f;
use tussock_analysis::functions::functions;
use tussock_analysis::hypothesis::{Hypothesis, one_way};
use tussock_analysis::pairs::pairs;
use tussock_analysis::sample::Sample;
use tussock_analysis::univariate::{Anova, anova};

use crate::support::{Scatter, Table, columns, sample};

const LEVEL: f64 = 0.9;

/// Invented samples of many shapes, and published ones.
fn samples() -> Vec<Sample> {
    let shapes: [(&[usize], usize); 9] = [
        (&[4, 5], 1),
        (&[6, 3], 3),
        (&[5, 5, 5], 2),
        (&[3, 9, 4], 5),
        (&[2, 1, 6, 4], 3),
        (&[7, 7, 7, 7, 7], 2),
        (&[10, 12, 9, 11, 8, 13], 6),
        (&[3; 12], 4),
        (&[90, 170, 300], 7),
    ];
    let mut scatter = Scatter::new(1);
    let mut samples: Vec<Sample> =
        shapes.iter().map(|(sizes, outcomes)| scatter.sample(sizes, *outcomes)).collect();
    for (file, factor) in [("iris", "species"), ("skulls", "epoch"), ("wine", "cultivar")] {
        samples.push(Table::read(&format!("data/{file}.csv")).sample(factor).unwrap());
    }
    samples
}

#[track_caller]
fn close(found: f64, expected: f64, tolerance: f64) {
    let error = (found - expected).abs() / expected.abs().max(1e-300);
    assert!(error <= tolerance, "{found:e} is not {expected:e}: off by {error:.1e}");
}

/// Agreement of numbers of the order of 1, some of which may be near 0.
#[track_caller]
fn near(found: f64, expected: f64, tolerance: f64) {
    assert!((found - expected).abs() <= tolerance, "{found:e} is not {expected:e}");
}

fn one_of_four(found: &Criteria) -> [Criterion; 4] {
    [found.wilks, found.pillai, found.hotelling.unwrap(), found.roy]
}

fn analyse(sample: &Sample, outcome: usize) -> Anova {
    anova(sample.outcome(outcome), sample.groups(), sample.group_count()).unwrap()
}

fn same_roots(first: &Hypothesis, second: &Hypothesis, tolerance: f64) {
    assert_eq!(first.dimensions(), second.dimensions());
    for (a, b) in first.roots().iter().zip(second.roots()) {
        close(*a, *b, tolerance);
    }
}

#[test]
fn roots_and_scores_do_not_change_with_the_coordinates_of_the_outcomes() {
    let mut scatter = Scatter::new(2);
    for base in samples() {
        let p = base.outcome_count();
        let mixing = DMatrix::from_fn(p, p, |i, j| {
            scatter.next() + if i == j { 2.0 + i as f64 } else { 0.0 }
        });
        let outcomes = DMatrix::from_fn(base.units(), p, |unit, j| base.outcome(j)[unit]);
        let mixed = (outcomes * mixing).add_scalar(17.0);
        let mixed = Sample::new(mixed, base.groups().to_vec(), base.group_count()).unwrap();
        let (before, after) = (one_way(&base).unwrap(), one_way(&mixed).unwrap());
        same_roots(&before, &after, 1e-10);
        let scores_before = scores(&base, &coefficients(&before));
        let scores_after = scores(&mixed, &coefficients(&after));
        for (a, b) in scores_before.column_iter().zip(scores_after.column_iter()) {
            let sign = a.dot(&b).signum();
            assert!((a - b * sign).amax() < 1e-9);
        }
        if let (Ok(before), Ok(after)) = (box_test(&base), box_test(&mixed)) {
            close(after.m, before.m, 1e-9);
            close(after.f.f, before.f.f, 1e-9);
        }
    }
}

#[test]
fn scaling_outcomes_changes_only_raw_coefficients() {
    for base in samples() {
        let scale = |j: usize| [1000.0, 0.01, 3.0][j % 3];
        let scaled: Vec<Vec<f64>> = columns(&base)
            .iter()
            .enumerate()
            .map(|(j, column)| column.iter().map(|y| scale(j) * y - 5.0).collect())
            .collect();
        let scaled = sample(&scaled, base.groups().to_vec(), base.group_count()).unwrap();
        let before = coefficients(&one_way(&base).unwrap());
        let after = coefficients(&one_way(&scaled).unwrap());
        assert!((&before.standardized - &after.standardized).amax() < 1e-10);
        assert!((&before.structure - &after.structure).amax() < 1e-10);
        for (j, (before, after)) in before.raw.row_iter().zip(after.raw.row_iter()).enumerate() {
            assert!((before - after * scale(j)).amax() < 1e-9 * before.amax());
        }
    }
}

#[test]
fn the_order_of_units_and_of_groups_does_not_matter() {
    for base in samples() {
        let (n, k) = (base.units(), base.group_count());
        // A step that shares no divisor with n visits every unit once.
        let step =
            (n / 2..).find(|step| (1..=n).filter(|i| i * step % n == 0).count() == 1).unwrap();
        let order: Vec<usize> = (0..n).map(|unit| unit * step % n).collect();
        let shuffled: Vec<Vec<f64>> = columns(&base)
            .iter()
            .map(|column| order.iter().map(|&unit| column[unit]).collect())
            .collect();
        let reversed = order.iter().map(|&unit| k - 1 - base.groups()[unit]).collect();
        let shuffled = sample(&shuffled, reversed, k).unwrap();
        let (before, after) = (one_way(&base).unwrap(), one_way(&shuffled).unwrap());
        same_roots(&before, &after, 1e-11);
        let (before, after) = (coefficients(&before), coefficients(&after));
        assert!((&before.standardized - &after.standardized).amax() < 1e-10);
        let before = centroids(&base, &scores(&base, &before));
        let after = centroids(&shuffled, &scores(&shuffled, &after));
        for (a, b) in before.iter().flatten().zip(after.iter().rev().flatten()) {
            near(a.mean, b.mean, 1e-10);
        }
        for j in 0..base.outcome_count() {
            close(analyse(&shuffled, j).test.f, analyse(&base, j).test.f, 1e-12);
        }
    }
}

#[test]
fn scores_have_unit_variance_within_groups_are_uncorrelated_and_centred() {
    for base in samples() {
        let hypothesis = one_way(&base).unwrap();
        let scores = scores(&base, &coefficients(&hypothesis));
        let columns: Vec<Vec<f64>> =
            scores.column_iter().map(|column| column.iter().copied().collect()).collect();
        for column in &columns {
            near(column.iter().sum::<f64>() / base.units() as f64, 0.0, 1e-11);
        }
        let found =
            correlate(&sample(&columns, base.groups().to_vec(), base.group_count()).unwrap());
        let identity = DMatrix::identity(columns.len(), columns.len());
        assert!((&found.within - &identity).amax() < 1e-11);
        assert!((&found.total - &identity).amax() < 1e-11);
        for sd in found.within_sd {
            close(sd, 1.0, 1e-12);
        }
        let groups = centroids(&base, &scores);
        for j in 0..columns.len() {
            let weighted = groups.iter().map(|group| group[j].n as f64 * group[j].mean);
            near(weighted.sum::<f64>() / base.units() as f64, 0.0, 1e-11);
        }
    }
}

#[test]
fn the_variance_of_a_score_between_groups_is_its_root() {
    for base in samples() {
        let hypothesis = one_way(&base).unwrap();
        let scores = scores(&base, &coefficients(&hypothesis));
        let found = functions(&hypothesis);
        for (function, column) in found.iter().zip(scores.column_iter()) {
            let column: Vec<f64> = column.iter().copied().collect();
            let analysis = anova(&column, base.groups(), base.group_count()).unwrap();
            close(analysis.ss_between / analysis.ss_within, function.eigenvalue, 1e-10);
            close(analysis.eta2, function.canonical.powi(2), 1e-10);
        }
    }
}

#[test]
fn effects_and_error_factor_have_the_cross_products_of_hypothesis_and_error() {
    for base in samples() {
        let hypothesis = one_way(&base).unwrap();
        let effects = hypothesis.effects();
        let error = hypothesis.error_factor();
        let within = correlate(&base).within;
        for j in 0..base.outcome_count() {
            let analysis = analyse(&base, j);
            close(effects.column(j).norm_squared(), analysis.ss_between, 1e-12);
            close(error.column(j).norm_squared(), analysis.ss_within, 1e-12);
            let unit = |j: usize| error.column(j).normalize();
            near(unit(0).dot(&unit(j)), within[(0, j)], 1e-12);
        }
    }
}

#[test]
fn shares_of_every_function_sum_to_one() {
    for base in samples() {
        let hypothesis = one_way(&base).unwrap();
        for column in coefficients(&hypothesis).share.column_iter() {
            near(column.sum(), 1.0, 1e-12);
        }
        near(functions(&hypothesis).iter().map(|function| function.share).sum(), 1.0, 1e-14);
    }
}

#[test]
fn structure_weighted_by_the_roots_restates_the_univariate_tests() {
    for base in samples() {
        let hypothesis = one_way(&base).unwrap();
        let structure = coefficients(&hypothesis).structure;
        for (j, row) in structure.row_iter().enumerate() {
            let sum: f64 = row.iter().zip(hypothesis.roots()).map(|(r, root)| r * r * root).sum();
            let test = analyse(&base, j).test;
            close(sum, test.f * test.df1 / test.df2, 1e-10);
        }
    }
}

#[test]
fn canonical_correlations_and_total_structure_give_the_univariate_effect_sizes() {
    for base in samples() {
        let hypothesis = one_way(&base).unwrap();
        let scores = scores(&base, &coefficients(&hypothesis));
        let mut both = columns(&base);
        both.extend(scores.column_iter().map(|column| column.iter().copied().collect::<Vec<_>>()));
        let total =
            correlate(&sample(&both, base.groups().to_vec(), base.group_count()).unwrap()).total;
        let p = base.outcome_count();
        let found = functions(&hypothesis);
        for j in 0..p {
            let sum: f64 = found
                .iter()
                .enumerate()
                .map(|(i, function)| (function.canonical * total[(j, p + i)]).powi(2))
                .sum();
            close(sum, analyse(&base, j).eta2, 1e-10);
        }
    }
}

#[test]
fn structure_is_the_correlation_of_outcomes_and_scores_within_groups() {
    for base in samples() {
        let found = coefficients(&one_way(&base).unwrap());
        let mut both = columns(&base);
        let scores = scores(&base, &found);
        both.extend(scores.column_iter().map(|column| column.iter().copied().collect::<Vec<_>>()));
        let within =
            correlate(&sample(&both, base.groups().to_vec(), base.group_count()).unwrap()).within;
        let p = base.outcome_count();
        for i in 0..p {
            for j in 0..found.structure.ncols() {
                near(found.structure[(i, j)], within[(i, p + j)], 1e-11);
            }
        }
    }
}

#[test]
fn the_largest_standardized_coefficient_of_every_function_is_positive() {
    for base in samples() {
        for column in coefficients(&one_way(&base).unwrap()).standardized.column_iter() {
            assert_eq!(column.amax(), column.max());
        }
    }
}

#[test]
fn the_first_test_of_dimensions_is_that_of_wilks() {
    for base in samples() {
        let hypothesis = one_way(&base).unwrap();
        let omnibus = criteria(&hypothesis, LEVEL).wilks;
        let found = functions(&hypothesis);
        assert_eq!(found[0].test, omnibus.test);
        assert_eq!(found[0].exactness, omnibus.exactness);
        assert_eq!(found[0].wilks, omnibus.value);
        assert!(found.iter().skip(1).all(|later| later.exactness == Exactness::Approximate));
        assert!(found.windows(2).all(|pair| pair[0].eigenvalue >= pair[1].eigenvalue));
        assert!(found.windows(2).all(|pair| pair[0].wilks <= pair[1].wilks));
    }
}

#[test]
fn exactness_follows_the_number_of_dimensions() {
    for base in samples() {
        let hypothesis = one_way(&base).unwrap();
        let found = criteria(&hypothesis, LEVEL);
        let (one, two) = (hypothesis.dimensions() == 1, hypothesis.dimensions() <= 2);
        let otherwise = |exact, other| if exact { Exactness::Exact } else { other };
        assert_eq!(found.wilks.exactness, otherwise(two, Exactness::Approximate));
        assert_eq!(found.pillai.exactness, otherwise(one, Exactness::Approximate));
        assert_eq!(found.hotelling.unwrap().exactness, otherwise(one, Exactness::Approximate));
        assert_eq!(found.roy.exactness, otherwise(one, Exactness::Bound));
        assert_eq!(found.roy.eta2_interval.is_some(), one);
    }
}

#[test]
fn one_dimension_has_one_exact_test_whatever_the_criterion() {
    let mut seen = 0;
    for base in samples() {
        let hypothesis = one_way(&base).unwrap();
        if hypothesis.dimensions() > 1 {
            continue;
        }
        seen += 1;
        let found = criteria(&hypothesis, LEVEL);
        let first = found.roy;
        for criterion in one_of_four(&found) {
            close(criterion.test.f, first.test.f, 1e-13);
            close(criterion.test.df1, first.test.df1, 1e-14);
            close(criterion.test.df2, first.test.df2, 1e-14);
            close(criterion.eta2, first.eta2, 1e-14);
            let (a, b) = (criterion.eta2_interval.unwrap(), first.eta2_interval.unwrap());
            near(a.lower, b.lower, 1e-9);
            near(a.upper, b.upper, 1e-9);
        }
    }
    assert_eq!(seen, 2);
}

#[test]
fn one_outcome_reduces_to_the_analysis_of_variance() {
    let mut scatter = Scatter::new(4);
    for sizes in [vec![3, 4], vec![5, 6, 7], vec![2; 9]] {
        let base = scatter.sample(&sizes, 1);
        let hypothesis = one_way(&base).unwrap();
        let analysis = analyse(&base, 0);
        for criterion in one_of_four(&criteria(&hypothesis, LEVEL)) {
            assert_eq!(criterion.exactness, Exactness::Exact);
            close(criterion.test.f, analysis.test.f, 1e-13);
            close(criterion.eta2, analysis.eta2, 1e-13);
            close(criterion.test.p.p, analysis.test.p.p, 1e-12);
        }
        let found = coefficients(&hypothesis);
        close(found.raw[(0, 0)], analysis.ms_within.sqrt().recip(), 1e-13);
        for matrix in [found.standardized, found.structure, found.share] {
            close(matrix[(0, 0)], 1.0, 1e-14);
        }
    }
}

/// Bartlett (1937, Proceedings of the Royal Society A 160), from the variances.
#[test]
fn one_outcome_reduces_the_covariance_test_to_that_of_bartlett() {
    let base = Scatter::new(6).sample(&[5, 9, 30], 1);
    let (df, k) = (base.units() as f64 - 3.0, 3.0);
    let groups: Vec<Vec<f64>> = (0..3)
        .map(|group| {
            let units = base.outcome(0).iter().zip(base.groups());
            units.filter(|(_, code)| **code == group).map(|(y, _)| *y).collect()
        })
        .collect();
    let variance = |own: &Vec<f64>| {
        let mean = own.iter().sum::<f64>() / own.len() as f64;
        own.iter().map(|y| (y - mean).powi(2)).sum::<f64>() / (own.len() - 1) as f64
    };
    let dfs: Vec<f64> = groups.iter().map(|own| own.len() as f64 - 1.0).collect();
    let pooled = groups.iter().zip(&dfs).map(|(own, df)| df * variance(own)).sum::<f64>() / df;
    let logs = groups.iter().zip(&dfs).map(|(own, df)| df * variance(own).ln()).sum::<f64>();
    let correction =
        1.0 + (dfs.iter().map(|df| 1.0 / df).sum::<f64>() - 1.0 / df) / (3.0 * (k - 1.0));
    let found = box_test(&base).unwrap();
    // Box multiplies by 1 - c where Bartlett divides by 1 + c.
    close(found.m, df * pooled.ln() - logs, 1e-12);
    close(found.chi_square, found.m * (2.0 - correction), 1e-12);
    assert_eq!(found.df, 2.0);
}

/// Hotelling (1931, Annals of Mathematical Statistics 2), from the covariance matrix.
#[test]
fn two_groups_reduce_to_the_two_sample_test() {
    let mut scatter = Scatter::new(11);
    for (sizes, p) in [([8, 6], 3), ([5, 14], 2), ([20, 20], 6)] {
        let base = scatter.sample(&sizes, p);
        let v = (base.units() - 2) as f64;
        let outcomes = DMatrix::from_fn(base.units(), p, |unit, j| base.outcome(j)[unit]);
        let first = outcomes.rows(0, sizes[0]);
        let second = outcomes.rows(sizes[0], sizes[1]);
        let difference: DVector<f64> = (first.row_mean() - second.row_mean()).transpose();
        let mut within = DMatrix::zeros(p, p);
        for group in [first, second] {
            let mean = group.row_mean();
            for row in group.row_iter() {
                let deviation = row - &mean;
                within += deviation.transpose() * deviation;
            }
        }
        let inverse = (within / v).try_inverse().unwrap();
        let d2 = difference.dot(&(&inverse * &difference));
        let weight = (sizes[0] * sizes[1]) as f64 / (sizes[0] + sizes[1]) as f64;
        let t2 = weight * d2;

        let hypothesis = one_way(&base).unwrap();
        close(hypothesis.roots()[0] * v, t2, 1e-11);
        let df2 = v - p as f64 + 1.0;
        for criterion in one_of_four(&criteria(&hypothesis, LEVEL)) {
            close(criterion.test.f, t2 * df2 / (v * p as f64), 1e-11);
            assert_eq!((criterion.test.df1, criterion.test.df2), (p as f64, df2));
        }
        let found = coefficients(&hypothesis);
        let centroids = centroids(&base, &scores(&base, &found));
        close((centroids[0][0].mean - centroids[1][0].mean).powi(2), d2, 1e-11);

        // Structure coefficients are in the proportions of the t statistics.
        let t = |j: usize| pairs(base.outcome(j), base.groups(), 2, 0.95).unwrap().list[0].t;
        let ratio = t(0) / found.structure[(0, 0)];
        for j in 1..p {
            close(t(j) / found.structure[(j, 0)], ratio, 1e-10);
        }
    }
}

#[test]
fn a_pair_of_two_groups_is_the_square_root_of_the_analysis_of_variance() {
    let base = Scatter::new(12).sample(&[7, 11], 2);
    for j in 0..2 {
        let analysis = analyse(&base, j);
        let found = pairs(base.outcome(j), base.groups(), 2, 0.95).unwrap();
        let pair = found.list[0];
        close(pair.t * pair.t, analysis.test.f, 1e-13);
        close(pair.p.p, analysis.test.p.p, 1e-12);
        close(found.pooled_sd * found.pooled_sd, analysis.ms_within, 1e-14);
        close(pair.g / pair.d, found.correction, 1e-15);
        assert!(pair.effect_interval.lower < pair.d && pair.d < pair.effect_interval.upper);
        // Both intervals exclude zero where p < .05, and only there.
        let excludes = |lower: f64, upper: f64| lower > 0.0 || upper < 0.0;
        let rejected = pair.p.p < 0.05;
        assert_eq!(excludes(pair.interval.lower, pair.interval.upper), rejected);
        let effect = pair.effect_interval;
        assert_eq!(excludes(effect.lower, effect.upper), rejected);
    }
}

/// Limits of the population effect to 17 digits, from inverting the noncentral t in 60-digit arithmetic.
#[test]
fn limits_of_a_standardized_difference_are_those_of_the_noncentral_t() {
    let expected = [
        (0.5, 20, 20, -0.13301811322887439, 1.1266612752942882),
        (0.8, 10, 14, -0.05319923212233786, 1.636489426597316),
        (-1.2, 8, 30, -2.0199445734082135, -0.3652329137817838),
        (0.2, 500, 480, 0.0743923861860621, 0.3255058601354415),
        (3.0, 6, 6, 1.2483221797610398, 4.689046893883398),
        (0.05, 5000, 5000, 0.010793344963921824, 0.08920415530729109),
        (6.5, 12, 12, 4.4197202752174665, 8.555737985758954),
    ];
    for (d, n1, n2, lower, upper) in expected {
        // Values at equal distances on both sides of each mean make the pooled variance 1.
        let n: usize = n1 + n2;
        let distance = ((n - 2) as f64 / n as f64).sqrt();
        let groups: Vec<usize> = (0..n).map(|unit| usize::from(unit >= n1)).collect();
        let value = |unit: usize| {
            let side = if unit.is_multiple_of(2) { distance } else { -distance };
            side + if unit < n1 { d } else { 0.0 }
        };
        let values: Vec<f64> = (0..n).map(value).collect();
        let pair = pairs(&values, &groups, 2, 0.95).unwrap().list[0];
        near(pair.d, d, 1e-14);
        near(pair.effect_interval.lower, lower, 1e-9);
        near(pair.effect_interval.upper, upper, 1e-9);
    }
}

#[test]
fn limits_of_effect_sizes_are_where_the_noncentral_f_puts_its_tails() {
    let tail = (1.0 - LEVEL) / 2.0;
    for base in samples() {
        let hypothesis = one_way(&base).unwrap();
        let (units, s) = (base.units() as f64, hypothesis.dimensions() as f64);
        let (p, q) = (base.outcome_count() as f64, hypothesis.df_hypothesis() as f64);
        let ratio = (p * p * q * q - 4.0) / (p * p + q * q - 5.0);
        let t = if p * p + q * q > 5.0 { ratio.sqrt() } else { 1.0 };
        let found = criteria(&hypothesis, LEVEL);
        // The noncentrality of each population effect, as it is defined and not as it is inverted.
        let of_wilks = |eta2: f64| units * t * ((1.0 - eta2).powf(-s / t) - 1.0);
        let of_traces = |eta2: f64| units * s * eta2 / (1.0 - eta2);
        let cases: [(Criterion, &dyn Fn(f64) -> f64); 3] = [
            (found.wilks, &of_wilks),
            (found.pillai, &of_traces),
            (found.hotelling.unwrap(), &of_traces),
        ];
        for (criterion, noncentrality) in cases {
            let test = criterion.test;
            let interval = criterion.eta2_interval.unwrap();
            let upper =
                noncentral_f::cumulative(test.f, test.df1, test.df2, noncentrality(interval.upper));
            if interval.upper > 0.0 {
                close(upper.p, tail, 1e-6);
            }
            assert_eq!(interval.lower > 0.0, test.p.p < tail, "{criterion:?}");
            if interval.lower > 0.0 {
                let lower = noncentral_f::survival(
                    test.f,
                    test.df1,
                    test.df2,
                    noncentrality(interval.lower),
                );
                close(lower.p, tail, 1e-6);
            }
        }
    }
}

#[test]
fn log_determinants_are_those_of_the_covariance_matrices() {
    let base = Scatter::new(13).sample(&[9, 12, 15], 3);
    let outcomes = DMatrix::from_fn(base.units(), 3, |unit, j| base.outcome(j)[unit]);
    let found = log_determinants(&base);
    let mut start = 0;
    for (group, &n) in base.group_sizes().iter().enumerate() {
        let own = outcomes.rows(start, n);
        let mean = own.row_mean();
        let mut products = DMatrix::zeros(3, 3);
        for row in own.row_iter() {
            let deviation = row - &mean;
            products += deviation.transpose() * deviation;
        }
        close(found[group].unwrap(), (products / (n - 1) as f64).determinant().ln(), 1e-12);
        start += n;
    }
}

#[test]
fn many_outcomes_and_groups_keep_the_identities() {
    let base = Scatter::new(14).sample(&[9; 40], 200);
    let hypothesis = one_way(&base).unwrap();
    assert_eq!(hypothesis.dimensions(), 39);
    let found = coefficients(&hypothesis);
    for column in found.share.column_iter() {
        near(column.sum(), 1.0, 1e-11);
    }
    for (j, row) in found.structure.row_iter().enumerate() {
        let sum: f64 = row.iter().zip(hypothesis.roots()).map(|(r, root)| r * r * root).sum();
        let test = analyse(&base, j).test;
        close(sum, test.f * test.df1 / test.df2, 1e-10);
    }
}
