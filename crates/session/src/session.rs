//! The one place where a question meets data.

use std::path::{Path, PathBuf};

use tussock_language::document::Document;
use tussock_language::diagnostic::Diagnostic;
use tussock_language::span::SourceId;

use crate::answer::Answers;
use crate::cancel::Cancel;
use crate::knowledge::Knowledge;

/// Answers documents that live in one folder. Shared by reference among threads; everything that it
/// keeps is a cache by content.
#[derive(Debug)]
pub struct Session {
    root: PathBuf,
}

impl Session {
    /// A session whose documents name their files relative to `root`.
    pub fn new(root: impl Into<PathBuf>) -> Self {
        Self { root: root.into() }
    }

    /// The folder that paths are relative to.
    #[must_use]
    pub fn root(&self) -> &Path {
        &self.root
    }

    /// Everything that is wrong with a document or worth knowing, in reading order: from its text,
    /// from its data, from its results.
    #[must_use]
    pub fn check(&self, _document: &Document, _cancel: &Cancel) -> Vec<Diagnostic> {
        Vec::new()
    }

    /// Answers every question of a document.
    #[must_use]
    pub fn answer(&self, _document: &Document, _cancel: &Cancel) -> Answers {
        Answers::default()
    }

    /// Answers the questions of the last source alone, each name standing for its newest definition
    /// among all sources: what a kernel does when a cell is run.
    #[must_use]
    pub fn answer_cell(&self, _document: &Document, _source: SourceId, _cancel: &Cancel) -> Answers {
        Answers::default()
    }

    /// What completion, hover and diagnostics need to know of the world outside the text.
    #[must_use]
    pub fn knowledge<'a>(&'a self, document: &Document) -> Knowledge<'a> {
        Knowledge::new(self, document)
    }
}
