//! `kernel_info_request`: what this kernel is and which language it answers.

use serde_json::json;

use super::Answer;
use crate::message::PROTOCOL_VERSION;

/// The language's name, by which front ends find its colours and its language server.
pub(crate) const LANGUAGE: &str = "tussock";
const VERSION: &str = env!("CARGO_PKG_VERSION");

pub(crate) fn answer() -> Answer {
    Answer::ok(json!({
        "protocol_version": PROTOCOL_VERSION,
        "implementation": "tussock",
        "implementation_version": VERSION,
        "language_info": {
            "name": LANGUAGE,
            "version": VERSION,
            "mimetype": "text/x-tussock",
            "file_extension": ".tus",
            // Of the lexers that a converter is sure to know, the one that changes nothing.
            "pygments_lexer": "text",
            "codemirror_mode": LANGUAGE,
            "nbconvert_exporter": "script",
        },
        "banner": format!("Tussock {VERSION}: compare groups on several outcomes at once."),
        "help_links": [],
        "debugger": false,
        "supported_features": [],
    }))
}
