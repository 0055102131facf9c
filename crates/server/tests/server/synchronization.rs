//! Whether the server holds the text that the editor holds, whatever comes in whatever haste.

use serde_json::{Value, json};

use crate::support::{Editor, replacement};

const A: &str = "file:///skerry/a.tus";

/// What a reply says when its text has changed meanwhile.
const CONTENT_MODIFIED: i64 = -32801;

#[tokio::test]
async fn fifty_edits_among_fifty_questions_are_applied_in_their_order() {
    let mut editor = Editor::start().await;
    editor.open(A, "tussock", "# ");
    let mut text = "# ".to_owned();
    let mut questions = Vec::new();
    for edit in 0..50_u32 {
        // Each goes into the middle of what the ones before have left: any other order shows.
        let letter = char::from_u32(u32::from('A') + edit).expect("a letter");
        let at = 2 + edit / 2;
        text.insert(at as usize, letter);
        let version = 2 + i32::try_from(edit).expect("small");
        editor.change(A, version, json!([replacement(0, at, at, &letter.to_string())]));
        let id = editor.request("test/text", json!({ "uri": A }));
        questions.push((id, text.clone()));
    }
    let last = questions.last().expect("fifty").0;
    for (id, text) in questions {
        let reply = editor.reply(id).await;
        if reply["error"]["code"] == CONTENT_MODIFIED {
            assert_ne!(id, last, "nothing came after the last question");
        } else {
            assert_eq!(reply["result"], text);
        }
    }
    editor.finish().await;
}

#[tokio::test]
async fn edits_of_one_message_apply_each_to_the_result_of_the_one_before() {
    let mut editor = Editor::start().await;
    editor.open(A, "tussock", "one\ntwo\n");
    let edits = json!([
        replacement(0, 0, 3, "first\nsecond"),
        replacement(1, 0, 6, "2"),
        replacement(2, 3, 3, "!"),
    ]);
    editor.change(A, 2, edits);
    assert_eq!(editor.text(A).await, "first\n2\ntwo!\n");
    // A whole new text wins over the edits before it and is edited by those after it.
    let edits = json!([replacement(0, 0, 5, "lost"), { "text": "new" }, replacement(0, 0, 1, "N")]);
    editor.change(A, 3, edits);
    assert_eq!(editor.text(A).await, "New");
    editor.finish().await;
}

#[tokio::test]
async fn characters_are_counted_as_the_client_counts_them() {
    // Before the edit: two characters, seven bytes, three UTF-16 units, two code points.
    let cases = [
        (json!({}), "utf-16", 3),
        (json!({ "general": { "positionEncodings": ["utf-16"] } }), "utf-16", 3),
        (json!({ "general": { "positionEncodings": ["utf-8", "utf-16"] } }), "utf-8", 7),
        (json!({ "general": { "positionEncodings": ["utf-32", "utf-16"] } }), "utf-32", 2),
        (json!({ "general": { "positionEncodings": ["ebcdic", "utf-8"] } }), "utf-8", 7),
        (json!({ "general": { "positionEncodings": ["ebcdic"] } }), "utf-16", 3),
    ];
    for (capabilities, encoding, at) in cases {
        let mut editor = Editor::start_with(capabilities).await;
        assert_eq!(editor.greeting["capabilities"]["positionEncoding"], encoding);
        editor.open(A, "tussock", "🚢€z");
        editor.change(A, 2, json!([replacement(0, at, at, "+")]));
        assert_eq!(editor.text(A).await, "🚢€+z", "{encoding}");
        editor.finish().await;
    }
}

#[tokio::test]
async fn line_breaks_and_a_byte_order_mark_are_part_of_the_text() {
    let mut editor = Editor::start().await;
    editor.open(A, "tussock", "\u{feff}a\r\nb\rc\n");
    let edits = json!([
        replacement(0, 1, 2, "A"),
        // Beyond the end of its line: before the line break.
        replacement(1, 9, 9, "+"),
        replacement(2, 0, 1, "C"),
        replacement(3, 0, 0, "d"),
    ]);
    editor.change(A, 2, edits);
    assert_eq!(editor.text(A).await, "\u{feff}A\r\nb+\rC\nd");
    editor.finish().await;
}

#[tokio::test]
async fn an_answer_about_text_that_has_changed_is_dropped() {
    let mut editor = Editor::start().await;
    editor.open(A, "tussock", "before");
    let slow = editor.request("test/slow", json!({ "uri": A }));
    editor.change(A, 2, json!([{ "text": "after" }]));
    assert_eq!(editor.reply(slow).await["error"]["code"], CONTENT_MODIFIED);
    assert_eq!(editor.text(A).await, "after");
    editor.finish().await;
}

#[tokio::test]
async fn many_slow_requests_hold_up_no_edit() {
    let mut editor = Editor::start().await;
    editor.open(A, "tussock", "before");
    let slow: Vec<i64> =
        (0..200).map(|_| editor.request("test/slow", json!({ "uri": A }))).collect();
    editor.change(A, 2, json!([{ "text": "after" }]));
    for id in slow {
        assert_eq!(editor.reply(id).await["error"]["code"], CONTENT_MODIFIED);
    }
    assert_eq!(editor.text(A).await, "after");
    editor.finish().await;
}

#[tokio::test]
async fn a_cancelled_request_is_answered_at_once_and_its_work_stops() {
    let mut editor = Editor::start().await;
    editor.open(A, "tussock", "to be cancelled");
    let slow = editor.request("test/slow", json!({ "uri": A }));
    reaches(&mut editor, "begun").await;
    editor.notify("$/cancelRequest", json!({ "id": slow }));
    assert_eq!(editor.reply(slow).await["error"]["code"], -32800);
    reaches(&mut editor, "stopped").await;
    editor.finish().await;
}

/// Waits until the slow request has come so far.
async fn reaches(editor: &mut Editor, progress: &str) {
    let begin = std::time::Instant::now();
    while editor.ask("test/progress", json!({ "uri": A })).await != progress {
        assert!(begin.elapsed().as_secs() < 5, "the work is not {progress}");
    }
}

#[tokio::test]
async fn a_text_that_is_not_open_has_no_answers() {
    let mut editor = Editor::start().await;
    assert_eq!(editor.text(A).await, Value::Null);
    editor.change(A, 2, json!([{ "text": "never opened" }]));
    assert_eq!(editor.text(A).await, Value::Null);
    editor.open(A, "tussock", "text");
    editor.notify("textDocument/didClose", json!({ "textDocument": { "uri": A } }));
    assert_eq!(editor.text(A).await, Value::Null);
    // Opened twice, as after a crash of the editor: the newer text stands.
    editor.open(A, "tussock", "one");
    editor.open(A, "tussock", "two");
    assert_eq!(editor.text(A).await, "two");
    editor.finish().await;
}

#[tokio::test]
async fn a_text_is_ours_by_its_language_or_its_name() {
    let mut editor = Editor::start().await;
    let cases = [
        ("file:///skerry/plain", "tussock", true),
        ("untitled:Untitled-1", "tussock", true),
        ("file:///skerry/a.tus", "plaintext", true),
        ("file:///skerry/a.md", "plaintext", true),
        ("file:///skerry/notes", "markdown", true),
        ("file:///skerry/joined.ipynb", "", true),
        ("file:///skerry/raw.ipynb", "json", false),
        ("file:///skerry/a.py", "python", false),
    ];
    for (uri, language, ours) in cases {
        editor.open(uri, language, "text");
        assert_eq!(editor.text(uri).await != Value::Null, ours, "{uri} {language}");
    }
    editor.finish().await;
}
