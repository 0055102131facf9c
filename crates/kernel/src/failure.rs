//! What went wrong, in the three fields that the protocol has for it.

use serde_json::{Map, Value, json};

/// A failure as a client shows it.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) struct Failure {
    /// Its name in one word.
    pub(crate) name: String,
    /// One sentence.
    pub(crate) message: String,
    /// The whole, line groups of text for a screen.
    pub(crate) traceback: Vec<String>,
}

impl Failure {
    /// A failure that one sentence tells.
    pub(crate) fn plain(name: &str, message: &str) -> Self {
        Self {
            name: name.to_owned(),
            message: message.to_owned(),
            traceback: vec![format!("error [{name}]: {message}")],
        }
    }

    /// The fields of an `error` message, and of a reply that failed.
    pub(crate) fn content(&self) -> Map<String, Value> {
        let mut content = Map::new();
        content.insert("ename".to_owned(), json!(self.name));
        content.insert("evalue".to_owned(), json!(self.message));
        content.insert("traceback".to_owned(), json!(self.traceback));
        content
    }
}
