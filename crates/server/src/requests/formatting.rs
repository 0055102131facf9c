//! `textDocument/formatting`: the code of a text in its standard form; prose is left alone.

use tower_lsp::jsonrpc::Result;
use tower_lsp::lsp_types::{
    DocumentFormattingParams, OneOf, ServerCapabilities, TextEdit, Url, request,
};
use tussock_language::format::edits;

use crate::ask::{Feature, Question};

/// The standard form of the code.
pub(crate) struct Formatting;

impl Feature for Formatting {
    type Request = request::Formatting;

    fn announce(capabilities: &mut ServerCapabilities) {
        capabilities.document_formatting_provider = Some(OneOf::Left(true));
    }

    fn text(params: &DocumentFormattingParams) -> &Url {
        &params.text_document.uri
    }

    fn answer(question: &Question, _: DocumentFormattingParams) -> Result<Option<Vec<TextEdit>>> {
        let Question { snapshot, source, .. } = question;
        let edits = edits(snapshot.document()).into_iter();
        let here = edits.filter(|edit| edit.location.source == *source);
        let edits = here.map(|edit| {
            TextEdit::new(snapshot.range(edit.location.source, edit.location.span), edit.text)
        });
        Ok(Some(edits.collect()))
    }
}
