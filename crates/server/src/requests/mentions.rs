//! `textDocument/documentHighlight`: the places in the same text that speak of the same thing.

use tower_lsp::jsonrpc::Result;
use tower_lsp::lsp_types::request::DocumentHighlightRequest;
use tower_lsp::lsp_types::{
    DocumentHighlight, DocumentHighlightKind, DocumentHighlightParams, OneOf, ServerCapabilities,
    Url,
};
use tussock_language::features::references::references;

use crate::ask::{Feature, Question};

/// The places in the same text that speak of the same thing.
pub(crate) struct Mentions;

impl Feature for Mentions {
    type Request = DocumentHighlightRequest;

    fn announce(capabilities: &mut ServerCapabilities) {
        capabilities.document_highlight_provider = Some(OneOf::Left(true));
    }

    fn text(params: &DocumentHighlightParams) -> &Url {
        &params.text_document_position_params.text_document.uri
    }

    fn answer(
        question: &Question,
        params: DocumentHighlightParams,
    ) -> Result<Option<Vec<DocumentHighlight>>> {
        let Question { snapshot, source, .. } = question;
        let offset = snapshot.offset(*source, params.text_document_position_params.position);
        let found = references(snapshot.document(), *source, offset).into_iter();
        let here = found.filter(|found| found.location.source == *source);
        let highlights = here.map(|found| DocumentHighlight {
            range: snapshot.range(*source, found.location.span),
            kind: Some(if found.defines {
                DocumentHighlightKind::WRITE
            } else {
                DocumentHighlightKind::READ
            }),
        });
        Ok(Some(highlights.collect()))
    }
}
