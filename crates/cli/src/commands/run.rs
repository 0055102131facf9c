//! `tussock run FILE --to text|html|md|json --out FILE`

use std::fs;
use std::path::PathBuf;
use std::process::ExitCode;

use clap::{Args, ValueEnum};
use serde_json::{Map, Value as Json, json};
use tussock_report::page::Page;
use tussock_report::render;
use tussock_session::answer::Answers;
use tussock_session::cancel::Cancel;
use tussock_session::files::Opened;
use tussock_session::page::page;
use tussock_session::session::Session;

use super::Outcome;
use crate::output::say;
use crate::problems;

/// Answer a document and write its answers.
#[derive(Args, Debug)]
pub(crate) struct Run {
    /// A script (.tus), a notebook (.ipynb) or a Markdown file (.md)
    file: PathBuf,
    /// The form of the answers
    #[arg(long, value_enum, default_value_t = Form::Text)]
    to: Form,
    /// Write to this file instead of standard output
    #[arg(long)]
    out: Option<PathBuf>,
}

/// The forms that answers can have.
#[derive(Clone, Copy, Debug, ValueEnum)]
pub(crate) enum Form {
    /// Plain text
    Text,
    /// A web page that needs nothing beside it
    Html,
    /// Markdown
    Md,
    /// Every table and every live value at full precision
    Json,
}

impl Run {
    pub(crate) fn run(self) -> Outcome {
        let opened = Opened::open(&self.file)?;
        let session = Session::new(opened.folder());
        let answers = session.answer(&opened.document, &Cancel::new());
        problems::tell(&opened, answers.problems());
        let text = rendered(&session, &opened, &answers, self.to);
        match &self.out {
            Some(path) => {
                fs::write(path, text).map_err(|error| format!("{}: {error}", path.display()))?
            }
            None => say(&text),
        }
        Ok(if answers.failed() { ExitCode::FAILURE } else { ExitCode::SUCCESS })
    }
}

/// The answers of a document in one form.
pub(crate) fn rendered(
    session: &Session,
    opened: &Opened,
    answers: &Answers,
    form: Form,
) -> String {
    let page = page(opened, answers);
    match form {
        Form::Text => (render::text::FORMAT.page)(&page),
        Form::Html => (render::html::FORMAT.page)(&page),
        Form::Md => (render::markdown::FORMAT.page)(&page),
        Form::Json => json(session, opened, answers, &page),
    }
}

fn json(session: &Session, opened: &Opened, answers: &Answers, page: &Page) -> String {
    let values: Map<String, Json> = session
        .values(&opened.document)
        .into_iter()
        .map(|(path, value)| (path, json!(value.number)))
        .collect();
    let problems: Vec<Json> =
        answers.problems().map(|problem| problems::json(opened, problem)).collect();
    let whole = json!({
        "document": render::json::page_value(page),
        "problems": problems,
        "values": values,
    });
    format!("{whole:#}\n")
}
