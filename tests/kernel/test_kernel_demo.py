"""The demonstration notebooks, run from top to bottom by a real client."""

import copy
import re

import nbclient
import nbformat
import pytest
from kernel_support import ESCAPES, ROOT

NOTEBOOKS = sorted((ROOT / "demo-notebooks").rglob("*.ipynb"))

pytestmark = pytest.mark.timeout(600)


def test_there_is_something_to_run():
    assert NOTEBOOKS


def shown(cell: dict) -> list[str]:
    """What a cell shows, as plain text: rounded numbers, the same on every machine."""
    return [
        ESCAPES.sub("", "\n".join(output["traceback"]))
        if output["output_type"] == "error"
        else output["data"]["text/plain"]
        for output in cell.get("outputs", [])
    ]


@pytest.fixture(scope="module", params=NOTEBOOKS, ids=lambda path: path.stem)
def demonstration(request):
    """A notebook as it is kept, and the same after a run from top to bottom."""
    kept = nbformat.read(request.param, as_version=4)
    nbformat.validate(kept)
    ran = copy.deepcopy(kept)
    for cell in ran.cells:
        if cell.cell_type == "code":
            cell.outputs, cell.execution_count = [], None
    folder = {"metadata": {"path": str(request.param.parent)}}
    client = nbclient.NotebookClient(ran, timeout=300, kernel_name="tussock", resources=folder)
    client.execute()  # which stops at an error
    return kept, ran


def code_cells(notebook) -> list:
    return [cell for cell in notebook.cells if cell.cell_type == "code"]


def test_a_demonstration_is_for_this_kernel(demonstration):
    kept, ran = demonstration
    assert kept.metadata.kernelspec.name == "tussock"
    assert kept.metadata.language_info.name == ran.metadata.language_info.name == "tussock"
    assert kept.metadata.language_info.file_extension == ".tus"


def test_every_question_of_a_demonstration_is_answered(demonstration):
    _, ran = demonstration
    cells = code_cells(ran)
    assert [cell.execution_count for cell in cells] == list(range(1, len(cells) + 1))
    questions = [cell for cell in cells if cell.source.lstrip().startswith(("show", "write"))]
    assert questions
    for cell in questions:
        kind = "execute_result" if cell.source.lstrip().startswith("show") else "display_data"
        answers = [output for output in cell.outputs if output.output_type == kind]
        assert answers, cell.source
        for form in ("text/html", "text/markdown", "text/plain"):
            assert re.search(r"\d", answers[-1].data[form]), (cell.source, form)
            assert "{{" not in answers[-1].data[form]


def test_a_demonstration_that_is_kept_with_its_answers_gives_them_again(demonstration):
    kept, ran = demonstration
    if not any(shown(cell) for cell in code_cells(kept)):
        pytest.skip("kept without answers")
    for before, now in zip(code_cells(kept), code_cells(ran), strict=True):
        assert shown(now) == shown(before), now.source
