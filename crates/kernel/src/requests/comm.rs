//! `comm_open`, `comm_msg`, `comm_close`: channels for widgets, of which this kernel has none.

use serde::Deserialize;
use serde_json::json;

use super::{Answer, Exchange, Handled};

#[derive(Deserialize)]
struct Open {
    comm_id: String,
}

/// Nothing is known under any target, so a channel that a client opens is closed at once, which is
/// how a client learns it.
pub(crate) fn close(exchange: &Exchange<'_>) -> Handled {
    let open: Open = exchange.request.content()?;
    exchange.publish("comm_close", json!({ "comm_id": open.comm_id, "data": {} }));
    Ok(Answer::none())
}

/// A word on a channel that isn't open.
pub(crate) fn ignore() -> Answer {
    Answer::none()
}
