//! `tussock demo`

use std::fs;
use std::path::PathBuf;
use std::process::ExitCode;

use clap::Args;
use tussock_session::cancel::Cancel;
use tussock_session::files::Opened;
use tussock_session::session::Session;

use super::Outcome;
use super::run::{Form, rendered};
use crate::output::say;
use crate::problems;

/// The notebook that the demonstration answers; its data is built in.
const NOTEBOOK: &str = include_str!("../../../../demo-notebooks/rosters.ipynb");

/// Answer the built-in demonstration and write it as a web page.
#[derive(Args, Debug)]
pub(crate) struct Demo {
    /// Where to write the page
    #[arg(long, default_value = "tussock-demo.html")]
    out: PathBuf,
}

impl Demo {
    pub(crate) fn run(self) -> Outcome {
        let opened = Opened::notebook("Rosters on the Skerry Ferries", NOTEBOOK)?;
        let session = Session::new(".");
        let answers = session.answer(&opened.document, &Cancel::new());
        problems::tell(&opened, answers.problems());
        fs::write(&self.out, rendered(&session, &opened, &answers, Form::Html))
            .map_err(|error| format!("{}: {error}", self.out.display()))?;
        let path = fs::canonicalize(&self.out)?;
        let questions = opened.document.sources.len();
        say(&format!(
            "{} answers to {questions} cells, written to {}\nOpen that file in a browser.\n",
            answers.list.len(),
            path.display()
        ));
        Ok(if answers.failed() { ExitCode::FAILURE } else { ExitCode::SUCCESS })
    }
}
