//! `textDocument/prepareRename` and `textDocument/rename`: another name for a thing, wherever it
//! is mentioned.

use tower_lsp::jsonrpc::{Error, ErrorCode, Result};
use tower_lsp::lsp_types::request::{self, PrepareRenameRequest};
use tower_lsp::lsp_types::{
    OneOf, PrepareRenameResponse, RenameOptions, RenameParams, ServerCapabilities,
    TextDocumentPositionParams, Url, WorkspaceEdit,
};
use tussock_language::features::rename::{RenameError, renamable, rename};

use crate::ask::{Feature, Question};
use crate::workspace_edit::workspace_edit;

/// Whether a name can be changed, and its place.
pub(crate) struct PrepareRename;

/// The edits that change a name.
pub(crate) struct Rename;

impl Feature for PrepareRename {
    type Request = PrepareRenameRequest;

    fn announce(capabilities: &mut ServerCapabilities) {
        capabilities.rename_provider = Some(OneOf::Right(RenameOptions {
            prepare_provider: Some(true),
            work_done_progress_options: Default::default(),
        }));
    }

    fn text(params: &TextDocumentPositionParams) -> &Url {
        &params.text_document.uri
    }

    fn answer(
        question: &Question,
        params: TextDocumentPositionParams,
    ) -> Result<Option<PrepareRenameResponse>> {
        let Question { snapshot, source, .. } = question;
        let offset = snapshot.offset(*source, params.position);
        let span = renamable(snapshot.document(), *source, offset).map_err(|why| refusal(&why))?;
        Ok(Some(PrepareRenameResponse::Range(snapshot.range(*source, span))))
    }
}

impl Feature for Rename {
    type Request = request::Rename;

    /// Announced together with its preparation.
    fn announce(_: &mut ServerCapabilities) {}

    fn text(params: &RenameParams) -> &Url {
        &params.text_document_position.text_document.uri
    }

    fn answer(question: &Question, params: RenameParams) -> Result<Option<WorkspaceEdit>> {
        let Question { snapshot, source, .. } = question;
        let offset = snapshot.offset(*source, params.text_document_position.position);
        let edits = rename(snapshot.document(), *source, offset, &params.new_name)
            .map_err(|why| refusal(&why))?;
        Ok(Some(workspace_edit(snapshot, &edits)))
    }
}

/// The protocol's way to say that a request was understood and can't be granted; editors show the
/// message.
fn refusal(why: &RenameError) -> Error {
    const REQUEST_FAILED: i64 = -32803;
    let mut error = Error::new(ErrorCode::ServerError(REQUEST_FAILED));
    error.message = why.to_string().into();
    error
}
