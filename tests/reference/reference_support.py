"""Runs the program on tables of text and gives its live values by path."""

import csv
import functools
import io
import json
import os
import re
import subprocess
import tempfile
from dataclasses import dataclass
from pathlib import Path

ROOT = Path(__file__).parents[2]
PROGRAM = Path(os.environ.get("TUSSOCK", ROOT / "target" / "release" / "tussock"))

# Published data and values of twenty digits, with their sources in the README beside them.
REFERENCE = ROOT / "crates" / "analysis" / "tests" / "reference"


def quoted(name):
    """A name as it stands in the language: bare where it is a word, else in back-quotes."""
    return name if re.fullmatch(r"[^\W\d]\w*", name) else f"`{name}`"


def dotted(*keys):
    """A path as the program writes it: numbers stand bare in it."""
    return ".".join(str(key) if str(key).isdigit() else quoted(key) for key in keys)


@dataclass(frozen=True)
class Answers:
    """What one document answered."""

    values: dict
    blocks: list
    problems: list
    status: int

    def value(self, *keys):
        return self.values[dotted(*keys)]

    def tables(self):
        return [block["table"] for block in self.blocks if block["kind"] == "table"]

    def cells(self):
        """Every cell of every table, intervals as their two limits."""
        for table in self.tables():
            for row in table["rows"]:
                for cell in row["cells"]:
                    if cell and "lower" in cell:
                        yield cell["lower"]
                        yield cell["upper"]
                    elif cell:
                        yield cell


@functools.lru_cache(maxsize=None)
def answer(script, **tables):
    """Answers a script that stands in a folder with the tables `name.csv`, given as text."""
    with tempfile.TemporaryDirectory() as folder:
        for name, text in tables.items():
            Path(folder, f"{name}.csv").write_text(text, encoding="utf-8")
        Path(folder, "analysis.tus").write_text(script, encoding="utf-8")
        command = [PROGRAM, "run", "analysis.tus", "--to", "json"]
        ran = subprocess.run(command, cwd=folder, capture_output=True, timeout=60)
    assert ran.returncode in (0, 1), ran.stderr.decode()
    whole = json.loads(ran.stdout, parse_constant=refuse)
    return Answers(
        whole["values"], whole["document"]["blocks"], whole["problems"], ran.returncode
    )


def refuse(constant):
    raise AssertionError(f"{constant} is no JSON")


def compared(outcomes, factor, table, levels=(), policy="", where=""):
    """The answers to one comparison, named `main`, of a table given as text."""
    names = ", ".join(quoted(outcome) for outcome in outcomes)
    order = ", ".join(quoted(level) for level in levels)
    script = "\n".join(
        [
            policy,
            'read "table.csv" as table',
            f"levels table.{quoted(factor)} {order}" if levels else "",
            f"compare {names} across {quoted(factor)} in table {where} as main",
            "",
        ]
    )
    found = answer(script, table=table)
    assert found.problems == [], found.problems
    assert found.status == 0
    return found


def table_text(columns):
    """Columns by name as CSV text; numbers with all their digits."""
    out = io.StringIO()
    writer = csv.writer(out, lineterminator="\n")
    writer.writerow(columns)
    written = [
        [repr(float(cell)) if isinstance(cell, float) else cell for cell in column]
        for column in columns.values()
    ]
    writer.writerows(zip(*written))
    return out.getvalue()


def read_columns(name):
    """The columns of a reference table as texts."""
    with (REFERENCE / name).open(encoding="utf-8", newline="") as file:
        rows = list(csv.DictReader(file))
    return {column: [row[column] for row in rows] for column in rows[0]}
