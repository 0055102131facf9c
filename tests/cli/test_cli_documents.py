"""Markdown documents: prose whose numbers follow the data, and pins that hold them."""

import pytest
from cli_support import COMPARE, GOOD

PAPER = """\
# Three groups

The groups did not differ, {{m.omnibus.pillai}}, with V = {{m.omnibus.pillai.value 3}}.

```tussock
read "good.csv" as t
compare x, y across g in t as m
show omnibus of m
```

Group a had a mean of {{m.groups.a.x.mean}} ({{ m.groups.a.x }}), and Λ had *p* = {{m.omnibus.wilks.p}}.
Code such as `{{m.omnibus}}` stays as it is, and so does \\{{m.omnibus}}.
"""


def test_prose_in_markdown_has_its_citations_put_in(folder):
    folder.write("paper.md", PAPER)
    ran = folder.tussock("run", "paper.md", "--to", "md")
    assert (ran.code, ran.err) == (0, "")
    lines = ran.out.splitlines()
    assert lines[0] == "# Three groups"
    assert lines[2] == (
        "The groups did not differ, *V* = .12, *F*(4, 24) = 0.40, *p* = .809, with V = .124."
    )
    assert lines[-2] == "Group a had a mean of 9.78 (*M* = 9.78, *SD* = 1.97), and Λ had *p* = .831."
    assert "```tussock" in lines and "**Differences on the set of outcomes by g**" in lines


def test_the_web_page_has_them_too(folder):
    folder.write("paper.md", PAPER)
    page = folder.tussock("run", "paper.md", "--to", "html").out
    assert "<h1>Three groups</h1>" in page
    citation = "<em>V</em> = .12, <em>F</em>(4, 24) = 0.40, <em>p</em> = .809, with V = .124."
    assert citation in page.replace("\u00a0", " ")
    assert page.count("<table") == 1


def test_and_so_has_plain_text(folder):
    folder.write("paper.md", PAPER)
    text = " ".join(folder.tussock("run", "paper.md").out.split())
    assert "The groups did not differ, V = .12, F(4, 24) = 0.40, p = .809, with V = .124." in text
    assert "Group a had a mean of 9.78 (M = 9.78, SD = 1.97), and Λ had p = .831." in text


def test_braces_in_code_and_escaped_braces_are_no_live_values(folder):
    folder.write("paper.md", PAPER)
    last = folder.tussock("run", "paper.md", "--to", "md").out.splitlines()[-1]
    assert last.count("{{m.omnibus}}") == 2


def test_the_numbers_follow_the_data(folder):
    folder.write("paper.md", PAPER)
    before = folder.tussock("run", "paper.md", "--to", "md").out
    folder.write("good.csv", GOOD.replace("a,12.6,", "a,22.6,"))
    after = folder.tussock("run", "paper.md", "--to", "md").out
    assert "a mean of 9.78 " in before
    assert "a mean of 11.78 " in after


def test_a_path_that_leads_nowhere_is_told_with_its_line_and_the_rest_is_answered(folder):
    broken = PAPER.replace("m.omnibus.pillai}}", "m.omnibus.pilai}}")
    broken = broken.replace("m.groups.a.x.mean", "m.groups.d.x.mean")
    folder.write("paper.md", broken)
    ran = folder.tussock("run", "paper.md", "--to", "md")
    assert ran.code == 1
    assert ran.err == """\
error [unknown-path]: `m.omnibus` has no key `pilai`
  paper.md:3:40
  3 | The groups did not differ, {{m.omnibus.pilai}}, with V = {{m.omnibus.pillai.value 3}}.
    |                                        ^^^^^
  help: did you mean `pillai`?
error [unknown-path]: `m.groups` has no key `d`
  paper.md:11:34
  11 | Group a had a mean of {{m.groups.d.x.mean}} ({{ m.groups.a.x }}), and Λ had *p* = {{m.omnibus.wilks.p}}.
     |                                  ^
  help: its keys are: `a`, `b` and `c`
"""
    assert "with V = .124." in ran.out
    assert "(*M* = 9.78, *SD* = 1.97)" in ran.out


def test_a_path_that_stops_early_is_told_with_how_it_goes_on(folder):
    folder.write("paper.md", "It was {{m.omnibus}}.\n\n```tussock\n" + COMPARE + "```\n")
    ran = folder.tussock("check", "paper.md")
    assert (ran.code, ran.err) == (
        1,
        """\
error [unknown-path]: `m.omnibus` is not a value yet
  paper.md:1:10
  1 | It was {{m.omnibus}}.
    |          ^^^^^^^^^
  help: it goes on with `wilks`, `pillai`, `hotelling`, `roy` and `g`
""",
    )


PIN = COMPARE + "pin m.omnibus.pillai.value at {}\nshow groups of m\n"


@pytest.mark.parametrize("held", [".124", "0.1242", ".12", ".1 within .05", ".13 within 1%"])
def test_a_pin_holds_within_what_was_written(folder, held):
    folder.write("a.tus", PIN.format(held))
    ran = folder.tussock("run", "a.tus")
    assert (ran.code, ran.err) == (0, "")


@pytest.mark.parametrize("held", [".125", ".1241", ".13", ".13 within .005"])
def test_a_pin_fails_where_the_value_has_moved(folder, held):
    folder.write("a.tus", PIN.format(held))
    for command in ("run", "check"):
        ran = folder.tussock(command, "a.tus")
        assert ran.code == 1
        assert ran.err.startswith("error [moved-pin]: `m.omnibus.pillai.value` is 0.12417")
        assert f" off the pinned {float(held.split()[0])}\n" in ran.err
        assert "\n  a.tus:3:31\n" in ran.err
        assert "  help: find out what changed; if the change is meant, pin the new value\n" in ran.err
    assert "Outcomes by g" in folder.tussock("run", "a.tus").out


def test_a_pin_fails_after_a_correction_of_the_data(folder):
    folder.write("a.tus", PIN.format(".124"))
    assert folder.tussock("run", "a.tus").code == 0
    folder.write("good.csv", GOOD.replace("a,12.6,", "a,22.6,"))
    ran = folder.tussock("run", "a.tus")
    assert ran.code == 1
    assert "[moved-pin]" in ran.err


def test_a_pin_in_a_fence_of_a_paper_fails_the_paper(folder):
    paper = PAPER.replace("show omnibus of m", "pin m.omnibus.pillai.value at .2")
    folder.write("paper.md", paper)
    ran = folder.tussock("run", "paper.md", "--to", "html", "--out", "paper.html")
    assert ran.code == 1
    assert "\n  paper.md:8:31\n" in ran.err
    assert "<em>V</em>" in folder.read("paper.html")


def test_a_pin_of_a_whole_citation_is_told_to_go_on(folder):
    folder.write("a.tus", COMPARE + "pin m.omnibus.pillai at .124\n")
    ran = folder.tussock("run", "a.tus")
    assert (ran.code, ran.err) == (
        1,
        """\
error [unknown-path]: `m.omnibus.pillai` is a whole citation, and a pin holds one number
  a.tus:3:5
  3 | pin m.omnibus.pillai at .124
    |     ^^^^^^^^^^^^^^^^
  help: go on with a key, as in `m.omnibus.pillai.p`
""",
    )
