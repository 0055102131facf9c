//! `comm_info_request`: which channels for widgets are open. None ever is.

use serde_json::json;

use super::Answer;

pub(crate) fn answer() -> Answer {
    Answer::ok(json!({ "comms": {} }))
}
