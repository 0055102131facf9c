//! `textDocument/foldingRange`: statements of several lines, and the code blocks of a Markdown file.

use tower_lsp::jsonrpc::Result;
use tower_lsp::lsp_types::request::FoldingRangeRequest;
use tower_lsp::lsp_types::{
    FoldingRange, FoldingRangeParams, FoldingRangeProviderCapability, ServerCapabilities, Url,
};
use tussock_language::document::{Form, RegionKind};
use tussock_language::features::symbols::symbols;
use tussock_language::span::Span;

use crate::ask::{Feature, Question};

/// What can be folded.
pub(crate) struct Folding;

impl Feature for Folding {
    type Request = FoldingRangeRequest;

    fn announce(capabilities: &mut ServerCapabilities) {
        capabilities.folding_range_provider = Some(FoldingRangeProviderCapability::Simple(true));
    }

    fn text(params: &FoldingRangeParams) -> &Url {
        &params.text_document.uri
    }

    fn answer(question: &Question, _: FoldingRangeParams) -> Result<Option<Vec<FoldingRange>>> {
        let Question { snapshot, source, .. } = question;
        let document = snapshot.document();
        let statements = symbols(document, *source).into_iter().map(|symbol| symbol.span);
        let fences = (document.form == Form::Markdown)
            .then(|| document.sources.get(source.0))
            .flatten()
            .into_iter()
            .flat_map(|text| &text.regions)
            .filter(|region| region.kind == RegionKind::Code)
            .map(|region| region.span);
        let text = document.text(*source);
        let ranges = statements.chain(fences).filter_map(|span| {
            let last = span.of(text).trim_end().len();
            let range = snapshot.range(*source, Span::new(span.start, span.start + last));
            (range.start.line < range.end.line).then(|| FoldingRange {
                start_line: range.start.line,
                end_line: range.end.line,
                ..FoldingRange::default()
            })
        });
        Ok(Some(ranges.collect()))
    }
}
