//! `tussock install`

use std::path::PathBuf;
use std::process::ExitCode;

use clap::Args;
use tussock_kernel::install::{InstallOptions, install};

use super::Outcome;
use crate::output::say;

/// Make Tussock known to Jupyter, for the user or inside a prefix.
#[derive(Args, Debug)]
pub(crate) struct Install {
    /// Install below this prefix, such as a Python virtual environment
    #[arg(long)]
    prefix: Option<PathBuf>,
}

impl Install {
    pub(crate) fn run(self) -> Outcome {
        let program = std::env::current_exe()?;
        let folder = install(InstallOptions { prefix: self.prefix, program })?;
        say(&format!("Jupyter now knows Tussock: {}\n", folder.display()));
        Ok(ExitCode::SUCCESS)
    }
}
