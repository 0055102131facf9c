//! The beginning, the end, and what happens when something breaks in between.

use serde_json::{Value, json};

use crate::support::Editor;

const A: &str = "file:///skerry/a.tus";

#[tokio::test]
async fn the_server_says_what_it_can_do() {
    let editor = Editor::start().await;
    let capabilities = &editor.greeting["capabilities"];
    assert_eq!(capabilities["textDocumentSync"]["change"], 2);
    assert_eq!(capabilities["hoverProvider"], true);
    assert_eq!(capabilities["documentFormattingProvider"], true);
    assert_eq!(capabilities["documentSymbolProvider"], true);
    assert_eq!(capabilities["foldingRangeProvider"], true);
    assert_eq!(capabilities["codeActionProvider"]["codeActionKinds"], json!(["quickfix"]));
    assert_eq!(
        capabilities["completionProvider"]["triggerCharacters"],
        json!([".", "`", "{", "\""])
    );
    let cells = &capabilities["notebookDocumentSync"]["notebookSelector"][0]["cells"];
    assert_eq!(*cells, json!([{ "language": "tussock" }, { "language": "markdown" }]));
    assert_eq!(editor.greeting["serverInfo"]["name"], "tussock");
    editor.finish().await;
}

#[tokio::test]
async fn exit_without_shutdown_is_noticed() {
    let mut editor = Editor::start().await;
    editor.notify("exit", Value::Null);
    assert!(!editor.end().await);
}

#[tokio::test]
async fn what_comes_after_exit_holds_nothing_up() {
    let mut editor = Editor::start().await;
    editor.open(A, "tussock", "text");
    editor.request("test/slow", json!({ "uri": A }));
    let id = editor.request("shutdown", Value::Null);
    editor.notify("exit", Value::Null);
    editor.request("test/text", json!({ "uri": A }));
    assert_eq!(editor.result(id).await, Value::Null);
    assert!(editor.end().await);
}

#[tokio::test]
async fn before_initialize_nothing_is_answered() {
    let mut editor = Editor::connect();
    let id = editor.request("test/text", json!({ "uri": A }));
    assert_eq!(editor.reply(id).await["error"]["code"], -32002);
    editor.notify("exit", Value::Null);
    assert!(!editor.end().await);
}

#[tokio::test]
async fn a_panic_is_told_and_the_server_lives_on() {
    let mut editor = Editor::start().await;
    editor.open(A, "tussock", "text");
    let id = editor.request("test/panic", json!({ "uri": A }));
    let error = editor.reply(id).await["error"].clone();
    assert_eq!(error["code"], -32603);
    assert_eq!(error["message"], "test/panic failed: a test made it panic");
    let log = editor.notification("window/logMessage").await;
    assert_eq!(log["type"], 1);
    let message = log["message"].as_str().expect("a text");
    assert!(message.contains("a test made it panic"), "{message}");
    assert!(message.contains("Please report it"), "{message}");
    assert_eq!(editor.text(A).await, "text");
    editor.finish().await;
}

#[tokio::test]
async fn a_client_that_watches_files_is_asked_to_watch_data() {
    let mut editor = Editor::start_with(json!({
        "workspace": { "didChangeWatchedFiles": { "dynamicRegistration": true } },
    }))
    .await;
    let asked = editor.notification("client/registerCapability").await;
    let registration = &asked["registrations"][0];
    assert_eq!(registration["method"], "workspace/didChangeWatchedFiles");
    let watcher = &registration["registerOptions"]["watchers"][0];
    assert_eq!(watcher["globPattern"], "**/*.{csv,tsv}");
    editor.finish().await;
}
