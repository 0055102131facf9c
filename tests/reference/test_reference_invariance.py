"""What may not change an analysis: the order of the rows, the names of the groups, origins and units."""

import numpy as np
import pytest
from reference_samples import NAMES, sample
from reference_support import compared, quoted, table_text

SAMPLES = ["iris", "rootstock", "pottery", "skulls"]
SAMPLES += [name for name in NAMES if name.endswith("outcomes")]

every_sample = pytest.mark.parametrize("name", SAMPLES)


def columns_of(data, y=None, levels=None, rows=None):
    y = data.y if y is None else y
    levels = data.levels if levels is None else levels
    rows = np.arange(len(y)) if rows is None else rows
    columns = {outcome: y[rows, j].tolist() for j, outcome in enumerate(data.outcomes)}
    return {**columns, data.factor: [levels[g] for g in data.group[rows]]}


def values_of(data, columns, levels):
    return compared(data.outcomes, data.factor, table_text(columns), levels=levels).values


def agree(before, after, limit=1e-10):
    assert before.keys() == after.keys()
    for path, value in before.items():
        # Scores, differences and logarithms may be near zero beside a spread of 1.
        error = abs(after[path] - value)
        assert error <= limit * max(1.0, abs(value)), (path, value, after[path])


def without_units(values):
    """Values that have no unit: all but means, spreads, raw coefficients and their like."""
    united = ("main.groups.", ".correlations.sd.", ".covariances.logdet", ".raw.")
    of_difference = (".difference", ".lower", ".upper")
    return {
        path: value
        for path, value in values.items()
        if not any(part in path for part in united)
        and not (".pairs." in path and path.endswith(of_difference))
    }


def unmoved(values):
    """Values that an origin does not move: all but the means and their limits."""
    moved = (".mean", ".lower", ".upper")
    return {p: v for p, v in values.items() if not (".groups." in p and p.endswith(moved))}


@every_sample
def test_the_order_of_the_rows_changes_nothing(name):
    data = sample(name)
    rows = np.random.default_rng(1).permutation(len(data.group))
    after = values_of(data, columns_of(data, rows=rows), data.levels)
    agree(scaled(data.answers.values, data), scaled(after, data))


def scaled(values, data):
    """Every value with a unit in standard deviations of its outcome, so that limits can be shared."""
    sd = {outcome: data.y[:, j].std() for j, outcome in enumerate(data.outcomes)}
    out = dict(without_units(values))
    for path, value in values.items():
        if path in out or ".logdet" in path or path.endswith(".n"):
            out[path] = value
            continue
        spread = next(sd[o] for o in data.outcomes if f".{quoted(o)}." in f"{path}.")
        out[path] = value * spread if ".raw." in path else value / spread
    return out


@every_sample
def test_other_names_for_the_groups_change_the_paths_alone(name):
    data = sample(name)
    names = [f"arm {chr(97 + index)}!" for index in range(len(data.levels))]
    after = values_of(data, columns_of(data, levels=names), names)
    before = data.answers.values
    assert len(before) == len(after)
    renamed = {}
    for path, value in after.items():
        for old, new in zip(data.levels, names):
            bare = old if old.isdigit() else quoted(old)
            path = path.replace(f".`{new}`", f".{bare}")
        renamed[path] = value
    assert renamed == before


@every_sample
def test_an_added_constant_moves_the_means_alone(name):
    data = sample(name)
    moved = data.y + data.y.std(axis=0) * np.arange(3, 3 + len(data.outcomes))
    after = values_of(data, columns_of(data, y=moved), data.levels)
    agree(unmoved(scaled(data.answers.values, data)), unmoved(scaled(after, data)))


@every_sample
def test_other_units_change_nothing_that_has_none(name):
    data = sample(name)
    units = np.logspace(4, -4, len(data.outcomes))
    after = values_of(data, columns_of(data, y=data.y * units), data.levels)
    agree(without_units(data.answers.values), without_units(after))


@every_sample
def test_a_power_of_two_as_a_unit_changes_no_bit_of_what_has_none(name):
    data = sample(name)
    units = 2.0 ** (7 * np.arange(len(data.outcomes)) - 15)
    after = values_of(data, columns_of(data, y=data.y * units), data.levels)
    before = data.answers.values
    for path in without_units(before):
        if ".covariances.levene" in path or ".outcomes." in path or ".pairs." in path:
            assert after[path] == before[path], path


@every_sample
def test_a_reversed_outcome_turns_the_signs_of_its_own_coefficients(name):
    data = sample(name)
    turned = data.y * np.array([-1.0] + [1.0] * (len(data.outcomes) - 1))
    after = values_of(data, columns_of(data, y=turned), data.levels)
    signless = lambda values: {
        path: abs(value)
        for path, value in without_units(values).items()
        if "lower" not in path and "upper" not in path
    }
    agree(signless(data.answers.values), signless(after))


@every_sample
def test_any_other_basis_of_the_outcomes_gives_the_same_omnibus_test(name):
    data = sample(name)
    rng = np.random.default_rng(2)
    units = data.units()
    p = units.shape[1]
    mixed = units @ (np.eye(p) + 0.3 * rng.standard_normal((p, p)))
    after = values_of(data, columns_of(data, y=mixed), data.levels)
    kept = lambda values: {
        path: value
        for path, value in values.items()
        if path.startswith(("main.omnibus.", "main.functions.", "main.covariances.box."))
    }
    agree(kept(data.answers.values), kept(after))


def test_the_order_of_the_outcomes_changes_nothing():
    data = sample("iris")
    order = ["pw", "sl", "pl", "sw"]
    table = table_text(columns_of(data))
    after = compared(order, data.factor, table, levels=data.levels).values
    agree(data.answers.values, after)


def test_the_order_of_the_levels_turns_differences_and_keeps_tests():
    data = sample("iris")
    levels = ["virginica", "setosa", "versicolor"]
    after = values_of(data, columns_of(data), levels)
    turned = after["main.pairs.species.virginica.setosa.sl.difference"]
    assert turned == -data.answers.values["main.pairs.species.setosa.virginica.sl.difference"]
    kept = lambda values: {p: v for p, v in values.items() if "pairs" not in p and "scores" not in p}
    agree(kept(data.answers.values), kept(after))
