//! An editor at the other end of a pair of pipes, in the same process.

mod features;
mod pipe;

use std::collections::VecDeque;
use std::time::Duration;

use serde_json::{Value, json};
use tokio::task::JoinHandle;
use tokio::time::timeout;

use self::pipe::{PipeReader, PipeWriter, pipe};

/// How long the server may take for anything.
const PATIENCE: Duration = Duration::from_secs(20);

/// A pause short enough for tests and long enough that a burst of edits falls within it.
pub(crate) const PAUSE: Duration = Duration::from_millis(60);

/// An editor that has a server running.
pub(crate) struct Editor {
    to_server: PipeWriter,
    from_server: PipeReader,
    received: VecDeque<Value>,
    /// What the server answered to `initialize`.
    pub(crate) greeting: Value,
    server: JoinHandle<bool>,
    next_id: i64,
}

impl Editor {
    /// Starts a server and greets it as an editor with no special abilities does.
    pub(crate) async fn start() -> Self {
        Self::start_with(json!({})).await
    }

    /// Starts a server and greets it with these capabilities.
    pub(crate) async fn start_with(capabilities: Value) -> Self {
        let mut editor = Self::connect();
        let params = json!({ "processId": null, "rootUri": null, "capabilities": capabilities });
        let id = editor.request("initialize", params);
        editor.greeting = editor.result(id).await;
        editor.notify("initialized", json!({}));
        editor
    }

    /// Starts a server and says nothing.
    pub(crate) fn connect() -> Self {
        let (to_server, input) = pipe();
        let (output, from_server) = pipe();
        let (service, socket) = features::add(tussock_server::build(PAUSE)).finish();
        let server = tokio::spawn(tussock_server::serve(input, output, service, socket));
        Self {
            to_server,
            from_server,
            received: VecDeque::new(),
            greeting: Value::Null,
            server,
            next_id: 0,
        }
    }

    /// Sends a notification.
    pub(crate) fn notify(&mut self, method: &str, params: Value) {
        self.send(&json!({ "jsonrpc": "2.0", "method": method, "params": params }));
    }

    /// Sends a request and gives its number.
    pub(crate) fn request(&mut self, method: &str, params: Value) -> i64 {
        self.next_id += 1;
        let id = self.next_id;
        self.send(&json!({ "jsonrpc": "2.0", "id": id, "method": method, "params": params }));
        id
    }

    /// Sends a request and waits for its result.
    pub(crate) async fn ask(&mut self, method: &str, params: Value) -> Value {
        let id = self.request(method, params);
        self.result(id).await
    }

    /// The result of a request; an error reply fails the test.
    pub(crate) async fn result(&mut self, id: i64) -> Value {
        let reply = self.reply(id).await;
        assert!(reply.get("error").is_none(), "{reply}");
        reply["result"].clone()
    }

    /// The whole reply to a request.
    pub(crate) async fn reply(&mut self, id: i64) -> Value {
        self.wait_for(|message| message.get("method").is_none() && message["id"] == id).await
    }

    /// The next notification of a kind.
    pub(crate) async fn notification(&mut self, method: &str) -> Value {
        self.wait_for(|message| message["method"] == method).await["params"].clone()
    }

    /// The next diagnostics of a text.
    pub(crate) async fn diagnostics(&mut self, uri: &str) -> Value {
        let is_it = |message: &Value| {
            message["method"] == "textDocument/publishDiagnostics"
                && message["params"]["uri"] == uri
        };
        self.wait_for(is_it).await["params"].clone()
    }

    /// Waits as long as `time` and gives how many messages of a kind came and were not yet taken.
    pub(crate) async fn count_after(&mut self, time: Duration, method: &str) -> usize {
        let _over = timeout(time, async {
            loop {
                let message = self.read().await;
                self.received.push_back(message);
            }
        })
        .await;
        self.received.iter().filter(|message| message["method"] == method).count()
    }

    /// Opens a text.
    pub(crate) fn open(&mut self, uri: &str, language: &str, text: &str) {
        self.notify(
            "textDocument/didOpen",
            json!({ "textDocument": { "uri": uri, "languageId": language, "version": 1, "text": text } }),
        );
    }

    /// Sends edits of a text.
    pub(crate) fn change(&mut self, uri: &str, version: i32, changes: Value) {
        self.notify(
            "textDocument/didChange",
            json!({ "textDocument": { "uri": uri, "version": version }, "contentChanges": changes }),
        );
    }

    /// The text as the server holds it.
    pub(crate) async fn text(&mut self, uri: &str) -> Value {
        self.ask("test/text", json!({ "uri": uri })).await
    }

    /// Says good-bye in good order and checks that the server ends, though the pipe stays open.
    pub(crate) async fn finish(mut self) {
        let id = self.request("shutdown", Value::Null);
        assert_eq!(self.result(id).await, Value::Null);
        self.notify("exit", Value::Null);
        assert!(self.end().await, "the server did not notice the shutdown");
    }

    /// Waits for the server's end; gives whether it was shut down before.
    pub(crate) async fn end(&mut self) -> bool {
        let ended = timeout(PATIENCE, &mut self.server).await;
        ended.expect("the server does not end").expect("the server panicked")
    }

    fn send(&mut self, message: &Value) {
        let body = message.to_string();
        self.to_server.push(format!("Content-Length: {}\r\n\r\n{body}", body.len()).into_bytes());
    }

    async fn wait_for(&mut self, wanted: impl Fn(&Value) -> bool) -> Value {
        if let Some(at) = self.received.iter().position(&wanted) {
            return self.received.remove(at).expect("it was found there");
        }
        loop {
            let message = timeout(PATIENCE, self.read()).await.expect("no message came in time");
            if wanted(&message) {
                return message;
            }
            self.received.push_back(message);
        }
    }

    /// Reads a message; a request of the server is granted at once and kept as well.
    async fn read(&mut self) -> Value {
        let message = self.from_server.message().await;
        if let (Some(_), Some(id)) = (message.get("method"), message.get("id")) {
            self.send(&json!({ "jsonrpc": "2.0", "id": id, "result": null }));
        }
        message
    }
}

/// A position of the protocol.
pub(crate) fn position(line: u32, character: u32) -> Value {
    json!({ "line": line, "character": character })
}

/// An edit that puts `text` in place of a range on one line.
pub(crate) fn replacement(line: u32, start: u32, end: u32, text: &str) -> Value {
    json!({ "range": { "start": position(line, start), "end": position(line, end) }, "text": text })
}
