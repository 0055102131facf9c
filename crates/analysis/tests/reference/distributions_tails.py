"""Writes distributions_tails.json: logarithms of tail probabilities far out, where many of the probabilities
themselves are below the smallest double, and of the factor J at large degrees of freedom.

Every value is computed by two unrelated routes, in mpmath and in the ball arithmetic of Arb (python-flint);
the run stops if they disagree in the first 30 digits. Arguments are exact decimals.
Usage: pip install mpmath python-flint; python distributions_tails.py > distributions_tails.json
"""

import json

import mpmath as mp
from flint import arb, ctx
from mpmath import mpf

mp.mp.dps = 60
ctx.prec = 400


def to_mp(ball):
    return mpf(ball.mid().str(60, radius=False))


def agreed(first, second, what):
    """The first value as text, if the second is the same to 30 digits."""
    if abs(first - second) > abs(first) * mpf(10) ** -30:
        raise SystemExit(f"{what}: {first} against {second}")
    return mp.nstr(first, 25)


# ---------------------------------------------------------------------------- F and chi-square
def ln_beta_density(a, b, x, y):
    return a * mp.log(x) + b * mp.log(y) + mp.loggamma(a + b) - mp.loggamma(a) - mp.loggamma(b)


def ln_lower_beta(a, b, x, y):
    """ln I_x(a, b) by the continued fraction (modified Lentz), for x below the centre."""
    c, d = mpf(1), 1 / (1 - (a + b) * x / (a + 1))
    value = d
    for m in range(1, 10**7):
        for t in (
            m * (b - m) * x / ((a + 2 * m - 1) * (a + 2 * m)),
            -(a + m) * (a + b + m) * x / ((a + 2 * m) * (a + 2 * m + 1)),
        ):
            d = 1 / (1 + t * d)
            c = 1 + t / c
            value *= d * c
        if abs(d * c - 1) < mpf(10) ** -50:
            return ln_beta_density(a, b, x, y) - mp.log(a) + mp.log(value)
    raise SystemExit("the continued fraction does not converge")


def arb_ln_beta_density(a, b, x, y):
    return a * x.log() + b * y.log() + (a + b).lgamma() - a.lgamma() - b.lgamma()


def arb_ln_lower_beta(a, b, x, y):
    """ln I_x(a, b) by the series with the factor (1 - x)^b, all of whose terms are positive, or for x close to 1,
    where it is slow, by Arb's hypergeometric function."""
    if x > 0.99:
        return x.beta_lower(a, b, regularized=1).log()
    term = total = arb(1)
    n = 0
    while True:
        term *= x * (a + b + n) / (a + 1 + n)
        total += term
        n += 1
        if term < total * arb(10) ** -50:
            return arb_ln_beta_density(a, b, x, y) - a.log() + total.log()


def ln_f_tail(f, d1, d2, side):
    """The logarithm of the lower or upper tail of F by both routes; the tail must be the smaller one."""
    results = []
    for kind, ln_lower in ((mpf, ln_lower_beta), (arb, arb_ln_lower_beta)):
        k, a, b = kind(f), kind(d1) / 2, kind(d2) / 2
        x, y = a * k / (a * k + b), b / (a * k + b)
        results.append(ln_lower(a, b, x, y) if side == "lower" else ln_lower(b, a, y, x))
    return results[0], to_mp(results[1])


def ln_chi_square_tail(x, df, side):
    a, z = mpf(df) / 2, mpf(x) / 2
    density = a * mp.log(z) - z - mp.loggamma(a)
    if side == "upper":  # Legendre's continued fraction, from far out inwards
        value = mpf(0)
        for m in range(20000, 0, -1):
            value = m * (a - m) / (z - a + 1 + 2 * m + value)
        first = density - mp.log(z - a + 1 + value)
        second = arb(x) / 2
        second = second.gamma_upper(arb(df) / 2, regularized=1).log()
    else:
        term = total = 1 / a
        n = 1
        while term > total * mpf(10) ** -50:
            term *= z / (a + n)
            total += term
            n += 1
        first = density + mp.log(total)
        second = (arb(x) / 2).gamma_lower(arb(df) / 2, regularized=1).log()
    return first, to_mp(second)


def ln_normal_two_sided(z):
    """ln P(|Z| > z), by the complementary error function and by its continued fraction or its series."""
    x = mpf(z) / mp.sqrt(2)
    if x > 2:  # Laplace's continued fraction, from far out inwards
        value = mpf(0)
        for m in range(4000, 0, -1):
            value = (mpf(m) / 2) / (x + value)
        second = -x * x - mp.log(x + value) - mp.log(mp.pi) / 2
    else:
        term = total = x
        n = 0
        while term > mpf(10) ** -55:
            n += 1
            term *= 2 * x * x / (2 * n + 1)
            total += term
        second = mp.log(1 - 2 / mp.sqrt(mp.pi) * mp.exp(-x * x) * total)
    return to_mp((arb(z) / arb(2).sqrt()).erfc().log()), second


# ---------------------------------------------------------------------------- noncentral laws
def ln_noncentral_f_tail(f, d1, d2, lam, side):
    """Poisson mixtures: the terms afresh from the density in mpmath, the tails by adding steps from the safe end
    in Arb with a starting value from the series."""
    results = []
    for kind, ln_lower, density in (
        (mpf, ln_lower_beta, ln_beta_density),
        (arb, arb_ln_lower_beta, arb_ln_beta_density),
    ):
        log = mp.log if kind is mpf else lambda value: value.log()
        exp = mp.exp if kind is mpf else lambda value: value.exp()
        k, a, b, h = kind(f), kind(d1) / 2, kind(d2) / 2, kind(lam) / 2
        x, y = a * k / (a * k + b), b / (a * k + b)
        if side == "lower":
            top = int(float(lam) / 2 + 40 * (float(lam) / 2) ** 0.5 + 200)
            if kind is mpf:
                top += 57  # another end for the other route
            tail = exp(ln_lower(a + top, b, x, y))
            step = exp(density(a + top, b, x, y) - log(a + top))
            weight = exp(-h + top * log(h) - (mp.loggamma(top + 1) if kind is mpf else arb(top + 1).lgamma()))
            total = weight * tail
            for j in range(top - 1, -1, -1):
                step *= (a + j + 1) / (x * (a + b + j))
                tail += step
                weight *= (j + 1) / h
                total += weight * tail
        else:
            tail = exp(ln_lower(b, a, y, x))
            step = exp(density(a, b, x, y) - log(a))
            weight = exp(-h)
            total = weight * tail
            count = int(10 * float(lam) + 40 * float(lam) ** 0.5 + 4000)
            if kind is mpf:
                count += 57
            for j in range(count):
                tail += step
                step *= x * (a + b + j) / (a + j + 1)
                weight *= h / (j + 1)
                total += weight * tail
        results.append(log(total))
    return results[0], to_mp(results[1])


def ln_noncentral_t_lower(t, df, delta):
    """ln E Phi(t S - delta): the trapezoidal rule over ln S, and tanh-sinh quadrature over pieces of S."""
    t, v, d = mpf(t), mpf(df), mpf(delta)
    constant = mp.log(2) + v / 2 * mp.log(v / 2) - mp.loggamma(v / 2)

    def ln_density(u):
        return constant + v * u - v * mp.exp(2 * u) / 2 + mp.log(mp.erfc((d - t * mp.exp(u)) / mp.sqrt(2)) / 2)

    peak = max((mpf(i) / 50 for i in range(-1000, 400)), key=ln_density)
    width = mpf(1) / 50
    while width > mpf(10) ** -6:  # a walk with shrinking steps
        peak, width = max((peak - width, peak, peak + width), key=ln_density), width / mpf(1.3)
    top = ln_density(peak)
    bend = -mp.diff(ln_density, peak, 2)
    # The edge that Phi makes may be sharper than the peak.
    step = min(1 / mp.sqrt(bend), 1 / abs(t * mp.exp(peak))) / 8

    def trapezoid(h, shift):
        total = mpf(0)
        for sign in (1, -1):
            n = 0 if sign == 1 else 1
            while True:
                term = mp.exp(ln_density(peak + (sign * n + shift) * h) - top)
                total += term
                n += 1
                if term < mpf(10) ** -45 and n > 3:
                    break
        return mp.log(total * h) + top

    first = trapezoid(step, mpf(0))

    # The other route: quadrature over S itself, between points where nothing is left.
    def density_of_s(s):
        return mp.exp(constant + (v - 1) * mp.log(s) - v * s * s / 2 - top) * mp.erfc((d - t * s) / mp.sqrt(2)) / 2

    spread = 1 / mp.sqrt(bend)
    ends = [peak]
    for sign, place in ((-1, 0), (1, -1)):
        reach = spread
        while ln_density(ends[place]) - top > -110:
            ends.insert(0 if sign < 0 else len(ends), peak + sign * reach)
            reach *= mpf(1.6)
    second = mp.log(mp.quad(density_of_s, [mp.exp(end) for end in ends], maxdegree=8)) + top
    return first, second


# ---------------------------------------------------------------------------- the factor J
def hedges(df):
    m = mpf(df)
    first = mp.exp(mp.loggamma(m / 2) - mp.loggamma((m - 1) / 2)) / mp.sqrt(m / 2)
    m = arb(df)
    second = ((m / 2).lgamma() - ((m - 1) / 2).lgamma() - (m / 2).log() / 2).exp()
    return first, to_mp(second)


POINTS = {
    "f": [
        ("1e5", "8", "288", "upper"), ("2000", "2", "5000", "upper"), ("1e10", "3", "87", "upper"),
        ("1e6", "1", "1e6", "upper"), ("77.3", "12.7", "845.6", "upper"), ("3", "1e6", "1e6", "upper"),
        ("1.02", "1e6", "1e6", "upper"), ("0.98", "1e6", "1e6", "lower"), ("1.5", "2.5e7", "3e6", "upper"),
        ("40", "1e6", "12.5", "upper"), ("1e-30", "7", "0.5", "lower"), ("1e-12", "300", "40", "lower"),
        ("6", "3.3", "1e7", "upper"), ("1.01", "1e5", "3e5", "upper"),
    ],
    "chi_square": [
        ("3.841458820694124", "1", "upper"), ("2000", "3", "upper"), ("12000", "1e4", "upper"),
        ("8500", "1e4", "lower"), ("1004000", "1e6", "upper"), ("996000", "1e6", "lower"),
        ("1.1e8", "1e8", "upper"), ("1e-8", "1", "lower"), ("0.5", "0.3", "upper"), ("700", "12.6", "upper"),
    ],
    "normal": [("0.001",), ("0.3",), ("0.66",), ("0.67",), ("1.96",), ("5.6",), ("5.7",), ("12",), ("38",), ("150",)],
    "ncf": [
        ("400", "3", "1000", "5", "upper"), ("0.01", "3", "60", "3000", "lower"), ("60", "2.5", "1e5", "10", "upper"),
        ("0.5", "12", "40", "5000", "lower"), ("30", "6.5", "33.3", "900", "lower"), ("3e4", "2", "12", "800", "upper"),
        ("20000", "1", "50", "30000", "lower"), ("45000", "1", "50", "30000", "upper"),
    ],
    "nct": [
        ("-40", "30", "25"), ("-5", "2.5", "60"), ("12", "30", "70"), ("-60", "1e4", "-5"), ("-1000", "12", "-2"),
        ("3", "7.5", "45"), ("150", "9", "400"), ("28.02443", "4.50003", "35.67"), ("12", "0.61", "8"),
    ],
    "hedges": [("1.5",), ("2",), ("3",), ("10",), ("77.25",), ("1e3",), ("1e6",), ("1e9",), ("1e12",)],
}


def main():
    tables = {
        "f": (("x", "d1", "d2", "side"), ln_f_tail),
        "chi_square": (("x", "df", "side"), ln_chi_square_tail),
        "normal": (("z",), ln_normal_two_sided),
        "ncf": (("x", "d1", "d2", "lambda", "side"), ln_noncentral_f_tail),
        "nct": (("t", "df", "delta"), ln_noncentral_t_lower),
        "hedges": (("df",), hedges),
    }
    source = (
        "Written by distributions_tails.py: natural logarithms of lower or upper tail probabilities (normal: of both "
        "together, nct: of the lower one) and the factor J, 25 digits, two unrelated routes each (mpmath and Arb; for nct two quadratures in mpmath) "
        "that agree in 30 digits. Arguments are exact decimals."
    )
    lines = [f'  "_source": {json.dumps(source)}']
    for name, (keys, function) in tables.items():
        rows = []
        for point in POINTS[name]:
            value = agreed(*function(*point), f"{name}{point}")
            row = dict(zip(keys, point), **{"j" if name == "hedges" else "ln_p": value})
            rows.append("    " + json.dumps(row))
        lines.append(f'  "{name}": [\n' + ",\n".join(rows) + "\n  ]")
    print("{\n" + ",\n".join(lines) + "\n}")


if __name__ == "__main__":
    main()
