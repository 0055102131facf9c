//! Diagnostics as one types: in time, of the right version, gone when they should be.

use serde_json::{Value, json};

use crate::support::{Editor, PAUSE, replacement};

const A: &str = "file:///skerry/a.tus";
const B: &str = "file:///skerry/b.md";
const BOOK: &str = "file:///skerry/crew.ipynb";

/// The rules that diagnostics name, in order.
fn rules(published: &Value) -> Vec<&str> {
    let diagnostics = published["diagnostics"].as_array().expect("a list");
    diagnostics.iter().map(|one| one["code"].as_str().expect("a rule")).collect()
}

#[tokio::test]
async fn a_mistake_is_shown_where_it_stands_and_goes_when_it_is_mended() {
    let mut editor = Editor::start().await;
    editor.open(A, "tussock", "# 🚢\nread sample ferry as crew\nshow 🚢 of main\n");
    let found = editor.diagnostics(A).await;
    assert_eq!(found["version"], 1);
    assert!(!rules(&found).is_empty(), "{found}");
    let first = &found["diagnostics"][0];
    assert_eq!(first["source"], "tussock");
    assert_eq!(first["severity"], 1);
    assert_eq!(first["range"]["start"], json!({ "line": 2, "character": 5 }));
    editor.change(A, 2, json!([{ "text": "# mended\n" }]));
    let found = editor.diagnostics(A).await;
    assert_eq!(found["version"], 2);
    assert_eq!(found["diagnostics"], json!([]));
    editor.finish().await;
}

#[tokio::test]
async fn a_burst_of_edits_is_checked_once_and_at_its_end() {
    let mut editor = Editor::start().await;
    editor.open(A, "tussock", "");
    for version in 2..=40 {
        editor.change(A, version, json!([replacement(0, 0, 0, "x")]));
    }
    let found = editor.diagnostics(A).await;
    assert_eq!(found["version"], 40);
    assert_eq!(rules(&found), ["unknown-word"]);
    let more = editor.count_after(PAUSE * 4, "textDocument/publishDiagnostics").await;
    assert_eq!(more, 0);
    editor.finish().await;
}

#[tokio::test]
async fn both_places_of_a_double_definition_are_named() {
    let mut editor = Editor::start().await;
    editor.open(A, "tussock", "read sample ferry as crew\nread sample ferry as crew\n");
    let found = editor.diagnostics(A).await;
    assert_eq!(rules(&found), ["duplicate-definition"]);
    let related = &found["diagnostics"][0]["relatedInformation"][0]["location"];
    assert_eq!(related["uri"], A);
    assert_eq!(related["range"]["start"]["line"], 0);
    editor.finish().await;
}

#[tokio::test]
async fn closing_clears_and_nothing_comes_after() {
    let mut editor = Editor::start().await;
    editor.open(A, "tussock", "nonsense\n");
    assert_eq!(rules(&editor.diagnostics(A).await), ["unknown-word"]);
    // Closed while a check is due.
    editor.change(A, 2, json!([replacement(0, 0, 0, "more ")]));
    editor.notify("textDocument/didClose", json!({ "textDocument": { "uri": A } }));
    assert_eq!(editor.diagnostics(A).await["diagnostics"], json!([]));
    let more = editor.count_after(PAUSE * 4, "textDocument/publishDiagnostics").await;
    assert_eq!(more, 0);
    editor.finish().await;
}

#[tokio::test]
async fn a_check_that_found_the_same_is_not_told_again() {
    let mut editor = Editor::start().await;
    editor.open(A, "tussock", "nonsense\n");
    assert_eq!(rules(&editor.diagnostics(A).await), ["unknown-word"]);
    editor.notify("workspace/didChangeWatchedFiles", json!({ "changes": [] }));
    editor.notify("textDocument/didSave", json!({ "textDocument": { "uri": A } }));
    let more = editor.count_after(PAUSE * 4, "textDocument/publishDiagnostics").await;
    assert_eq!(more, 0);
    editor.finish().await;
}

#[tokio::test]
async fn a_byte_order_mark_is_no_part_of_the_first_statement() {
    let mut editor = Editor::start().await;
    editor.open(A, "tussock", "\u{feff}read sample ferry as crew\r\n");
    assert_eq!(editor.diagnostics(A).await["diagnostics"], json!([]));
    editor.change(A, 2, json!([replacement(0, 1, 5, "nonsense")]));
    let found = editor.diagnostics(A).await;
    assert_eq!(rules(&found), ["unknown-word"]);
    assert_eq!(found["diagnostics"][0]["range"]["start"], json!({ "line": 0, "character": 1 }));
    editor.finish().await;
}

#[tokio::test]
async fn in_markdown_only_the_fences_are_code() {
    let mut editor = Editor::start().await;
    let text = "# Crews\n\nnonsense\n\n```tussock\nnonsense\n```\n\n```python\nnonsense\n```\n";
    editor.open(B, "markdown", text);
    let found = editor.diagnostics(B).await;
    assert_eq!(rules(&found), ["unknown-word"]);
    assert_eq!(found["diagnostics"][0]["range"]["start"]["line"], 5);
    editor.finish().await;
}

#[tokio::test]
async fn braces_in_a_file_without_code_are_no_business_of_ours() {
    let mut editor = Editor::start().await;
    editor.open(B, "markdown", "Dear {{ customer.name }},\n");
    assert_eq!(editor.diagnostics(B).await["diagnostics"], json!([]));
    editor.finish().await;
}

#[tokio::test]
async fn each_cell_has_the_diagnostics_of_the_whole_notebook_that_stand_in_it() {
    let mut editor = Editor::start().await;
    let cell = |name: &str| format!("vscode-notebook-cell:/skerry/crew.ipynb#{name}");
    let text = |name: &str, language: &str, text: &str| json!({ "uri": cell(name), "languageId": language, "version": 1, "text": text });
    editor.notify(
        "notebookDocument/didOpen",
        json!({
            "notebookDocument": {
                "uri": BOOK, "notebookType": "jupyter-notebook", "version": 1,
                "cells": [
                    { "kind": 2, "document": cell("a") },
                    { "kind": 1, "document": cell("prose") },
                    { "kind": 2, "document": cell("b") },
                ],
            },
            "cellTextDocuments": [
                text("a", "tussock", "read sample ferry as crew"),
                text("prose", "markdown", "Prose {{nobody.omnibus.pillai}}."),
                text("b", "tussock", "compare mood across roster in crow as main"),
            ],
        }),
    );
    // `crow` in one cell is near `crew` in another.
    let found = editor.diagnostics(&cell("b")).await;
    assert_eq!(rules(&found), ["unknown-table"]);
    assert_eq!(found["version"], 1);
    assert_eq!(rules(&editor.diagnostics(&cell("prose")).await), ["unknown-comparison"]);
    assert_eq!(editor.diagnostics(&cell("a")).await["diagnostics"], json!([]));
    // One edit, and only the cell about which there is news is told.
    editor.notify(
        "notebookDocument/didChange",
        json!({
            "notebookDocument": { "uri": BOOK, "version": 2 },
            "change": { "cells": { "textContent": [{
                "document": { "uri": cell("b"), "version": 2 },
                "changes": [replacement(0, 32, 33, "e")],
            }] } },
        }),
    );
    let found = editor.diagnostics(&cell("b")).await;
    assert_eq!((found["version"].clone(), found["diagnostics"].clone()), (json!(2), json!([])));
    let more = editor.count_after(PAUSE * 4, "textDocument/publishDiagnostics").await;
    assert_eq!(more, 0);
    editor.finish().await;
}

#[tokio::test]
async fn a_quick_fix_mends_what_is_wrong() {
    for (capabilities, versioned) in [
        (json!({}), false),
        (json!({ "workspace": { "workspaceEdit": { "documentChanges": true } } }), true),
    ] {
        let mut editor = Editor::start_with(capabilities).await;
        editor.open(A, "tussock", "read sample ferry as crew\nshwo omnibus of main\n");
        let place = json!({ "line": 1, "character": 2 });
        let params = json!({
            "textDocument": { "uri": A },
            "range": { "start": place, "end": place },
            "context": { "diagnostics": [] },
        });
        let actions = editor.ask("textDocument/codeAction", params).await;
        let action = &actions[0];
        assert_eq!(action["kind"], "quickfix");
        assert_eq!(action["diagnostics"][0]["code"], "unknown-word");
        let edits = if versioned {
            let change = &action["edit"]["documentChanges"][0];
            assert_eq!(change["textDocument"], json!({ "uri": A, "version": 1 }));
            &change["edits"]
        } else {
            &action["edit"]["changes"][A]
        };
        assert_eq!(
            *edits,
            json!([{ "range": replacement(1, 0, 4, "")["range"], "newText": "show" }])
        );
        editor.finish().await;
    }
}

#[tokio::test]
async fn quick_fixes_are_offered_at_their_place_and_when_asked_for() {
    let mut editor = Editor::start().await;
    editor.open(A, "tussock", "read sample ferry as crew\nshwo omnibus of main\n");
    let ask = |line: u32, only: Value| {
        let place = json!({ "line": line, "character": 2 });
        json!({
            "textDocument": { "uri": A },
            "range": { "start": place, "end": place },
            "context": { "diagnostics": [], "only": only },
        })
    };
    for (line, only, count) in [
        (1, json!(["quickfix"]), 1),
        (1, json!([""]), 1),
        (1, json!(["refactor"]), 0),
        (0, json!(["quickfix"]), 0),
    ] {
        let actions = editor.ask("textDocument/codeAction", ask(line, only.clone())).await;
        assert_eq!(actions.as_array().expect("a list").len(), count, "line {line}, {only}");
    }
    editor.finish().await;
}
