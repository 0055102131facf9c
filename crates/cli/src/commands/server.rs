//! `tussock server`

use clap::Args;

use super::Outcome;

/// Serve an editor.
#[derive(Args, Debug)]
pub(crate) struct Server {
    /// Accepted because many editors pass it; standard input and output are the only transport
    #[arg(long, hide = true)]
    stdio: bool,
}

impl Server {
    pub(crate) fn run(self) -> Outcome {
        Ok(tussock_server::run()?)
    }
}
