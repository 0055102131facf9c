"""Data for comparison with other libraries: real and seeded, units scattered over 1e-3 to 1e3."""

import functools
from dataclasses import dataclass

import numpy as np
from reference_support import compared, read_columns, table_text

REAL = {
    "iris": "species",
    "wine": "cultivar",
    "rootstock": "rootstock",
    "skulls": "epoch",
    "pottery": "Site",
}

# The seed, the sizes of the groups (unequal on purpose) and the number of outcomes.
SEEDED = {
    "two groups, one outcome": (11, (9, 14), 1),
    "two groups, three outcomes": (12, (23, 8), 3),
    "three groups, two outcomes": (13, (7, 12, 30), 2),
    "three groups, five outcomes": (14, (21, 16, 11), 5),
    "four groups, four outcomes": (15, (9, 25, 13, 18), 4),
    "five groups, one outcome": (16, (6, 7, 15, 4, 20), 1),
    "five groups, three outcomes": (17, (30, 9, 12, 40, 17), 3),
    "five groups, five outcomes": (18, (12, 19, 26, 8, 33), 5),
}

NAMES = [*REAL, *SEEDED]


@dataclass(frozen=True)
class Sample:
    """Outcomes as columns of `y`, the index of each unit's group, and what the program answers."""

    factor: str
    levels: tuple
    outcomes: tuple
    y: np.ndarray
    group: np.ndarray
    answers: object

    def value(self, *keys):
        return self.answers.value("main", *keys)

    def of_term(self, view, *keys):
        return self.answers.value("main", view, self.factor, *keys)

    def groups(self, outcome=None):
        """The rows of each group: of all outcomes, or the values of one."""
        columns = self.y if outcome is None else self.y[:, outcome]
        return [columns[self.group == index] for index in range(len(self.levels))]

    def units(self):
        """The outcomes in units of their own standard deviation, which criteria do not feel and
        other libraries bear better."""
        return (self.y - self.y.mean(axis=0)) / self.y.std(axis=0, ddof=1)

    def residuals(self):
        means = np.array([rows.mean(axis=0) for rows in self.groups()])
        return self.y - means[self.group]

    def error_df(self):
        return len(self.group) - len(self.levels)


@functools.lru_cache(maxsize=None)
def sample(name, policy=""):
    if name in REAL:
        columns = read_columns(f"data/{name}.csv")
        factor = REAL[name]
    else:
        columns, factor = seeded(*SEEDED[name]), "group"
    levels = tuple(dict.fromkeys(columns[factor]))
    outcomes = tuple(column for column in columns if column != factor)
    return Sample(
        factor=factor,
        levels=levels,
        outcomes=outcomes,
        y=np.array([[float(cell) for cell in columns[outcome]] for outcome in outcomes]).T,
        group=np.array([levels.index(level) for level in columns[factor]]),
        answers=compared(outcomes, factor, table_text(columns), levels=levels, policy=policy),
    )


def seeded(seed, sizes, outcomes):
    rng = np.random.default_rng(seed)
    group = rng.permutation(np.repeat(np.arange(len(sizes)), sizes))
    mixing = rng.standard_normal((outcomes, outcomes)) + 2 * np.eye(outcomes)
    effects = 0.7 * rng.standard_normal((len(sizes), outcomes))
    y = rng.standard_normal((len(group), outcomes)) @ mixing + effects[group]
    y *= np.logspace(-3, 3, outcomes) if outcomes > 1 else 250.0
    y += rng.uniform(-5, 5, outcomes) * y.std(axis=0)
    columns = {f"y{j + 1}": y[:, j].tolist() for j in range(outcomes)}
    return {**columns, "group": [f"g{index + 1}" for index in group]}
