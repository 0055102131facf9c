"""Writes one_way.json: every quantity of a one-factor comparison to 20 digits.

Decimal text is read as exact fractions (or, in cases named so, rounded to doubles first, as every
program that stores doubles must); means and cross products are exact; roots, determinants and
distributions are computed with 60 digits by mpmath. The formulas are those of the sources named in
the documentation of the crate, written down independently of it. Run: python one_way.py
"""

import csv
import functools
import itertools
import json
import pathlib
from fractions import Fraction

import mpmath as mp
from mpmath import mpf

mp.mp.dps = 60
HERE = pathlib.Path(__file__).parent

CASES = [
    ("jw8", "data", "g"),
    ("stevens12", "data", "g"),
    ("iris", "data", "species"),
    ("rootstock", "data", "rootstock"),
    ("skulls", "data", "epoch"),
    ("pottery", "data", "Site"),
    ("wine", "data", "cultivar"),
    ("scale_unit", "hard", "g"),
    ("scale_mixed", "hard", "g"),
    ("offset_1e6", "hard", "g"),
    ("offset_1e9", "hard", "g"),
    ("offset_1e12", "hard", "g"),
    ("nearsing_1e-4", "hard", "g"),
    ("nearsing_1e-7", "hard", "g"),
    ("nearsing_1e-10", "hard", "g"),
    ("huge_effect", "hard", "g"),
    ("box_second_branch", "hard", "g"),
    ("one_outcome", "hard", "g"),
    ("offset_1e6 as doubles", "hard", "g"),
    ("offset_1e9 as doubles", "hard", "g"),
    ("offset_1e12 as doubles", "hard", "g"),
    ("huge_effect as doubles", "hard", "g"),
    ("rank1_means", "hard", "g"),
    ("zero_effect", "hard", "g"),
    ("p_eq_dfe", "hard", "g"),
    ("singleton_group", "hard", "g"),
    ("small_groups", "hard", "g"),
]
LEVEL = mpf(95) / 100
ETA_LEVEL = mpf(90) / 100


def text(x):
    return mp.nstr(x, 20, strip_zeros=False)


def exact(fraction):
    return mpf(fraction.numerator) / fraction.denominator


def f_upper(f, df1, df2):
    if f == 0:
        return mpf(1)
    return mp.betainc(mpf(df2) / 2, mpf(df1) / 2, 0, df2 / (df2 + df1 * f), regularized=True)


def chi2_upper(x, df):
    return mp.gammainc(mpf(df) / 2, x / 2, mp.inf, regularized=True)


def t_two_sided(t, df):
    return f_upper(t * t, 1, df)


def root(function, low, high):
    """The zero of a monotone function between two points, by bisection and then secants."""
    below = function(low) < 0
    for _ in range(24):
        middle = (low + high) / 2
        if (function(middle) < 0) == below:
            low = middle
        else:
            high = middle
    return mp.findroot(function, (low, high), solver="secant", tol=mpf(10) ** -80, verify=False)


@functools.cache
def t_quantile(level, df):
    """The t that two-sided probability 1 - level lies beyond."""
    return root(lambda t: t_two_sided(t, df) - (1 - level), mpf("0.1"), mpf(40))


def test(f, df1, df2):
    p = f_upper(f, df1, df2)
    return {"f": text(f), "df1": text(mpf(df1)), "df2": text(mpf(df2)), "p": text(p), "ln_p": text(mp.log(p))}


def noncentral_f_lower(f, df1, df2, noncentrality):
    """Poisson mixture of beta distributions, by the upward recurrence of the incomplete beta."""
    a, b = mpf(df1) / 2, mpf(df2) / 2
    x = df1 * f / (df1 * f + df2)
    half = noncentrality / 2
    weight, total, mass, j = mp.e ** -half, mpf(0), mpf(0), 0
    beta = mp.betainc(a, b, 0, x, regularized=True)
    step = x**a * (1 - x) ** b / (a * mp.beta(a, b))
    while mass < 1 - mpf(10) ** -30:
        total += weight * beta
        mass += weight
        beta -= step
        step *= x * (a + b + j) / (a + j + 1)
        j += 1
        weight *= half / j
    return total


def noncentrality_limits(f, df1, df2, level):
    tail = (1 - level) / 2
    limits = []
    for target in (1 - tail, tail):
        lower = lambda x: noncentral_f_lower(f, df1, df2, x) - target
        if f == 0 or lower(mpf(0)) <= 0:
            limits.append(mpf(0))
            continue
        high = mpf(1)
        while lower(high) > 0:
            high *= 2
        limits.append(root(lower, mpf(0), high))
    return limits


def criterion(value, f, df1, df2, eta2, effect, limits=True):
    found = dict(value=text(value), **test(f, df1, df2), eta2=text(eta2))
    if value > 0:
        found["ln_value"] = text(mp.log(value))
    # The mixture has too many terms for effects of thousands.
    if limits and df1 * f < 20000:
        low, high = noncentrality_limits(f, df1, df2, ETA_LEVEL)
        found["eta2_interval"] = [text(effect(low)), text(effect(high))]
    return found


def rao(value, p, q, multiplier):
    t = mp.sqrt(mpf(p * p * q * q - 4) / (p * p + q * q - 5)) if p * p + q * q > 5 else mpf(1)
    root = value ** (1 / t)
    df1, df2 = p * q, multiplier * t - mpf(p * q - 2) / 2
    return (1 - root) / root * df2 / df1, df1, df2, t


def criteria(roots, p, q, v, units):
    s = min(p, q)
    m, n = mpf(abs(p - q) - 1) / 2, mpf(v - p - 1) / 2
    product = mp.fprod(1 / (1 + x) for x in roots)
    f, df1, df2, t = rao(product, p, q, v - mpf(p - q + 1) / 2)
    found = {"wilks": criterion(product, f, df1, df2, 1 - product ** (mpf(1) / s),
                                lambda x: 1 - (1 / (1 + x / (units * t))) ** (t / s))}
    trace = mp.fsum(x / (1 + x) for x in roots)
    df1, df2 = s * (2 * m + s + 1), s * (2 * n + s + 1)
    found["pillai"] = criterion(trace, df2 / df1 * trace / (s - trace), df1, df2, trace / s, lambda x: x / (x + units * s))
    total = mp.fsum(roots)
    if v > p + 3:
        df1, b = p * q, mpf((v + q - p - 1) * (v - 1)) / ((v - p - 3) * (v - p))
        df2 = 4 + (df1 + 2) / (b - 1)
        c = (df2 - 2) / (v - p - 1)
        found["hotelling"] = criterion(total, total / c * df2 / df1, df1, df2, total / (total + s), lambda x: x / (x + units * s))
        found["hotelling"]["approximation"] = "McKeon"
    elif s * n + 1 > 0:
        df1, df2 = s * (2 * m + s + 1), 2 * (s * n + 1)
        f = df2 * total / (s * s * (2 * m + s + 1))
        found["hotelling"] = criterion(total, f, df1, df2, total / (total + s), lambda x: x / (x + units * s))
        found["hotelling"]["approximation"] = "PillaiSamson"
    d = max(p, q)
    found["roy"] = criterion(roots[0], roots[0] * (v - d + q) / d, d, v - d + q, roots[0] / (1 + roots[0]),
                             lambda x: x / (x + units), limits=s == 1)
    return found


def anova(values):
    """values: one list of exact fractions for each group."""
    everything = [x for group in values for x in group]
    n, k = len(everything), len(values)
    grand = sum(everything) / n
    means = [sum(group) / len(group) for group in values]
    between = sum(len(group) * (mean - grand) ** 2 for group, mean in zip(values, means))
    within = sum((x - mean) ** 2 for group, mean in zip(values, means) for x in group)
    return exact(between), exact(within), k - 1, n - k


def levene(values, centre):
    distances = [[abs(x - centre(group)) for x in group] for group in values]
    between, within, df1, df2 = anova(distances)
    return None if within == 0 else test(between / df1 / (within / df2), df1, df2)


def mean(group):
    return sum(group) / len(group)


def median(group):
    ordered = sorted(group)
    return (ordered[(len(group) - 1) // 2] + ordered[len(group) // 2]) / 2


def spread(group):
    """Mean, standard deviation, standard error and interval of exact fractions."""
    n = len(group)
    centre = exact(mean(group))
    if n == 1:
        return {"n": 1, "mean": text(centre)}
    sd = mp.sqrt(exact(sum((x - mean(group)) ** 2 for x in group)) / (n - 1))
    half = t_quantile(LEVEL, n - 1) * sd / mp.sqrt(n)
    return {"n": n, "mean": text(centre), "sd": text(sd), "se": text(sd / mp.sqrt(n)), "interval": [text(centre - half), text(centre + half)]}


def univariate(values):
    between, within, df1, df2 = anova(values)
    f = between / df1 / (within / df2)
    everything = [x for group in values for x in group]
    omega2 = df1 * (f - 1) / (df1 * f + df2 + 1)
    sd = mp.sqrt(within / df2)
    correction = mp.gamma(mpf(df2) / 2) / mp.gamma(mpf(df2 - 1) / 2) / mp.sqrt(mpf(df2) / 2)
    pairs = []
    for (i, a), (j, b) in itertools.combinations(enumerate(values), 2):
        difference = exact(mean(a) - mean(b))
        unit = mp.sqrt(mpf(1) / len(a) + mpf(1) / len(b))
        t = difference / sd / unit
        half = t_quantile(LEVEL, df2) * sd * unit
        p = t_two_sided(t, df2)
        pairs.append({"first": i, "second": j, "difference": text(difference), "interval": [text(difference - half), text(difference + half)],
                      "t": text(t), "p": text(p), "ln_p": text(mp.log(p)), "d": text(difference / sd), "g": text(correction * difference / sd)})
    return {"ss_between": text(between), "ss_within": text(within), **test(f, df1, df2), "eta2": text(between / (between + within)), "omega2": text(omega2),
            "total": spread(everything), "groups": [spread(group) for group in values], "levene_mean": levene(values, mean), "levene_median": levene(values, median),
            "pairs": pairs, "pooled_sd": text(sd), "correction": text(correction)}


def cross_products(rows, centre):
    p = len(centre)
    return [[sum((row[a] - centre[a]) * (row[b] - centre[b]) for row in rows) for b in range(p)] for a in range(p)]


def matrix(entries):
    return mp.matrix([[exact(x) for x in row] for row in entries])


def box(groups, error, v, p):
    if any(len(rows) <= p for rows in groups):
        return None
    k = len(groups)
    dfs = [len(rows) - 1 for rows in groups]
    logs = []
    for rows, df in zip(groups, dfs):
        determinant = mp.det(matrix(cross_products(rows, [mean(column) for column in zip(*rows)])) / df)
        if determinant == 0:
            return None
        logs.append(mp.log(determinant))
    pooled = mp.log(mp.det(error / v))
    m = v * pooled - mp.fsum(df * log for df, log in zip(dfs, logs))
    c1 = (sum(mpf(1) / df for df in dfs) - mpf(1) / v) * (2 * p * p + 3 * p - 1) / (6 * (p + 1) * (k - 1))
    c2 = (sum(mpf(1) / df**2 for df in dfs) - mpf(1) / v**2) * (p - 1) * (p + 2) / (6 * (k - 1))
    f1 = mpf(p * (p + 1) * (k - 1)) / 2
    f2 = (f1 + 2) / abs(c2 - c1**2)
    if c2 > c1**2:
        f = m * (1 - c1 - f1 / f2) / f1
    else:
        part = m * (1 - c1 + 2 / f2) / f2
        f = f2 * part / (f1 * (1 - part))
    chi2 = m * (1 - c1)
    return {"m": text(m), "chi_square": text(chi2), "df": text(f1), "chi_square_test": {"p": text(chi2_upper(chi2, f1)), "ln_p": text(mp.log(chi2_upper(chi2, f1)))}, "branch": "first" if c2 > c1**2 else "second",
            "f": test(f, f1, f2), "log_determinants": [text(x) for x in logs], "pooled_log_determinant": text(pooled)}


def correlations(products, df):
    p = products.rows
    sd = [mp.sqrt(products[j, j] / df) for j in range(p)]
    r = [[text(products[i, j] / mp.sqrt(products[i, i] * products[j, j])) for j in range(p)] for i in range(p)]
    return {"sd": [text(x) for x in sd], "r": r}


def discriminant(roots, vectors, error, groups, v, p):
    covariance = error / v
    sd = [mp.sqrt(covariance[j, j]) for j in range(p)]
    grand = [mean(column) for column in zip(*[row for rows in groups for row in rows])]
    found = []
    for root, vector in zip(roots, vectors):
        largest = max(range(p), key=lambda j: abs(vector[j] * sd[j]))
        vector = vector if vector[largest] > 0 else -vector
        product = covariance * vector
        standardized = [vector[j] * sd[j] for j in range(p)]
        structure = [product[j] / sd[j] for j in range(p)]
        centroids = []
        for rows in groups:
            scores = [mp.fsum(vector[j] * exact(row[j] - grand[j]) for j in range(p)) for row in rows]
            centre = mp.fsum(scores) / len(rows)
            sds = text(mp.sqrt(mp.fsum((x - centre) ** 2 for x in scores) / (len(rows) - 1))) if len(rows) > 1 else None
            centroids.append({"n": len(rows), "mean": text(centre), "sd": sds})
        found.append({"raw": [text(x) for x in vector], "standardized": [text(x) for x in standardized], "structure": [text(x) for x in structure],
                      "share": [text(a * b) for a, b in zip(standardized, structure)], "centroids": centroids})
    return found


def one_way(name, folder, factor):
    name, as_doubles, _ = name.partition(" as doubles")
    read = (lambda cell: Fraction(float(cell))) if as_doubles else Fraction
    with open(HERE / folder / f"{name}.csv", newline="") as file:
        table = list(csv.DictReader(file))
    outcomes = [column for column in table[0] if column != factor]
    levels = list(dict.fromkeys(row[factor] for row in table))
    groups = [[[read(row[y]) for y in outcomes] for row in table if row[factor] == level] for level in levels]
    rows = [row for group in groups for row in group]
    n, p, k = len(rows), len(outcomes), len(levels)
    q, v = k - 1, n - k
    total = cross_products(rows, [mean(column) for column in zip(*rows)])
    within = [cross_products(group, [mean(column) for column in zip(*group)]) for group in groups]
    error = [[sum(products[a][b] for products in within) for b in range(p)] for a in range(p)]
    effect = [[total[a][b] - error[a][b] for b in range(p)] for a in range(p)]
    error, effect, total = matrix(error), matrix(effect), matrix(total)

    inverse = mp.inverse(mp.cholesky(error))
    values, whitened = mp.eigsy(inverse * effect * inverse.T)
    order = sorted(range(p), key=lambda j: -values[j])[: min(p, q)]
    roots = [mpf(0) if abs(values[j]) < mpf(10) ** -40 else values[j] for j in order]
    vectors = [inverse.T * whitened[:, j] * mp.sqrt(v) for j in order]

    multiplier = v - mpf(p - q + 1) / 2
    dimensions = []
    for gone in range(len(roots)):
        product = mp.fprod(1 / (1 + x) for x in roots[gone:])
        f, df1, df2, _ = rao(product, p - gone, q - gone, multiplier)
        dimensions.append({"wilks": text(product), **test(f, df1, df2)})
    found = {"file": f"{folder}/{name}.csv", "factor": factor, "outcomes": outcomes, "levels": levels, "df_hypothesis": q, "df_error": v,
            "roots": [text(x) for x in roots], "canonical": [text(mp.sqrt(x / (1 + x))) for x in roots], **criteria(roots, p, q, v, n), "dimensions": dimensions}
    if folder == "hard" and name not in ("singleton_group", "small_groups", "p_eq_dfe", "scale_mixed", "box_second_branch", "one_outcome"):
        return found
    return {**found, "discriminant": discriminant(roots, vectors, error, groups, v, p), "within": correlations(error, v), "total": correlations(total, n - 1), "box": box(groups, error, v, p),
            "univariate": [univariate([[row[j] for row in group] for group in groups]) for j in range(p)]}


if __name__ == "__main__":
    found = {name: one_way(name, folder, factor) for name, folder, factor in CASES}
    lines = [f"{json.dumps(name)}: {json.dumps(case)}" for name, case in found.items()]
    (HERE / "one_way.json").write_text("{\n" + ",\n".join(lines) + "\n}\n")
