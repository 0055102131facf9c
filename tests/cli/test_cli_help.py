"""What the program says of itself."""

import re

import pytest

COMMANDS = {
    "run": ["--to", "--out"],
    "check": ["--json"],
    "format": ["--check"],
    "explain": [],
    "demo": ["--out"],
    "install": ["--prefix"],
    "kernel": [],
    "server": [],
}


def test_help_lists_every_command_with_a_word_on_it(folder):
    ran = folder.tussock("--help")
    assert (ran.code, ran.err) == (0, "")
    listed = dict(re.findall(r"^  (\w+) {2,}(.+)$", ran.out, flags=re.MULTILINE))
    listed.pop("help")
    assert list(listed) == list(COMMANDS)
    assert all(len(word) > 10 for word in listed.values())


@pytest.mark.parametrize("command", COMMANDS)
def test_each_command_says_what_it_does_and_names_its_options(folder, command):
    ran = folder.tussock(command, "--help")
    assert (ran.code, ran.err) == (0, "")
    assert f"Usage: tussock {command}" in ran.out
    options = set(re.findall(r"--[a-z]+", ran.out)) - {"--help"}
    assert options == set(COMMANDS[command])


def test_lines_of_help_fit_a_terminal(folder):
    for command in ([], *([name] for name in COMMANDS)):
        for line in folder.tussock(*command, "--help").out.splitlines():
            assert len(line) <= 88, line


def test_the_version_is_that_of_the_package(folder):
    ran = folder.tussock("--version")
    assert ran.code == 0
    assert re.fullmatch(r"tussock \d+\.\d+\.\d+\n", ran.out)


@pytest.mark.parametrize(
    ("arguments", "says"),
    [
        ([], "Usage: tussock <COMMAND>"),
        (["rum"], "unrecognized subcommand 'rum'"),
        (["run"], "<FILE>"),
        (["run", "a.tus", "--to", "pdf"], "[possible values: text, html, md, json]"),
        (["check"], "<FILES>"),
        (["run", "a.tus", "b.tus"], "unexpected argument 'b.tus'"),
        (["server", "--port", "1"], "unexpected argument '--port'"),
    ],
)
def test_a_command_that_is_not_understood_has_code_2_and_says_what_is_missing(folder, arguments, says):
    ran = folder.tussock(*arguments)
    assert (ran.code, ran.out) == (2, "")
    assert says in ran.err
