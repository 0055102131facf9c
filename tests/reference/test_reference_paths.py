"""Live values: every number of every view has a path, and what stands there is what the table prints."""

import functools
import itertools
import math

import numpy as np
import pytest
from reference_support import answer, compared, dotted, quoted, table_text

FACTOR = "type of watch"
LEVELS = ["1", "2.5", "fixed day"]
OUTCOMES = ["Reaction time (ms)", "mood", "größe_2", "1st lapse"]

VIEWS = "flow groups correlations covariances omnibus functions coefficients centroids scores outcomes pairs"


@functools.cache
def odd_table(groups):
    rng = np.random.default_rng(20)
    group = np.arange(60) % groups
    columns = {
        outcome: (10.0**j * (rng.standard_normal(60) + 0.5 * group + 3)).round(4).tolist()
        for j, outcome in enumerate(OUTCOMES)
    }
    # The levels in another order than the program gives them: numbers by size, then words.
    shuffled = ["fixed day", "1", "2.5"][:groups]
    return table_text({**columns, FACTOR: [shuffled[g] for g in group]})


def script(groups, *questions):
    names = ", ".join(map(quoted, OUTCOMES))
    lines = [
        'read "table.csv" as table',
        f"compare {names} across {quoted(FACTOR)} in table as main",
        *questions,
    ]
    return "\n".join(lines) + "\n"


def answered(groups, *questions):
    return answer(script(groups, *questions), table=odd_table(groups))


def levels(groups):
    return LEVELS if groups == 3 else ["1", "fixed day"]


def expected_paths(groups):
    """Every path that the pages of the views promise, key by key."""
    names = levels(groups)
    pairs = list(itertools.combinations(names, 2))
    functions = range(1, min(len(OUTCOMES), groups - 1) + 1)
    test = ("F", "df1", "df2", "p", "ln_p")
    paths = [("flow", "read", "rows"), *(("flow", "read", "groups", level) for level in names)]
    paths += [("flow", "analysed", key) for key in ("rows", "left_out")]
    paths += [("flow", "analysed", "groups", level) for level in names]
    for level in names:
        paths.append(("groups", level, "n"))
        for outcome, key in itertools.product(OUTCOMES, ("mean", "sd", "se", "lower", "upper")):
            paths.append(("groups", level, outcome, key))
    for kind in ("within", "total"):
        for first in OUTCOMES:
            paths.append(("correlations", "sd", kind, first))
            paths += [("correlations", kind, first, b) for b in OUTCOMES if b != first]
    box = ("M", "chi2", "df", "chi2_p", "ln_chi2_p", *test)
    paths += [("covariances", "box", key) for key in box]
    paths += [("covariances", "logdet", level) for level in names]
    paths.append(("covariances", "logdet_pooled"))
    for kind, outcome, key in itertools.product(("levene", "brown_forsythe"), OUTCOMES, test):
        paths.append(("covariances", kind, outcome, key))
    sizes = ("value", "eta2", "eta2_lower", "eta2_upper")
    for criterion in ("wilks", "pillai", "hotelling"):
        paths += [("omnibus", FACTOR, criterion, key) for key in (*test, *sizes)]
    bound = ("F", "df1", "df2", "p_bound", "ln_p_bound", "value", "eta2", "theta")
    roy = (*test, *sizes, "theta") if groups == 2 else bound
    paths += [("omnibus", FACTOR, "roy", key) for key in roy]
    paths.append(("omnibus", FACTOR, "wilks", "ln_value"))
    for number in functions:
        keys = ("eigenvalue", "share", "canonical", "wilks", *test)
        paths += [("functions", FACTOR, number, key) for key in keys]
        for kind in ("raw", "standardized", "structure", "share"):
            paths += [("coefficients", FACTOR, kind, o, number) for o in OUTCOMES]
        for level, key in itertools.product(names, ("mean", "sd")):
            paths.append(("centroids", FACTOR, level, number, key))
        paths += [("scores", FACTOR, number, key) for key in (*test, "eta2")]
    of_pair = ["difference", "lower", "upper", "t", "df", "p", "ln_p"]
    of_pair += [f"{ln}p_{kind}" for ln in ("", "ln_") for kind in ("bonferroni", "holm", "adjusted")]
    of_pair += ["d", "d_lower", "d_upper", "g", "g_lower", "g_upper"]
    for (a, b), key in itertools.product(pairs, of_pair):
        paths += [("scores", FACTOR, number, a, b, key) for number in functions]
        paths += [("pairs", FACTOR, a, b, outcome, key) for outcome in OUTCOMES]
    for outcome in OUTCOMES:
        paths += [("outcomes", FACTOR, outcome, key) for key in (*test, "eta2", "omega2")]
        paths.append(("pairs", FACTOR, "mean_abs_effect", outcome))
    return {dotted("main", *path) for path in paths}


both = pytest.mark.parametrize("groups", [2, 3])


@both
def test_the_paths_are_those_that_the_pages_promise_and_no_others(groups):
    assert set(answered(groups).values) == expected_paths(groups)


@both
def test_every_value_is_a_finite_number(groups):
    for path, value in answered(groups).values.items():
        assert isinstance(value, float) and math.isfinite(value), (path, value)


def test_a_key_that_is_no_plain_word_stands_in_back_quotes_and_a_whole_number_bare():
    values = answered(3).values
    for path in (
        "main.groups.1.`Reaction time (ms)`.mean",
        "main.groups.`2.5`.größe_2.sd",
        "main.centroids.`type of watch`.`fixed day`.1.mean",
        "main.pairs.`type of watch`.1.`2.5`.`1st lapse`.p_holm",
    ):
        assert path in values


@both
def test_every_path_can_be_written_down_and_pinned_as_the_program_gives_it(groups):
    values = answered(groups).values
    pins = [f"pin {path} at {value!r} within 0" for path, value in values.items()]
    pinned = answered(groups, *pins)
    assert pinned.problems == []
    assert pinned.status == 0


@both
def test_the_only_term_of_the_design_may_be_left_out(groups):
    values = answered(groups).values
    term = f".{quoted(FACTOR)}."
    shortened = {path.replace(term, "."): value for path, value in values.items() if term in path}
    pins = [f"pin {path} at {value!r} within 0" for path, value in shortened.items()]
    assert len(pins) > 150
    assert answered(groups, *pins).problems == []


@both
def test_a_cell_of_a_table_holds_the_live_value_of_its_path(groups):
    questions = [f"show {view} of main" for view in VIEWS.split()]
    found = answered(groups, *questions)
    assert len(found.tables()) == len(questions) + 2  # scores and pairs have two tables each
    placed = [cell for cell in found.cells() if "path" in cell]
    assert len(placed) > 150
    for cell in placed:
        assert cell["number"] == found.values[cell["path"]], cell


@both
def test_every_number_of_a_table_has_a_path_but_repeated_sizes(groups):
    questions = [f"show {view} of main" for view in VIEWS.split()]
    for cell in answered(groups, *questions).cells():
        if cell.get("number") is not None and cell["style"] != "count":
            assert "path" in cell, cell


@pytest.mark.parametrize(
    "question",
    [
        "show groups of main interval 90%",
        "show omnibus of main alpha .01",
        "show pairs of main effect d interval 90% pairs holm",
        "show scores of main effect d interval 90%",
    ],
)
def test_a_cell_that_a_setting_of_its_own_changes_has_no_path(question):
    """A path stands for one number in the whole document: the one that the policy asks for."""
    found = answered(3, question)
    differing = [
        cell
        for cell in found.cells()
        if "path" in cell and cell["number"] != found.values[cell["path"]]
    ]
    assert differing == []


def test_an_outcome_called_sd_does_not_hide_the_standard_deviations():
    rng = np.random.default_rng(9)
    y = rng.standard_normal((30, 2)) * [1.0, 50.0]
    columns = {"mood": y[:, 0].tolist(), "sd": y[:, 1].tolist(), "g": ["a", "b", "c"] * 10}
    found = compared(["mood", "sd"], "g", table_text(columns))
    correlations = lambda *keys: found.value("main", "correlations", *keys)
    for first, second in (("mood", "sd"), ("sd", "mood")):
        assert abs(correlations("total", first, second) - np.corrcoef(y.T)[0, 1]) < 1e-12
    for j, outcome in enumerate(("mood", "sd")):
        assert abs(correlations("sd", "total", outcome) - y[:, j].std(ddof=1)) < 1e-12 * 50


def test_a_table_called_read_does_not_hide_the_rows_of_the_file():
    rng = np.random.default_rng(10)
    columns = {"y": rng.standard_normal(30).tolist(), "g": ["a", "b"] * 15, "age": range(30)}
    document = """
read "table.csv" as table
admit table where age >= 10 as read because "ten and older"
compare y across g in read as main
show flow of main
"""
    found = answer(document, table=table_text(columns))
    rows = [cell["number"] for cell in found.cells() if cell.get("path", "").endswith(".rows")]
    assert 30 in rows and 20 in rows
    for cell in found.cells():
        if "path" in cell:
            assert cell["number"] == found.values[cell["path"]], cell


def test_levels_and_outcomes_may_be_called_as_keys_are():
    rng = np.random.default_rng(12)
    columns = {"n": rng.standard_normal(40).tolist(), "g": ["F", "mean"] * 20}
    columns["mean"] = rng.standard_normal(40).tolist()
    questions = [f"show {view} of main" for view in VIEWS.split()]
    document = "\n".join(
        ['read "table.csv" as table', "compare n, mean across g in table as main", *questions, ""]
    )
    found = answer(document, table=table_text(columns))
    for cell in found.cells():
        if "path" in cell:
            assert cell["number"] == found.values[cell["path"]], cell
