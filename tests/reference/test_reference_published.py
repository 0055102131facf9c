"""Figures printed in books and papers, to the digits that they are printed with.

The data are those of `crates/analysis/tests/reference/data`; what is small enough stands here.
"""

import numpy as np
import pytest
from reference_support import REFERENCE, compared, read_columns, table_text


def rounds_to(found, printed):
    """Asserts that a number rounds to what was printed."""
    decimals = len(printed.partition(".")[2])
    assert abs(found - float(printed)) <= 0.5 * 10.0**-decimals * (1 + 1e-9), (found, printed)


def data(name, outcomes, factor):
    return compared(outcomes, factor, (REFERENCE / "data" / f"{name}.csv").read_text())


def sums_of_squares(found, factor, outcome, units):
    """Between and within, from the printed measures: the total SD and η²."""
    total = found.value("main", "correlations", "sd", "total", outcome) ** 2 * (units - 1)
    between = total * found.value("main", "outcomes", factor, outcome, "eta2")
    return between, total - between


def cross_product(found, kind, first, second, df):
    """A sum of products within groups, or of all units about the grand mean."""
    correlations = lambda *keys: found.value("main", "correlations", *keys)
    sd = [correlations("sd", kind, outcome) for outcome in (first, second)]
    return correlations(kind, first, second) * sd[0] * sd[1] * df


# --- Johnson & Wichern, Applied Multivariate Statistical Analysis, examples 6.8 and 6.9: 8 units.


@pytest.fixture(scope="module")
def johnson_wichern():
    return data("jw8", ["y1", "y2"], "g")


def test_johnson_and_wichern_sums_of_squares_and_products(johnson_wichern):
    found = johnson_wichern
    for outcome, between, within in [("y1", "78", "10"), ("y2", "48", "24")]:
        of = sums_of_squares(found, "g", outcome, 8)
        rounds_to(of[0], between)
        rounds_to(of[1], within)
    within = cross_product(found, "within", "y1", "y2", 5)
    total = cross_product(found, "total", "y1", "y2", 7)
    assert within == pytest.approx(1, rel=1e-12)
    assert total - within == pytest.approx(-12, rel=1e-12)


def test_johnson_and_wichern_wilks(johnson_wichern):
    """The book prints F = 8.19, from the rounded Λ; the exact F is 8.1989."""
    wilks = lambda key: johnson_wichern.value("main", "omnibus", "g", "wilks", key)
    assert wilks("value") == pytest.approx(239 / 6215, rel=1e-14)
    rounds_to(wilks("value"), "0.0385")
    rounds_to(wilks("F"), "8.199")
    assert (wilks("df1"), wilks("df2")) == (4, 8)


# --- Stevens, Applied Multivariate Statistics for the Social Sciences: three groups, two outcomes.


@pytest.fixture(scope="module")
def stevens():
    return data("stevens12", ["y1", "y2"], "g")


def test_stevens_sums_of_squares_and_products(stevens):
    for outcome, between, within in [("y1", "61.87", "14.8"), ("y2", "19.05", "9.2")]:
        of = sums_of_squares(stevens, "g", outcome, 12)
        rounds_to(of[0], between)
        rounds_to(of[1], within)
    within = cross_product(stevens, "within", "y1", "y2", 9)
    rounds_to(within, "1.6")
    rounds_to(cross_product(stevens, "total", "y1", "y2", 11) - within, "24.40")


def test_stevens_wilks(stevens):
    wilks = lambda key: stevens.value("main", "omnibus", "g", "wilks", key)
    rounds_to(wilks("value"), "0.0897")
    rounds_to(wilks("F"), "9.36")
    assert (wilks("df1"), wilks("df2")) == (4, 16)


# --- Rencher, Methods of Multivariate Analysis, chapter 6: apple trees on six rootstocks (Andrews &
# Herzberg 1985, Data, table 48).


@pytest.fixture(scope="module")
def rootstock():
    return data("rootstock", ["girth4", "ext4", "girth15", "weight15"], "rootstock")


@pytest.mark.parametrize(
    ("path", "printed"),
    [
        ("omnibus.rootstock.wilks.value", "0.1540"),
        ("omnibus.rootstock.wilks.F", "4.937"),
        ("omnibus.rootstock.wilks.df1", "20"),
        ("omnibus.rootstock.wilks.df2", "130.3"),
        ("omnibus.rootstock.pillai.value", "1.305"),
        ("omnibus.rootstock.hotelling.value", "2.921"),
        ("omnibus.rootstock.roy.theta", "0.652"),
        ("functions.rootstock.1.eigenvalue", "1.876"),
        ("functions.rootstock.2.eigenvalue", "0.791"),
        ("functions.rootstock.3.eigenvalue", "0.229"),
        ("functions.rootstock.4.eigenvalue", "0.026"),
    ],
)
def test_rencher_rootstocks(rootstock, path, printed):
    rounds_to(rootstock.values[f"main.{path}"], printed)


def test_rencher_sums_of_squares_and_products(rootstock):
    between, within = sums_of_squares(rootstock, "rootstock", "girth4", 48)
    rounds_to(between, "0.074")
    rounds_to(within, "0.320")
    rounds_to(sums_of_squares(rootstock, "rootstock", "ext4", 48)[1], "12.143")
    rounds_to(cross_product(rootstock, "within", "girth4", "ext4", 42), "1.697")


def test_roys_f_for_the_rootstocks_gives_a_bound_and_no_p_value(rootstock):
    """The exact p of this largest root is 3.33794587e-6 (Chiani 2016, Journal of Multivariate
    Analysis 143; computed to 50 digits): the bound lies below it by a factor of 330."""
    bound = rootstock.values["main.omnibus.rootstock.roy.p_bound"]
    assert "main.omnibus.rootstock.roy.p" not in rootstock.values
    assert bound < 3.33794587e-6
    rounds_to(bound * 1e8, "1.0")


# --- Fisher 1936, The use of multiple measurements in taxonomic problems, Annals of Eugenics 7.

MEASURES = {"sl": "sepal length", "sw": "sepal width", "pl": "petal length", "pw": "petal width"}


@pytest.fixture(scope="module")
def two_species():
    columns = read_columns("data/iris.csv")
    kept = [row for row, species in enumerate(columns["species"]) if species != "virginica"]
    table = table_text({name: [column[row] for row in kept] for name, column in columns.items()})
    return compared(list(MEASURES), "species", table)


def test_fisher_pooled_sums_of_squares_and_products(two_species):
    printed = {
        ("sl", "sl"): "19.1434",
        ("sl", "sw"): "9.0356",
        ("sl", "pl"): "9.7634",
        ("sl", "pw"): "3.2394",
        ("sw", "sw"): "11.8658",
        ("sw", "pl"): "4.6232",
        ("sw", "pw"): "2.4746",
        ("pl", "pl"): "12.2978",
        ("pl", "pw"): "3.8794",
        ("pw", "pw"): "2.4604",
    }
    for (first, second), figure in printed.items():
        if first == second:
            sd = two_species.value("main", "correlations", "sd", "within", first)
            rounds_to(98 * sd**2, figure)
        else:
            rounds_to(cross_product(two_species, "within", first, second, 98), figure)


def test_fisher_discriminant_function(two_species):
    """His function solves Wa = d, W of sums of products; he worked by hand, so six decimals agree."""
    printed = np.array([-0.0311511, -0.1839075, 0.2221044, 0.3147370])
    raw = np.array(
        [
            two_species.value("main", "coefficients", "species", "raw", outcome, 1)
            for outcome in MEASURES
        ]
    )
    # Of unit variance within groups; his has a'W a = a'd, from which the scale follows.
    differences = -np.array(
        [
            two_species.value(
                "main", "pairs", "species", "setosa", "versicolor", outcome, "difference"
            )
            for outcome in MEASURES
        ]
    )
    scale = raw @ differences / 98
    assert raw * scale == pytest.approx(printed, abs=1e-6)


# --- Fisher's three species, as many multivariate textbooks print them.


@pytest.fixture(scope="module")
def iris():
    return data("iris", list(MEASURES), "species")


@pytest.mark.parametrize(
    ("path", "printed"),
    [
        ("functions.species.1.eigenvalue", "32.192"),
        ("functions.species.2.eigenvalue", "0.285"),
        ("functions.species.1.canonical", "0.985"),
        ("functions.species.2.canonical", "0.471"),
        ("omnibus.species.wilks.value", "0.0234"),
        ("omnibus.species.wilks.F", "199.15"),
        ("omnibus.species.wilks.df1", "8"),
        ("omnibus.species.wilks.df2", "288"),
        ("omnibus.species.pillai.value", "1.192"),
        ("omnibus.species.hotelling.value", "32.477"),
        ("covariances.box.chi2", "140.94"),
        ("covariances.box.df", "20"),
    ],
)
def test_iris_of_three_species(iris, path, printed):
    rounds_to(iris.values[f"main.{path}"], printed)


# --- Manly, Multivariate Statistical Methods: Egyptian skulls of five periods (Thomson &
# Randall-Maciver 1905, The Ancient Races of the Thebaid).


@pytest.mark.parametrize(
    ("path", "printed"),
    [
        ("omnibus.epoch.wilks.value", "0.664"),
        ("omnibus.epoch.wilks.F", "3.90"),
        ("omnibus.epoch.wilks.df1", "16"),
        ("omnibus.epoch.wilks.df2", "434.5"),
        ("omnibus.epoch.pillai.value", "0.353"),
        ("omnibus.epoch.hotelling.value", "0.482"),
        ("omnibus.epoch.roy.value", "0.425"),
        ("covariances.box.F", "1.14"),
        ("covariances.box.df1", "40"),
        ("covariances.box.df2", "46379"),
    ],
)
def test_manly_skulls(path, printed):
    found = data("skulls", ["mb", "bh", "bl", "nh"], "epoch")
    rounds_to(found.values[f"main.{path}"], printed)


# --- NIST/SEMATECH e-Handbook of Statistical Methods, section 7.4.3: three levels, five units each.


def test_handbook_analysis_of_variance():
    y = [6.9, 5.4, 5.8, 4.6, 4.0, 8.3, 6.8, 7.8, 9.2, 6.5, 8.0, 10.5, 8.1, 6.9, 9.3]
    level = [f"{1 + unit // 5}" for unit in range(15)]
    found = compared(["y"], "level", table_text({"y": y, "level": level}))
    between, within = sums_of_squares(found, "level", "y", 15)
    rounds_to(between, "27.897")
    rounds_to(within, "17.452")
    rounds_to(found.values["main.outcomes.level.y.F"], "9.59")
    assert found.values["main.outcomes.level.y.df1"] == 2
    assert found.values["main.outcomes.level.y.df2"] == 12


# --- Potthoff & Roy 1964, Biometrika 51: distances (mm) in the growth of 11 girls and 16 boys.

GIRLS = """21 20 21.5 23 | 21 21.5 24 25.5 | 20.5 24 24.5 26 | 23.5 24.5 25 26.5 | 21.5 23 22.5 23.5
| 20 21 21 22.5 | 21.5 22.5 23 25 | 23 23 23.5 24 | 20 21 22 21.5 | 16.5 19 19 19.5 | 24.5 25 28 28"""
BOYS = """26 25 29 31 | 21.5 22.5 23 26.5 | 23 22.5 24 27.5 | 25.5 27.5 26.5 27 | 20 23.5 22.5 26
| 24.5 25.5 27 28.5 | 22 22 24.5 26.5 | 24 21.5 24.5 25.5 | 23 20.5 31 26 | 27.5 28 31 31.5
| 23 23 23.5 25 | 21.5 23.5 24 28 | 17 24.5 26 29.5 | 22.5 25.5 25.5 26 | 23 24.5 26 30
| 22 21.5 23.5 25"""
AGES = ["age8", "age10", "age12", "age14"]


@pytest.fixture(scope="module")
def growth():
    rows = [("girls", *row.split()) for row in GIRLS.split("|")]
    rows += [("boys", *row.split()) for row in BOYS.split("|")]
    columns = dict(zip(["sex", *AGES], zip(*rows)))
    return compared(AGES, "sex", table_text(columns), levels=["girls", "boys"])


def test_potthoff_and_roy_means(growth):
    assert growth.value("main", "groups", "girls", "n") == 11
    assert growth.value("main", "groups", "boys", "n") == 16
    printed = {
        "girls": ["21.18", "22.23", "23.09", "24.09"],
        "boys": ["22.88", "23.81", "25.72", "27.47"],
    }
    for sex, means in printed.items():
        for age, mean in zip(AGES, means):
            rounds_to(growth.value("main", "groups", sex, age, "mean"), mean)


def test_potthoff_and_roy_pooled_covariances(growth):
    """Printed to four decimals, the last of them off by one in places."""
    printed = [
        [5.4155, 2.7168, 3.9102, 2.7102],
        [None, 4.1848, 2.9272, 3.3172],
        [None, None, 6.4557, 4.1307],
        [None, None, None, 4.9857],
    ]
    for i, first in enumerate(AGES):
        sd = growth.value("main", "correlations", "sd", "within", first)
        assert sd**2 == pytest.approx(printed[i][i], abs=1.5e-4)
        for j, second in enumerate(AGES[i + 1 :], i + 1):
            found = cross_product(growth, "within", first, second, 1)
            assert found == pytest.approx(printed[i][j], abs=1.5e-4)


# --- Books that print means and covariance matrices only: units are made that have just these, for what
# depends on means and covariances alone has to come out as printed.


def made_to_order(rng, n, mean, covariance):
    scores = rng.standard_normal((n, len(mean)))
    scores -= scores.mean(axis=0)
    q, _ = np.linalg.qr(scores)
    return np.array(mean) + q * np.sqrt(n - 1) @ np.linalg.cholesky(np.array(covariance)).T


def symmetric(*rows):
    """A matrix from its lower triangle."""
    matrix = np.zeros((len(rows), len(rows)))
    for i, row in enumerate(rows):
        matrix[i, : i + 1] = matrix[: i + 1, i] = row
    return matrix


def test_johnson_and_wichern_electricity():
    """Example 6.4, electricity used (kWh) in homes with and without air conditioning. T² of the
    printed matrices is 16.066."""
    rng = np.random.default_rng(65)
    ac = made_to_order(rng, 45, [204.4, 556.6], symmetric([13825.3], [23823.4, 73107.4]))
    none = made_to_order(rng, 55, [130.0, 355.0], symmetric([8632.0], [19616.7, 55964.5]))
    peak, off_peak = np.vstack([ac, none]).T
    columns = {"peak": peak.tolist(), "off": off_peak.tolist(), "ac": ["yes"] * 45 + ["no"] * 55}
    found = compared(["peak", "off"], "ac", table_text(columns), levels=["yes", "no"])
    rounds_to(found.value("main", "correlations", "sd", "within", "peak") ** 2, "10963.7")
    # Hotelling's T² is N - 2 times the only eigenvalue.
    rounds_to(98 * found.value("main", "omnibus", "ac", "hotelling", "value"), "16.07")


def test_johnson_and_wichern_nursing_homes():
    """Example 6.12, costs of nursing homes in three kinds of ownership. The first logarithm is
    -17.3976, which the book cuts off; u is .01325."""
    homes = {
        "private": (271, [0.291], [-0.001, 0.011], [0.002, 0, 0.001], [0.010, 0.003, 0, 0.010]),
        "nonprofit": (138, [0.561], [0.011, 0.025], [0.001, 0.004, 0.005], [0.037, 0.007, 0.002, 0.019]),
        "government": (107, [0.261], [0.030, 0.017], [0.003, 0, 0.004], [0.018, 0.006, 0.001, 0.013]),
    }
    rng = np.random.default_rng(612)
    mean = [2.0, 0.5, 0.1, 0.4]
    costs = [made_to_order(rng, n, mean, symmetric(*rows)) for n, *rows in homes.values()]
    outcomes = ["nursing", "dietary", "plant", "laundry"]
    columns = dict(zip(outcomes, np.vstack(costs).T.tolist()))
    columns["owner"] = [owner for owner, (n, *_) in homes.items() for _ in range(n)]
    found = compared(outcomes, "owner", table_text(columns), levels=list(homes))
    covariances = lambda *keys: found.value("main", "covariances", *keys)
    assert covariances("logdet", "private") == pytest.approx(-17.397, abs=1e-3)
    rounds_to(covariances("logdet", "nonprofit"), "-13.926")
    rounds_to(covariances("logdet", "government"), "-15.741")
    assert covariances("box", "df") == 20
    u = 1 - covariances("box", "chi2") / covariances("box", "M")
    assert u == pytest.approx(0.0133, abs=1e-4)


def test_morrison_two_groups():
    """Multivariate Statistical Methods: four subtests of the Wechsler scale, of 37 old people without
    and 12 with a senile factor."""
    pooled = symmetric(
        [11.2553],
        [9.4042, 13.5318],
        [7.1489, 7.3830, 11.5744],
        [3.3830, 2.5532, 2.6170, 5.8085],
    )
    rng = np.random.default_rng(49)
    without = made_to_order(rng, 37, [12.57, 9.57, 11.49, 7.97], pooled)
    with_factor = made_to_order(rng, 12, [8.75, 5.33, 8.50, 4.75], pooled)
    scores = np.vstack([without, with_factor]).T.tolist()
    subtests = ["information", "similarities", "arithmetic", "picture"]
    columns = {**dict(zip(subtests, scores)), "factor": ["without"] * 37 + ["with"] * 12}
    found = compared(subtests, "factor", table_text(columns), levels=["without", "with"])
    assert 47 * found.values["main.omnibus.factor.hotelling.value"] == pytest.approx(22.05, abs=0.01)
    rounds_to(found.values["main.omnibus.factor.hotelling.F"], "5.16")
    assert found.values["main.omnibus.factor.hotelling.df1"] == 4
    assert found.values["main.omnibus.factor.hotelling.df2"] == 44


# --- Hedges 1981, Journal of Educational Statistics 6, table 1 (also Hedges & Olkin 1985, Statistical
# Methods for Meta-Analysis, table 2): the correction c(m). Four of its entries differ from the exact
# factor by one unit of the last digit.


@pytest.mark.parametrize(
    ("df", "printed", "exact"),
    [
        (2, "0.5642", True),
        (3, "0.7236", True),
        (4, "0.7979", True),
        (5, "0.8408", False),
        (6, "0.8686", True),
        (7, "0.8882", True),
        (8, "0.9027", True),
        (9, "0.9139", True),
        (10, "0.9228", False),
        (11, "0.9300", True),
        (12, "0.9359", True),
        (13, "0.9410", True),
        (14, "0.9453", True),
        (15, "0.9490", True),
        (16, "0.9523", True),
        (17, "0.9551", True),
        (18, "0.9577", False),
        (19, "0.9599", True),
        (20, "0.9619", True),
        (25, "0.9697", False),
        (30, "0.9748", True),
        (40, "0.9811", True),
        (50, "0.9849", True),
    ],
)
def test_hedges_correction(df, printed, exact):
    y = [float(unit * unit % 7) for unit in range(df + 2)]
    group = ["a"] + ["b"] * (df + 1)
    found = compared(["y"], "group", table_text({"y": y, "group": group}))
    pair = lambda key: found.value("main", "pairs", "group", "a", "b", "y", key)
    assert pair("df") == df
    if exact:
        rounds_to(pair("g") / pair("d"), printed)
    else:
        assert pair("g") / pair("d") == pytest.approx(float(printed), abs=1.1e-4)
