//! What the client at the other end said that it can do.

use tower_lsp::lsp_types::{ClientCapabilities, InitializeParams};

use crate::convert::Encoding;

/// Abilities of a client that change what the server sends.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub(crate) struct Abilities {
    /// What a `character` counts.
    pub(crate) encoding: Encoding,
    /// Whether edits may name the version of the text that they are for.
    pub(crate) versioned_edits: bool,
    /// Whether symbols may have a range of their own beside the name's.
    pub(crate) nested_symbols: bool,
    /// Whether the client watches files for those who ask later.
    pub(crate) watches_files: bool,
}

impl Abilities {
    /// Reads the first message of a client.
    pub(crate) fn of(params: &InitializeParams) -> Self {
        let client = &params.capabilities;
        let offered = client.general.as_ref().and_then(|it| it.position_encodings.as_deref());
        Self {
            encoding: Encoding::negotiate(offered),
            versioned_edits: versioned_edits(client).unwrap_or(false),
            nested_symbols: nested_symbols(client).unwrap_or(false),
            watches_files: watches_files(client).unwrap_or(false),
        }
    }
}

fn versioned_edits(client: &ClientCapabilities) -> Option<bool> {
    client.workspace.as_ref()?.workspace_edit.as_ref()?.document_changes
}

fn nested_symbols(client: &ClientCapabilities) -> Option<bool> {
    let text_document = client.text_document.as_ref()?;
    text_document.document_symbol.as_ref()?.hierarchical_document_symbol_support
}

fn watches_files(client: &ClientCapabilities) -> Option<bool> {
    client.workspace.as_ref()?.did_change_watched_files.as_ref()?.dynamic_registration
}
