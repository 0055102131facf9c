//! `tussock check FILE...`

use std::path::PathBuf;
use std::process::ExitCode;

use clap::Args;
use serde_json::Value as Json;
use tussock_language::diagnostic::Severity;
use tussock_session::cancel::Cancel;
use tussock_session::files::Opened;
use tussock_session::session::Session;

use super::Outcome;
use crate::output::say;
use crate::problems;

/// Say what is wrong with documents.
#[derive(Args, Debug)]
pub(crate) struct Check {
    /// Scripts, notebooks and Markdown files
    #[arg(required = true)]
    files: Vec<PathBuf>,
    /// As JSON on standard output
    #[arg(long)]
    json: bool,
}

impl Check {
    pub(crate) fn run(self) -> Outcome {
        let mut failed = false;
        let mut list: Vec<Json> = Vec::new();
        for file in &self.files {
            let opened = Opened::open(file)?;
            let found = Session::new(opened.folder()).check(&opened.document, &Cancel::new());
            failed |= found.iter().any(|problem| problem.severity == Severity::Error);
            if self.json {
                list.extend(found.iter().map(|problem| problems::json(&opened, problem)));
            } else {
                problems::tell(&opened, found.iter());
            }
        }
        if self.json {
            say(&format!("{:#}\n", Json::Array(list)));
        }
        Ok(if failed { ExitCode::FAILURE } else { ExitCode::SUCCESS })
    }
}
