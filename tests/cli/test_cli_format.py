"""`tussock format`: layout, and nothing but layout."""

import json

import pytest

SCRIPT = """\
policy   alpha .05  interval 95%
read "good.csv"   as t   # the file
compare x,y   across g in t   as m


show omnibus   of m
"""

LAID_OUT = """\
policy alpha .05 interval 95%
read "good.csv" as t # the file
compare x, y across g in t as m


show omnibus of m
"""

MARKDOWN = """\
# Title   with  blanks

Text   {{ m.omnibus.pillai }}   and more;  `compare x,y`.

```tussock
read "good.csv"   as t
compare x,y across g in t   as m
```

```python
x  =  1
```

~~~~tussock
show omnibus   of m
~~~~
"""

LAID_OUT_MARKDOWN = """\
# Title   with  blanks

Text   {{ m.omnibus.pillai }}   and more;  `compare x,y`.

```tussock
read "good.csv" as t
compare x, y across g in t as m
```

```python
x  =  1
```

~~~~tussock
show omnibus of m
~~~~
"""


def notebook(*code):
    """A notebook with fields in an order of its own and with outputs that have to stay."""
    cells = [
        {"cell_type": "markdown", "metadata": {}, "source": ["Text   with  blanks\n", "x,y"]},
        {"cell_type": "raw", "metadata": {}, "source": "compare   x,y"},
    ]
    for source in code:
        cells.append(
            {
                "cell_type": "code",
                "execution_count": 3,
                "id": "one",
                "metadata": {"zone": 1, "aim": [1.50, 2e-7]},
                "outputs": [{"output_type": "stream", "name": "stdout", "text": ["x,y   z\n"]}],
                "source": source,
            }
        )
    return {"nbformat": 4, "metadata": {"b": {}, "a": "größe"}, "cells": cells, "nbformat_minor": 5}


FORMS = {
    "a.tus": (SCRIPT, LAID_OUT),
    "a.md": (MARKDOWN, LAID_OUT_MARKDOWN),
    "a.ipynb": (
        json.dumps(notebook(["compare x,y   across g\n", "  in t as m"], "show   flow of m"), indent=1),
        json.dumps(notebook(["compare x, y across g in t as m"], ["show flow of m"]), indent=1),
    ),
}

every_form = pytest.mark.parametrize("name", FORMS)


def same(name, found, expected):
    """Notebooks have to agree in what they hold and in its order, not in their own blanks."""
    if name.endswith(".ipynb"):
        assert json.dumps(json.loads(found)) == json.dumps(json.loads(expected))
    else:
        assert found == expected


@every_form
def test_a_document_is_laid_out_in_its_place_and_nothing_else_is_touched(folder, name):
    before, after = FORMS[name]
    folder.write(name, before)
    ran = folder.tussock("format", name)
    assert (ran.code, ran.out, ran.err) == (0, f"{name} laid out\n", "")
    same(name, folder.read(name), after)


@every_form
def test_a_document_that_is_laid_out_stays_as_it_is(folder, name):
    folder.write(name, FORMS[name][0])
    folder.tussock("format", name)
    once = folder.read(name)
    ran = folder.tussock("format", name)
    assert (ran.code, ran.out, ran.err) == (0, "", "")
    assert folder.read(name) == once


@every_form
def test_check_changes_nothing_and_fails_where_a_file_would_change(folder, name):
    folder.write(name, FORMS[name][0])
    ran = folder.tussock("format", "--check", name)
    assert (ran.code, ran.out, ran.err) == (1, f"{name} would change\n", "")
    assert folder.read(name) == FORMS[name][0]
    folder.tussock("format", name)
    ran = folder.tussock("format", "--check", name)
    assert (ran.code, ran.out, ran.err) == (0, "", "")


def test_a_notebook_that_is_laid_out_keeps_its_own_bytes(folder):
    """Other programs write notebooks with other indentation; only code counts."""
    text = json.dumps(notebook(["show flow of m"]), separators=(",", ":"))
    folder.write("a.ipynb", text)
    assert folder.tussock("format", "a.ipynb").out == ""
    assert folder.read("a.ipynb") == text


def test_several_files_are_laid_out_and_those_that_change_are_named(folder):
    folder.write("a.tus", SCRIPT)
    folder.write("b.tus", LAID_OUT)
    folder.write("c.md", MARKDOWN)
    ran = folder.tussock("format", "a.tus", "b.tus", "c.md")
    assert (ran.code, ran.out) == (0, "a.tus laid out\nc.md laid out\n")


def test_a_statement_that_is_broken_keeps_its_words(folder):
    folder.write("a.tus", "compare x,   acr\nshow   flow of m\n")
    folder.tussock("format", "a.tus")
    words = folder.read("a.tus").split()
    assert words == ["compare", "x,", "acr", "show", "flow", "of", "m"]


def test_the_answers_do_not_change_with_the_layout(folder):
    folder.write("a.tus", SCRIPT)
    before = json.loads(folder.tussock("run", "a.tus", "--to", "json").out)
    folder.tussock("format", "a.tus")
    after = json.loads(folder.tussock("run", "a.tus", "--to", "json").out)
    assert before["values"] == after["values"]
    assert before["document"]["blocks"][1:] == after["document"]["blocks"][1:]


@pytest.mark.parametrize(
    ("name", "text", "complaint"),
    [
        ("a.txt", "show", "a.txt: the name must end in .tus, .md or .ipynb"),
        ("a.ipynb", "[]", "a.ipynb: not a notebook: it has no list of cells"),
        ("b.tus", None, "b.tus: No such file or directory (os error 2)"),
    ],
)
def test_a_file_that_is_no_document_is_refused_with_code_2(folder, name, text, complaint):
    if text is not None:
        folder.write(name, text)
    ran = folder.tussock("format", name)
    assert (ran.code, ran.out, ran.err) == (2, "", f"tussock: {complaint}\n")
    if text is not None:
        assert folder.read(name) == text


def test_windows_line_breaks_do_not_count_as_a_change(folder):
    path = folder.path / "a.tus"
    path.write_bytes(LAID_OUT.replace("\n", "\r\n").encode())
    folder.tussock("format", "a.tus")
    assert path.read_bytes().replace(b"\r\n", b"\n").decode() == LAID_OUT
