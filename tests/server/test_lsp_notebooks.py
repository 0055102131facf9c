"""Notebooks: cell by cell from editors that send cells, as one text from those that join them."""

import pytest
from lsp_support import replace, rules
from lsprotocol import types

CELLS = {
    "a": ("tussock", 'read "crew.csv" as crew'),
    "b": ("markdown", "They differed, {{main.omnibus.pillai}}."),
    "c": ("tussock", "compare alertness, mood across roster in crew as main"),
    "d": ("tussock", "show omnibus of main"),
}


class Notebook:
    def __init__(self, editor, folder):
        self.editor = editor
        self.uri = (folder / "crew.ipynb").as_uri()
        self.version = 1
        editor.notebook_document_did_open(
            types.DidOpenNotebookDocumentParams(
                types.NotebookDocument(
                    uri=self.uri,
                    notebook_type="jupyter-notebook",
                    version=1,
                    cells=[self.cell(name) for name in CELLS],
                ),
                [self.item(name) for name in CELLS],
            )
        )

    def of(self, name):
        return self.uri.replace("file:", "vscode-notebook-cell:") + "#" + name

    def cell(self, name):
        kind = types.NotebookCellKind.Code
        if CELLS.get(name, ("",))[0] == "markdown":
            kind = types.NotebookCellKind.Markup
        return types.NotebookCell(kind=kind, document=self.of(name))

    def item(self, name, text=None):
        language, standard = CELLS.get(name, ("tussock", ""))
        return types.TextDocumentItem(self.of(name), language, 1, text or standard)

    def change(self, cells):
        self.version += 1
        self.editor.notebook_document_did_change(
            types.DidChangeNotebookDocumentParams(
                types.VersionedNotebookDocumentIdentifier(self.version, self.uri),
                types.NotebookDocumentChangeEvent(cells=cells),
            )
        )

    def edit(self, name, version, *changes):
        content = types.NotebookDocumentCellContentChanges(
            types.VersionedTextDocumentIdentifier(uri=self.of(name), version=version), list(changes)
        )
        self.change(types.NotebookDocumentCellChanges(text_content=[content]))

    def splice(self, start, delete, names=(), opened=(), closed=()):
        self.change(
            types.NotebookDocumentCellChanges(
                structure=types.NotebookDocumentCellChangeStructure(
                    array=types.NotebookCellArrayChange(
                        start=start, delete_count=delete, cells=[self.cell(name) for name in names]
                    ),
                    did_open=list(opened),
                    did_close=[types.TextDocumentIdentifier(self.of(name)) for name in closed],
                )
            )
        )


@pytest.fixture
def notebook(editor, folder):
    return Notebook(editor, folder)


@pytest.mark.asyncio
async def test_a_cell_knows_the_names_and_the_data_of_the_others(editor, notebook):
    for name in CELLS:
        found = await editor.diagnosed(notebook.of(name), 1)
        assert [d for d in found if d.severity == types.DiagnosticSeverity.Error] == []
    items = await editor.completions(notebook.of("c"), 0, len("compare alertness, m"))
    assert [item.label for item in items][0] == "mood"
    hover = await editor.hover(notebook.of("b"), 0, len("They differed, {{main.omnibus.pil"))
    assert "V = " in hover and "p " in hover


@pytest.mark.asyncio
async def test_an_edit_in_one_cell_is_felt_in_another(editor, notebook):
    await editor.diagnosed(notebook.of("d"), 1)
    notebook.edit("c", 2, replace(0, 49, 53, "other"))
    found = await editor.diagnosed(notebook.of("d"), 1, lambda found: found)
    assert rules(found) == ["unknown-comparison"]
    notebook.edit("c", 3, replace(0, 49, 54, "main"))
    await editor.diagnosed(notebook.of("d"), 1, lambda found: not found)


@pytest.mark.asyncio
async def test_cells_that_are_pasted_moved_and_removed(editor, notebook):
    await editor.diagnosed(notebook.of("d"), 1)
    notebook.splice(4, 0, ["e"], opened=[notebook.item("e", "show omnibus of mian")])
    assert rules(await editor.diagnosed(notebook.of("e"), 1)) == ["unknown-comparison"]
    # Moved to the top, in one message, its text neither closed nor opened.
    notebook.splice(0, 5, ["e", "a", "b", "c", "d"])
    notebook.edit("e", 2, replace(0, 16, 20, "main"))
    await editor.diagnosed(notebook.of("e"), 2, lambda found: not found)
    notebook.splice(3, 1, closed=["c"])
    await editor.diagnosed(notebook.of("e"), 2, lambda found: rules(found) == ["unknown-comparison"])
    assert await editor.diagnosed(notebook.of("c")) == []
    assert await editor.hover(notebook.of("c"), 0, 2) is None


@pytest.mark.asyncio
async def test_cells_that_a_front_end_has_joined_are_one_script(editor, folder):
    uri = (folder / "joined.ipynb").as_uri()
    text = "\n\n\n".join(text for language, text in CELLS.values() if language == "tussock")
    editor.open(uri, text, "tussock")
    found = await editor.diagnosed(uri, 1)
    assert [d for d in found if d.severity == types.DiagnosticSeverity.Error] == []
    items = await editor.completions(uri, 3, len("compare alertness, m"))
    assert [item.label for item in items][0] == "mood"
