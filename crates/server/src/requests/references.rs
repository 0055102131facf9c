//! `textDocument/references`: every place that speaks of the same thing.

use tower_lsp::jsonrpc::Result;
use tower_lsp::lsp_types::{Location, OneOf, ReferenceParams, ServerCapabilities, Url, request};
use tussock_language::features::references::references;

use crate::ask::{Feature, Question};

/// Every place that speaks of the same thing.
pub(crate) struct References;

impl Feature for References {
    type Request = request::References;

    fn announce(capabilities: &mut ServerCapabilities) {
        capabilities.references_provider = Some(OneOf::Left(true));
    }

    fn text(params: &ReferenceParams) -> &Url {
        &params.text_document_position.text_document.uri
    }

    fn answer(question: &Question, params: ReferenceParams) -> Result<Option<Vec<Location>>> {
        let Question { snapshot, source, .. } = question;
        let offset = snapshot.offset(*source, params.text_document_position.position);
        let found = references(snapshot.document(), *source, offset).into_iter();
        let wanted = found.filter(|found| params.context.include_declaration || !found.defines);
        Ok(Some(wanted.filter_map(|found| snapshot.location(found.location)).collect()))
    }
}
