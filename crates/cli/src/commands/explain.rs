//! `tussock explain NAME`

use std::process::ExitCode;

use clap::Args;
use tussock_language::features::explain;
use tussock_session::session::Session;

use super::Outcome;
use crate::output::{complain, say};

/// Explain a word of the language, a statistic or a rule.
#[derive(Args, Debug)]
pub(crate) struct Explain {
    /// The word; without one, all words that can be explained are listed
    name: Option<String>,
}

impl Explain {
    pub(crate) fn run(self) -> Outcome {
        let session = Session::new(".");
        let document = tussock_language::document::Document::script("");
        let facts = session.knowledge(&document);
        let Some(name) = self.name else {
            for entry in explain::index(&facts) {
                say(&format!("{:<26} {}\n", entry.page.name, entry.page.summary));
            }
            return Ok(ExitCode::SUCCESS);
        };
        if let Some(page) = explain::page(&name, &facts) {
            say(page.trim_end());
            say("\n");
            return Ok(ExitCode::SUCCESS);
        }
        let near = explain::nearest(&name, &facts);
        let hint = match near.as_slice() {
            [] => "`tussock explain` lists the words that have one".to_owned(),
            near => format!("did you mean {}?", near.join(" or ")),
        };
        complain(&format!("there is no page for `{name}`: {hint}"));
        Ok(ExitCode::FAILURE)
    }
}
