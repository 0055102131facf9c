//! The facts that the language asks for, from the real files and the real answers.

use tussock_language::document::Document;
use tussock_language::facts::{ColumnFact, Facts, KeyFact, Page};

use crate::session::Session;

/// Facts about one version of one document.
#[derive(Debug)]
pub struct Knowledge<'a> {
    _session: &'a Session,
}

impl<'a> Knowledge<'a> {
    pub(crate) fn new(session: &'a Session, _document: &Document) -> Self {
        Self { _session: session }
    }
}

impl Facts for Knowledge<'_> {
    fn views(&self) -> &[Page] {
        &[]
    }
    fn functions(&self) -> &[Page] {
        &[]
    }
    fn samples(&self) -> &[Page] {
        &[]
    }
    fn columns(&self, _: &str) -> Option<Vec<ColumnFact>> {
        None
    }
    fn levels(&self, _: &str, _: &str) -> Option<Vec<String>> {
        None
    }
    fn keys(&self, _: &[String]) -> Vec<KeyFact> {
        Vec::new()
    }
    fn value(&self, _: &[String]) -> Option<String> {
        None
    }
    fn coefficients(&self, _: &str, _: &str) -> Option<String> {
        None
    }
    fn files(&self, _: &str) -> Vec<String> {
        Vec::new()
    }
}
