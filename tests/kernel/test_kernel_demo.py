"""The demonstration notebooks, run from top to bottom by a real client."""

import copy

import nbclient
import nbformat
import pytest
from kernel_support import ESCAPES, ROOT

NOTEBOOKS = sorted((ROOT / "demo-notebooks").rglob("*.ipynb"))

pytestmark = pytest.mark.timeout(600)


def test_there_is_something_to_run():
    assert NOTEBOOKS


def forms(cell: dict) -> list[tuple[str, object]]:
    """What a cell shows, without what differs from run to run."""
    shown = []
    for output in cell.get("outputs", []):
        if output["output_type"] == "error":
            shown.append(("error", ESCAPES.sub("", "\n".join(output["traceback"]))))
        else:
            shown.append((output["output_type"], dict(output["data"])))
    return shown


@pytest.mark.parametrize("path", NOTEBOOKS, ids=lambda path: path.stem)
def test_a_demonstration_runs_and_gives_what_is_printed_in_it(path):
    stored = nbformat.read(path, as_version=4)
    nbformat.validate(stored)
    assert stored.metadata.kernelspec.name == "tussock"
    assert stored.metadata.language_info.file_extension == ".tus"
    fresh = copy.deepcopy(stored)
    for cell in fresh.cells:
        if cell.cell_type == "code":
            cell.outputs, cell.execution_count = [], None
    client = nbclient.NotebookClient(
        fresh,
        timeout=300,
        kernel_name="tussock",
        resources={"metadata": {"path": str(path.parent)}},
    )
    client.execute()
    code = [cell for cell in fresh.cells if cell.cell_type == "code"]
    assert [cell.execution_count for cell in code] == list(range(1, len(code) + 1))
    assert any(kind == "execute_result" for cell in code for kind, _ in forms(cell))
    for ran, kept in zip(fresh.cells, stored.cells, strict=True):
        assert forms(ran) == forms(kept), ran.source
