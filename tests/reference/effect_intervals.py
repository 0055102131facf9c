"""Computes `effect_intervals.json`: limits of effect sizes to 20 digits, by root-finding in 32 digits.

    python tests/reference/effect_intervals.py

The noncentral t is integrated over the distribution of the standard deviation; the noncentral F is summed
as a mixture of central ones with Poisson weights. A limit is the noncentrality at which what was found
stands at the edge of its distribution (Steiger & Fouladi 1997, in Harlow et al., What If There Were No
Significance Tests?; Steiger 2004, Psychological Methods 9).
"""

import json
from pathlib import Path

from mpmath import mp, mpf

mp.dps = 32
FILE = Path(__file__).with_name("effect_intervals.json")

# d, the sizes of the two groups.
DIFFERENCES = [
    ("0.5", 20, 20),
    ("0.8", 10, 14),
    ("0.0", 15, 15),
    ("-1.2", 8, 30),
    ("0.2", 500, 480),
    ("3.0", 6, 6),
    ("0.35", 2, 3),
    ("1.5", 3, 200),
    ("0.05", 5000, 5000),
    ("6.5", 12, 12),
]

# F and its degrees of freedom.
RATIOS = [
    ("5.0", 3, 76),
    ("3.35", 2, 27),
    ("0.5", 3, 40),
    ("0.01", 3, 40),
    ("1.0", 1, 10),
    ("40.72", 2, 18),
    ("4.76", 5, 102),
    ("250.0", 2, 147),
    ("1180.16", 2, 147),
    ("1.5", 30, 3000),
]


def correction(df):
    """Hedges' factor (1981, Journal of Educational Statistics 6)."""
    return mp.gamma(mpf(df) / 2) / (mp.sqrt(mpf(df) / 2) * mp.gamma(mpf(df - 1) / 2))


def noncentral_t(t, df, delta):
    """P(T <= t): the mean of Φ(t s - delta) over s = √(χ²/df)."""
    df = mpf(df)
    log_constant = df / 2 * mp.log(df / 2) - mp.loggamma(df / 2) + mp.log(2)

    def integrand(s):
        density = mp.exp(log_constant + (df - 1) * mp.log(s) - df * s * s / 2)
        return density * mp.ncdf(t * s - delta)

    # The density is all but normal about 1; what lies beyond 40 of its widths is below 1e-40.
    width = 1 / mp.sqrt(2 * df)
    steps = [mpf(0)] + [1 + k * width for k in range(-18, 41, 3) if 1 + k * width > 0]
    return mp.quad(integrand, steps, method="gauss-legendre")


def noncentral_f(f, df1, df2, noncentrality):
    """P(F' <= f): Poisson weights, from the heaviest one outwards."""
    x = df1 * f / (df1 * f + df2)
    half = noncentrality / 2

    def term(j):
        weight = mp.exp(-half + j * mp.log(half) - mp.loggamma(j + 1)) if half else mpf(j == 0)
        return weight * mp.betainc(mpf(df1) / 2 + j, mpf(df2) / 2, 0, x, regularized=True)

    centre = int(half)
    total = mpf(0)
    for step, start in ((1, centre), (-1, centre - 1)):
        j = start
        while j >= 0:
            part = term(j)
            total += part
            if part < mpf(10) ** -30 and abs(j - centre) > 3:
                break
            j += step
    return total


def root(distribution, target, low, high):
    """Where a falling distribution function meets the target, by false position after Illinois."""
    while distribution(high) > target:
        high *= 2
    above, below = distribution(low) - target, distribution(high) - target
    while high - low > mpf(10) ** -23 * max(1, abs(high)):
        middle = (low * below - high * above) / (below - above)
        value = distribution(middle) - target
        if abs(value) < mpf(10) ** -25:
            return middle
        if value > 0:
            low, above, below = middle, value, below / 2
        else:
            high, below, above = middle, value, above / 2
    return (low + high) / 2


def difference(d, n1, n2):
    per_unit = mp.sqrt(mpf(1) / n1 + mpf(1) / n2)
    t, df = mpf(d) / per_unit, n1 + n2 - 2
    reach = 6 + abs(t)
    limits = [
        root(lambda delta: noncentral_t(t, df, delta), mpf(tail), t - reach, t + reach) * per_unit
        for tail in ("0.975", "0.025")
    ]
    g = mpf(d) * correction(df)
    return {"d": d, "n1": n1, "n2": n2, "g": text(g), "lower": text(limits[0]), "upper": text(limits[1])}


def ratio(f, df1, df2):
    units = df1 + df2 + 1
    value = mpf(f)
    limits = []
    for tail in ("0.95", "0.05"):
        below = lambda noncentrality: noncentral_f(value, df1, df2, noncentrality)
        if below(mpf(0)) <= mpf(tail):
            limits.append(mpf(0))
        else:
            limits.append(root(below, mpf(tail), mpf(0), value * df1 + 10))
    eta2 = value * df1 / (value * df1 + df2)
    shares = [text(limit / (limit + units)) for limit in limits]
    return {"F": f, "df1": df1, "df2": df2, "eta2": text(eta2), "lower": shares[0], "upper": shares[1]}


def text(number):
    return mp.nstr(number, 20)


if __name__ == "__main__":
    whole = {
        "differences": [difference(*case) for case in DIFFERENCES],
        "ratios": [ratio(*case) for case in RATIOS],
    }
    FILE.write_text(json.dumps(whole, indent=1) + "\n", encoding="utf-8")
