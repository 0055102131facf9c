import os
import subprocess
from dataclasses import dataclass
from pathlib import Path

import pytest
from cli_support import GOOD


@dataclass(frozen=True)
class Ran:
    """What a command left behind."""

    code: int
    out: str
    err: str


@dataclass(frozen=True)
class Folder:
    """A folder with files, in which commands are typed."""

    path: Path
    program: Path

    def write(self, name, text):
        (self.path / name).parent.mkdir(parents=True, exist_ok=True)
        (self.path / name).write_text(text, encoding="utf-8")

    def read(self, name):
        return (self.path / name).read_text(encoding="utf-8")

    def tussock(self, *arguments, **environment):
        ran = subprocess.run(
            [self.program, *arguments],
            cwd=self.path,
            env={**os.environ, **environment},
            capture_output=True,
            timeout=60,
        )
        return Ran(ran.returncode, ran.stdout.decode("utf-8"), ran.stderr.decode("utf-8"))


@pytest.fixture
def folder(tmp_path, program):
    """A folder with a small table, good.csv: outcomes x and y of the groups a, b and c of g."""
    made = Folder(tmp_path, program)
    made.write("good.csv", GOOD)
    return made
