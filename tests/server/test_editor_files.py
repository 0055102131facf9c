"""The editors' files: they parse, and their patterns colour what they should."""

import json
import re

import pytest
from lsp_support import ROOT

EDITORS = ROOT / "editors"
GRAMMAR = EDITORS / "vscode" / "syntaxes" / "tussock.tmLanguage.json"


def patterns(value):
    """Every regular expression in a grammar."""
    if isinstance(value, dict):
        for key, inner in value.items():
            if key in ("match", "begin", "end", "while", "beforeText", "wordPattern"):
                yield inner
            else:
                yield from patterns(inner)
    elif isinstance(value, list):
        for inner in value:
            yield from patterns(inner)


@pytest.mark.parametrize("file", sorted(EDITORS.rglob("*.json")), ids=lambda file: file.name)
def test_every_json_file_parses(file):
    json.loads(file.read_text(encoding="utf-8"))


@pytest.mark.parametrize("file", sorted((EDITORS / "vscode" / "syntaxes").iterdir()), ids=lambda file: file.name)
def test_every_pattern_of_the_grammars_compiles(file):
    found = list(patterns(json.loads(file.read_text(encoding="utf-8"))))
    assert found
    for pattern in found:
        # What the two kinds of expression do not share: an anchor, and references from an end to
        # the groups of its begin.
        re.compile(pattern.replace("|\\G", "").replace("(\\2|", "(").replace("(\\3)", "()"))


@pytest.mark.parametrize(
    "rule, text, marked",
    [
        ("verb", "show omnibus", "show"),
        ("verb", "  show omnibus", None),
        ("verb", "shows", None),
        ("word", "crew as main", "as"),
        ("word", "alphabet", None),
        ("number", "alpha .05", ".05"),
        ("number", "interval 95%", "95%"),
        ("number", "1e-3", "1e-3"),
        ("number", "q12", None),
        ("name", "a `Sleep (h)` b", "`Sleep (h)`"),
        ("function", "log(x)", "log"),
    ],
)
def test_a_pattern_marks_what_it_should(rule, text, marked):
    grammar = json.loads(GRAMMAR.read_text(encoding="utf-8"))
    found = re.search(grammar["repository"][rule]["match"], text)
    assert (found and found.group()) == marked


def test_the_files_that_a_package_names_are_there():
    package = json.loads((EDITORS / "vscode" / "package.json").read_text(encoding="utf-8"))
    contributed = package["contributes"]
    named = [grammar["path"] for grammar in contributed["grammars"]]
    named += [language["configuration"] for language in contributed["languages"]]
    labextension = EDITORS / "jupyterlab" / "labextension"
    package = json.loads((labextension / "package.json").read_text(encoding="utf-8"))
    loaded = labextension / package["jupyterlab"]["_build"]["load"]
    for file in [EDITORS / "vscode" / path for path in named] + [loaded]:
        assert file.is_file(), file
    # The name under which the page registers it is the name under which it is looked up.
    assert f'window._JUPYTERLAB["{package["name"]}"]' in loaded.read_text(encoding="utf-8")
