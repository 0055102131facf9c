//! The requests, one file a type (or family of types). Each is registered in one line below.

mod comm;
mod comm_info;
mod complete;
mod connect;
pub(crate) mod execute;
mod history;
mod inspect;
mod interrupt;
mod is_complete;
mod kernel_info;
mod shutdown;

use serde_json::{Map, Value, json};
use tussock_session::cancel::Cancel;

use crate::barrier::guarded;
use crate::connection::Connection;
use crate::evaluator::Evaluator;
use crate::failure::Failure;
use crate::log::log;
use crate::message::{BadContent, Request};
use crate::sockets::iopub::Publisher;
use crate::worker::Worker;

pub(crate) use kernel_info::LANGUAGE;

/// What the requests of the control channel work on.
pub(crate) struct Control {
    pub(crate) connection: Connection,
    /// Raised to stop the cell that runs.
    pub(crate) cancel: Cancel,
    /// Whether a client has asked for the end.
    pub(crate) ending: bool,
}

/// A request, and the way to publish what follows from it.
pub(crate) struct Exchange<'a> {
    pub(crate) request: &'a Request,
    pub(crate) iopub: &'a Publisher,
}

impl Exchange<'_> {
    /// Publishes a message that follows from the request.
    pub(crate) fn publish(&self, kind: &str, content: Value) {
        self.iopub.publish(self.request, kind, content);
    }
}

/// What a client gets for a request.
pub(crate) struct Answer {
    /// The reply's content; nothing for a message that has no reply.
    pub(crate) content: Option<Value>,
    /// Whether the cells that wait are not to be run.
    pub(crate) abort_waiting: bool,
}

impl Answer {
    /// A reply with these fields, and that all went well.
    fn ok(fields: Value) -> Self {
        let mut content = Map::new();
        content.insert("status".to_owned(), json!("ok"));
        if let Value::Object(fields) = fields {
            content.extend(fields);
        }
        Self { content: Some(Value::Object(content)), abort_waiting: false }
    }

    /// A reply that something went wrong.
    fn failed(failure: &Failure) -> Self {
        let mut content = failure.content();
        content.insert("status".to_owned(), json!("error"));
        Self { content: Some(Value::Object(content)), abort_waiting: false }
    }

    /// The same reply with a further field.
    fn with(mut self, field: &str, value: Value) -> Self {
        if let Some(Value::Object(content)) = &mut self.content {
            content.insert(field.to_owned(), value);
        }
        self
    }

    /// No reply, for a message that has none.
    fn none() -> Self {
        Self { content: None, abort_waiting: false }
    }
}

type Handled = Result<Answer, BadContent>;
type Handler<State> = fn(&mut State, &Exchange<'_>) -> Handled;

/// The requests of the shell channel.
fn shell<E: Evaluator>() -> [(&'static str, Handler<Worker<E>>); 11] {
    [
        ("comm_close", |_, _| Ok(comm::ignore())),
        ("comm_info_request", |_, _| Ok(comm_info::answer())),
        ("comm_msg", |_, _| Ok(comm::ignore())),
        ("comm_open", |_, exchange| comm::close(exchange)),
        ("complete_request", complete::answer),
        ("connect_request", |worker, _| Ok(connect::answer(&worker.connection))),
        ("execute_request", execute::answer),
        ("history_request", history::answer),
        ("inspect_request", inspect::answer),
        ("is_complete_request", is_complete::answer),
        ("kernel_info_request", |_, _| Ok(kernel_info::answer())),
    ]
}

/// The requests of the control channel.
fn control() -> [(&'static str, Handler<Control>); 5] {
    [
        ("comm_info_request", |_, _| Ok(comm_info::answer())),
        ("connect_request", |control, _| Ok(connect::answer(&control.connection))),
        ("interrupt_request", |control, _| Ok(interrupt::answer(control))),
        ("kernel_info_request", |_, _| Ok(kernel_info::answer())),
        ("shutdown_request", shutdown::answer),
    ]
}

/// Answers a request of the shell channel.
pub(crate) fn answer_shell<E: Evaluator>(
    worker: &mut Worker<E>,
    exchange: &Exchange<'_>,
) -> Answer {
    answer(&shell(), worker, exchange)
}

/// Answers a request of the control channel.
pub(crate) fn answer_control(state: &mut Control, exchange: &Exchange<'_>) -> Answer {
    answer(&control(), state, exchange)
}

/// Every request gets its one reply: also one that can't be read, that nobody knows, or at which
/// the program itself fails.
fn answer<State>(
    handlers: &[(&'static str, Handler<State>)],
    state: &mut State,
    exchange: &Exchange<'_>,
) -> Answer {
    let kind = exchange.request.kind.as_str();
    let Some((_, handler)) = handlers.iter().find(|(name, _)| *name == kind) else {
        return unknown(kind);
    };
    match guarded(kind, || handler(state, exchange)) {
        Ok(Ok(answer)) => answer,
        Ok(Err(bad)) => {
            log(&bad.to_string());
            Answer::failed(&Failure::plain("bad-request", &bad.to_string()))
        }
        Err(failure) => Answer::failed(&failure),
    }
}

fn unknown(kind: &str) -> Answer {
    let text = format!("no `{kind}` is known on this channel");
    log(&text);
    if kind.ends_with("_request") {
        Answer::failed(&Failure::plain("unknown-request", &text))
    } else {
        Answer::none()
    }
}
