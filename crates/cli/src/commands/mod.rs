//! The commands, one file each.

mod check;
mod demo;
mod explain;
mod format;
mod install;
mod kernel;
mod run;
mod server;

use std::error::Error;
use std::process::ExitCode;

use clap::Subcommand;

/// What a command gives: an exit code, or a failure to tell.
pub(crate) type Outcome = Result<ExitCode, Box<dyn Error>>;

/// What can be asked of the program.
#[derive(Debug, Subcommand)]
pub(crate) enum Command {
    /// Answer a document: a script, a notebook or a Markdown file
    Run(run::Run),
    /// Say what is wrong with documents, without answering them
    Check(check::Check),
    /// Lay out documents as they are meant to look
    Format(format::Format),
    /// Explain a word of the language, a statistic or a rule
    Explain(explain::Explain),
    /// Answer the built-in demonstration and write it as a web page
    Demo(demo::Demo),
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
            Self::Run(command) => command.run(),
            Self::Check(command) => command.run(),
            Self::Format(command) => command.run(),
            Self::Explain(command) => command.run(),
            Self::Demo(command) => command.run(),
            Self::Install(command) => command.run(),
            Self::Kernel(command) => command.run(),
            Self::Server(command) => command.run(),
        }
    }
}
