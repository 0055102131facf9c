"""Bad input: what is told, where, and what to do about it; the other questions are answered still."""

from dataclasses import dataclass, field

import pytest
from cli_support import COMPARE, GOOD

WIDE = """\
g,q1,q2,q3,q4,q5,q6,q7,q8
a,0.08,0.72,0.22,1.09,-0.05,0.20,0.67,-1.09
a,-0.40,-0.50,1.98,-0.09,0.65,0.62,-0.28,-1.55
a,0.96,-0.41,0.72,-1.31,-0.44,1.26,1.43,-1.30
b,-1.33,-0.04,0.73,0.16,0.30,-0.99,0.59,1.12
b,-0.44,-1.43,-0.76,0.76,-1.73,-0.09,-0.99,-0.13
b,-0.24,0.02,1.50,0.42,1.33,-0.14,-0.48,0.38
c,-2.84,-0.04,0.16,-1.24,0.46,-0.56,-2.46,-0.21
c,-0.98,-0.52,-0.15,1.25,0.10,-0.03,0.39,-1.81
"""


def with_column(name, of):
    """The good table with one column more, made from its rows."""
    header, *rows = GOOD.splitlines()
    cells = [row.split(",") for row in rows]
    more = [of(float(x), float(y)) for _, x, y in cells]
    lines = [f"{row},{value}" for row, value in zip(rows, more)]
    return "\n".join([f"{header},{name}", *lines]) + "\n"


def without_y(level):
    """The good table without values of y in one group."""
    kept = [
        line.rsplit(",", 1)[0] + "," if line.startswith(f"{level},") else line
        for line in GOOD.splitlines()
    ]
    return "\n".join(kept) + "\n"


@dataclass(frozen=True)
class Case:
    fact: str
    document: str
    told: str
    tables: dict = field(default_factory=dict)
    answered: tuple = ()


CASES = [
    Case(
        "a file that is not there is told with the nearest name in the folder",
        'read "goood.csv" as t\ncompare x, y across g in t as m\nshow omnibus of m\n',
        """\
error [unreadable-file]: there is no file `goood.csv`
  a.tus:1:6
  1 | read "goood.csv" as t
    |      ^^^^^^^^^^^
  help: did you mean `good.csv`?
""",
    ),
    Case(
        "where no name is near, the tables of the folder are told",
        'read "passengers.csv" as t\n',
        """\
error [unreadable-file]: there is no file `passengers.csv`
  a.tus:1:6
  1 | read "passengers.csv" as t
    |      ^^^^^^^^^^^^^^^^
  help: in that folder are `good.csv`
""",
    ),
    Case(
        "a wrong separator is told with the one that fits",
        'read "semi.csv" as t\ncompare x, y across g in t as m\nshow omnibus of m\n',
        """\
error [unreadable-file]: the columns are not separated by commas, but seem to be by semicolons
  a.tus:1:6
  1 | read "semi.csv" as t
    |      ^^^^^^^^^^
  help: write `separator ";"` after `read`
""",
        {"semi.csv": GOOD.replace(",", ";")},
    ),
    Case(
        "a row of another length is told with its line",
        'read "ragged.csv" as t\n',
        """\
error [unreadable-file]: line 17 has 2 cells, but the header has 3
  a.tus:1:6
  1 | read "ragged.csv" as t
    |      ^^^^^^^^^^^^
  help: keep the separators of empty cells, and put a cell with a line break in quotation marks
""",
        {"ragged.csv": GOOD + "c,1.0\n"},
    ),
    Case(
        "an empty file is told as such",
        'read "empty.csv" as t\n',
        """\
error [unreadable-file]: the file is empty
  a.tus:1:6
  1 | read "empty.csv" as t
    |      ^^^^^^^^^^^
  help: the first line must name the columns
""",
        {"empty.csv": ""},
    ),
    Case(
        "text in a column of numbers is told with its row and line",
        'read "text.csv" as t\ncompare x, y across g in t as m\nshow omnibus of m\n',
        """\
error [text-in-numeric-column]: `x` has 2 cells that are not numbers, first "NA" in row 7 (line 8 of the file)
  a.tus:2:9
  2 | compare x, y across g in t as m
    |         ^
  help: if it stands for a missing value, write `missing "NA"` after `read`
""",
        {"text.csv": GOOD.replace("b,10.0,", "b,NA,").replace("b,10.6,", "b,NA,")},
    ),
    Case(
        "numbers with a decimal comma are told with the clause that reads them",
        'read "comma.csv" as t separator ";"\ncompare x across g in t as m\nshow groups of m\n',
        """\
error [text-in-numeric-column]: `x` has 4 cells that are not numbers, first "1,5" in row 1 (line 2 of the file)
  a.tus:2:9
  2 | compare x across g in t as m
    |         ^
  help: if the numbers have a decimal comma, write `decimal ","` after `read`
""",
        {"comma.csv": "g;x\na;1,5\na;2,5\nb;3,5\nb;4,0\n"},
    ),
    Case(
        "a group without a complete row is told with how to leave it out",
        'read "miss.csv" as t\ncompare x, y across g in t as m\nshow omnibus of m\n'
        "compare x across g in t as n\nshow groups of n\n",
        """\
error [empty-group]: no row of `c` has a value on every outcome
  a.tus:2:21
  2 | compare x, y across g in t as m
    |                     ^
  help: leave the group out with `where g != c`, or compare on other outcomes
""",
        {"miss.csv": without_y("c")},
        ("Outcomes by g",),
    ),
    Case(
        "one group is no comparison",
        'read "good.csv" as t\ncompare x, y across g in t where g = a as m\nshow omnibus of m\n',
        """\
error [single-group]: `g` has the same value in every row, so there is nothing to compare
  a.tus:2:21
  2 | compare x, y across g in t where g = a as m
    |                     ^
  help: a comparison needs two groups or more: check the factor, and what `where` and `admit` leave
""",
    ),
    Case(
        "an identifier taken for the factor is told as such, however many it has",
        'read "crew.csv" as t\ncompare x, y across id in t as m\nshow omnibus of m\n',
        """\
error [single-row-groups]: every group has one row, so there is no variation within groups to compare with
  a.tus:2:21
  2 | compare x, y across id in t as m
    |                     ^^
  help: check that the factor is the right column: an identifier makes one group a row
""",
        {"crew.csv": "id,x,y\n" + "".join(f"u{i},{i % 7},{i % 11}\n" for i in range(30_000))},
    ),
    Case(
        "a condition that leaves no rows is told as such",
        'read "good.csv" as t\ncompare x, y across g in t where x > 100 as m\nshow omnibus of m\n',
        """\
error [single-group]: there are no rows to compare
  a.tus:2:21
  2 | compare x, y across g in t where x > 100 as m
    |                     ^
  help: a comparison needs two groups or more: check the factor, and what `where` and `admit` leave
""",
    ),
    Case(
        "an outcome that is the same in every row stops the tests of the set and nothing else",
        'read "const.csv" as t\ncompare x, z across g in t as m\n'
        + "".join(
            f"show {view} of m\n"
            for view in ("flow", "groups", "correlations", "covariances", "omnibus", "outcomes", "pairs")
        ),
        """\
error [constant-outcome]: `z` has the same value in every row
  a.tus:2:12
  2 | compare x, z across g in t as m
    |            ^
  help: leave it out of the outcomes: it can show no difference
""",
        {"const.csv": with_column("z", lambda x, y: 5)},
        (
            "Rows on their way into the comparison m",
            "Outcomes by g",
            "Correlations of the outcomes",
            "Spread of the outcomes across the groups of g",
            "Differences on each outcome by g",
            "Pairs of groups on each outcome, g",
            "Average size of the differences on each outcome",
        ),
    ),
    Case(
        "two outcomes that hold the same are told with both places",
        'read "twin.csv" as t\ncompare x, y, z across g in t as m\nshow omnibus of m\nshow outcomes of m\n',
        """\
error [dependent-outcomes]: `z` holds the same information as `x`
  a.tus:2:15
  2 | compare x, y, z across g in t as m
    |               ^
  `x` is here
  a.tus:2:9
  2 | compare x, y, z across g in t as m
    |         ^
  help: leave out one of the two
""",
        {"twin.csv": with_column("z", lambda x, y: x)},
        ("Differences on each outcome by g",),
    ),
    Case(
        "an outcome in another unit is one of them too",
        'read "twin.csv" as t\ncompare x, y, z across g in t as m\nshow omnibus of m\n',
        """\
error [dependent-outcomes]: `z` is `x` in another unit
  a.tus:2:15
  2 | compare x, y, z across g in t as m
    |               ^
  `x` is here
  a.tus:2:9
  2 | compare x, y, z across g in t as m
    |         ^
  help: leave out one of the two
""",
        {"twin.csv": with_column("z", lambda x, y: round(1000 * x) / 10 + 32)},
    ),
    Case(
        "a total and its parts are told with the weights of the sum",
        'read "sum.csv" as t\ncompare x, y, z across g in t as m\nshow omnibus of m\nshow groups of m\n',
        """\
error [dependent-outcomes]: `z` is a linear function of other outcomes: `x` + `y`
  a.tus:2:15
  2 | compare x, y, z across g in t as m
    |               ^
  help: leave out one of them: a total and all its parts can't be outcomes together
""",
        {"sum.csv": with_column("z", lambda x, y: round(x + y, 1))},
        ("Outcomes by g",),
    ),
    Case(
        "more outcomes than degrees of freedom are told with how many can be compared",
        'read "wide.csv" as t\ncompare q1..q8 across g in t as m\nshow omnibus of m\nshow outcomes of m\n',
        """\
error [too-many-outcomes]: 8 outcomes are too many for 5 degrees of freedom for error
  a.tus:2:9
  2 | compare q1..q8 across g in t as m
    |         ^^^^^^
  help: compare at most 5 outcomes at once, better far fewer
""",
        {"wide.csv": WIDE},
        ("Differences on each outcome by g",),
    ),
    Case(
        "an outcome that does not vary within groups has no test",
        'read "good.csv" as t\nderive t.k = if g = "a" then 1 else 2\ncompare x, k across g in t as m\n'
        "show omnibus of m\nshow groups of m\n",
        """\
error [constant-within-groups]: `k` does not vary within any group
  a.tus:3:12
  3 | compare x, k across g in t as m
    |            ^
  help: it separates the groups perfectly, so no test of it is possible: leave it out
""",
        answered=("Outcomes by g",),
    ),
    Case(
        "names that are slightly wrong are told with the right ones, each once",
        'read "good.csv" as t\ncompare x, yy across g in t as m\nshow omnibus of mm\nshow omnibuss of m\n'
        "compare x, y across g in t as n\nshow groups of n\n",
        """\
error [unknown-column]: `t` has no column `yy`
  a.tus:2:12
  2 | compare x, yy across g in t as m
    |            ^^
  help: did you mean `y`?
error [unknown-comparison]: there is no comparison `mm`
  a.tus:3:17
  3 | show omnibus of mm
    |                 ^^
  help: did you mean `m`?
error [unknown-view]: there is no view `omnibuss`
  a.tus:4:6
  4 | show omnibuss of m
    |      ^^^^^^^^
  help: did you mean `omnibus`?
""",
        answered=("Outcomes by g",),
    ),
    Case(
        "a level that does not occur is told with the nearest one",
        'read "good.csv" as t\nadmit t where g in [a, bb] as u because "why"\n'
        "compare x, y across g in u as m\nshow omnibus of m\n",
        """\
error [unknown-level]: `t.g` has no level `bb`
  a.tus:2:24
  2 | admit t where g in [a, bb] as u because "why"
    |                        ^^
  help: did you mean `b`?
""",
    ),
    Case(
        "a level that the order leaves out is told",
        'read "good.csv" as t\nlevels t.g a, b\ncompare x, y across g in t as m\nshow omnibus of m\n',
        """\
error [unlisted-level]: `g` also has the level `c`, which this order leaves out
  a.tus:2:1
  2 | levels t.g a, b
    | ^^^^^^^^^^^^^^^
  help: name it in the order, or merge it into another level with `merging`
""",
    ),
    Case(
        "a view that is not built is told with those that are",
        COMPARE + "show power of m\nshow groups of m\n",
        """\
error [unknown-view]: there is no view `power`
  a.tus:3:6
  3 | show power of m
    |      ^^^^^
  help: the views are: `flow`, `groups`, `correlations`, `covariances`, `omnibus`, `functions`, `coefficients`, `centroids`, `scores`, `outcomes` and `pairs`
""",
        answered=("Outcomes by g",),
    ),
    Case(
        "a word that no statement starts with is told with those that one does",
        COMPARE + "report m by functions\nshow groups of m\n",
        """\
error [unknown-word]: `report` is not a word that a statement starts with
  a.tus:3:1
  3 | report m by functions
    | ^^^^^^
  help: the words are `policy`, `read`, `admit`, `derive`, `levels`, `label`, `compare`, `show`, `write` and `pin`
""",
        answered=("Outcomes by g",),
    ),
    Case(
        "a second factor is told to be one too many",
        'read "good.csv" as t\ncompare x across g, y in t as m\n',
        """\
error [several-factors]: `across` names more than one factor
  a.tus:2:21
  2 | compare x across g, y in t as m
    |                     ^
  help: compare one factor at a time: write one `compare` statement for each factor
""",
    ),
    Case(
        "a name that is defined twice is told with both places",
        COMPARE + "compare x across g in t as m\nshow groups of m\n",
        """\
error [duplicate-definition]: `m` is defined a second time
  a.tus:3:28
  3 | compare x across g in t as m
    |                            ^
  it is defined here first
  a.tus:2:31
  2 | compare x, y across g in t as m
    |                               ^
  help: a name has one meaning in a document: give one of the two another name
""",
        answered=("Outcomes by g",),
    ),
    Case(
        "a statement that is half typed does not stand in the way of the next ones",
        COMPARE + "compare x,\nshow groups of m\n",
        """\
error [syntax]: an outcome is missing at the end
  a.tus:3:11
  3 | compare x,
    |           ^
  help: the form is: compare OUTCOME, ... across FACTOR, ... in TABLE [where CONDITION] as NAME
""",
        answered=("Outcomes by g",),
    ),
    Case(
        "nor does a verb alone",
        COMPARE + "show groups of m\nread\n",
        """\
error [syntax]: a file or `sample` is missing at the end
  a.tus:4:5
  4 | read
    |     ^
  help: the form is: read sample SAMPLE | "file" as NAME [missing VALUE, ...] [separator "separator"] [decimal "decimal sign"] [encoding "encoding"]
""",
        answered=("Outcomes by g",),
    ),
    Case(
        "nor a text without its closing quotation mark",
        COMPARE + 'write "the {{m.omnibus\nshow groups of m\n',
        """\
error [syntax]: the closing `"` is missing
  a.tus:3:7
  3 | write "the {{m.omnibus
    |       ^^^^^^^^^^^^^^^^
""",
        answered=("Outcomes by g",),
    ),
    Case(
        "a path that leads nowhere is told at the key that is wrong",
        COMPARE + 'write "It was {{m.omnibus.pilai}}."\nwrite "It was {{m.omnibus.pillai}}."\n',
        """\
error [unknown-path]: `m.omnibus` has no key `pilai`
  a.tus:3:27
  3 | write "It was {{m.omnibus.pilai}}."
    |                           ^^^^^
  help: did you mean `pillai`?
""",
        answered=("It was V = .12, F(4, 24) = 0.40, p = .809.",),
    ),
]


@pytest.mark.parametrize("case", CASES, ids=lambda case: case.fact)
def test_bad_input(folder, case):
    for name, text in case.tables.items():
        folder.write(name, text)
    folder.write("a.tus", case.document)
    ran = folder.tussock("run", "a.tus")
    assert ran.err == case.told
    assert ran.code == 1
    for line in case.answered:
        assert line in ran.out.splitlines()


@pytest.mark.parametrize("case", CASES, ids=lambda case: case.fact)
def test_check_tells_the_same(folder, case):
    for name, text in case.tables.items():
        folder.write(name, text)
    folder.write("a.tus", case.document)
    ran = folder.tussock("check", "a.tus")
    assert (ran.err, ran.out, ran.code) == (case.told, "", 1)


def test_a_problem_also_stands_in_the_document_below_the_code(folder):
    folder.write("a.tus", COMPARE + "show omnibuss of m\n")
    text = folder.tussock("run", "a.tus").out
    assert "Error: there is no view `omnibuss`\n    a.tus:3:6\n    did you mean `omnibus`?\n" in text
    page = folder.tussock("run", "a.tus", "--to", "html").out
    assert '<aside class="problem error"><p><strong>Error:</strong> there is no view' in page
    assert "a.tus:3:6\ndid you mean `omnibus`?" in page


def test_ten_thousand_groups_are_compared(folder):
    rows = "".join(f"u{i // 3},{i % 7},{i % 11}\n" for i in range(30_000))
    folder.write("crew.csv", "id,x,y\n" + rows)
    folder.write("a.tus", 'read "crew.csv" as t\ncompare x, y across id in t as m\nshow omnibus of m\n')
    ran = folder.tussock("run", "a.tus")
    assert (ran.code, ran.err) == (0, "")
    assert "N = 30000 in 10000 groups of id." in " ".join(ran.out.split())


def test_a_group_of_one_is_compared_and_what_it_lacks_is_a_dash_with_a_note(folder):
    folder.write("one.csv", GOOD.split("c,")[0] + "c,9.0,20.0\n")
    folder.write(
        "a.tus",
        'read "one.csv" as t\ncompare x, y across g in t as m\n'
        "show groups of m\nshow covariances of m\nshow centroids of m\nshow omnibus of m\n",
    )
    ran = folder.tussock("run", "a.tus")
    assert (ran.code, ran.err) == (0, "")
    text = " ".join(ran.out.split())
    assert text.count("A group of one has no standard deviation.") == 2
    assert "No Box’s M: the group c has 1 row, and 3 are needed here." in text
    (row,) = [line for line in ran.out.splitlines() if line.split()[:3] == ["c", "1", "9.00"]]
    assert row.split()[3:] == ["—", "—", "—"]


def test_a_function_that_separates_nothing_is_not_interpreted(folder):
    """The means of the four groups lie on a line, so there is one function."""
    rows = [
        f"g{step},{x + step},{y + 2 * step}"
        for step in range(4)
        for x, y in ((-1, -2), (1, 2), (-1, 1), (1, -1))
    ]
    folder.write("line.csv", "\n".join(["g,x,y", *rows]) + "\n")
    folder.write(
        "a.tus", 'read "line.csv" as t\ncompare x, y across g in t as m\nshow coefficients of m\n'
    )
    text = " ".join(folder.tussock("run", "a.tus").out.split())
    assert "Function 2 separates nothing (λ = 0), so its direction is arbitrary." in text
    assert "On function 2" not in text


def test_many_problems_are_told_in_reading_order(folder):
    folder.write(
        "a.tus", "show a of b\ncompare x across g in t as m\npin m.n.o at 1\nlevels u.g a\nfoo\n"
    )
    ran = folder.tussock("check", "a.tus")
    places = [line.strip() for line in ran.err.splitlines() if line.startswith("  a.tus:")]
    assert len(places) >= 5
    assert places == sorted(places, key=lambda place: [int(n) for n in place.split(":")[1:]])


@pytest.mark.parametrize(
    "text",
    [
        "\x00\x01\x02",
        "compare " * 2000,
        "((((" * 2000,
        "show omnibus of m\n" * 2000,
        'write "' + "{{" * 3000,
        "derive t.a = " + "1 + " * 3000 + "1\n",
        "read sample ferry as crew\nderive crew.a = " + "(" * 3000 + "1" + ")" * 3000 + "\n",
        "`",
        "\u202e\u0000é̂\U0001f6a2 = ×",
        "policy alpha 1e999999\n",
    ],
    ids=["bytes", "verbs", "brackets", "questions", "braces", "sum", "nesting", "quote", "signs", "big"],
)
def test_no_text_takes_the_program_down(folder, text):
    folder.write("a.tus", text)
    for command in (["run", "a.tus"], ["check", "a.tus"], ["format", "--check", "a.tus"]):
        ran = folder.tussock(*command)
        assert ran.code in (0, 1), (command, ran.code, ran.err[-500:])
        assert "panicked" not in ran.err and "internal-error" not in ran.err
