//! Notebooks: the order of the cells, and the part of the protocol that keeps it in step.
//!
//! The protocol library has no types for `notebookDocument/*`, so the messages are spelled out
//! here: only the fields that are read, so that a client may send what else it likes.

use std::collections::BTreeMap;

use serde::Deserialize;
use serde_json::{Value, json};
use tower_lsp::lsp_types::{
    TextDocumentContentChangeEvent, TextDocumentIdentifier, TextDocumentItem, Url,
    VersionedTextDocumentIdentifier,
};

use crate::convert::Encoding;
use crate::texts::Text;

/// What the server asks to be told of: code cells in its own language, and the prose between them.
pub(crate) fn capability() -> Value {
    json!({
        "notebookSelector": [{
            "notebook": "*",
            "cells": [{ "language": "tussock" }, { "language": "markdown" }],
        }],
        "save": true,
    })
}

/// `notebookDocument/didOpen`.
#[derive(Debug, Deserialize)]
#[serde(rename_all = "camelCase")]
pub(crate) struct DidOpen {
    notebook_document: Opened,
    cell_text_documents: Vec<TextDocumentItem>,
}

#[derive(Debug, Deserialize)]
struct Opened {
    uri: Url,
    cells: Vec<Cell>,
}

/// `notebookDocument/didChange`.
#[derive(Debug, Deserialize)]
#[serde(rename_all = "camelCase")]
pub(crate) struct DidChange {
    notebook_document: Identifier,
    change: Change,
}

/// `notebookDocument/didSave`.
#[derive(Debug, Deserialize)]
#[serde(rename_all = "camelCase")]
pub(crate) struct DidSave {
    #[expect(dead_code, reason = "read so that a malformed message is noticed")]
    notebook_document: Identifier,
}

/// `notebookDocument/didClose`.
#[derive(Debug, Deserialize)]
#[serde(rename_all = "camelCase")]
pub(crate) struct DidClose {
    notebook_document: Identifier,
}

#[derive(Debug, Deserialize)]
struct Identifier {
    uri: Url,
}

#[derive(Debug, Default, Deserialize)]
struct Change {
    cells: Option<CellChanges>,
}

#[derive(Debug, Default, Deserialize)]
#[serde(rename_all = "camelCase")]
struct CellChanges {
    structure: Option<Structure>,
    #[serde(default)]
    text_content: Vec<TextContent>,
}

/// Cells put in, taken out or moved. A cell that is moved is taken out and put in again, and its
/// text may or may not be closed and opened on the way.
#[derive(Debug, Deserialize)]
#[serde(rename_all = "camelCase")]
struct Structure {
    array: Splice,
    #[serde(default)]
    did_open: Vec<TextDocumentItem>,
    #[serde(default)]
    did_close: Vec<TextDocumentIdentifier>,
}

#[derive(Debug, Deserialize)]
#[serde(rename_all = "camelCase")]
struct Splice {
    start: usize,
    delete_count: usize,
    #[serde(default)]
    cells: Vec<Cell>,
}

#[derive(Clone, Debug, Deserialize)]
struct Cell {
    document: Url,
}

#[derive(Debug, Deserialize)]
struct TextContent {
    document: VersionedTextDocumentIdentifier,
    changes: Vec<TextDocumentContentChangeEvent>,
}

impl DidChange {
    /// The notebook that changed.
    pub(crate) fn uri(&self) -> &Url {
        &self.notebook_document.uri
    }
}

impl DidClose {
    /// The notebook that was closed.
    pub(crate) fn uri(&self) -> &Url {
        &self.notebook_document.uri
    }
}

/// An open notebook.
#[derive(Debug)]
pub(crate) struct Notebook {
    order: Vec<Url>,
    texts: BTreeMap<Url, Text>,
}

impl Notebook {
    /// A notebook as it was opened, and its name.
    pub(crate) fn opened(message: DidOpen) -> (Url, Self) {
        let mut notebook = Self { order: Vec::new(), texts: BTreeMap::new() };
        notebook
            .order
            .extend(message.notebook_document.cells.into_iter().map(|cell| cell.document));
        notebook.open(message.cell_text_documents);
        (message.notebook_document.uri, notebook)
    }

    /// Applies a change: first the order, then the texts that come and go, then their edits.
    pub(crate) fn change(&mut self, message: DidChange, encoding: Encoding) {
        let cells = message.change.cells.unwrap_or_default();
        if let Some(structure) = cells.structure {
            self.splice(structure.array);
            // Closed before opened: a cell that is moved may be named under both.
            for closed in structure.did_close {
                if !self.order.contains(&closed.uri) {
                    self.texts.remove(&closed.uri);
                }
            }
            self.open(structure.did_open);
        }
        for content in cells.text_content {
            self.edit(&content.document.uri, content.document.version, content.changes, encoding);
        }
    }

    /// Edits the text of one cell; a cell that is not known is passed over.
    pub(crate) fn edit(
        &mut self,
        cell: &Url,
        version: i32,
        changes: Vec<TextDocumentContentChangeEvent>,
        encoding: Encoding,
    ) {
        if let Some(text) = self.texts.get_mut(cell) {
            text.edit(version, changes, encoding);
        }
    }

    /// Whether a text belongs to the notebook.
    pub(crate) fn holds(&self, cell: &Url) -> bool {
        self.texts.contains_key(cell)
    }

    /// The cells and their texts in reading order. A cell whose text was never opened is left out:
    /// it is in a language that the client was not asked for.
    pub(crate) fn cells(&self) -> impl Iterator<Item = (&Url, &Text)> {
        self.order.iter().filter_map(|uri| self.texts.get_key_value(uri))
    }

    /// Whether a text is among the cells in their order.
    pub(crate) fn shows(&self, cell: &Url) -> bool {
        self.cells().any(|(uri, _)| uri == cell)
    }

    fn open(&mut self, items: Vec<TextDocumentItem>) {
        for item in items {
            self.texts.insert(item.uri.clone(), Text::opened(item));
        }
    }

    fn splice(&mut self, splice: Splice) {
        let start = splice.start.min(self.order.len());
        let end = start.saturating_add(splice.delete_count).min(self.order.len());
        let added = splice.cells.into_iter().map(|cell| cell.document);
        self.order.splice(start..end, added);
    }
}
