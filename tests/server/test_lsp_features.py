"""Completion, hover, formatting and outline from the real program and a real data file."""

import asyncio

import pytest
from lsp_support import SCRIPT, replace
from lsprotocol import types
from pygls.exceptions import JsonRpcException


@pytest.fixture
def uri(folder):
    return (folder / "a.tus").as_uri()


def labels(items):
    return [item.label for item in items]


@pytest.mark.asyncio
async def test_columns_come_from_the_file(editor, uri):
    editor.open(uri, SCRIPT.replace("alertness, mood", "alertness, "))
    items = await editor.completions(uri, 2, len("compare alertness, "))
    assert {"mood", "Sleep (h)"} <= set(labels(items)) or {"mood", "`Sleep (h)`"} <= set(labels(items))
    [sleep] = [item for item in items if "Sleep" in item.label]
    # It can only be written in back-quotes.
    assert sleep.text_edit.new_text == "`Sleep (h)`"


@pytest.mark.asyncio
async def test_levels_come_from_the_file(editor, uri):
    editor.open(uri, 'read "crew.csv" as crew\nlevels crew.roster fixed, ')
    items = await editor.completions(uri, 1, len("levels crew.roster fixed, "))
    assert {"forward", "backward"} <= set(labels(items))


@pytest.mark.asyncio
async def test_live_values_complete_key_by_key_and_hover_with_their_value(editor, uri):
    text = SCRIPT + 'write "V = {{main.omnibus.pillai.value}}"\n'
    editor.open(uri, text)
    items = await editor.completions(uri, 4, len('write "V = {{main.omnibus.'))
    assert {"pillai", "wilks"} <= set(labels(items))
    hover = await editor.hover(uri, 4, len('write "V = {{main.omnibus.pillai.v'))
    answer = [word for word in hover.replace("`", " ").split() if word.startswith(".")]
    assert answer, hover


@pytest.mark.asyncio
async def test_hover_tells_of_a_column_what_is_in_the_file(editor, uri):
    editor.open(uri, SCRIPT)
    hover = await editor.hover(uri, 2, len("compare aler"))
    assert "alertness" in hover
    hover = await editor.hover(uri, 2, len("compare alertness, mood across ros"))
    assert "fixed" in hover and "backward" in hover


@pytest.mark.asyncio
async def test_a_formatted_script_means_the_same(editor, uri):
    good, bad = "compare alertness, mood across", "compare   alertness ,mood across"
    editor.open(uri, SCRIPT.replace(good, bad))
    params = types.DocumentFormattingParams(
        types.TextDocumentIdentifier(uri), types.FormattingOptions(2, True)
    )
    [edit] = await editor.text_document_formatting_async(params)
    # Only the line that is out of form is touched.
    assert edit.range.start.line == edit.range.end.line == 2
    line = bad[: edit.range.start.character] + edit.new_text + bad[edit.range.end.character :]
    assert line == good
    editor.change(uri, 2, types.TextDocumentContentChangePartial(edit.range, edit.new_text))
    assert list(await editor.text_document_formatting_async(params) or []) == []


@pytest.mark.asyncio
async def test_the_outline_lists_definitions_and_questions(editor, uri):
    editor.open(uri, SCRIPT)
    outline = await editor.text_document_document_symbol_async(
        types.DocumentSymbolParams(types.TextDocumentIdentifier(uri))
    )
    assert [symbol.name for symbol in outline] == ["crew", "crew.roster", "main", "omnibus of main"]


@pytest.mark.asyncio
async def test_answers_follow_edits_in_their_order(editor, uri):
    """Fifty names in a row, a question after each: every answer is of its own text, or none."""
    editor.open(uri, 'read "crew.csv" as t0\n')
    start = len('read "crew.csv" as ')
    questions = []
    for n in range(1, 51):
        previous = len(f"t{n - 1}")
        editor.change(uri, n + 1, replace(0, start, start + previous, f"t{n}"))
        # Sent now, not when it is awaited.
        question = editor.protocol.send_request(
            "textDocument/documentSymbol",
            types.DocumentSymbolParams(types.TextDocumentIdentifier(uri)),
        )
        questions.append(asyncio.wrap_future(question))
    answered = 0
    for n, question in enumerate(questions, start=1):
        try:
            [symbol] = await question
        except JsonRpcException as error:
            assert error.code == types.LSPErrorCodes.ContentModified
            assert n < 50
        else:
            assert symbol.name == f"t{n}"
            answered += 1
    assert answered >= 1


@pytest.mark.asyncio
@pytest.mark.parametrize("encoding", ["utf-8", "utf-16", "utf-32"])
async def test_every_encoding_of_positions(stranger, folder, encoding):
    result = await stranger.greet(folder, encodings=[types.PositionEncodingKind(encoding)])
    assert result.capabilities.position_encoding == encoding
    uri = (folder / "a.tus").as_uri()
    stranger.open(uri, 'read "crew.csv" as `Crew 🚢`\nlevels `Crew 🚢`.ros fixed\n')
    at = len("levels `Crew 🚢`.ros".encode(encoding if encoding == "utf-8" else encoding + "-le"))
    at //= {"utf-8": 1, "utf-16": 2, "utf-32": 4}[encoding]
    items = await stranger.completions(uri, 1, at)
    assert "roster" in labels(items)
    [item] = [item for item in items if item.label == "roster"]
    assert item.text_edit.range == types.Range(types.Position(1, at - 3), types.Position(1, at))
