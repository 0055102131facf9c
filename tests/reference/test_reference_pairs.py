"""Differences between pairs of groups: tests, families, effect sizes and their intervals."""

import itertools
import json
from pathlib import Path

import numpy as np
import pytest
from mpmath import mp
from reference_samples import NAMES, sample
from reference_support import compared, table_text
from scipy import optimize, stats
from statsmodels.stats.multitest import multipletests

every_sample = pytest.mark.parametrize("name", NAMES)

# Limits of effect sizes to 20 digits; `effect_intervals.py` computes them.
LIMITS = json.loads(Path(__file__).with_name("effect_intervals.json").read_text(encoding="utf-8"))

TIGHT = 1e-11


def near(found, expected, limit=TIGHT, scale=None):
    found, expected = float(found), float(expected)
    scale = abs(expected) if scale is None else scale
    assert abs(found - expected) <= limit * scale, (found, expected)


def pairs_of(data):
    return list(itertools.combinations(range(len(data.levels)), 2))


def found_pair(data, a, b, outcome):
    return lambda key: data.of_term("pairs", data.levels[a], data.levels[b], outcome, key)


def pooled_sd(groups):
    df = sum(len(rows) - 1 for rows in groups)
    return np.sqrt(sum(((rows - rows.mean()) ** 2).sum() for rows in groups) / df), df


@every_sample
def test_differences_are_tested_with_the_error_pooled_over_all_groups(name):
    data = sample(name)
    for j, outcome in enumerate(data.outcomes):
        groups = data.groups(j)
        s, df = pooled_sd(groups)
        for a, b in pairs_of(data):
            found = found_pair(data, a, b, outcome)
            difference = groups[a].mean() - groups[b].mean()
            se = s * np.sqrt(1 / len(groups[a]) + 1 / len(groups[b]))
            scale = max(abs(groups[a]).max(), abs(groups[b]).max())
            near(found("difference"), difference, scale=scale)
            half = stats.t.ppf(0.975, df) * se
            near(found("lower"), difference - half, scale=scale)
            near(found("upper"), difference + half, scale=scale)
            assert found("df") == df
            t = difference / se
            near(found("t"), t, 1e-10, scale=max(1.0, abs(t)))
            p = 2 * stats.t.sf(abs(t), df)
            near(found("p"), p, 1e-10, scale=p * max(1.0, t * t))


@every_sample
def test_d_is_in_pooled_standard_deviations_and_g_takes_the_exact_correction(name):
    """Hedges 1981, Journal of Educational Statistics 6: J = Γ(ν/2) / (√(ν/2) Γ((ν - 1)/2))."""
    data = sample(name)
    mp.dps = 30
    for j, outcome in enumerate(data.outcomes):
        groups = data.groups(j)
        s, df = pooled_sd(groups)
        half = mp.mpf(df) / 2
        correction = mp.gamma(half) / (mp.sqrt(half) * mp.gamma(half - mp.mpf(1) / 2))
        sizes = []
        for a, b in pairs_of(data):
            found = found_pair(data, a, b, outcome)
            d = (groups[a].mean() - groups[b].mean()) / s
            near(found("d"), d, 1e-10, scale=max(1.0, abs(d)))
            near(found("g"), found("d") * float(correction), 1e-14)
            sizes.append(abs(found("g")))
        near(data.of_term("pairs", "mean_abs_effect", outcome), np.mean(sizes), 1e-14)


@every_sample
def test_one_family_holds_all_outcomes_and_pairs(name):
    """Holm 1979, Scandinavian Journal of Statistics 6."""
    data = sample(name)
    family = [
        found_pair(data, a, b, outcome) for outcome in data.outcomes for a, b in pairs_of(data)
    ]
    p = [found("p") for found in family]
    assert len(family) == len(data.outcomes) * len(data.levels) * (len(data.levels) - 1) / 2
    for method in ("bonferroni", "holm"):
        for found, expected in zip(family, multipletests(p, method=method)[1]):
            near(found(f"p_{method}"), expected, 1e-13)


@every_sample
def test_the_pairs_of_the_scores_are_a_family_of_their_own(name):
    data = sample(name)
    functions = min(len(data.outcomes), len(data.levels) - 1)
    family = [
        (lambda key, at=(number, data.levels[a], data.levels[b]): data.of_term("scores", *at, key))
        for number in range(1, functions + 1)
        for a, b in pairs_of(data)
    ]
    p = [found("p") for found in family]
    for method in ("bonferroni", "holm"):
        for found, expected in zip(family, multipletests(p, method=method)[1]):
            near(found(f"p_{method}"), expected, 1e-13)
    # Scores have a pooled standard deviation of 1.
    for found in family:
        near(found("d"), found("difference"), 1e-12, scale=max(1.0, abs(found("d"))))


@pytest.mark.parametrize("adjustment", ["bonferroni", "holm"])
def test_the_policy_chooses_what_the_adjusted_p_is(adjustment):
    data = sample("skulls", policy=f"policy pairs {adjustment}")
    for outcome in data.outcomes:
        for a, b in pairs_of(data):
            found = found_pair(data, a, b, outcome)
            assert found("p_adjusted") == found(f"p_{adjustment}")


def test_without_an_adjustment_the_adjusted_p_is_the_plain_one():
    data = sample("iris", policy="policy pairs unadjusted")
    for outcome in data.outcomes:
        for a, b in pairs_of(data):
            found = found_pair(data, a, b, outcome)
            assert found("p_adjusted") == found("p")


@pytest.mark.parametrize(
    "name", [name for name in NAMES if name not in ("iris", "wine", "pottery")]
)
def test_limits_of_d_are_where_t_stands_at_the_edges_of_its_distribution(name):
    """By scipy's noncentral t, in the range where that is sound: moderate and positive t."""
    data = sample(name)
    for outcome in data.outcomes:
        for a, b in pairs_of(data):
            found = found_pair(data, a, b, outcome)
            n_a, n_b = (data.value("groups", data.levels[i], "n") for i in (a, b))
            per_unit = np.sqrt(1 / n_a + 1 / n_b)
            t, df = abs(found("t")), found("df")
            assert t < 12
            limits = [
                per_unit
                * optimize.brentq(
                    lambda delta: stats.nct.cdf(t, df, delta) - tail, t - 6, t + 6, xtol=1e-14
                )
                for tail in (0.975, 0.025)
            ]
            if found("t") < 0:
                limits = [-limits[1], -limits[0]]
            for key, limit in zip(("d_lower", "d_upper"), limits):
                near(found(key), limit, 1e-9, scale=max(1.0, abs(limit)))
            assert found("g_lower") == found("d_lower")
            assert found("g_upper") == found("d_upper")


@pytest.mark.parametrize("case", LIMITS["differences"], ids=lambda case: f"d={case['d']}")
def test_a_standardized_difference_has_the_limits_of_the_noncentral_t(case):
    """Two groups whose difference is just d pooled standard deviations."""
    rng = np.random.default_rng(3)
    n1, n2 = case["n1"], case["n2"]
    deviations = [rng.standard_normal(n) for n in (n1, n2)]
    deviations = [values - values.mean() for values in deviations]
    scale = np.sqrt(sum((values**2).sum() for values in deviations) / (n1 + n2 - 2))
    first = deviations[0] / scale + float(case["d"])
    second = deviations[1] / scale
    columns = {"y": [*first.tolist(), *second.tolist()], "arm": ["a"] * n1 + ["b"] * n2}
    found = compared(["y"], "arm", table_text(columns))
    pair = lambda key: found.value("main", "pairs", "arm", "a", "b", "y", key)
    near(pair("d"), case["d"], 1e-12, scale=max(1.0, abs(float(case["d"]))))
    near(pair("g"), case["g"], 1e-12, scale=max(1.0, abs(float(case["g"]))))
    for key in ("lower", "upper"):
        near(pair(f"g_{key}"), case[key], TIGHT, scale=max(1.0, abs(float(case[key]))))


def of_ratio(f, df1, df2):
    """One outcome in df1 + 1 groups whose analysis of variance has this F."""
    rng = np.random.default_rng(4)
    k, n = df1 + 1, df1 + df2 + 1
    group = np.arange(n) % k
    within = rng.standard_normal(n)
    means = rng.standard_normal(k)
    within -= np.array([within[group == g].mean() for g in range(k)])[group]
    within /= np.linalg.norm(within) / np.sqrt(df2)
    between = means[group] - means[group].mean()
    between *= np.sqrt(f * df1) / np.linalg.norm(between)
    columns = {"y": (within + between).tolist(), "group": [f"g{g}" for g in group]}
    return compared(["y"], "group", table_text(columns))


@pytest.mark.parametrize("case", LIMITS["ratios"], ids=lambda case: f"F={case['F']}")
def test_a_share_of_variance_has_the_limits_of_the_noncentral_f(case):
    """With one outcome all four criteria have this one effect size and interval."""
    found = of_ratio(float(case["F"]), case["df1"], case["df2"])
    for criterion in ("wilks", "pillai", "hotelling", "roy"):
        of = lambda key: found.value("main", "omnibus", "group", criterion, key)
        near(of("F"), case["F"], 1e-12)
        assert (of("df1"), of("df2")) == (case["df1"], case["df2"])
        near(of("eta2"), case["eta2"], 1e-12)
        for key in ("lower", "upper"):
            if float(case[key]) == 0:
                assert of(f"eta2_{key}") == 0
            else:
                near(of(f"eta2_{key}"), case[key], TIGHT)


def noncentrality_limits(f, df1, df2, level):
    """By scipy's noncentral F, which is sound for the moderate F that come here."""
    limits = []
    for tail in (0.5 + level / 2, 0.5 - level / 2):
        below = lambda noncentrality: stats.ncf.cdf(f, df1, df2, noncentrality) - tail
        if stats.f.cdf(f, df1, df2) <= tail:
            limits.append(0.0)
        else:
            high = f * df1 + 10
            while below(high) > 0:
                high *= 1.5
            limits.append(optimize.brentq(below, 1e-9, high, xtol=1e-13))
    return limits


@pytest.mark.parametrize("alpha", [0.05, 0.01])
@pytest.mark.parametrize(
    "name", [name for name in NAMES if name not in ("iris", "wine", "pottery")]
)
def test_limits_of_effect_sizes_are_where_f_stands_at_the_edges_of_its_distribution(name, alpha):
    """The level is 1 - 2 alpha, so that an interval leaves out zero where its test rejects (Steiger
    2004). The noncentralities are those of O'Brien & Shieh (1999): N s V/(s - V), N U and
    N t (Λ^(-1/t) - 1), of the population."""
    data = sample(name, policy=f"policy alpha {alpha}")
    p, q, n = len(data.outcomes), len(data.levels) - 1, len(data.group)
    s = min(p, q)
    t = np.sqrt((p * p * q * q - 4) / (p * p + q * q - 5)) if p * p + q * q > 5 else 1.0
    shares = {
        "wilks": lambda x: 1 - (1 + x / (n * t)) ** (-t / s),
        "pillai": lambda x: x / (x + n * s),
        "hotelling": lambda x: x / (x + n * s),
    }
    for criterion, share in shares.items():
        of = lambda key: data.of_term("omnibus", criterion, key)
        limits = noncentrality_limits(of("F"), of("df1"), of("df2"), 1 - 2 * alpha)
        for key, limit in zip(("eta2_lower", "eta2_upper"), limits):
            near(of(key), share(limit), 1e-8, scale=max(share(limit), 1e-3))
        assert (of("eta2_lower") > 0) == (of("p") < alpha)
