"""Diagnostics from the real program: from the text, from the data file, while typing."""

import pytest
from lsp_support import SCRIPT, replace, rules
from lsprotocol import types


@pytest.mark.asyncio
async def test_a_good_script_has_no_errors(editor, folder):
    uri = (folder / "a.tus").as_uri()
    editor.open(uri, SCRIPT)
    found = await editor.diagnosed(uri, 1)
    assert [d for d in found if d.severity == types.DiagnosticSeverity.Error] == []


@pytest.mark.asyncio
async def test_a_column_that_the_file_lacks_is_marked_and_mended(editor, folder):
    uri = (folder / "a.tus").as_uri()
    editor.open(uri, SCRIPT.replace("mood", "mod"))
    found = await editor.diagnosed(uri, 1)
    [mistake] = [d for d in found if d.code == "unknown-column"]
    assert mistake.source == "tussock"
    assert mistake.severity == types.DiagnosticSeverity.Error
    assert mistake.range.start == types.Position(2, 19)
    assert mistake.range.end == types.Position(2, 22)
    assert "mood" in mistake.message

    actions = await editor.text_document_code_action_async(
        types.CodeActionParams(
            types.TextDocumentIdentifier(uri),
            mistake.range,
            types.CodeActionContext(diagnostics=[mistake]),
        )
    )
    [edit] = [
        edit
        for action in actions
        for change in action.edit.document_changes
        for edit in change.edits
    ]
    assert edit.new_text == "mood"
    editor.change(uri, 2, types.TextDocumentContentChangePartial(edit.range, edit.new_text))
    assert "unknown-column" not in rules(await editor.diagnosed(uri, 2))


@pytest.mark.asyncio
async def test_the_file_is_read_anew_when_it_changes_on_disk(editor, folder):
    uri = (folder / "a.tus").as_uri()
    editor.open(uri, SCRIPT.replace("mood", "energy"))
    assert "unknown-column" in rules(await editor.diagnosed(uri, 1))
    assert [r.method for r in editor.registrations] == ["workspace/didChangeWatchedFiles"]

    data = folder / "crew.csv"
    data.write_text(data.read_text().replace("mood", "energy"))
    editor.workspace_did_change_watched_files(
        types.DidChangeWatchedFilesParams(
            [types.FileEvent(data.as_uri(), types.FileChangeType.Changed)]
        )
    )
    await editor.diagnosed(uri, 1, lambda found: "unknown-column" not in rules(found))


@pytest.mark.asyncio
async def test_a_file_that_is_not_there_is_said_to_be_missing(editor, folder):
    uri = (folder / "a.tus").as_uri()
    editor.open(uri, SCRIPT.replace("crew.csv", "crow.csv"))
    found = await editor.diagnosed(uri, 1)
    [mistake] = [d for d in found if "crow.csv" in d.message]
    assert mistake.range.start.line == 0


@pytest.mark.asyncio
async def test_closing_clears(editor, folder):
    uri = (folder / "a.tus").as_uri()
    editor.open(uri, "nonsense\n")
    assert rules(await editor.diagnosed(uri, 1)) == ["unknown-word"]
    editor.text_document_did_close(
        types.DidCloseTextDocumentParams(types.TextDocumentIdentifier(uri))
    )
    await editor.diagnosed(uri, wanted=lambda found: not found)


@pytest.mark.asyncio
async def test_a_markdown_file_is_checked_in_its_fences_and_its_values(editor, folder):
    uri = (folder / "a.md").as_uri()
    text = f"# Crews\n\n```tussock\n{SCRIPT}```\n\nThey differed, {{{{main.omnibus.pilai}}}}.\n"
    editor.open(uri, text, "markdown")
    found = await editor.diagnosed(uri, 1)
    [mistake] = [d for d in found if d.severity == types.DiagnosticSeverity.Error]
    assert mistake.code == "unknown-path"
    assert mistake.range.start.line == 9


@pytest.mark.asyncio
async def test_typing_letter_by_letter_ends_where_pasting_does(editor, folder):
    typed, pasted = (folder / "typed.tus").as_uri(), (folder / "pasted.tus").as_uri()
    text = SCRIPT.replace("main\n", "`Hauptvergleich 🚢`\n").replace("mood", "mod")
    editor.open(pasted, text)
    editor.open(typed, "")
    version = 1
    line = character = 0
    for letter in text:
        version += 1
        editor.change(typed, version, replace(line, character, character, letter))
        if letter == "\n":
            line, character = line + 1, 0
        else:
            character += len(letter.encode("utf-16-le")) // 2
    expected = await editor.diagnosed(pasted, 1)
    assert expected
    assert await editor.diagnosed(typed, version) == expected
