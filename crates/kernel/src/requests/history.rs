//! `history_request`: what was run before.

use serde::Deserialize;
use serde_json::{Value, json};

use super::{Answer, Exchange, Handled};
use crate::evaluator::Evaluator;
use crate::history::{Entry, SESSION};
use crate::worker::Worker;

#[derive(Deserialize)]
struct Asked {
    #[serde(default)]
    output: bool,
    #[serde(flatten)]
    which: Which,
}

/// Which entries. `raw` makes no difference here: a cell is run as it was typed.
#[derive(Deserialize)]
#[serde(tag = "hist_access_type", rename_all = "lowercase")]
enum Which {
    /// The last ones.
    Tail { n: Option<usize> },
    /// Those with a number from `start` up to, but not including, `stop`.
    Range {
        #[serde(default)]
        session: i64,
        start: Option<i64>,
        stop: Option<i64>,
    },
    /// Those that match a pattern with `*` and `?`.
    Search {
        n: Option<usize>,
        pattern: Option<String>,
        #[serde(default)]
        unique: bool,
    },
}

pub(crate) fn answer<E: Evaluator>(worker: &mut Worker<E>, exchange: &Exchange<'_>) -> Handled {
    let asked: Asked = exchange.request.content()?;
    let history = &worker.history;
    let entries = match asked.which {
        Which::Tail { n } => history.tail(n),
        Which::Range { session, start, stop } => history.range(session, start, stop),
        Which::Search { n, pattern, unique } => {
            history.search(pattern.as_deref().unwrap_or("*"), unique, n)
        }
    };
    let list: Vec<Value> = entries.iter().map(|entry| triple(entry, asked.output)).collect();
    Ok(Answer::ok(json!({ "history": list })))
}

fn triple(entry: &Entry, with_output: bool) -> Value {
    if with_output {
        json!([SESSION, entry.number, [entry.input, entry.output]])
    } else {
        json!([SESSION, entry.number, entry.input])
    }
}
