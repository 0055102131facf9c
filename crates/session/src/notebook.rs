//! A notebook being run cell by cell: which definitions stand, which cell made them.

use std::path::PathBuf;

use tussock_language::document::{Document, Form, Source};
use tussock_language::span::SourceId;

use crate::answer::Answers;
use crate::cancel::Cancel;
use crate::knowledge::Knowledge;
use crate::session::Session;

/// The cells that were run, in the order of running. A cell that is run again replaces what it
/// defined; a name always stands for its newest definition.
#[derive(Debug)]
pub struct Notebook {
    session: Session,
    cells: Vec<Cell>,
}

#[derive(Debug)]
struct Cell {
    id: Option<String>,
    source: Source,
}

/// What running a cell gave, and the document that its locations refer to.
#[derive(Debug)]
pub struct Reply {
    /// The answers and problems of the cell.
    pub answers: Answers,
    /// The document in which the cell is the source `source`.
    pub document: Document,
    /// The cell.
    pub source: SourceId,
}

impl Notebook {
    /// No cells yet; paths are relative to `root`.
    pub fn new(root: impl Into<PathBuf>) -> Self {
        Self { session: Session::new(root), cells: Vec::new() }
    }

    /// Runs a cell. `id` is the front end's name for the cell, where it tells one.
    pub fn run(&mut self, id: Option<&str>, code: &str, cancel: &Cancel) -> Reply {
        if id.is_some() {
            self.cells.retain(|cell| cell.id.as_deref() != id);
        }
        self.cells.push(Cell { id: id.map(str::to_owned), source: Source::code(code) });
        let document = self.document();
        let source = SourceId(document.sources.len().saturating_sub(1));
        let answers = self.session.answer_cell(&document, source, cancel);
        Reply { answers, document, source }
    }

    /// The document with a cell as it is being typed, for completion and hover: the cells that were
    /// run, and `code` as the last source.
    #[must_use]
    pub fn with_cell(&self, code: &str) -> (Document, SourceId) {
        let mut document = self.document();
        document.sources.push(Source::code(code));
        let source = SourceId(document.sources.len().saturating_sub(1));
        (document, source)
    }

    /// What completion and hover need to know.
    #[must_use]
    pub fn knowledge<'a>(&'a self, document: &'a Document) -> Knowledge<'a> {
        self.session.knowledge(document)
    }

    fn document(&self) -> Document {
        let sources = self.cells.iter().map(|cell| cell.source.clone()).collect();
        Document { form: Form::Notebook, sources }
    }
}
