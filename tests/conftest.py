"""What all tests share: the program, which has to be built first."""

import os
from pathlib import Path

import pytest

ROOT = Path(__file__).parents[1]


@pytest.fixture(scope="session")
def program():
    """The program under test; the variable TUSSOCK names another one."""
    path = Path(os.environ.get("TUSSOCK", ROOT / "target" / "release" / "tussock"))
    assert path.exists(), f"{path} is not built: run `cargo build --release`"
    return path
