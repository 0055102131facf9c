//! `textDocument/documentSymbol`: what a text defines and asks.

use tower_lsp::jsonrpc::Result;
use tower_lsp::lsp_types::request::DocumentSymbolRequest;
use tower_lsp::lsp_types::{
    DocumentSymbol, DocumentSymbolParams, DocumentSymbolResponse, OneOf, ServerCapabilities,
    SymbolInformation, SymbolKind, Url,
};
use tussock_language::features::symbols::{self, Symbol, symbols};
use tussock_language::span::{self, SourceId};

use crate::ask::{Feature, Question};
use crate::snapshot::Snapshot;

/// What a text defines and asks.
pub(crate) struct Symbols;

impl Feature for Symbols {
    type Request = DocumentSymbolRequest;

    fn announce(capabilities: &mut ServerCapabilities) {
        capabilities.document_symbol_provider = Some(OneOf::Left(true));
    }

    fn text(params: &DocumentSymbolParams) -> &Url {
        &params.text_document.uri
    }

    fn answer(
        question: &Question,
        _: DocumentSymbolParams,
    ) -> Result<Option<DocumentSymbolResponse>> {
        let Question { snapshot, source, .. } = question;
        let found = symbols(snapshot.document(), *source).into_iter();
        Ok(Some(if snapshot.abilities().nested_symbols {
            let symbols = found.map(|symbol| with_range(snapshot, *source, symbol));
            DocumentSymbolResponse::Nested(symbols.collect())
        } else {
            let symbols = found.filter_map(|symbol| with_location(snapshot, *source, symbol));
            DocumentSymbolResponse::Flat(symbols.collect())
        }))
    }
}

#[expect(deprecated, reason = "the field is part of the type")]
fn with_range(snapshot: &Snapshot, source: SourceId, symbol: Symbol) -> DocumentSymbol {
    DocumentSymbol {
        name: symbol.name,
        detail: Some(symbol.detail).filter(|detail| !detail.is_empty()),
        kind: kind(symbol.kind),
        tags: None,
        deprecated: None,
        range: snapshot.range(source, symbol.span),
        selection_range: snapshot.range(source, symbol.selection),
        children: None,
    }
}

#[expect(deprecated, reason = "the field is part of the type")]
fn with_location(
    snapshot: &Snapshot,
    source: SourceId,
    symbol: Symbol,
) -> Option<SymbolInformation> {
    Some(SymbolInformation {
        name: symbol.name,
        kind: kind(symbol.kind),
        tags: None,
        deprecated: None,
        location: snapshot.location(span::Location { source, span: symbol.span })?,
        container_name: None,
    })
}

fn kind(kind: symbols::SymbolKind) -> SymbolKind {
    match kind {
        symbols::SymbolKind::Table => SymbolKind::STRUCT,
        symbols::SymbolKind::Column => SymbolKind::FIELD,
        symbols::SymbolKind::Comparison => SymbolKind::CLASS,
        symbols::SymbolKind::Policy => SymbolKind::CONSTANT,
        symbols::SymbolKind::Question => SymbolKind::FUNCTION,
    }
}
