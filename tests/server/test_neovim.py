"""The set-up for Neovim, in Neovim."""

import json
import os
import subprocess
import sys
from pathlib import Path

import pytest
from lsp_support import PROGRAM, ROOT

NVIM = Path(sys.executable).parent / "nvim"

MISTAKEN = """\
read "crew.csv" as `crew 🚢`
levels `crew 🚢`.rooster fixed, forward, backward
compare alertness, mood across roster in `crew 🚢` as main
show omnibus of main
"""


@pytest.fixture
def seen(folder):
    script, markdown, prose = folder / "a.tus", folder / "a.md", folder / "prose.md"
    script.write_text(MISTAKEN, encoding="utf-8")
    markdown.write_text("# Crews\n\n```tussock\nshow omnibus of nobody\n```\n", encoding="utf-8")
    prose.write_text("Dear {{ customer }},\n", encoding="utf-8")
    setup = ROOT / "editors" / "neovim"
    output = folder / "seen.json"
    environment = {
        **os.environ,
        "PATH": f"{PROGRAM.parent}{os.pathsep}{os.environ['PATH']}",
        "SCRIPT": str(script),
        "MARKDOWN": str(markdown),
        "PROSE": str(prose),
        "SEEN": str(output),
        "XDG_STATE_HOME": str(folder / "state"),
        "XDG_DATA_HOME": str(folder / "data"),
        "XDG_CACHE_HOME": str(folder / "cache"),
    }
    check = Path(__file__).parent / "neovim" / "check.lua"
    run = subprocess.run(
        [NVIM, "--clean", "--headless", "--cmd", f"set runtimepath^={setup}", "-c", f"luafile {check}"],
        env=environment,
        cwd=folder,
        capture_output=True,
        text=True,
        timeout=120,
    )
    assert output.exists(), run.stderr
    seen = json.loads(output.read_text(encoding="utf-8"))
    assert "error" not in seen, seen
    return seen


def test_a_person_in_neovim_has_the_features(seen):
    assert seen["filetype"] == "tussock"
    assert seen["commentstring"] == "# %s"
    assert seen["syntax"] == "tussockVerb"
    assert seen["encoding"] == "utf-8"

    start = len("levels `crew 🚢`.".encode())
    assert seen["mistake"] == ["unknown-column", 1, start, start + len("rooster"), "tussock"]
    assert seen["mended"] == "levels `crew 🚢`.roster fixed, forward, backward"
    assert "read" in seen["hover"]
    assert seen["completion"] == ["alertness"]
    assert seen["outline"][-1] == "omnibus of main"
    assert seen["formatted"] == "policy alpha .05"
    assert seen["rules_at_the_end"] == []

    assert seen["markdown"] == ["unknown-comparison", 3]
    assert seen["fence"] == "tussockVerb"
    assert seen["clients_of_prose"] == 0
