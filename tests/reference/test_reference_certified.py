"""One-way analyses of variance with certified values: NIST Statistical Reference Datasets.

SiRstv and AtmWtAg are measured; the SmLs series is that of Simon & Lesage (1989, Computational Statistics &
Data Analysis 8), made to break programs: all of its values share leading digits. How many digits of the
certified F are within reach is a matter of the data: rounding them to doubles leaves `digits_possible`, a
number that `nist_strd_anova.json` has from exact fractions, beside the F of the rounded data.
"""

import json
import math

import pytest
from reference_support import REFERENCE, compared, table_text

CERTIFIED = json.loads((REFERENCE / "nist_strd_anova.json").read_text(encoding="utf-8"))

# The SmLs series: the leading digits of every value, and the number of values in each treatment.
CONSTRUCTED = {
    f"SmLs0{3 * row + column + 1}": (leading, replicates)
    for row, leading in enumerate(["1", "1000000", "1000000000000"])
    for column, replicates in enumerate([21, 201, 2001])
}


def constructed(leading, replicates):
    """Nine treatments: a value, then values .1 below and above it in turn."""
    table = {"y": [], "treatment": []}
    for treatment, tenth in enumerate([4, 3, 5, 3, 5, 3, 5, 3, 5], 1):
        for replicate in range(replicates):
            step = 0 if replicate == 0 else -1 if replicate % 2 else 1
            table["y"].append(f"{leading}.{tenth + step}")
            table["treatment"].append(f"{treatment}")
    return table_text(table)


def analysed(name):
    if name in CONSTRUCTED:
        return "treatment", compared(["y"], "treatment", constructed(*CONSTRUCTED[name]))
    text = (REFERENCE / "data" / f"{name}.csv").read_text(encoding="utf-8")
    return "instrument", compared(["y"], "instrument", text)


def correct_digits(found, certified):
    error = abs(found / float(certified) - 1.0)
    return 15.0 if error == 0.0 else min(-math.log10(error), 15.0)


@pytest.mark.parametrize("name", CERTIFIED)
def test_f_has_every_certified_digit_that_the_rounding_of_the_data_leaves(name):
    expected = CERTIFIED[name]
    factor, found = analysed(name)
    f = found.value("main", "outcomes", factor, "y", "F")
    assert found.value("main", "outcomes", factor, "y", "df1") == float(expected["df1"])
    assert found.value("main", "outcomes", factor, "y", "df2") == float(expected["df2"])
    assert correct_digits(f, expected["f"]) > expected["digits_possible"] - 0.5
    assert correct_digits(f, expected["f_of_doubles"]) > 13.5


@pytest.mark.parametrize("name", CERTIFIED)
def test_the_share_of_variation_between_groups_has_them_too(name):
    expected = CERTIFIED[name]
    factor, found = analysed(name)
    eta2 = found.value("main", "outcomes", factor, "y", "eta2")
    limit = min(expected["digits_possible"], 14.0) - 0.5
    assert correct_digits(eta2, expected["r2"]) > limit


@pytest.mark.parametrize("name", CERTIFIED)
def test_with_one_outcome_every_criterion_gives_the_same_f(name):
    factor, found = analysed(name)
    for criterion in ("wilks", "pillai", "hotelling", "roy"):
        f = found.value("main", "omnibus", factor, criterion, "F")
        assert correct_digits(f, CERTIFIED[name]["f_of_doubles"]) > 13.0


def test_all_eleven_sets_are_there():
    assert len(CERTIFIED) == 11
    assert set(CONSTRUCTED) < set(CERTIFIED)
