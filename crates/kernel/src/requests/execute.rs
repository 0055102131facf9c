//! `execute_request`: runs a cell.

use serde::Deserialize;
use serde_json::{Value, json};
use tussock_language::present::Line;
use tussock_language::span::Location;
use tussock_session::notebook::Reply;

use super::{Answer, Exchange, Handled};
use crate::barrier::guarded;
use crate::evaluator::Evaluator;
use crate::failure::Failure;
use crate::history::{Entry, History};
use crate::outputs::{self, Piece, Shown};
use crate::worker::Worker;

#[derive(Deserialize)]
struct Asked {
    code: String,
    /// To show nothing and to count as nothing.
    #[serde(default)]
    silent: bool,
    /// To count; taken for granted, unless the cell is silent.
    store_history: Option<bool>,
    #[serde(default = "yes")]
    stop_on_error: bool,
}

fn yes() -> bool {
    true
}

pub(crate) fn answer<E: Evaluator>(worker: &mut Worker<E>, exchange: &Exchange<'_>) -> Handled {
    let asked: Asked = exchange.request.content()?;
    let stored = !asked.silent && asked.store_history.unwrap_or(true);
    if stored {
        worker.count += 1;
    }
    let count = worker.count;
    if !asked.silent {
        exchange.publish("execute_input", json!({ "code": asked.code, "execution_count": count }));
    }

    let cell = exchange.request.metadata.get("cellId").and_then(Value::as_str);
    // Rendering is within the barrier too: what can't be shown is a failure of the cell.
    let outcome = guarded("the running of a cell", || {
        let reply = worker.evaluator.run(cell, &asked.code, &worker.cancel);
        let number = stored.then_some(count);
        outputs::of(&reply, &|location| place(&reply, location, number, &worker.history))
    });
    let shown = outcome.unwrap_or_else(Shown::failed);

    if !asked.silent {
        publish(exchange, &shown, count);
    }
    if stored {
        let output = shown.result_text();
        worker.history.add(Entry { number: count, input: asked.code, output });
    }
    Ok(reply(shown.failure.as_ref(), count, asked.stop_on_error))
}

fn publish(exchange: &Exchange<'_>, shown: &Shown, count: u32) {
    for Piece { data, is_result } in &shown.pieces {
        if *is_result {
            let content = json!({ "data": data, "metadata": {}, "execution_count": count });
            exchange.publish("execute_result", content);
        } else {
            let content = json!({ "data": data, "metadata": {}, "transient": {} });
            exchange.publish("display_data", content);
        }
    }
    if let Some(failure) = &shown.failure {
        exchange.publish("error", Value::Object(failure.content()));
    }
}

fn reply(failure: Option<&Failure>, count: u32, stop_on_error: bool) -> Answer {
    let answer = match failure {
        None => Answer::ok(json!({ "payload": [], "user_expressions": {} })),
        Some(failure) => Answer::failed(failure),
    };
    Answer {
        abort_waiting: failure.is_some() && stop_on_error,
        ..answer.with("execution_count", json!(count))
    }
}

/// The reply for a cell that wasn't run because an earlier one failed.
pub(crate) fn aborted(count: u32) -> Answer {
    let content = json!({ "status": "aborted", "execution_count": count });
    Answer { content: Some(content), abort_waiting: false }
}

/// How a reader finds a place: by the number that the front end shows beside the cell, and the
/// line.
fn place(reply: &Reply, location: Location, number: Option<u32>, history: &History) -> String {
    let text = reply.document.text(location.source);
    let number = if location.source == reply.source { number } else { history.number_of(text) };
    let cell = match number {
        Some(number) => format!("cell [{number}]"),
        None if location.source == reply.source => "this cell".to_owned(),
        None => "an earlier cell".to_owned(),
    };
    format!("{cell}, line {}", Line::around(text, location.span.start).number)
}
