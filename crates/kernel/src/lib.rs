//! The Jupyter kernel. Only this crate knows the Jupyter protocol and its message library.
//!
//! Five sockets, one owning thread each. Requests of the shell channel wait in a queue of the
//! thread that owns its socket and are answered one by one on a working thread; requests of the
//! control channel are answered at once; everything that is published passes through one ordered
//! queue.

mod barrier;
mod completeness;
pub mod connection;
pub mod error;
pub mod evaluator;
mod failure;
mod history;
pub mod install;
mod log;
mod message;
mod notebook;
mod outputs;
mod parent;
mod position;
mod requests;
mod serve;
mod signature;
mod sockets;
mod worker;

use std::path::Path;

use tussock_session::notebook::Notebook;

use crate::connection::Connection;
pub use crate::error::KernelError;
pub use crate::serve::serve;

/// Serves a notebook in the current folder until a client asks for the end.
///
/// # Errors
/// When the connection file can't be used, an address can't be taken, or the connection fails.
pub fn run(connection_file: &Path) -> Result<(), KernelError> {
    let connection = Connection::read(connection_file)?;
    let folder = std::env::current_dir().map_err(KernelError::Folder)?;
    serve(&connection, Notebook::new(folder))
}
