//! `tussock format FILE...`

use std::fs;
use std::path::{Path, PathBuf};
use std::process::ExitCode;

use clap::Args;
use tussock_language::format;
use tussock_session::files;

use super::Outcome;
use crate::output::say;

/// Lay out documents as they are meant to look.
#[derive(Args, Debug)]
pub(crate) struct Format {
    /// Scripts, notebooks and Markdown files
    #[arg(required = true)]
    files: Vec<PathBuf>,
    /// Change nothing; fail where a file would change
    #[arg(long)]
    check: bool,
}

impl Format {
    pub(crate) fn run(self) -> Outcome {
        let mut changed = false;
        for file in &self.files {
            let before =
                fs::read_to_string(file).map_err(|error| format!("{}: {error}", file.display()))?;
            let after = formatted(file, &before)?;
            if before == after {
                continue;
            }
            changed = true;
            if self.check {
                say(&format!("{} would change\n", file.display()));
            } else {
                fs::write(file, after).map_err(|error| format!("{}: {error}", file.display()))?;
                say(&format!("{} laid out\n", file.display()));
            }
        }
        Ok(if self.check && changed { ExitCode::FAILURE } else { ExitCode::SUCCESS })
    }
}

fn formatted(file: &Path, text: &str) -> Result<String, Box<dyn std::error::Error>> {
    let ending = file.extension().and_then(|ending| ending.to_str());
    match ending {
        Some("tus") => Ok(format::format(text)),
        Some("md" | "markdown") => Ok(format::format_markdown(text)),
        Some("ipynb") => Ok(files::format_notebook(text)
            .map_err(|reason| format!("{}: not a notebook: {reason}", file.display()))?),
        _ => Err(format!("{}: the name must end in .tus, .md or .ipynb", file.display()).into()),
    }
}
