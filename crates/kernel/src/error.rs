//! Why a kernel can't start or can't go on.

use std::path::PathBuf;

use crate::connection::Channel;

/// Why a kernel can't start or can't go on. What is wrong in a cell is never among these: it is an
/// answer to the cell.
#[derive(Debug, thiserror::Error)]
pub enum KernelError {
    /// The connection file can't be read.
    #[error("can't read the connection file {}: {source}", path.display())]
    Unreadable {
        /// The file.
        path: PathBuf,
        /// Why.
        source: std::io::Error,
    },
    /// The connection file isn't one.
    #[error("the connection file is not what Jupyter writes: {0}")]
    Malformed(#[from] serde_json::Error),
    /// The connection file asks for what this kernel doesn't do.
    #[error("the connection file asks for {asked}, which this kernel does not serve: {instead}")]
    Unsupported {
        /// What it asks for.
        asked: String,
        /// What would do.
        instead: &'static str,
    },
    /// An address can't be taken.
    #[error("can't listen on {endpoint} ({channel}): {source}")]
    Bind {
        /// The channel.
        channel: Channel,
        /// The address.
        endpoint: String,
        /// Why.
        source: zmq::Error,
    },
    /// A socket that worked fails.
    #[error("the connection to Jupyter failed: {0}")]
    Socket(#[from] zmq::Error),
    /// The system gives no thread.
    #[error("can't start a thread: {0}")]
    Thread(std::io::Error),
    /// The folder in which the kernel was started is gone.
    #[error("can't tell in which folder the kernel runs: {0}")]
    Folder(std::io::Error),
}
