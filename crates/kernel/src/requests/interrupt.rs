//! `interrupt_request`: stops the cell that runs. What earlier cells defined still stands.

use serde_json::json;

use super::{Answer, Control};

pub(crate) fn answer(control: &Control) -> Answer {
    control.cancel.cancel();
    Answer::ok(json!({}))
}
