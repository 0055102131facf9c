"""`tussock check`: what is wrong with documents, for people and for programs."""

import json

from cli_support import COMPARE, OMNIBUS

LAX = COMPARE + "show pairs of m pairs unadjusted\n"


def test_a_document_without_problems_is_passed_over_in_silence(folder):
    folder.write("a.tus", OMNIBUS)
    ran = folder.tussock("check", "a.tus")
    assert (ran.code, ran.out, ran.err) == (0, "", "")


def test_a_warning_is_told_and_fails_nothing(folder):
    folder.write("a.tus", "policy pairs holm\n" + LAX)
    ran = folder.tussock("check", "a.tus")
    assert ran.code == 0
    assert ran.err.startswith("warning [lax-setting]: ")
    assert "  a.tus:4:" in ran.err
    assert folder.tussock("run", "a.tus").code == 0


def test_a_warning_that_is_allowed_with_a_reason_is_not_told(folder):
    allowed = LAX.replace("show", "# allow lax-setting: for the supplement\nshow")
    folder.write("a.tus", "policy pairs holm\n" + allowed)
    ran = folder.tussock("check", "a.tus")
    assert (ran.code, ran.out, ran.err) == (0, "", "")


def test_what_makes_the_tests_impossible_is_told_even_where_none_is_asked_for(folder):
    folder.write("twin.csv", "g,x,z\na,1,1\na,2,2\na,4,4\nb,2,2\nb,5,5\nb,7,7\n")
    folder.write("a.tus", 'read "twin.csv" as t\ncompare x, z across g in t as m\n')
    ran = folder.tussock("check", "a.tus")
    assert ran.code == 1
    assert ran.err.startswith("error [dependent-outcomes]: `z` holds the same information as `x`\n")


def test_several_files_are_checked_and_one_error_fails_them_all(folder):
    folder.write("a.tus", OMNIBUS)
    folder.write("b.tus", OMNIBUS.replace("omnibus", "omnibuss"))
    folder.write("c.md", "V is {{m.omnibus.pillai}}.\n\n```tussock\n" + COMPARE + "```\n")
    assert folder.tussock("check", "a.tus", "c.md").code == 0
    ran = folder.tussock("check", "a.tus", "b.tus", "c.md")
    assert ran.code == 1
    assert [line for line in ran.err.splitlines() if ":" in line and "tus" in line] == ["  b.tus:3:6"]


def test_problems_as_json_name_file_place_rule_message_and_help(folder):
    folder.write("a.tus", OMNIBUS)
    folder.write("b.tus", "# größer\n" + OMNIBUS.replace("omnibus", "omnibuss"))
    ran = folder.tussock("check", "--json", "a.tus", "b.tus")
    assert (ran.code, ran.err) == (1, "")
    assert json.loads(ran.out) == [
        {
            "file": "b.tus",
            "cell": None,
            "start": {"line": 4, "column": 6},
            "end": {"line": 4, "column": 14},
            "rule": "unknown-view",
            "severity": "error",
            "message": "there is no view `omnibuss`",
            "help": "did you mean `omnibus`?",
        }
    ]


def test_no_problems_as_json_are_an_empty_list(folder):
    folder.write("a.tus", OMNIBUS)
    ran = folder.tussock("check", "--json", "a.tus")
    assert (ran.code, json.loads(ran.out), ran.err) == (0, [], "")


def test_columns_are_counted_in_characters(folder):
    folder.write("a.tus", COMPARE + 'write "größe — {{m.omnibus.pilai}}"\n')
    (problem,) = json.loads(folder.tussock("check", "--json", "a.tus").out)
    assert problem["start"] == {"line": 3, "column": 28}
    assert problem["end"] == {"line": 3, "column": 33}


def test_a_problem_in_a_notebook_names_its_cell_in_json_too(folder):
    cells = [
        {"cell_type": "markdown", "metadata": {}, "source": "Text."},
        {"cell_type": "code", "metadata": {}, "outputs": [], "source": "show groups of m"},
    ]
    folder.write("a.ipynb", json.dumps({"cells": cells, "metadata": {}, "nbformat": 4}))
    (problem,) = json.loads(folder.tussock("check", "--json", "a.ipynb").out)
    assert (problem["file"], problem["cell"]) == ("a.ipynb", 2)
    assert problem["start"] == {"line": 1, "column": 16}
    assert problem["rule"] == "unknown-comparison"


def test_a_file_that_is_not_there_has_code_2(folder):
    ran = folder.tussock("check", "nothing.tus")
    assert (ran.code, ran.err) == (2, "tussock: nothing.tus: No such file or directory (os error 2)\n")


def test_checking_changes_no_file(folder):
    folder.write("a.tus", "show   omnibus of m\n")
    before = sorted(folder.path.iterdir())
    folder.tussock("check", "a.tus")
    assert sorted(folder.path.iterdir()) == before
    assert folder.read("a.tus") == "show   omnibus of m\n"
