//! `inspect_request`: what a word in a cell means, and its live values.

use serde::Deserialize;
use serde_json::json;

use super::{Answer, Exchange, Handled};
use crate::evaluator::Evaluator;
use crate::outputs;
use crate::position::byte_offset;
use crate::worker::Worker;

#[derive(Deserialize)]
struct Asked {
    code: String,
    cursor_pos: usize,
}

pub(crate) fn answer<E: Evaluator>(worker: &mut Worker<E>, exchange: &Exchange<'_>) -> Handled {
    let asked: Asked = exchange.request.content()?;
    let offset = byte_offset(&asked.code, asked.cursor_pos);
    let page = worker.evaluator.inspect(&asked.code, offset);
    Ok(Answer::ok(json!({
        "found": page.is_some(),
        "data": page.map_or_else(|| json!({}), |page| outputs::markdown(&page)),
        "metadata": {},
    })))
}
