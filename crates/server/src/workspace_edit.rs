//! Edits of the language as a client applies them.

use std::collections::BTreeMap;

use tower_lsp::lsp_types::{
    DocumentChanges, OneOf, OptionalVersionedTextDocumentIdentifier, TextDocumentEdit, TextEdit,
    WorkspaceEdit,
};
use tussock_language::diagnostic::Edit;
use tussock_language::span::SourceId;

use crate::snapshot::Snapshot;

/// The edits, gathered by text; with the version that they are for where the client heeds it.
pub(crate) fn workspace_edit(snapshot: &Snapshot, edits: &[Edit]) -> WorkspaceEdit {
    let mut by_source: BTreeMap<SourceId, Vec<TextEdit>> = BTreeMap::new();
    for Edit { location, text } in edits {
        let range = snapshot.range(location.source, location.span);
        by_source.entry(location.source).or_default().push(TextEdit::new(range, text.clone()));
    }
    let by_text = by_source
        .into_iter()
        .filter_map(|(source, edits)| snapshot.place(source).map(|place| (place, edits)));
    if snapshot.abilities().versioned_edits {
        let edits = by_text.map(|(place, edits)| TextDocumentEdit {
            text_document: OptionalVersionedTextDocumentIdentifier {
                uri: place.uri.clone(),
                version: Some(place.version),
            },
            edits: edits.into_iter().map(OneOf::Left).collect(),
        });
        let document_changes = Some(DocumentChanges::Edits(edits.collect()));
        WorkspaceEdit { document_changes, ..WorkspaceEdit::default() }
    } else {
        let changes = by_text.map(|(place, edits)| (place.uri.clone(), edits)).collect();
        WorkspaceEdit { changes: Some(changes), ..WorkspaceEdit::default() }
    }
}
