"""The whole path, text file to live values, against values computed to twenty digits.

`one_way.json` and the tables that it belongs to are described, with the sources of the data, in
`crates/analysis/tests/reference/README.md`; `one_way.py` beside it computes the values from the decimal
text in exact fractions and 60-digit arithmetic.
"""

import itertools
import json

import pytest
from reference_support import REFERENCE, compared
from reference_tolerances import Check

CASES = json.loads((REFERENCE / "one_way.json").read_text(encoding="utf-8"))

# The cases of which the reference holds every table, not only the multivariate tests.
FULL = [name for name, case in CASES.items() if "univariate" in case]

every_case = pytest.mark.parametrize("name", CASES)
every_full_case = pytest.mark.parametrize("name", FULL)


class Case:
    def __init__(self, name):
        self.check = Check(name)
        self.expected = CASES[name]
        self.levels = self.expected["levels"]
        self.outcomes = self.expected["outcomes"]
        self.factor = self.expected["factor"]
        self.answers = compared(
            self.outcomes,
            self.factor,
            (REFERENCE / self.expected["file"]).read_text(encoding="utf-8"),
            levels=self.levels,
        )

    def value(self, view, *keys):
        return self.answers.value("main", view, *keys)

    def of_term(self, view, *keys):
        return self.answers.value("main", view, self.factor, *keys)

    def has(self, view, *keys):
        try:
            self.answers.value("main", view, *keys)
        except KeyError:
            return False
        return True

    def f_test(self, keys, expected, suffix=""):
        """A test by F; where F is only a bound the keys of its p end in `_bound`."""
        what = ".".join(keys)
        found = {key: self.answers.value("main", *keys, key) for key in ("F", "df1", "df2")}
        for key in ("p", "ln_p"):
            found[key] = self.answers.value("main", *keys, key + suffix)
        self.check.close(f"F of {what}", found["F"], expected["f"])
        self.check.close(f"df1 of {what}", found["df1"], expected["df1"])
        self.check.close(f"df2 of {what}", found["df2"], expected["df2"])
        self.check.p(what, found["p"], found["ln_p"], expected["p"], expected["ln_p"])

    def limits(self, what, lower, upper, expected):
        scale = max(abs(float(limit)) for limit in expected)
        self.check.close(f"lower limit of {what}", lower, expected[0], scale)
        self.check.close(f"upper limit of {what}", upper, expected[1], scale)


@every_case
def test_the_eigenvalues_and_canonical_correlations_agree(name):
    case = Case(name)
    for number, root in enumerate(case.expected["roots"], 1):
        case.check.close("λ", case.of_term("functions", number, "eigenvalue"), root)
        canonical = case.expected["canonical"][number - 1]
        case.check.close("R", case.of_term("functions", number, "canonical"), canonical)
    roots = [float(root) for root in case.expected["roots"]]
    if sum(roots) > 0:
        for number, root in enumerate(roots, 1):
            share = case.of_term("functions", number, "share")
            case.check.close("share of the separation", share, root / sum(roots))
    assert not case.has("functions", case.factor, len(roots) + 1, "eigenvalue")


@every_case
def test_each_of_the_four_criteria_agrees(name):
    case = Case(name)
    bound = "_bound" if len(case.expected["roots"]) > 1 else ""
    for criterion in ("wilks", "pillai", "hotelling", "roy"):
        expected = case.expected[criterion]
        keys = ("omnibus", case.factor, criterion)
        case.check.close(criterion, case.of_term("omnibus", criterion, "value"), expected["value"])
        case.f_test(keys, expected, bound if criterion == "roy" else "")
        case.check.close("η²", case.of_term("omnibus", criterion, "eta2"), expected["eta2"])
        if "eta2_interval" in expected:
            lower = case.of_term("omnibus", criterion, "eta2_lower")
            upper = case.of_term("omnibus", criterion, "eta2_upper")
            case.limits("η²", lower, upper, expected["eta2_interval"])
    theta = case.of_term("omnibus", "roy", "theta")
    case.check.close("θ", theta, case.expected["roy"]["eta2"])


@every_case
def test_roys_criterion_has_a_p_value_only_where_its_f_is_exact(name):
    case = Case(name)
    exact = len(case.expected["roots"]) == 1
    for key in ("p", "ln_p", "eta2_lower", "eta2_upper"):
        assert case.has("omnibus", case.factor, "roy", key) == exact
    for key in ("p_bound", "ln_p_bound"):
        assert case.has("omnibus", case.factor, "roy", key) != exact


@every_case
def test_the_tests_of_a_function_and_all_later_ones_agree(name):
    case = Case(name)
    for number, expected in enumerate(case.expected["dimensions"], 1):
        case.check.close("Λ", case.of_term("functions", number, "wilks"), expected["wilks"])
        case.f_test(("functions", case.factor, str(number)), expected)


@every_full_case
def test_coefficients_agree_and_so_do_their_signs(name):
    """The largest standardized coefficient of a function is positive."""
    case = Case(name)
    for number, expected in enumerate(case.expected["discriminant"], 1):
        found = {}
        for kind in ("raw", "standardized", "structure", "share"):
            for outcome, value in zip(case.outcomes, expected[kind]):
                found[kind, outcome] = case.of_term("coefficients", kind, outcome, number)
                case.check.close(f"{kind} coefficient", found[kind, outcome], value)
        standardized = [found["standardized", outcome] for outcome in case.outcomes]
        assert max(standardized, key=abs) > 0


@every_full_case
def test_centroids_agree(name):
    case = Case(name)
    for number, expected in enumerate(case.expected["discriminant"], 1):
        for level, centroid in zip(case.levels, expected["centroids"]):
            mean = case.of_term("centroids", level, number, "mean")
            case.check.close("centroid", mean, centroid["mean"])
            if centroid["sd"] is None:
                assert not case.has("centroids", case.factor, level, number, "sd")
            else:
                sd = case.of_term("centroids", level, number, "sd")
                case.check.close("SD of scores", sd, centroid["sd"])


@every_full_case
def test_correlations_within_groups_and_in_total_agree(name):
    case = Case(name)
    for kind in ("within", "total"):
        expected = case.expected[kind]
        for i, first in enumerate(case.outcomes):
            sd = case.value("correlations", "sd", kind, first)
            case.check.close(f"SD {kind}", sd, expected["sd"][i])
            for j, second in enumerate(case.outcomes):
                if i != j:
                    r = case.value("correlations", kind, first, second)
                    case.check.close(f"r {kind}", r, expected["r"][i][j], scale=1.0)


@every_full_case
def test_descriptions_of_the_groups_agree(name):
    case = Case(name)
    for outcome, expected in zip(case.outcomes, case.expected["univariate"]):
        for level, group in zip(case.levels, expected["groups"]):
            assert case.value("groups", level, "n") == group["n"]
            mean = case.value("groups", level, outcome, "mean")
            if "sd" not in group:
                case.check.close("M", mean, group["mean"])
                assert not case.has("groups", level, outcome, "sd")
                assert not case.has("groups", level, outcome, "lower")
                continue
            scale = max(abs(float(group["mean"])), float(group["sd"]))
            case.check.close("M", mean, group["mean"], scale)
            for key in ("sd", "se"):
                case.check.close(key, case.value("groups", level, outcome, key), group[key])
            lower = case.value("groups", level, outcome, "lower")
            upper = case.value("groups", level, outcome, "upper")
            case.limits("M", lower, upper, group["interval"])


@every_full_case
def test_analyses_of_variance_agree(name):
    case = Case(name)
    for outcome, expected in zip(case.outcomes, case.expected["univariate"]):
        case.f_test(("outcomes", case.factor, outcome), expected)
        for key in ("eta2", "omega2"):
            found = case.of_term("outcomes", outcome, key)
            case.check.close(key, found, expected[key])


@every_full_case
def test_pairs_of_groups_agree(name):
    case = Case(name)
    for outcome, expected in zip(case.outcomes, case.expected["univariate"]):
        pooled_sd = float(expected["pooled_sd"])
        sizes = []
        for pair in expected["pairs"]:
            levels = case.levels[pair["first"]], case.levels[pair["second"]]
            at = ("pairs", *levels, outcome)

            def found(key):
                return case.of_term(*at, key)

            case.check.close("difference", found("difference"), pair["difference"], pooled_sd)
            case.limits("difference", found("lower"), found("upper"), pair["interval"])
            case.check.close("t", found("t"), pair["t"], max(1.0, abs(float(pair["t"]))))
            case.check.close("df", found("df"), expected["df2"])
            scale = max(1.0, abs(float(pair["d"])))
            case.check.close("d", found("d"), pair["d"], scale)
            case.check.close("g", found("g"), pair["g"], scale)
            case.check.p("a pair", found("p"), found("ln_p"), pair["p"], pair["ln_p"])
            sizes.append(abs(float(pair["g"])))
        assert len(sizes) == len(list(itertools.combinations(case.levels, 2)))
        average = case.of_term("pairs", "mean_abs_effect", outcome)
        case.check.close("mean of |g|", average, sum(sizes) / len(sizes))


@every_full_case
def test_boxs_test_agrees_or_is_refused_where_a_group_is_too_small(name):
    case = Case(name)
    expected = case.expected["box"]
    if expected is None:
        assert not case.has("covariances", "box", "M")
        return
    box = {key: case.value("covariances", "box", key) for key in ("M", "chi2", "df")}
    case.check.close("M", box["M"], expected["m"])
    case.check.close("χ²", box["chi2"], expected["chi_square"])
    case.check.close("df", box["df"], expected["df"])
    p, ln_p = (case.value("covariances", "box", key) for key in ("chi2_p", "ln_chi2_p"))
    chi_square = expected["chi_square_test"]
    case.check.p("χ²", p, ln_p, chi_square["p"], chi_square["ln_p"])
    case.f_test(("covariances", "box"), expected["f"])
    for level, log in zip(case.levels, expected["log_determinants"]):
        case.check.close("ln |S|", case.value("covariances", "logdet", level), log)
    pooled = case.value("covariances", "logdet_pooled")
    case.check.close("ln |S| pooled", pooled, expected["pooled_log_determinant"])


@every_full_case
def test_levenes_and_brown_and_forsythes_tests_agree(name):
    case = Case(name)
    kinds = {"levene": "levene_mean", "brown_forsythe": "levene_median"}
    for outcome, expected in zip(case.outcomes, case.expected["univariate"]):
        for kind, key in kinds.items():
            if expected[key] is None:
                assert not case.has("covariances", kind, outcome, "F")
            else:
                case.f_test(("covariances", kind, outcome), expected[key])


def test_five_of_the_full_cases_have_a_group_that_is_too_small_for_boxs_test():
    refused = [name for name in FULL if CASES[name]["box"] is None]
    assert refused == ["jw8", "pottery", "p_eq_dfe", "singleton_group", "small_groups"]
    assert (len(CASES), len(FULL)) == (27, 13)


def test_equal_means_give_no_effect_exactly():
    case = Case("zero_effect")
    assert case.of_term("omnibus", "wilks", "value") == 1
    for criterion in ("pillai", "hotelling"):
        assert case.of_term("omnibus", criterion, "value") == 0
    for criterion in ("wilks", "pillai", "hotelling"):
        found = [case.of_term("omnibus", criterion, key) for key in ("F", "p", "ln_p", "eta2")]
        assert found == [0, 1, 0, 0]


def test_where_nothing_separates_the_groups_only_the_shares_do_not_exist():
    values = Case("zero_effect").answers.values
    absent = {path for path, value in values.items() if value is None}
    assert absent == {"main.functions.g.1.share", "main.functions.g.2.share"}


def test_means_on_a_line_leave_the_second_eigenvalue_zero_and_not_noise():
    case = Case("rank1_means")
    assert case.of_term("functions", 2, "eigenvalue") == 0
    assert case.of_term("functions", 1, "share") == 1
    assert case.of_term("functions", 2, "p") == 1


def test_a_p_value_below_the_range_of_doubles_keeps_its_logarithm():
    case = Case("huge_effect")
    assert case.of_term("omnibus", "wilks", "p") == 0
    # 2.4456284e-396
    assert abs(case.of_term("omnibus", "wilks", "ln_p") + 910.9293947) < 1e-7


def test_units_of_1e_8_to_1e8_do_not_change_what_has_no_unit():
    unit, mixed = Case("scale_unit"), Case("scale_mixed")
    for path, value in unit.answers.values.items():
        if path.startswith(("main.omnibus.", "main.functions.", "main.coefficients.g.str")):
            unit.check.close(path, mixed.answers.values[path], value, max(1.0, abs(value)))
