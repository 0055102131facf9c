//! `textDocument/definition`: where a name gets its meaning.

use tower_lsp::jsonrpc::Result;
use tower_lsp::lsp_types::request::GotoDefinition;
use tower_lsp::lsp_types::{
    GotoDefinitionParams, GotoDefinitionResponse, OneOf, ServerCapabilities, Url,
};
use tussock_language::features::definition::definition;

use crate::ask::{Feature, Question};

/// Where a name gets its meaning.
pub(crate) struct Definition;

impl Feature for Definition {
    type Request = GotoDefinition;

    fn announce(capabilities: &mut ServerCapabilities) {
        capabilities.definition_provider = Some(OneOf::Left(true));
    }

    fn text(params: &GotoDefinitionParams) -> &Url {
        &params.text_document_position_params.text_document.uri
    }

    fn answer(
        question: &Question,
        params: GotoDefinitionParams,
    ) -> Result<Option<GotoDefinitionResponse>> {
        let Question { snapshot, source, .. } = question;
        let offset = snapshot.offset(*source, params.text_document_position_params.position);
        let found = definition(snapshot.document(), *source, offset);
        let location = found.and_then(|location| snapshot.location(location));
        Ok(location.map(GotoDefinitionResponse::Scalar))
    }
}
