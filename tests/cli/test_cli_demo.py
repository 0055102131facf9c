"""`tussock demo`: the built-in demonstration as one web page."""

import html.parser
import json
import re
from pathlib import Path

import pytest

NOTEBOOK = Path(__file__).parents[2] / "demo-notebooks" / "rosters.ipynb"


class Page(html.parser.HTMLParser):
    def __init__(self, text):
        super().__init__()
        self.tags, self.attributes = [], []
        self.feed(text)

    def handle_starttag(self, tag, attributes):
        self.tags.append(tag)
        self.attributes += attributes


@pytest.fixture
def cells():
    notebook = json.loads(NOTEBOOK.read_text(encoding="utf-8"))
    return [(cell["cell_type"], "".join(cell["source"])) for cell in notebook["cells"]]


def test_it_writes_a_page_and_says_where(folder):
    ran = folder.tussock("demo")
    assert (ran.code, ran.err) == (0, "")
    page = folder.path / "tussock-demo.html"
    assert page.exists()
    assert str(page.resolve()) in ran.out
    assert ran.out.endswith("Open that file in a browser.\n")


def test_it_can_be_told_where(folder):
    folder.write("pages/keep", "")
    ran = folder.tussock("demo", "--out", "pages/demo.html")
    assert ran.code == 0
    assert str((folder.path / "pages" / "demo.html").resolve()) in ran.out
    assert not (folder.path / "tussock-demo.html").exists()


def test_the_page_loads_nothing_from_anywhere(folder):
    folder.tussock("demo", "--out", "demo.html")
    text = folder.read("demo.html")
    page = Page(text)
    assert not {"script", "link", "img", "iframe", "object", "embed", "base"} & set(page.tags)
    assert not [a for a in page.attributes if a[0] in ("src", "href", "srcset", "action")]
    assert not re.search(r"https?:|url\(|@import", text)


def test_every_question_of_the_demonstration_is_answered(folder, cells):
    folder.tussock("demo", "--out", "demo.html")
    text = folder.read("demo.html")
    code = "\n".join(source for kind, source in cells if kind == "code")
    shown = re.findall(r"^show (\w+) of", code, flags=re.MULTILINE)
    # The views of scores and of pairs have two tables each.
    assert Page(text).tags.count("table") == len(shown) + shown.count("scores") + shown.count("pairs")
    views = "flow groups correlations covariances omnibus functions coefficients centroids"
    assert sorted(shown) == sorted([*views.split(), "scores", "outcomes", "pairs"])
    assert 'class="problem' not in text
    assert "{{" not in re.sub(r"<pre>.*?</pre>", "", text, flags=re.DOTALL)


def test_the_page_shows_the_prose_and_the_code_of_the_demonstration(folder, cells):
    folder.tussock("demo", "--out", "demo.html")
    page = Page(folder.read("demo.html"))
    assert page.tags.count("pre") == sum(kind == "code" for kind, _ in cells)
    prose = "\n".join(source for kind, source in cells if kind == "markdown")
    headings = [line for line in prose.splitlines() if line.startswith("#")]
    assert sum(tag in ("h1", "h2", "h3") for tag in page.tags) >= len(headings)


def test_the_demonstration_in_its_own_file_gives_the_same_values(folder):
    """The notebook that a user opens is the one that is built in."""
    ran = folder.tussock("run", str(NOTEBOOK), "--to", "json")
    assert (ran.code, ran.err) == (0, "")
    values = json.loads(ran.out)["values"]
    folder.tussock("demo", "--out", "demo.html")
    titles = [v for k, v in Page(folder.read("demo.html")).attributes if k == "title"]
    lines = [line.split(" = ") for title in titles for line in title.splitlines()]
    assert len(lines) > 200
    for path, number in lines:
        assert float(number) == values[path]


def test_the_built_in_documents_are_laid_out_and_without_problems(folder):
    assert folder.tussock("check", str(NOTEBOOK)).code == 0
    ran = folder.tussock("format", "--check", str(NOTEBOOK))
    assert (ran.code, ran.out) == (0, "")


def test_a_page_that_cannot_be_written_is_a_failure(folder):
    ran = folder.tussock("demo", "--out", "nowhere/demo.html")
    assert (ran.code, ran.out) == (2, "")
    assert ran.err == "tussock: nowhere/demo.html: No such file or directory (os error 2)\n"
