"""Whole analyses against numpy, scipy, statsmodels and scikit-learn, computed here."""

import warnings

import numpy as np
import pytest
from reference_samples import NAMES, sample
from scipy import stats
from sklearn.discriminant_analysis import LinearDiscriminantAnalysis
from statsmodels.multivariate.manova import MANOVA
from statsmodels.stats.multivariate import test_cov_oneway as covariance_test

every_sample = pytest.mark.parametrize("name", NAMES)

# Relative agreement. These libraries form cross products and lose digits that the program keeps, so the
# limit is that of double precision after such a detour; what they get without one is held closer.
USUAL = 1e-11
DIRECT = 1e-12


def near(found, expected, limit=USUAL, scale=None):
    scale = abs(expected) if scale is None else scale
    assert abs(found - expected) <= limit * scale, (found, expected)


def near_p(found, expected):
    """A relative error of F returns in p multiplied by up to |ln p|."""
    if expected > 1e-250:
        near(found, expected, scale=expected * max(1.0, abs(np.log(expected))))


# --- Groups (numpy; intervals by scipy's Student t)


@every_sample
def test_sizes_means_deviations_and_intervals(name):
    data = sample(name)
    for j, outcome in enumerate(data.outcomes):
        for level, rows in zip(data.levels, data.groups(j)):
            of = lambda key: data.value("groups", level, outcome, key)
            assert data.value("groups", level, "n") == len(rows)
            scale = abs(rows).max()
            near(of("mean"), rows.mean(), DIRECT, scale)
            near(of("sd"), rows.std(ddof=1), DIRECT, scale)
            near(of("se"), stats.sem(rows), DIRECT, scale)
            interval = stats.t.interval(0.95, len(rows) - 1, rows.mean(), stats.sem(rows))
            near(of("lower"), interval[0], DIRECT, scale)
            near(of("upper"), interval[1], DIRECT, scale)


def test_the_interval_follows_the_policy():
    data = sample("skulls", policy="policy interval 99%")
    rows = data.groups(0)[0]
    interval = stats.t.interval(0.99, len(rows) - 1, rows.mean(), stats.sem(rows))
    near(data.value("groups", "c4000BC", "mb", "lower"), interval[0], DIRECT)


# --- Correlations (numpy)


@every_sample
def test_correlations_within_groups_and_over_all_units(name):
    data = sample(name)
    centred = data.y - data.y.mean(axis=0)
    kinds = {
        "within": (data.residuals(), data.error_df()),
        "total": (centred, len(data.y) - 1),
    }
    for kind, (deviations, df) in kinds.items():
        norms = np.linalg.norm(deviations, axis=0)
        r = (deviations / norms).T @ (deviations / norms)
        for i, first in enumerate(data.outcomes):
            near(data.value("correlations", "sd", kind, first), norms[i] / np.sqrt(df), DIRECT)
            for j, second in enumerate(data.outcomes):
                if i != j:
                    found = data.value("correlations", kind, first, second)
                    near(found, r[i, j], DIRECT, scale=1.0)


# --- Equal spread (scipy; Box's M by statsmodels)


@every_sample
@pytest.mark.parametrize(("kind", "center"), [("levene", "mean"), ("brown_forsythe", "median")])
def test_levenes_test_and_brown_and_forsythes(name, kind, center):
    data = sample(name)
    for j, outcome in enumerate(data.outcomes):
        expected = stats.levene(*data.groups(j), center=center)
        near(data.value("covariances", kind, outcome, "F"), expected.statistic)
        near_p(data.value("covariances", kind, outcome, "p"), expected.pvalue)
        df = [data.value("covariances", kind, outcome, key) for key in ("df1", "df2")]
        assert df == [len(data.levels) - 1, data.error_df()]


@every_sample
def test_boxs_test_of_equal_covariance_matrices(name):
    data = sample(name)
    groups = data.groups()
    p = len(data.outcomes)
    if min(len(rows) for rows in groups) <= p:
        assert "main.covariances.box.M" not in data.answers.values
        return
    scale = data.y.std(axis=0, ddof=1)
    covariances = [np.atleast_2d(np.cov((rows / scale).T)) for rows in groups]
    expected = covariance_test(covariances, [len(rows) for rows in groups])
    box = {
        key: data.value("covariances", "box", key)
        for key in ("M", "F", "df1", "df2", "p", "chi2", "df", "chi2_p")
    }
    near(box["M"], expected.statistic_base)
    near(box["chi2"], expected.statistic_chi2)
    near(box["df"], expected.df_chi2)
    near_p(box["chi2_p"], expected.pvalue_chi2)
    near(box["df1"], expected.df_f[0])
    near(box["df2"], expected.df_f[1])
    if first_branch([len(rows) for rows in groups], p):
        near(box["F"], expected.statistic_f)
        near_p(box["p"], expected.pvalue_f)
    for level, covariance in zip(data.levels, covariances):
        log = np.linalg.slogdet(covariance).logabsdet + 2 * np.log(scale).sum()
        near(data.value("covariances", "logdet", level), log, DIRECT, max(1.0, abs(log)))


def first_branch(sizes, p):
    """Where Box (1949) has the second of his two F, statsmodels 0.15 puts a plus for a minus into
    its denominator (F = f2 b M / (f1 (1 - b M))), so only the first is compared."""
    k, total = len(sizes), sum(sizes)
    c1 = sum(1 / (n - 1) for n in sizes) - 1 / (total - k)
    c1 *= (2 * p * p + 3 * p - 1) / (6 * (p + 1) * (k - 1))
    c2 = sum(1 / (n - 1) ** 2 for n in sizes) - 1 / (total - k) ** 2
    c2 *= (p - 1) * (p + 2) / (6 * (k - 1))
    return c2 > c1 * c1


# --- The omnibus test (statsmodels)


@pytest.mark.parametrize("name", [name for name in NAMES if "one outcome" not in name])
def test_the_four_criteria_of_several_outcomes(name):
    data = sample(name)
    with warnings.catch_warnings():
        warnings.simplefilter("ignore")
        dummies = np.eye(len(data.levels))[data.group]
        fitted = MANOVA(data.units(), dummies)
        differences = np.eye(len(data.levels))[:-1] - np.eye(len(data.levels))[-1]
        table = fitted.mv_test([("groups", differences)]).results["groups"]["stat"]
    rows = {
        "wilks": "Wilks' lambda",
        "pillai": "Pillai's trace",
        "hotelling": "Hotelling-Lawley trace",
        "roy": "Roy's greatest root",
    }
    bound = "_bound" if min(len(data.outcomes), len(data.levels) - 1) > 1 else ""
    for criterion, label in rows.items():
        expected = table.loc[label].astype(float)
        suffix = bound if criterion == "roy" else ""
        near(data.of_term("omnibus", criterion, "value"), expected["Value"])
        near(data.of_term("omnibus", criterion, "F"), expected["F Value"])
        near(data.of_term("omnibus", criterion, "df1"), expected["Num DF"], DIRECT)
        near(data.of_term("omnibus", criterion, "df2"), expected["Den DF"], DIRECT)
        near_p(data.of_term("omnibus", criterion, f"p{suffix}"), expected["Pr > F"])


@pytest.mark.parametrize("name", [name for name in NAMES if "one outcome" in name])
def test_the_four_criteria_of_one_outcome_are_its_analysis_of_variance(name):
    data = sample(name)
    expected = stats.f_oneway(*data.groups(0))
    for criterion in ("wilks", "pillai", "hotelling", "roy"):
        near(data.of_term("omnibus", criterion, "F"), expected.statistic)
        near_p(data.of_term("omnibus", criterion, "p"), expected.pvalue)


@every_sample
def test_effect_sizes_of_the_criteria(name):
    """Cramer & Nicewander 1979, Psychometrika 44."""
    data = sample(name)
    s = min(len(data.outcomes), len(data.levels) - 1)
    value = lambda criterion: data.of_term("omnibus", criterion, "value")
    eta2 = lambda criterion: data.of_term("omnibus", criterion, "eta2")
    near(eta2("wilks"), 1 - value("wilks") ** (1 / s), DIRECT, scale=1.0)
    near(eta2("pillai"), value("pillai") / s, DIRECT)
    near(eta2("hotelling"), value("hotelling") / (value("hotelling") + s), DIRECT)
    near(eta2("roy"), value("roy") / (1 + value("roy")), DIRECT)
    near(data.of_term("omnibus", "roy", "theta"), eta2("roy"), DIRECT)


# --- The functions (numpy's singular values; scikit-learn)


def canonical_correlations(data):
    """Cosines of the angles between outcomes and group membership (Björck & Golub 1973, Mathematics
    of Computation 27)."""
    outcomes, _ = np.linalg.qr(data.units())
    dummies = np.eye(len(data.levels))[data.group]
    groups, _ = np.linalg.qr((dummies - dummies.mean(axis=0))[:, 1:])
    return np.linalg.svd(outcomes.T @ groups, compute_uv=False)


@every_sample
def test_eigenvalues_and_canonical_correlations(name):
    data = sample(name)
    canonical = canonical_correlations(data)
    roots = canonical**2 / (1 - canonical**2)
    for number, (r, root) in enumerate(zip(canonical, roots), 1):
        of = lambda key: data.of_term("functions", number, key)
        near(of("canonical"), r, DIRECT, scale=1.0)
        near(of("eigenvalue"), root, USUAL, scale=roots[0])
        near(of("share"), root / roots.sum(), USUAL, scale=1.0)
        near(of("wilks"), np.prod(1 / (1 + roots[number - 1 :])), USUAL)


@every_sample
@pytest.mark.parametrize("solver", ["svd", "eigen"])
def test_raw_coefficients_and_shares_by_linear_discriminant_analysis(name, solver):
    """scikit-learn divides by n where the pooled covariance matrix has n - k."""
    data = sample(name)
    lda = LinearDiscriminantAnalysis(solver=solver).fit(data.units(), data.group)
    n, k = len(data.group), len(data.levels)
    functions = min(len(data.outcomes), k - 1)
    scalings = lda.scalings_[:, :functions] * np.sqrt((n - k) / n)
    scalings /= data.y.std(axis=0, ddof=1)[:, None]
    for number in range(1, functions + 1):
        raw = [data.of_term("coefficients", "raw", outcome, number) for outcome in data.outcomes]
        expected = scalings[:, number - 1]
        expected = expected * np.sign(expected @ raw)
        scale = np.abs(expected * data.y.std(axis=0)).max() / data.y.std(axis=0)
        assert np.all(np.abs(raw - expected) <= 1e-9 * scale), (raw, expected)
        share = data.of_term("functions", number, "share")
        near(share, lda.explained_variance_ratio_[number - 1], USUAL, scale=1.0)


def scores(data):
    raw = [
        [
            data.of_term("coefficients", "raw", outcome, number)
            for number in range(1, min(len(data.outcomes), len(data.levels) - 1) + 1)
        ]
        for outcome in data.outcomes
    ]
    return (data.y - data.y.mean(axis=0)) @ np.array(raw)


@every_sample
def test_scores_have_unit_variance_within_groups_and_are_uncorrelated(name):
    data = sample(name)
    found = scores(data)
    means = np.array([found[data.group == g].mean(axis=0) for g in range(len(data.levels))])
    within = found - means[data.group]
    covariance = within.T @ within / data.error_df()
    assert np.abs(covariance - np.eye(found.shape[1])).max() < 1e-11


@every_sample
def test_standardized_and_structure_coefficients_and_shares(name):
    """Raw ones times the pooled standard deviation; correlations within groups of outcome and score
    (Huberty & Olejnik 2006, Applied MANOVA and Discriminant Analysis); their product (Thomas 1992,
    Multivariate Behavioral Research 27)."""
    data = sample(name)
    residuals = data.residuals()
    pooled = np.linalg.norm(residuals, axis=0) / np.sqrt(data.error_df())
    found = scores(data)
    means = np.array([found[data.group == g].mean(axis=0) for g in range(len(data.levels))])
    within = found - means[data.group]
    for number in range(1, found.shape[1] + 1):
        shares = []
        for j, outcome in enumerate(data.outcomes):
            of = lambda kind: data.of_term("coefficients", kind, outcome, number)
            near(of("standardized"), of("raw") * pooled[j], DIRECT)
            score = within[:, number - 1]
            r = residuals[:, j] @ score / np.linalg.norm(residuals[:, j]) / np.linalg.norm(score)
            near(of("structure"), r, 1e-11, scale=1.0)
            near(of("share"), of("standardized") * of("structure"), DIRECT)
            shares.append(of("share"))
        near(sum(shares), 1.0, 1e-11)
        standardized = [
            data.of_term("coefficients", "standardized", outcome, number)
            for outcome in data.outcomes
        ]
        assert max(standardized, key=abs) > 0


@every_sample
def test_centroids_are_the_means_of_the_scores(name):
    data = sample(name)
    found = scores(data)
    for g, level in enumerate(data.levels):
        rows = found[data.group == g]
        for number in range(1, found.shape[1] + 1):
            of = lambda key: data.of_term("centroids", level, number, key)
            near(of("mean"), rows[:, number - 1].mean(), 1e-11, scale=np.abs(found).max())
            near(of("sd"), rows[:, number - 1].std(ddof=1), 1e-11, scale=np.abs(found).max())


@every_sample
def test_the_analysis_of_variance_of_scores(name):
    data = sample(name)
    found = scores(data)
    for number in range(1, found.shape[1] + 1):
        column = found[:, number - 1]
        expected = stats.f_oneway(*[column[data.group == g] for g in range(len(data.levels))])
        of = lambda key: data.of_term("scores", number, key)
        near(of("F"), expected.statistic)
        near_p(of("p"), expected.pvalue)
        assert (of("df1"), of("df2")) == (len(data.levels) - 1, data.error_df())
        near(of("eta2"), of("F") * of("df1") / (of("F") * of("df1") + of("df2")), DIRECT)


# --- The outcomes one by one (scipy)


@every_sample
def test_the_analysis_of_variance_of_each_outcome(name):
    """ω² after Hays 1963, Statistics for Psychologists."""
    data = sample(name)
    k, n = len(data.levels), len(data.group)
    for j, outcome in enumerate(data.outcomes):
        groups = data.groups(j)
        expected = stats.f_oneway(*groups)
        of = lambda key: data.of_term("outcomes", outcome, key)
        near(of("F"), expected.statistic)
        near_p(of("p"), expected.pvalue)
        assert (of("df1"), of("df2")) == (k - 1, n - k)
        grand = data.y[:, j].mean()
        between = sum(len(rows) * (rows.mean() - grand) ** 2 for rows in groups)
        within = sum(((rows - rows.mean()) ** 2).sum() for rows in groups)
        near(of("eta2"), between / (between + within))
        error = within / (n - k)
        near(of("omega2"), (between - (k - 1) * error) / (between + within + error), scale=1.0)
