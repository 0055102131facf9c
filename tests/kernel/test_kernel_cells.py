"""Cells as a front end runs them, and their answers in every form that is sent."""

import re
import time
import unicodedata

import numpy as np
import pytest
from bs4 import BeautifulSoup
from kernel_support import ANALYSIS, Kernel

pytestmark = pytest.mark.timeout(300)

# Invented: two outcomes of eight watches on each of three rosters.
ROSTERS = ["fixed", "forward", "backward"]
WATCHES = {
    roster: np.array(
        [
            [52 + 4 * shift + (7 * watch) % 5, 31 - 2 * shift + (3 * watch * watch) % 7]
            for watch in range(8)
        ],
        dtype=float,
    )
    for shift, roster in enumerate(ROSTERS)
}
FILE = "roster,alertness,mood\n" + "".join(
    f"{roster},{alertness:g},{mood:g}\n"
    for roster, rows in WATCHES.items()
    for alertness, mood in rows
)
FROM_FILE = """\
read "crew.csv" as crew
levels crew.roster fixed, forward, backward
compare alertness, mood across roster in crew as main
"""


@pytest.fixture
def crew(kernel, tmp_path):
    """A kernel beside the file of the watches."""
    (tmp_path / "crew.csv").write_text(FILE, encoding="utf-8")
    return kernel


def text(cell: str) -> str:
    """A cell's text with subscripts and superscripts set level, as HTML's text has them."""
    return unicodedata.normalize("NFKC", cell).strip()


def html_rows(html: str) -> list[list[str]]:
    rows = BeautifulSoup(html, "html.parser").select("tbody tr")
    return [[text(cell.get_text()) for cell in row.find_all(["th", "td"])] for row in rows]


def plain_rows(plain: str) -> list[list[str]]:
    return [re.split(r"\s{2,}", text(line)) for line in plain.splitlines()]


def printed_criteria(html: str) -> dict[str, str]:
    """The values that the omnibus table prints, by the criterion's name without its symbol."""
    return {row[0].split(",")[0]: row[1] for row in html_rows(html)}


def criteria(groups: dict[str, np.ndarray]) -> dict[str, float]:
    """The four criteria, from the eigenvalues of H relative to E."""
    everyone = np.vstack(list(groups.values()))
    centred = [rows - rows.mean(axis=0) for rows in groups.values()]
    error = sum(rows.T @ rows for rows in centred)
    total = (everyone - everyone.mean(axis=0)).T @ (everyone - everyone.mean(axis=0))
    eigenvalues = np.linalg.eigvals(np.linalg.solve(error, total - error)).real
    return {
        "Wilks": np.prod(1 / (1 + eigenvalues)),
        "Pillai": np.sum(eigenvalues / (1 + eigenvalues)),
        "Hotelling–Lawley": np.sum(eigenvalues),
        "Roy": np.max(eigenvalues),
    }


def test_the_numbers_of_a_table_are_right_in_every_form(crew):
    data = crew.run(FROM_FILE + "show omnibus of main").expect_ok().result().content["data"]
    assert sorted(data) == ["text/html", "text/markdown", "text/plain"]
    in_html = printed_criteria(data["text/html"])
    for name, value in criteria(WATCHES).items():
        assert float(in_html[name]) == pytest.approx(value, abs=0.0005), name
        for form in ("text/plain", "text/markdown"):
            line = next(line for line in data[form].splitlines() if name in line)
            assert in_html[name] in line, form


@pytest.mark.parametrize(
    "view", ["groups", "correlations", "covariances", "omnibus", "functions", "coefficients",
             "centroids", "scores", "outcomes", "pairs", "flow"]
)
def test_every_view_comes_in_three_forms_with_the_same_numbers(analysed, view):
    ran = analysed.run(f"show {view} of main").expect_ok()
    tables = ran.of_kind("execute_result") + [
        output for output in ran.of_kind("display_data") if "<table" in output.html()
    ]
    assert tables
    for table in tables:
        data = table.content["data"]
        rows = [[cell for cell in row if cell] for row in html_rows(data["text/html"])]
        assert any(re.search(r"\d", cell) for row in rows for cell in row)
        shown = plain_rows(data["text/plain"])
        for row in rows:
            assert any(row == line for line in shown), (row, data["text/plain"])


def test_tables_need_no_style_sheet_and_no_script(analysed):
    html = analysed.run("show pairs of main").expect_ok().result().html()
    for stripped in ("<style", "<script", " id=", " data-", "var(--"):
        assert stripped not in html
    assert BeautifulSoup(html, "html.parser").select("th[scope=col]")


def test_the_table_that_ends_a_cell_is_its_result_and_others_come_before(crew):
    ran = crew.run(FROM_FILE + "show groups of main\nshow omnibus of main").expect_ok()
    kinds = [output.kind for output in ran.outputs]
    assert kinds[-1] == "execute_result"
    assert set(kinds[:-1]) == {"display_data"}
    assert "Wilks" in ran.result().plain()
    assert "alertness" in ran.outputs[-2].plain()


def test_a_paragraph_prints_the_values_that_the_table_prints(analysed):
    table = analysed.run("show omnibus of main").result()
    wilks = printed_criteria(table.html())["Wilks"]
    ran = analysed.run('write "The criterion is {{main.omnibus.wilks.value}}, no more."')
    (paragraph,) = ran.expect_ok().of_kind("display_data")
    assert paragraph.plain() == f"The criterion is {wilks}, no more."
    assert paragraph.html() == f"<p>The criterion is {wilks}, no more.</p>"


def test_a_definition_says_quietly_what_it_defined(crew):
    ran = crew.run(FROM_FILE).expect_ok()
    assert {output.kind for output in ran.outputs} == {"display_data"}
    words = "\n".join(output.plain() for output in ran.outputs)
    assert "24 rows" in words


def test_an_error_names_its_place_and_what_to_do(analysed):
    ran = analysed.run("show omnibus of mian")
    assert ran.reply["status"] == "error"
    assert ran.reply["ename"] == "unknown-comparison"
    assert ran.error().content["ename"] == "unknown-comparison"
    assert "`mian`" in ran.error().content["evalue"]
    lines = ran.traceback().splitlines()
    assert f"cell [{ran.reply['execution_count']}], line 1" in lines[1]
    code, carets = lines[2], lines[3]
    assert code.endswith("1 | show omnibus of mian")
    assert carets.index("^") == code.index("mian") and carets.count("^") == len("mian")
    assert "main" in lines[4]


def test_all_errors_of_a_cell_are_told_at_once_after_what_could_be_answered(analysed):
    ran = analysed.run("show omnibus of mian\nshow groups of main\nshow omnibs of main")
    assert [output.kind for output in ran.outputs] == ["display_data", "error"]
    assert "alertness" in ran.outputs[0].plain()
    assert len(ran.error().content["traceback"]) == 2
    traceback = ran.traceback()
    assert "line 1" in traceback and "line 3" in traceback


def test_an_error_that_lies_in_an_earlier_cell_is_told_with_that_cells_number(kernel):
    first = kernel.run('read "absent.csv" as crew', cell="a")
    assert first.reply["status"] == "error"
    kernel.run("# a remark", cell="b").expect_ok()
    ran = kernel.run(
        "compare alertness, mood across roster in crew as main\nshow groups of main", cell="c"
    )
    assert ran.reply["status"] == "error"
    assert "absent.csv" in ran.traceback()


def test_a_cell_that_is_run_again_replaces_what_it_defined(crew):
    crew.run('read "crew.csv" as crew', cell="read").expect_ok()
    crew.run("compare alertness, mood across roster in crew as main", cell="compare").expect_ok()
    three = crew.run("show groups of main", cell="show").expect_ok().result().plain()
    assert "backward" in three
    crew.run(
        'read "crew.csv" as all\nadmit all where roster != backward as crew because "a test"',
        cell="read",
    ).expect_ok()
    two = crew.run("show groups of main", cell="show").expect_ok().result().plain()
    assert "backward" not in two and "forward" in two


def test_late_corrections_of_the_file_are_in_the_next_answer(crew, tmp_path):
    crew.run(FROM_FILE, cell="all").expect_ok()
    before = crew.run("show omnibus of main").expect_ok().result().html()
    corrected = {roster: rows.copy() for roster, rows in WATCHES.items()}
    corrected["fixed"][0, 0] += 30
    first = f"fixed,{WATCHES['fixed'][0, 0]:g},"
    assert FILE.count(first) >= 1
    text = FILE.replace(first, f"fixed,{corrected['fixed'][0, 0]:g},", 1)
    (tmp_path / "crew.csv").write_text(text, encoding="utf-8")
    after = crew.run("show omnibus of main").expect_ok().result().html()
    assert after != before
    assert float(printed_criteria(after)["Pillai"]) == pytest.approx(criteria(corrected)["Pillai"], abs=0.0005)


def long_cell() -> str:
    """A cell of many questions, no two the same, so that no answer can be looked up."""
    return "\n".join(f"show pairs of main interval {80 + n / 100:.2f}%" for n in range(1500))


def test_the_questions_of_the_long_cell_have_answers(analysed):
    analysed.run(long_cell().splitlines()[0]).expect_ok()


def test_an_error_stops_the_cells_that_wait_and_none_that_comes_later(analysed):
    failing = analysed.send(long_cell())
    analysed.wait_until_busy(failing)
    waiting = [analysed.send("show groups of main"), analysed.send("show flow of main")]
    time.sleep(0.5)  # for them to arrive
    analysed.interrupt()
    assert analysed.receive(failing).reply["status"] == "error"
    for sent in waiting:
        ran = analysed.receive(sent)
        assert ran.reply["status"] == "aborted"
        assert ran.outputs == []
    analysed.run("show groups of main").expect_ok()


def test_a_restarted_kernel_has_forgotten_everything(kernel):
    assert kernel.run(ANALYSIS).expect_ok().reply["execution_count"] == 1
    kernel.manager.restart_kernel(now=False)
    kernel.client.wait_for_ready(timeout=60)
    ran = kernel.run("show omnibus of main")
    assert ran.reply["execution_count"] == 1
    assert ran.reply["ename"] == "unknown-comparison"


def test_a_long_cell_that_is_interrupted_stops_and_the_session_goes_on(analysed):
    sent = analysed.send(long_cell())
    analysed.wait_until_busy(sent)
    assert analysed.interrupt() == {"status": "ok"}
    ran = analysed.receive(sent)
    assert ran.reply["status"] == "error"
    assert ran.reply["ename"] == "interrupted"
    assert ran.outputs[-1].kind == "error"
    assert len(ran.outputs) < 1500
    analysed.run("show omnibus of main").expect_ok()


def test_an_interrupt_leaves_the_session_as_it_is(analysed):
    assert analysed.interrupt() == {"status": "ok"}
    analysed.run("show omnibus of main").expect_ok()


def test_the_kernel_ends_when_it_is_asked_to(tmp_path):
    kernel = Kernel(tmp_path)
    kernel.client.stop_channels()
    process = kernel.manager.provisioner.process
    kernel.manager.shutdown_kernel(now=False)
    assert process.returncode == 0


def test_completion_knows_columns_levels_and_views(crew):
    crew.run('read "crew.csv" as crew', cell="read").expect_ok()
    reply = crew.complete("compare mood, al| across roster in crew as main")
    assert "alertness" in reply["matches"]
    kinds = {one["text"]: one["type"] for one in types_of(reply)}
    assert kinds["alertness"] == "column"
    assert "backward" in crew.complete("levels crew.roster back|")["matches"]
    assert "omnibus" in crew.complete("show omn|")["matches"]


def types_of(reply: dict) -> list[dict]:
    return reply["metadata"]["_jupyter_types_experimental"]


def test_completion_replaces_the_right_characters_after_signs_beyond_the_basic_plane(crew):
    crew.run('read "crew.csv" as crew', cell="read").expect_ok()
    code = "# 🌾 é e\u0301 🧑‍✈️\r\nlevels crew.roster back|"
    reply = crew.complete(code)
    assert reply["matches"] == ["backward"]
    start, end = reply["cursor_start"], reply["cursor_end"]
    assert code.replace("|", "")[start:end] == "back"


def test_inspection_explains_a_word_with_its_live_values(analysed):
    reply = analysed.inspect("show omni|bus of main")
    assert reply["status"] == "ok" and reply["found"]
    assert set(reply["data"]) == {"text/html", "text/markdown", "text/plain"}
    assert "Wilks" in reply["data"]["text/markdown"]
    assert BeautifulSoup(reply["data"]["text/html"], "html.parser").find(["h1", "h2", "p"])
    nothing = analysed.inspect("|  ")
    assert nothing == {"status": "ok", "found": False, "data": {}, "metadata": {}}
