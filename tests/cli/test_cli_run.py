"""`tussock run`: a document in, its answers out, in four forms."""

import html.parser
import json
import re

import pytest
from cli_support import COMPARE, GOOD, OMNIBUS

NOTEBOOK = {
    "cells": [
        {"cell_type": "markdown", "metadata": {}, "source": ["V is {{m.omnibus.pillai.value 3}}."]},
        {"cell_type": "raw", "metadata": {}, "source": "show nothing"},
        {
            "cell_type": "code",
            "execution_count": None,
            "id": "one",
            "metadata": {},
            "outputs": [],
            "source": COMPARE.splitlines(keepends=True),
        },
        {
            "cell_type": "code",
            "execution_count": None,
            "id": "two",
            "metadata": {},
            "outputs": [],
            "source": "show groups of m",
        },
    ],
    "metadata": {},
    "nbformat": 4,
    "nbformat_minor": 5,
}


class Elements(html.parser.HTMLParser):
    """The tags of a page, with their attributes."""

    def __init__(self, text):
        super().__init__()
        self.found = []
        self.feed(text)

    def handle_starttag(self, tag, attributes):
        self.found.append((tag, dict(attributes)))


def test_a_script_is_answered_as_text_on_standard_output(folder):
    folder.write("a.tus", OMNIBUS)
    ran = folder.tussock("run", "a.tus")
    assert (ran.code, ran.err) == (0, "")
    lines = ran.out.splitlines()
    assert "Differences on the set of outcomes by g" in lines
    (pillai,) = [line.split(maxsplit=7) for line in lines if line.startswith("Pillai, V ")]
    assert pillai == "Pillai, V .124 0.40 4 24 .809".split() + ["approximate   .062   [.00, .11]"]
    assert any(line.startswith("Note. N = 15 in 3 groups of g.") for line in lines)


def test_text_is_the_form_that_is_taken_where_none_is_asked_for(folder):
    folder.write("a.tus", OMNIBUS)
    assert folder.tussock("run", "a.tus") == folder.tussock("run", "a.tus", "--to", "text")


def test_markdown_has_a_table_that_any_reader_of_markdown_knows(folder):
    folder.write("a.tus", OMNIBUS)
    ran = folder.tussock("run", "a.tus", "--to", "md")
    assert (ran.code, ran.err) == (0, "")
    rows = [line for line in ran.out.splitlines() if line.startswith("| ")]
    cells = [[cell.strip() for cell in row.strip("|").split("|")] for row in rows]
    assert cells[0][:6] == ["Criterion", "Value", "*F*", "df₁", "df₂", "*p*"]
    assert cells[3][:6] == ["Pillai, *V*", ".124", "0.40", "4", "24", ".809"]
    assert len(cells) == 6
    assert {len(row) for row in cells} == {9}
    assert "```tussock\nread" in ran.out


def test_html_is_one_page_that_needs_nothing_beside_it(folder):
    folder.write("a.tus", OMNIBUS)
    ran = folder.tussock("run", "a.tus", "--to", "html")
    assert (ran.code, ran.err) == (0, "")
    assert ran.out.startswith("<!DOCTYPE html>")
    elements = Elements(ran.out).found
    tags = [tag for tag, _ in elements]
    assert tags.count("table") == 1
    assert not {"script", "link", "img", "iframe"} & set(tags)
    assert not [a for _, a in elements if {"src", "href"} & set(a)]
    assert "url(" not in ran.out and "@import" not in ran.out


def test_html_shows_the_path_and_every_digit_of_a_number_that_is_pointed_at(folder):
    folder.write("a.tus", OMNIBUS)
    page = folder.tussock("run", "a.tus", "--to", "html").out
    values = json.loads(folder.tussock("run", "a.tus", "--to", "json").out)["values"]
    titles = [a["title"] for tag, a in Elements(page).found if tag == "td" and "title" in a]
    shown = [line.split(" = ") for title in titles for line in title.splitlines()]
    assert len(shown) > 20
    for path, number in shown:
        assert float(number) == values[path]


def test_json_has_the_document_its_problems_and_every_live_value(folder):
    folder.write("a.tus", OMNIBUS)
    ran = folder.tussock("run", "a.tus", "--to", "json")
    assert (ran.code, ran.err) == (0, "")
    whole = json.loads(ran.out)
    assert set(whole) == {"document", "problems", "values"}
    assert whole["problems"] == []
    assert [block["kind"] for block in whole["document"]["blocks"]] == ["code", "table"]
    table = whole["document"]["blocks"][1]["table"]
    assert table["title"] == "Differences on the set of outcomes by g"
    assert table["columns"][0] == {"head": "Criterion", "spanner": None, "kind": "row-head"}
    assert table["rows"][1]["cells"][2] == {
        "number": whole["values"]["m.omnibus.g.pillai.F"],
        "printed": "0.40",
        "style": "statistic",
        "path": "m.omnibus.g.pillai.F",
    }
    # Roy's F is a bound, so there is no p.
    assert table["rows"][3]["cells"][5] == {
        "number": None,
        "reason": "does not exist here; see the notes",
    }


def test_json_has_the_values_of_views_that_no_question_asks_for(folder):
    folder.write("a.tus", COMPARE)
    values = json.loads(folder.tussock("run", "a.tus", "--to", "json").out)["values"]
    assert values["m.groups.a.n"] == 5
    assert {path.split(".")[1] for path in values} == {
        "flow",
        "groups",
        "correlations",
        "covariances",
        "omnibus",
        "functions",
        "coefficients",
        "centroids",
        "scores",
        "outcomes",
        "pairs",
    }


@pytest.mark.parametrize("form", ["text", "html", "md", "json"])
def test_answers_can_be_written_to_a_file(folder, form):
    folder.write("a.tus", OMNIBUS)
    ran = folder.tussock("run", "a.tus", "--to", form, "--out", f"answers.{form}")
    assert (ran.code, ran.out, ran.err) == (0, "", "")
    assert folder.read(f"answers.{form}") == folder.tussock("run", "a.tus", "--to", form).out


def test_a_folder_that_does_not_exist_is_no_place_for_the_answers(folder):
    folder.write("a.tus", OMNIBUS)
    ran = folder.tussock("run", "a.tus", "--out", "nowhere/answers.txt")
    assert ran.code == 2
    assert ran.err == "tussock: nowhere/answers.txt: No such file or directory (os error 2)\n"


@pytest.mark.parametrize("form", ["text", "html", "md", "json"])
def test_the_same_document_gives_the_same_bytes_whatever_the_locale(folder, form):
    folder.write("a.tus", OMNIBUS + "show pairs of m\n")
    first = folder.tussock("run", "a.tus", "--to", form)
    again = folder.tussock("run", "a.tus", "--to", form, LC_ALL="de_DE.UTF-8", TZ="Asia/Tokyo")
    few = folder.tussock("run", "a.tus", "--to", form, POLARS_MAX_THREADS="1", RAYON_NUM_THREADS="1")
    assert first == again == few


def test_a_data_file_is_looked_for_beside_the_document(folder):
    folder.write("papers/one/a.tus", OMNIBUS)
    folder.write("papers/one/good.csv", GOOD)
    folder.write("good.csv", "not,this\n1,2\n")
    assert folder.tussock("run", "papers/one/a.tus").code == 0


def test_the_cells_of_a_notebook_are_one_document(folder):
    folder.write("a.ipynb", json.dumps(NOTEBOOK))
    ran = folder.tussock("run", "a.ipynb")
    assert (ran.code, ran.err) == (0, "")
    assert "V is .124." in ran.out
    assert "Outcomes by g" in ran.out
    assert "show nothing" not in ran.out


def test_a_problem_in_a_notebook_is_told_with_its_cell(folder):
    notebook = json.loads(json.dumps(NOTEBOOK))
    notebook["cells"][3]["source"] = "# groups\nshow groupes of m"
    folder.write("a.ipynb", json.dumps(notebook))
    ran = folder.tussock("run", "a.ipynb")
    assert ran.code == 1
    assert ran.err == (
        "error [unknown-view]: there is no view `groupes`\n"
        "  a.ipynb, cell 4, line 2, column 6\n"
        "  2 | show groupes of m\n"
        "    |      ^^^^^^^\n"
        "  help: did you mean `groups`?\n"
    )


@pytest.mark.parametrize(
    ("name", "text", "complaint"),
    [
        ("a.txt", "show", "a.txt: the name must end in .tus, .md or .ipynb"),
        ("a.ipynb", "{", "a.ipynb: not a notebook: EOF while parsing an object at line 1 column 1"),
        ("a.ipynb", "[]", "a.ipynb: not a notebook: it has no list of cells"),
        ("b.tus", None, "b.tus: No such file or directory (os error 2)"),
    ],
)
def test_a_file_that_is_no_document_is_refused_with_code_2(folder, name, text, complaint):
    if text is not None:
        folder.write(name, text)
    ran = folder.tussock("run", name)
    assert (ran.code, ran.out, ran.err) == (2, "", f"tussock: {complaint}\n")


def test_a_document_without_questions_has_no_answers_and_no_problems(folder):
    folder.write("a.tus", "# nothing yet\n")
    ran = folder.tussock("run", "a.tus")
    assert (ran.code, ran.err) == (0, "")


def test_a_reader_that_stops_reading_is_no_failure(folder):
    """As in `tussock run a.tus --to json | head -1`."""
    import subprocess

    folder.write("a.tus", OMNIBUS + "show pairs of m\n")
    command = f"set -o pipefail; {folder.program} run a.tus --to json | head -1"
    ran = subprocess.run(["bash", "-c", command], cwd=folder.path, capture_output=True)
    assert (ran.returncode, ran.stdout, ran.stderr) == (0, b"{\n", b"")


def test_windows_line_breaks_and_a_byte_order_mark_do_no_harm(folder):
    folder.write("good.csv", "\ufeff" + GOOD.replace("\n", "\r\n"))
    folder.write("a.tus", OMNIBUS.replace("\n", "\r\n"))
    ran = folder.tussock("run", "a.tus")
    assert (ran.code, ran.err) == (0, "")
    assert re.search(r"Pillai, V +\.124", ran.out)


def test_a_setting_of_one_table_holds_for_it_alone(folder):
    folder.write("a.tus", COMPARE + "show groups of m interval 99%\nshow groups of m\n")
    out = folder.tussock("run", "a.tus").out
    assert out.index("99% CI") < out.index("95% CI")
