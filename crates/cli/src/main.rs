//! The `tussock` program: one binary for notebooks, editors, documents and the terminal.

mod commands;
mod output;
mod problems;

use std::process::ExitCode;

use clap::Parser;

use commands::Command;

/// Compare groups on several outcomes at once.
#[derive(Debug, Parser)]
#[command(name = "tussock", version, max_term_width = 88)]
struct Arguments {
    #[command(subcommand)]
    command: Command,
}

fn main() -> ExitCode {
    let arguments = Arguments::parse();
    match arguments.command.run() {
        Ok(code) => code,
        Err(failure) => {
            output::complain(&failure.to_string());
            ExitCode::from(2)
        }
    }
}
