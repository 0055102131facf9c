//! The commands, one file each.

mod kernel;
mod install;
mod server;

use std::error::Error;
use std::process::ExitCode;

use clap::Subcommand;

/// What a command gives: an exit code, or a failure to tell.
pub(crate) type Outcome = Result<ExitCode, Box<dyn Error>>;

/// What can be asked of the program.
#[derive(Debug, Subcommand)]
pub(crate) enum Command {
    /// Make Tussock known to Jupyter
    Install(install::Install),
    /// Serve a notebook (Jupyter starts this)
    Kernel(kernel::Kernel),
    /// Serve an editor over standard input and output (editors start this)
    Server(server::Server),
}

impl Command {
    pub(crate) fn run(self) -> Outcome {
        match self {
            Self::Install(command) => command.run(),
            Self::Kernel(command) => command.run(),
            Self::Server(command) => command.run(),
        }
    }
}
