//! Requests that only the tests know, answered by the same machinery as all others.

use std::collections::BTreeMap;
use std::sync::Mutex;
use std::time::{Duration, Instant};

use tower_lsp::LspServiceBuilder;
use tower_lsp::jsonrpc::Result;
use tower_lsp::lsp_types::request::Request;
use tower_lsp::lsp_types::{ServerCapabilities, TextDocumentIdentifier, Url};
use tussock_server::{Backend, Feature, Question};

/// Adds the test requests to a service.
pub(crate) fn add(service: LspServiceBuilder<Backend>) -> LspServiceBuilder<Backend> {
    service
        .custom_method("test/text", Backend::ask::<Text>)
        .custom_method("test/sources", Backend::ask::<Sources>)
        .custom_method("test/slow", Backend::ask::<Slow>)
        .custom_method("test/progress", Backend::ask::<Progress>)
        .custom_method("test/panic", Backend::ask::<Panic>)
}

/// The text as the server holds it.
struct Text;

/// The texts of all sources of the document.
struct Sources;

/// Works until it is told to stop, or the text has changed.
struct Slow;

/// How far a slow request about this text has come.
struct Progress;

/// Panics.
struct Panic;

static PROGRESS: Mutex<BTreeMap<String, &str>> = Mutex::new(BTreeMap::new());

macro_rules! request {
    ($name:ident, $method:literal, $result:ty, $answer:expr) => {
        impl Request for $name {
            type Params = TextDocumentIdentifier;
            type Result = Option<$result>;
            const METHOD: &'static str = $method;
        }

        impl Feature for $name {
            type Request = Self;

            fn announce(_: &mut ServerCapabilities) {}

            fn text(params: &TextDocumentIdentifier) -> &Url {
                &params.uri
            }

            fn answer(question: &Question, _: TextDocumentIdentifier) -> Result<Option<$result>> {
                let answer: fn(&Question) -> $result = $answer;
                Ok(Some(answer(question)))
            }
        }
    };
}

request!(Text, "test/text", String, content);

request!(Sources, "test/sources", Vec<String>, |question| {
    question.snapshot.document().sources.iter().map(|source| source.text.clone()).collect()
});

request!(Slow, "test/slow", String, |question| {
    note(question, "begun");
    let begin = Instant::now();
    while begin.elapsed() < Duration::from_secs(10) {
        if question.cancel.is_cancelled() {
            note(question, "stopped");
            return "stopped".to_owned();
        }
        if question.snapshot.is_superseded() {
            return "late".to_owned();
        }
        std::thread::yield_now();
    }
    "nobody stopped it".to_owned()
});

request!(Progress, "test/progress", String, |question| {
    let progress = PROGRESS.lock().expect("nobody panics with it");
    progress.get(&content(question)).copied().unwrap_or("not begun").to_owned()
});

request!(Panic, "test/panic", String, |_| panic!("a test made it panic"));

fn content(question: &Question) -> String {
    question.snapshot.document().text(question.source).to_owned()
}

fn note(question: &Question, progress: &'static str) {
    PROGRESS.lock().expect("nobody panics with it").insert(content(question), progress);
}
