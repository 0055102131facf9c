//! The language server: the language's features over the Language Server Protocol.
//!
//! Only this crate knows the protocol. It holds the open texts, turns positions into bytes and
//! back, and asks `tussock-language` and `tussock-session` for everything else.
//!
//! | file | what it does |
//! | --- | --- |
//! | `backend` | the messages of the protocol, and where each goes |
//! | `documents` | the one owner of the open documents |
//! | `texts`, `notebooks` | an open text; cells and their order |
//! | `snapshot` | one version of a document, on which all work is done |
//! | `ask`, `requests/` | what happens to every request; one file for each kind |
//! | `diagnostics`, `outbox` | when documents are checked, what the client is told |
//! | `convert` | positions and bytes |
//! | `front` | what the protocol library leaves to do |

mod ask;
mod backend;
mod client;
mod convert;
mod diagnostics;
mod documents;
mod fault;
mod front;
mod notebooks;
mod outbox;
mod requests;
mod sessions;
mod snapshot;
mod texts;
mod workspace_edit;

use std::io;
use std::process::ExitCode;
use std::sync::atomic::Ordering;
use std::time::Duration;

use tokio::io::{AsyncRead, AsyncWrite};
use tower_lsp::{LspService, LspServiceBuilder, Server};

pub use ask::{Answer, Feature, Params, Question};
pub use backend::Backend;
pub use convert::{Encoding, Lines, apply};
pub use snapshot::Snapshot;

/// How long a document rests before it is checked: long enough that a word is not checked letter
/// by letter, short enough to seem at once.
const PAUSE: Duration = Duration::from_millis(200);

/// Serves one client over standard input and output until it says `exit` or goes away. The exit
/// code is a failure where the client left without shutting the server down, as the protocol asks.
///
/// # Errors
///
/// Where the threads can't be started.
pub fn run() -> io::Result<ExitCode> {
    let runtime =
        tokio::runtime::Builder::new_multi_thread().worker_threads(2).enable_all().build()?;
    let orderly = runtime.block_on(async {
        let (service, socket) = build(PAUSE).finish();
        serve(tokio::io::stdin(), tokio::io::stdout(), service, socket).await
    });
    // A thread may still wait for input that never comes.
    runtime.shutdown_background();
    Ok(if orderly { ExitCode::SUCCESS } else { ExitCode::FAILURE })
}

/// The service, to which a test can add methods of its own. A document is checked `pause` after
/// its last change. Must be called within a runtime.
pub fn build(pause: Duration) -> LspServiceBuilder<Backend> {
    LspService::build(|client| Backend::new(client, pause))
        .custom_method("notebookDocument/didOpen", Backend::notebook_did_open)
        .custom_method("notebookDocument/didChange", Backend::notebook_did_change)
        .custom_method("notebookDocument/didSave", Backend::notebook_did_save)
        .custom_method("notebookDocument/didClose", Backend::notebook_did_close)
}

/// Serves a client over any streams. Gives whether the client shut the server down before it left.
pub async fn serve<I, O>(
    input: I,
    output: O,
    service: LspService<Backend>,
    socket: tower_lsp::ClientSocket,
) -> bool
where
    I: AsyncRead + Unpin,
    O: AsyncWrite,
{
    let (front, input, shut_down) = front::build(service, input);
    // Every message is started as soon as it is read: handlers wait for workers, not for each
    // other, so a cancellation or an edit is never stuck behind slow requests.
    Server::new(input, output, socket).concurrency_level(usize::MAX).serve(front).await;
    shut_down.load(Ordering::Acquire)
}
