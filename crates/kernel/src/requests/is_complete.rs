//! `is_complete_request`: whether a console should run what was typed or wait for more.

use serde::Deserialize;
use serde_json::json;

use super::{Answer, Exchange, Handled};
use crate::evaluator::{Completeness, Evaluator};
use crate::worker::Worker;

#[derive(Deserialize)]
struct Asked {
    code: String,
}

pub(crate) fn answer<E: Evaluator>(worker: &mut Worker<E>, exchange: &Exchange<'_>) -> Handled {
    let asked: Asked = exchange.request.content()?;
    // The one reply whose status says how the code is, not how the request went.
    let content = match worker.evaluator.is_complete(&asked.code) {
        Completeness::Complete => json!({ "status": "complete", "indent": "" }),
        Completeness::Incomplete { indent } => json!({ "status": "incomplete", "indent": indent }),
        Completeness::Invalid => json!({ "status": "invalid", "indent": "" }),
    };
    Ok(Answer { content: Some(content), abort_waiting: false })
}
