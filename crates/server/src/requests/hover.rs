//! `textDocument/hover`: what the word under the cursor means, and its live values.

use tower_lsp::jsonrpc::Result;
use tower_lsp::lsp_types::request::HoverRequest;
use tower_lsp::lsp_types::{
    Hover, HoverContents, HoverParams, HoverProviderCapability, MarkupContent, MarkupKind,
    ServerCapabilities, Url,
};
use tussock_language::features::hover::hover;

use crate::ask::{Feature, Question};

/// What the word under the cursor means.
pub(crate) struct HoverText;

impl Feature for HoverText {
    type Request = HoverRequest;

    fn announce(capabilities: &mut ServerCapabilities) {
        capabilities.hover_provider = Some(HoverProviderCapability::Simple(true));
    }

    fn text(params: &HoverParams) -> &Url {
        &params.text_document_position_params.text_document.uri
    }

    fn answer(question: &Question, params: HoverParams) -> Result<Option<Hover>> {
        let Question { snapshot, source, .. } = question;
        let offset = snapshot.offset(*source, params.text_document_position_params.position);
        let found = hover(snapshot.document(), *source, offset, &snapshot.knowledge());
        Ok(found.map(|hover| Hover {
            contents: HoverContents::Markup(MarkupContent {
                kind: MarkupKind::Markdown,
                value: hover.markdown,
            }),
            range: Some(snapshot.range(*source, hover.span)),
        }))
    }
}
