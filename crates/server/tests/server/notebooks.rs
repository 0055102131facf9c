//! Notebooks: cells that come, go, move and change, and what is asked about them.

use serde_json::{Value, json};

use crate::support::{Editor, replacement};

const BOOK: &str = "file:///skerry/crew.ipynb";

/// A cell's name as one front end writes it: to be taken as it is.
fn cell(name: &str) -> String {
    format!("vscode-notebook-cell:/skerry/crew.ipynb#{name}")
}

/// A cell in the notebook's array.
fn entry(name: &str, kind: u8) -> Value {
    json!({ "kind": kind, "document": cell(name), "metadata": {} })
}

/// A cell's text as it is opened.
fn text(name: &str, language: &str, text: &str) -> Value {
    json!({ "uri": cell(name), "languageId": language, "version": 1, "text": text })
}

/// Opens a notebook of two code cells with a Markdown cell between them.
async fn opened() -> Editor {
    let mut editor = Editor::start().await;
    editor.notify(
        "notebookDocument/didOpen",
        json!({
            "notebookDocument": {
                "uri": BOOK, "notebookType": "jupyter-notebook", "version": 1,
                "metadata": { "custom": {} },
                "cells": [entry("a", 2), entry("prose", 1), entry("b", 2)],
            },
            "cellTextDocuments": [
                text("a", "tussock", "first"),
                text("prose", "markdown", "Prose."),
                text("b", "tussock", "second"),
            ],
        }),
    );
    editor
}

/// Sends a change of the notebook.
fn change(editor: &mut Editor, version: i32, cells: Value) {
    editor.notify(
        "notebookDocument/didChange",
        json!({
            "notebookDocument": { "uri": BOOK, "version": version },
            "change": { "cells": cells },
        }),
    );
}

/// The texts of the whole notebook as seen from one of its cells.
async fn whole(editor: &mut Editor, from: &str) -> Value {
    editor.ask("test/sources", json!({ "uri": cell(from) })).await
}

#[tokio::test]
async fn all_cells_are_one_document_in_reading_order() {
    let mut editor = opened().await;
    for from in ["a", "prose", "b"] {
        assert_eq!(whole(&mut editor, from).await, json!(["first", "Prose.", "second"]));
    }
    assert_eq!(editor.text(&cell("b")).await, "second");
    editor.finish().await;
}

#[tokio::test]
async fn cells_are_edited_by_increments() {
    let mut editor = opened().await;
    let content = json!([
        {
            "document": { "uri": cell("b"), "version": 2 },
            "changes": [replacement(0, 0, 6, "🚢"), replacement(0, 2, 2, "!")],
        },
        { "document": { "uri": cell("a"), "version": 2 }, "changes": [{ "text": "1st" }] },
        { "document": { "uri": cell("unknown"), "version": 2 }, "changes": [{ "text": "?" }] },
    ]);
    change(&mut editor, 2, json!({ "textContent": content }));
    assert_eq!(whole(&mut editor, "a").await, json!(["1st", "Prose.", "🚢!"]));
    // Some clients synchronize a cell like a file.
    editor.change(&cell("a"), 3, json!([replacement(0, 0, 1, "2")]));
    assert_eq!(editor.text(&cell("a")).await, "2st");
    editor.finish().await;
}

#[tokio::test]
async fn a_pasted_cell_brings_its_text_and_its_edits_in_one_message() {
    let mut editor = opened().await;
    change(
        &mut editor,
        2,
        json!({
            "structure": {
                "array": { "start": 1, "deleteCount": 0, "cells": [entry("new", 2)] },
                "didOpen": [text("new", "tussock", "pasted")],
            },
            "textContent": [{
                "document": { "uri": cell("new"), "version": 2 },
                "changes": [replacement(0, 6, 6, "!")],
            }],
        }),
    );
    assert_eq!(whole(&mut editor, "b").await, json!(["first", "pasted!", "Prose.", "second"]));
    editor.finish().await;
}

#[tokio::test]
async fn a_cell_moves_whether_or_not_its_text_is_opened_anew() {
    // Taken out and put in: without a word on its text; with the text closed and opened; closed
    // only, by a client that means the old place.
    let texts = [
        (json!([]), json!([])),
        (json!([text("b", "tussock", "second")]), json!([{ "uri": cell("b") }])),
        (json!([]), json!([{ "uri": cell("b") }])),
    ];
    for (open, close) in texts {
        let mut editor = opened().await;
        let reordered = [entry("b", 2), entry("a", 2), entry("prose", 1)];
        change(
            &mut editor,
            2,
            json!({
                "structure": {
                    "array": { "start": 0, "deleteCount": 3, "cells": reordered },
                    "didOpen": open,
                    "didClose": close,
                },
            }),
        );
        assert_eq!(whole(&mut editor, "a").await, json!(["second", "first", "Prose."]));
        editor.finish().await;
    }
}

#[tokio::test]
async fn a_move_in_two_messages_keeps_the_text() {
    let mut editor = opened().await;
    let taken_out = json!({ "structure": { "array": { "start": 0, "deleteCount": 1 } } });
    change(&mut editor, 2, taken_out);
    assert_eq!(whole(&mut editor, "b").await, json!(["Prose.", "second"]));
    // Its text is still open and can be asked for, but is no part of the notebook.
    assert_eq!(editor.text(&cell("a")).await, Value::Null);
    let put_in = json!({ "start": 2, "deleteCount": 0, "cells": [entry("a", 2)] });
    change(&mut editor, 3, json!({ "structure": { "array": put_in } }));
    assert_eq!(whole(&mut editor, "a").await, json!(["Prose.", "second", "first"]));
    editor.finish().await;
}

#[tokio::test]
async fn a_removed_cell_is_forgotten_and_its_diagnostics_cleared() {
    let mut editor = opened().await;
    change(
        &mut editor,
        2,
        json!({
            "structure": {
                "array": { "start": 2, "deleteCount": 1, "cells": [] },
                "didClose": [{ "uri": cell("b") }],
            },
        }),
    );
    let cleared = editor.diagnostics(&cell("b")).await;
    assert_eq!(cleared["diagnostics"], json!([]));
    assert_eq!(editor.text(&cell("b")).await, Value::Null);
    assert_eq!(whole(&mut editor, "a").await, json!(["first", "Prose."]));
    editor.finish().await;
}

#[tokio::test]
async fn impossible_changes_do_no_harm() {
    let mut editor = opened().await;
    let beyond = json!({ "start": 90, "deleteCount": 9, "cells": [entry("never-opened", 2)] });
    change(&mut editor, 2, json!({ "structure": { "array": beyond } }));
    assert_eq!(whole(&mut editor, "a").await, json!(["first", "Prose.", "second"]));
    assert_eq!(editor.text(&cell("never-opened")).await, Value::Null);
    editor.notify(
        "notebookDocument/didChange",
        json!({
            "notebookDocument": { "uri": "file:///skerry/unknown.ipynb", "version": 2 },
            "change": { "metadata": {} },
        }),
    );
    editor.notify("notebookDocument/didChange", json!({ "nonsense": true }));
    assert_eq!(editor.text(&cell("a")).await, "first");
    editor.finish().await;
}

#[tokio::test]
async fn a_cell_in_another_language_keeps_its_place_and_says_nothing() {
    let mut editor = opened().await;
    change(
        &mut editor,
        2,
        json!({
            "structure": {
                "array": { "start": 0, "deleteCount": 1, "cells": [entry("a", 2)] },
                "didClose": [{ "uri": cell("a") }],
                "didOpen": [text("a", "python", "show nonsense of")],
            },
        }),
    );
    assert_eq!(whole(&mut editor, "b").await, json!(["show nonsense of", "Prose.", "second"]));
    let symbols =
        editor.ask("textDocument/documentSymbol", json!({ "textDocument": { "uri": cell("a") } }));
    assert_eq!(symbols.await, json!([]));
    editor.finish().await;
}

#[tokio::test]
async fn a_closed_notebook_is_forgotten_and_can_be_opened_again() {
    let mut editor = opened().await;
    editor.notify(
        "notebookDocument/didClose",
        json!({
            "notebookDocument": { "uri": BOOK },
            "cellTextDocuments": [{ "uri": cell("a") }, { "uri": cell("prose") }, { "uri": cell("b") }],
        }),
    );
    for name in ["a", "prose", "b"] {
        assert_eq!(editor.diagnostics(&cell(name)).await["diagnostics"], json!([]));
        assert_eq!(editor.text(&cell(name)).await, Value::Null);
    }
    editor.notify(
        "notebookDocument/didOpen",
        json!({
            "notebookDocument": {
                "uri": BOOK, "notebookType": "jupyter-notebook", "version": 1,
                "cells": [entry("a", 2)],
            },
            "cellTextDocuments": [text("a", "tussock", "again")],
        }),
    );
    assert_eq!(whole(&mut editor, "a").await, json!(["again"]));
    editor.finish().await;
}
