//! Documents in files: scripts, Markdown, notebooks.

use std::fs;
use std::io;
use std::path::{Path, PathBuf};

use serde_json::Value as Json;
use thiserror::Error;
use tussock_language::document::{Document, Form, Source};
use tussock_language::present::Line;
use tussock_language::span::Location;

/// Why a file is no document.
#[derive(Debug, Error)]
pub enum OpenError {
    /// It could not be read.
    #[error("{path}: {error}")]
    Io {
        /// The file.
        path: PathBuf,
        /// Why.
        error: io::Error,
    },
    /// Its name tells nothing that can be understood.
    #[error("{path}: the name must end in .tus, .md or .ipynb")]
    Extension {
        /// The file.
        path: PathBuf,
    },
    /// A notebook that is none.
    #[error("{path}: not a notebook: {reason}")]
    Notebook {
        /// The file.
        path: PathBuf,
        /// Why not.
        reason: String,
    },
}

/// A document and how its places are named to a reader.
#[derive(Clone, Debug, PartialEq)]
pub struct Opened {
    /// The file.
    pub path: PathBuf,
    /// What it holds.
    pub document: Document,
}

impl Opened {
    /// Opens a file by the ending of its name.
    ///
    /// # Errors
    /// A file that can't be read, has another ending, or is a notebook in name only.
    pub fn open(path: &Path) -> Result<Self, OpenError> {
        let ending = path.extension().and_then(|ending| ending.to_str()).map(str::to_lowercase);
        let form = match ending.as_deref() {
            Some("tus") => Form::Script,
            Some("md" | "markdown") => Form::Markdown,
            Some("ipynb") => Form::Notebook,
            _ => return Err(OpenError::Extension { path: path.to_owned() }),
        };
        let text = fs::read_to_string(path)
            .map_err(|error| OpenError::Io { path: path.to_owned(), error })?;
        let document = match form {
            Form::Script => Document::script(text),
            Form::Markdown => Document::markdown(&text),
            Form::Notebook => notebook(&text)
                .map_err(|reason| OpenError::Notebook { path: path.to_owned(), reason })?,
        };
        Ok(Self { path: path.to_owned(), document })
    }

    /// A notebook that is no file of its own; `title` stands for its name.
    ///
    /// # Errors
    /// A text that is no notebook.
    pub fn notebook(title: &str, text: &str) -> Result<Self, OpenError> {
        let path = PathBuf::from(title);
        match notebook(text) {
            Ok(document) => Ok(Self { path, document }),
            Err(reason) => Err(OpenError::Notebook { path, reason }),
        }
    }

    /// The cell of a place, counted from 1, in a notebook.
    #[must_use]
    pub fn cell(&self, location: Location) -> Option<usize> {
        (self.document.form == Form::Notebook).then_some(location.source.0 + 1)
    }

    /// The folder that the document's own paths are relative to.
    #[must_use]
    pub fn folder(&self) -> PathBuf {
        let parent = self.path.parent().unwrap_or(Path::new(""));
        if parent.as_os_str().is_empty() { PathBuf::from(".") } else { parent.to_owned() }
    }

    /// A place as a reader finds it: `crew.tus:3:9`, or `demo.ipynb, cell 2:3:9`.
    #[must_use]
    pub fn place(&self, location: Location) -> String {
        let text = self.document.text(location.source);
        let line = Line::around(text, location.span.start);
        let before = text.get(line.start..location.span.start).unwrap_or_default();
        let column = before.chars().count() + 1;
        let file = self.path.display();
        match self.document.form {
            Form::Script | Form::Markdown => format!("{file}:{}:{column}", line.number),
            Form::Notebook => {
                let cell = location.source.0 + 1;
                format!("{file}, cell {cell}, line {}, column {column}", line.number)
            }
        }
    }
}

/// The cells of a notebook (nbformat 4): code is code, Markdown is prose, raw cells stay out.
fn notebook(text: &str) -> Result<Document, String> {
    let json: Json = serde_json::from_str(text).map_err(|error| error.to_string())?;
    let cells = json.get("cells").and_then(Json::as_array).ok_or("it has no list of cells")?;
    let mut sources = Vec::new();
    for cell in cells {
        let text = cell.get("source").map(joined).unwrap_or_default();
        match cell.get("cell_type").and_then(Json::as_str) {
            Some("code") => sources.push(Source::code(text)),
            Some("markdown") => sources.push(Source::prose(text)),
            // A place in the list is kept, so that cell numbers are those that a reader counts.
            _ => sources.push(Source { text: String::new(), regions: Vec::new() }),
        }
    }
    Ok(Document { form: Form::Notebook, sources })
}

/// A notebook's text with every code cell laid out; everything else stays as it is.
///
/// # Errors
/// A text that is no notebook, and why.
pub fn format_notebook(text: &str) -> Result<String, String> {
    let mut json: Json = serde_json::from_str(text).map_err(|error| error.to_string())?;
    let cells = json.get_mut("cells").and_then(Json::as_array_mut);
    let mut changed = false;
    for cell in cells.ok_or("it has no list of cells")? {
        if cell.get("cell_type").and_then(Json::as_str) != Some("code") {
            continue;
        }
        let before = cell.get("source").map(joined).unwrap_or_default();
        // A cell ends without a line break, a file with one.
        let after = tussock_language::format::format(&before).trim_end_matches('\n').to_owned();
        if after != before.trim_end_matches('\n') {
            let lines: Vec<Json> = after.split_inclusive('\n').map(Json::from).collect();
            if let Some(source) = cell.get_mut("source") {
                *source = Json::Array(lines);
                changed = true;
            }
        }
    }
    if !changed {
        return Ok(text.to_owned());
    }
    let mut out = Vec::new();
    let formatter = serde_json::ser::PrettyFormatter::with_indent(b" ");
    let mut serializer = serde_json::Serializer::with_formatter(&mut out, formatter);
    serde::Serialize::serialize(&json, &mut serializer).map_err(|error| error.to_string())?;
    out.push(b'\n');
    String::from_utf8(out).map_err(|error| error.to_string())
}

/// A cell's text stands as one string or as a list of lines.
fn joined(source: &Json) -> String {
    match source {
        Json::String(text) => text.clone(),
        Json::Array(lines) => lines.iter().filter_map(Json::as_str).collect(),
        Json::Null | Json::Bool(_) | Json::Number(_) | Json::Object(_) => String::new(),
    }
}
