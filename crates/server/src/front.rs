//! What the protocol library leaves to do: notebooks in the capabilities, and the end.

use std::future::Future;
use std::pin::Pin;
use std::sync::Arc;
use std::sync::atomic::{AtomicBool, Ordering};
use std::task::{Context, Poll, Waker};

use serde_json::Value;
use tokio::io::{AsyncRead, ReadBuf};
use tokio::sync::oneshot;
use tower_lsp::jsonrpc::{Request, Response};
use tower_service::Service;

use crate::notebooks;

/// Stands before the library's service.
pub(crate) struct Front<S> {
    inner: S,
    shut_down: Arc<AtomicBool>,
    /// Taken when `exit` came.
    exit: Option<oneshot::Sender<()>>,
}

/// The client's messages up to `exit`, after which nothing is read: the library would wait for a
/// next message for as long as the client leaves the stream open.
pub(crate) struct Input<R> {
    inner: R,
    exit: oneshot::Receiver<()>,
    ended: bool,
}

/// Puts a front before a service and an end to its input. The flag says whether the client shut
/// the server down in good order.
pub(crate) fn build<S, R>(inner: S, input: R) -> (Front<S>, Input<R>, Arc<AtomicBool>) {
    let (sender, receiver) = oneshot::channel();
    let shut_down = Arc::new(AtomicBool::new(false));
    let front = Front { inner, shut_down: Arc::clone(&shut_down), exit: Some(sender) };
    (front, Input { inner: input, exit: receiver, ended: false }, shut_down)
}

type Reply<E> = Pin<Box<dyn Future<Output = Result<Option<Response>, E>> + Send>>;

impl<S> Service<Request> for Front<S>
where
    S: Service<Request, Response = Option<Response>>,
    S::Future: Send + 'static,
    S::Error: Send + 'static,
{
    type Response = Option<Response>;
    type Error = S::Error;
    type Future = Reply<S::Error>;

    fn poll_ready(&mut self, context: &mut Context<'_>) -> Poll<Result<(), S::Error>> {
        // After `exit` the inner service only gives errors, and its transport then never ends.
        if self.exit.is_none() { Poll::Ready(Ok(())) } else { self.inner.poll_ready(context) }
    }

    fn call(&mut self, request: Request) -> Self::Future {
        if self.exit.is_none() {
            return Box::pin(std::future::ready(Ok(None)));
        }
        match request.method() {
            "initialize" => {
                let reply = self.inner.call(request);
                Box::pin(async move { Ok(reply.await?.map(with_notebooks)) })
            }
            "shutdown" => {
                self.shut_down.store(true, Ordering::Release);
                let mut reply: Self::Future = Box::pin(self.inner.call(without_params(request)));
                // Had now, because an `exit` hard behind would cancel it.
                match reply.as_mut().poll(&mut Context::from_waker(Waker::noop())) {
                    Poll::Ready(reply) => Box::pin(std::future::ready(reply)),
                    Poll::Pending => reply,
                }
            }
            "exit" => {
                let reply = self.inner.call(request);
                if let Some(exit) = self.exit.take() {
                    // The input is gone only when it has ended by itself.
                    let _ended = exit.send(());
                }
                Box::pin(reply)
            }
            _ => Box::pin(self.inner.call(request)),
        }
    }
}

impl<R: AsyncRead + Unpin> AsyncRead for Input<R> {
    fn poll_read(
        mut self: Pin<&mut Self>,
        context: &mut Context<'_>,
        buffer: &mut ReadBuf<'_>,
    ) -> Poll<std::io::Result<()>> {
        if !self.ended && Pin::new(&mut self.exit).poll(context).is_ready() {
            self.ended = true;
        }
        if self.ended {
            return Poll::Ready(Ok(()));
        }
        Pin::new(&mut self.inner).poll_read(context, buffer)
    }
}

/// Adds the capability that the library's types lack to the answer to `initialize`.
fn with_notebooks(response: Response) -> Response {
    let (id, body) = response.into_parts();
    let body = body.map(|mut result| {
        if let Some(Value::Object(capabilities)) = result.get_mut("capabilities") {
            capabilities.insert("notebookDocumentSync".to_owned(), notebooks::capability());
        }
        result
    });
    Response::from_parts(id, body)
}

/// The same request without parameters: some clients send `null` with `shutdown`, which the
/// library takes for a mistake.
fn without_params(request: Request) -> Request {
    let (method, id, _) = request.into_parts();
    let builder = Request::build(method);
    match id {
        Some(id) => builder.id(id).finish(),
        None => builder.finish(),
    }
}
