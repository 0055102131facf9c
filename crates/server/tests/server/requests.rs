//! The answers to requests: what the language says, in the client's positions.

use serde_json::{Value, json};

use crate::support::{Editor, position, replacement};

const A: &str = "file:///skerry/a.tus";
const B: &str = "file:///skerry/b.md";

fn at(uri: &str, line: u32, character: u32) -> Value {
    json!({ "textDocument": { "uri": uri }, "position": position(line, character) })
}

fn labels(items: &Value) -> Vec<&str> {
    let items = items.as_array().expect("a list");
    items.iter().map(|item| item["label"].as_str().expect("a label")).collect()
}

#[tokio::test]
async fn completion_replaces_the_word_at_the_cursor() {
    let mut editor = Editor::start().await;
    editor.open(A, "tussock", "# 🚢\ncompa");
    let items = editor.ask("textDocument/completion", at(A, 1, 5)).await;
    assert_eq!(labels(&items), ["compare"]);
    let item = &items[0];
    assert_eq!(item["textEdit"]["range"], replacement(1, 0, 5, "")["range"]);
    assert_eq!(item["documentation"]["kind"], "markdown");
    editor.finish().await;
}

#[tokio::test]
async fn columns_behind_wide_characters_are_where_the_client_sees_them() {
    let mut editor = Editor::start().await;
    editor.open(
        A,
        "tussock",
        "write \"🚢🚢 {{ma\"\nread sample ferry as crew\n\
        compare mood across roster in crew as main\n",
    );
    let items = editor.ask("textDocument/completion", at(A, 0, 16)).await;
    assert_eq!(labels(&items), ["main"]);
    assert_eq!(items[0]["textEdit"]["range"], replacement(0, 14, 16, "")["range"]);
    editor.finish().await;
}

#[tokio::test]
async fn hover_explains_the_word_and_marks_it() {
    let mut editor = Editor::start().await;
    editor.open(A, "tussock", "# 🚢\r\nread sample ferry as crew\r\n");
    let hover = editor.ask("textDocument/hover", at(A, 1, 2)).await;
    assert_eq!(hover["contents"]["kind"], "markdown");
    assert!(hover["contents"]["value"].as_str().expect("a text").contains("read"), "{hover}");
    assert_eq!(hover["range"], replacement(1, 0, 4, "")["range"]);
    assert_eq!(editor.ask("textDocument/hover", at(A, 9, 0)).await, Value::Null);
    editor.finish().await;
}

#[tokio::test]
async fn the_outline_is_nested_or_flat_as_the_client_likes() {
    let script = "read sample ferry as crew\ncompare mood\n  across roster in crew as main\n";
    let nested = json!({
        "textDocument": { "documentSymbol": { "hierarchicalDocumentSymbolSupport": true } },
    });
    let mut editor = Editor::start_with(nested).await;
    editor.open(A, "tussock", script);
    let outline =
        editor.ask("textDocument/documentSymbol", json!({ "textDocument": { "uri": A } })).await;
    assert_eq!(outline[0]["name"], "crew");
    assert_eq!(outline[0]["selectionRange"], replacement(0, 21, 25, "")["range"]);
    assert_eq!(outline[1]["name"], "main");
    assert_eq!(outline[1]["range"], json!({ "start": position(1, 0), "end": position(2, 31) }));
    editor.finish().await;

    let mut editor = Editor::start().await;
    editor.open(A, "tussock", script);
    let outline =
        editor.ask("textDocument/documentSymbol", json!({ "textDocument": { "uri": A } })).await;
    assert_eq!(outline[1]["name"], "main");
    assert_eq!(outline[1]["location"]["uri"], A);
    editor.finish().await;
}

#[tokio::test]
async fn long_statements_and_fences_fold() {
    let mut editor = Editor::start().await;
    let text = "Text.\n\n```tussock\nread sample ferry as crew\ncompare mood\n  across roster\n  \
        in crew as main\n```\n";
    editor.open(B, "markdown", text);
    let ranges =
        editor.ask("textDocument/foldingRange", json!({ "textDocument": { "uri": B } })).await;
    assert_eq!(ranges, json!([{ "startLine": 4, "endLine": 6 }, { "startLine": 3, "endLine": 6 }]));
    editor.finish().await;
}

/// A script whose names stand behind wide characters.
const NAMES: &str = "# 🚢\nread sample ferry as `🚢`\ncompare mood across roster in `🚢` as main\n\
    show omnibus of main\n";

#[tokio::test]
async fn a_name_leads_to_its_definition_and_to_every_mention() {
    let mut editor = Editor::start().await;
    editor.open(A, "tussock", NAMES);
    let definition = editor.ask("textDocument/definition", at(A, 2, 32)).await;
    assert_eq!(definition["uri"], A);
    assert_eq!(definition["range"], replacement(1, 21, 25, "")["range"]);

    let mut with = at(A, 1, 22);
    with["context"] = json!({ "includeDeclaration": true });
    let found = editor.ask("textDocument/references", with.clone()).await;
    assert_eq!(found.as_array().expect("a list").len(), 2);
    with["context"] = json!({ "includeDeclaration": false });
    let found = editor.ask("textDocument/references", with).await;
    assert_eq!(found[0]["range"], replacement(2, 30, 34, "")["range"]);
    assert_eq!(found.as_array().expect("a list").len(), 1);

    let found = editor.ask("textDocument/documentHighlight", at(A, 3, 17)).await;
    let kinds: Vec<_> = found.as_array().expect("a list").iter().map(|one| &one["kind"]).collect();
    assert_eq!(kinds, [3, 2], "written, then read");
    editor.finish().await;
}

#[tokio::test]
async fn a_new_name_is_written_wherever_the_old_one_stood() {
    let mut editor = Editor::start().await;
    editor.open(A, "tussock", NAMES);
    let range = editor.ask("textDocument/prepareRename", at(A, 1, 22)).await;
    assert_eq!(range, replacement(1, 21, 25, "")["range"]);
    let mut params = at(A, 1, 22);
    params["newName"] = json!("crew");
    let edit = editor.ask("textDocument/rename", params).await;
    let edits = json!([
        { "range": replacement(1, 21, 25, "")["range"], "newText": "crew" },
        { "range": replacement(2, 30, 34, "")["range"], "newText": "crew" },
    ]);
    assert_eq!(edit["changes"][A], edits);
    editor.finish().await;
}

#[tokio::test]
async fn a_name_that_cannot_be_changed_is_refused_with_the_reason() {
    let mut editor = Editor::start().await;
    editor.open(A, "tussock", NAMES);
    let id = editor.request("textDocument/prepareRename", at(A, 2, 10));
    let error = editor.reply(id).await["error"].clone();
    assert_eq!(error["code"], -32803);
    assert!(error["message"].as_str().expect("a text").contains("mood"), "{error}");
    let mut params = at(A, 1, 22);
    params["newName"] = json!("main");
    let id = editor.request("textDocument/rename", params);
    assert_eq!(editor.reply(id).await["error"]["code"], -32803);
    editor.finish().await;
}

#[tokio::test]
async fn words_are_told_apart_by_meaning_line_by_line() {
    let mut editor = Editor::start().await;
    editor.open(
        A,
        "tussock",
        "# 🚢\nread sample ferry as crew\nwrite \"\"\"🚢\n🚢 {{main}}\"\"\"\n",
    );
    let uri = json!({ "textDocument": { "uri": A } });
    let tokens = editor.ask("textDocument/semanticTokens/full", uri).await;
    let legend =
        editor.greeting["capabilities"]["semanticTokensProvider"]["legend"]["tokenTypes"].clone();
    let numbers: Vec<u64> =
        tokens["data"].as_array().expect("a list").iter().map(|n| n.as_u64().expect("n")).collect();
    let (mut line, mut start) = (0, 0);
    let mut words = Vec::new();
    for token in numbers.chunks(5) {
        start = if token[0] == 0 { start + token[1] } else { token[1] };
        line += token[0];
        let kind = legend[usize::try_from(token[3]).expect("small")].as_str().expect("a name");
        words.push((line, start, token[2], kind.to_owned()));
    }
    let expected = [
        (0, 0, 4, "comment"),
        (1, 0, 4, "keyword"),
        (1, 5, 6, "keyword"),
        (1, 12, 5, "struct"),
        (1, 18, 2, "keyword"),
        (1, 21, 4, "struct"),
        (2, 0, 5, "keyword"),
        (2, 6, 5, "string"),
        (3, 0, 3, "string"),
        (3, 5, 4, "class"),
        (3, 11, 3, "string"),
    ];
    assert_eq!(words, expected.map(|(line, at, length, kind)| (line, at, length, kind.to_owned())));
    editor.finish().await;
}

#[tokio::test]
async fn formatting_touches_only_code_that_is_out_of_form() {
    let mut editor = Editor::start().await;
    let format = |uri: &str| {
        json!({
            "textDocument": { "uri": uri },
            "options": { "tabSize": 2, "insertSpaces": true },
        })
    };
    editor.open(A, "tussock", "# 🚢\r\nread   sample ferry as crew\r\n");
    let edits = editor.ask("textDocument/formatting", format(A)).await;
    let superfluous = replacement(1, 5, 7, "")["range"].clone();
    assert_eq!(edits, json!([{ "range": superfluous, "newText": "" }]));
    let text = "a   b\n\n```tussock\nread sample  ferry as crew\n```\n\n\
        - x\n\n  ```tussock\n  show   omnibus of main\n  ```\n";
    editor.open(B, "markdown", text);
    let edits = editor.ask("textDocument/formatting", format(B)).await;
    let lines: Vec<_> = edits
        .as_array()
        .expect("a list")
        .iter()
        .map(|edit| edit["range"]["start"]["line"].clone())
        .collect();
    assert_eq!(lines, [3, 9]);
    editor.finish().await;
}
