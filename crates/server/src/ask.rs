//! What happens to every request: a snapshot in arrival order, work off the reader, one answer.

use std::sync::Arc;

use tower_lsp::jsonrpc::{Error, ErrorCode, Result};
use tower_lsp::lsp_types::request::Request;
use tower_lsp::lsp_types::{ServerCapabilities, Url};
use tussock_language::span::SourceId;
use tussock_session::cancel::Cancel;

use crate::backend::Backend;
use crate::documents::View;
use crate::fault;
use crate::snapshot::Snapshot;

/// A request about a text, answered from one snapshot. One file each, in `requests`.
pub trait Feature {
    /// The request of the protocol.
    type Request: Request;

    /// Tells the client that the request is understood.
    fn announce(capabilities: &mut ServerCapabilities);

    /// The text that the request is about.
    fn text(params: &Params<Self>) -> &Url;

    /// The answer.
    ///
    /// # Errors
    ///
    /// Where the client asks for what can't be done; the message is shown to the user.
    fn answer(question: &Question, params: Params<Self>) -> Result<Answer<Self>>;
}

/// The parameters of a feature's request.
pub type Params<F> = <<F as Feature>::Request as Request>::Params;

/// The answer to a feature's request.
pub type Answer<F> = <<F as Feature>::Request as Request>::Result;

/// What a request is about.
#[derive(Debug)]
pub struct Question {
    /// The document as it was when the request came.
    pub snapshot: Arc<Snapshot>,
    /// The text in it that was named.
    pub source: SourceId,
    /// Goes up when the client no longer wants the answer.
    pub cancel: Cancel,
}

impl Backend {
    /// Answers a request: null for a text that is not open, an error where the text has changed
    /// meanwhile, since the answer's positions would be wrong.
    ///
    /// # Errors
    ///
    /// `ContentModified`, what the feature refuses, or an internal error after a panic.
    pub async fn ask<F: Feature>(&self, params: Params<F>) -> Result<Answer<F>>
    where
        Params<F>: Send + 'static,
        Answer<F>: Default + Send + 'static,
    {
        // In the queue before the first wait, hence behind every edit that came earlier.
        let view = self.documents().ask(F::text(&params));
        let Ok(View { snapshot, source }) = view.await else {
            return Ok(Answer::<F>::default());
        };
        let raised_on_drop = RaisedOnDrop(Cancel::new());
        let cancel = raised_on_drop.0.clone();
        let question = Question { snapshot: Arc::clone(&snapshot), source, cancel };

        let turn = self.turn().await;
        let work = tokio::task::spawn_blocking(move || {
            let _until_done = turn;
            if question.cancel.is_cancelled() || question.snapshot.is_superseded() {
                return Err(content_modified());
            }
            F::answer(&question, params)
        });
        let answer = work.await.unwrap_or_else(|failure| Err(self.failed::<F>(source, failure)));
        if snapshot.is_superseded() { Err(content_modified()) } else { answer }
    }

    /// Tells the log of a panic, and the client in the answer.
    fn failed<F: Feature>(&self, source: SourceId, failure: tokio::task::JoinError) -> Error {
        let method = F::Request::METHOD;
        let what = match failure.try_into_panic() {
            Ok(panic) => format!("{method} failed: {}", fault::words(panic.as_ref())),
            Err(_) => format!("{method} was stopped"),
        };
        self.outbox().report_fault(&format!("{what} (text {})", source.0 + 1));
        let mut error = Error::internal_error();
        error.message = what.into();
        error
    }
}

/// A cancelled request is a dropped future: dropping this raises the flag that its work looks at.
struct RaisedOnDrop(Cancel);

impl Drop for RaisedOnDrop {
    fn drop(&mut self) {
        self.0.cancel();
    }
}

fn content_modified() -> Error {
    let mut error = Error::new(ErrorCode::ContentModified);
    error.message = "the text has changed since".into();
    error
}
