//! `tussock kernel CONNECTION_FILE`

use std::path::PathBuf;
use std::process::ExitCode;

use clap::Args;

use super::Outcome;

/// Serve a notebook.
#[derive(Args, Debug)]
pub(crate) struct Kernel {
    /// The connection file that Jupyter wrote
    connection_file: PathBuf,
}

impl Kernel {
    pub(crate) fn run(self) -> Outcome {
        tussock_kernel::run(&self.connection_file)?;
        Ok(ExitCode::SUCCESS)
    }
}
