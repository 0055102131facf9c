//! `textDocument/semanticTokens/full`: what each word is, for editors that colour by meaning.

use tower_lsp::jsonrpc::Result;
use tower_lsp::lsp_types::request::SemanticTokensFullRequest;
use tower_lsp::lsp_types::{
    Position, SemanticToken, SemanticTokenType, SemanticTokens, SemanticTokensFullOptions,
    SemanticTokensLegend, SemanticTokensOptions, SemanticTokensParams, SemanticTokensResult,
    SemanticTokensServerCapabilities, ServerCapabilities, Url,
};
use tussock_language::features::highlight::{HighlightKind, highlights};
use tussock_language::span::Span;

use crate::ask::{Feature, Question};

/// What each word is.
pub(crate) struct WordKinds;

/// The protocol's names for what a word can be; a token refers to one by its place in this list.
const LEGEND: [SemanticTokenType; 10] = [
    SemanticTokenType::KEYWORD,
    SemanticTokenType::STRUCT,
    SemanticTokenType::CLASS,
    SemanticTokenType::VARIABLE,
    SemanticTokenType::ENUM_MEMBER,
    SemanticTokenType::FUNCTION,
    SemanticTokenType::PROPERTY,
    SemanticTokenType::NUMBER,
    SemanticTokenType::STRING,
    SemanticTokenType::COMMENT,
];

impl Feature for WordKinds {
    type Request = SemanticTokensFullRequest;

    fn announce(capabilities: &mut ServerCapabilities) {
        capabilities.semantic_tokens_provider =
            Some(SemanticTokensServerCapabilities::SemanticTokensOptions(SemanticTokensOptions {
                legend: SemanticTokensLegend {
                    token_types: LEGEND.to_vec(),
                    token_modifiers: Vec::new(),
                },
                full: Some(SemanticTokensFullOptions::Bool(true)),
                ..SemanticTokensOptions::default()
            }));
    }

    fn text(params: &SemanticTokensParams) -> &Url {
        &params.text_document.uri
    }

    fn answer(
        question: &Question,
        _: SemanticTokensParams,
    ) -> Result<Option<SemanticTokensResult>> {
        let Question { snapshot, source, .. } = question;
        let text = snapshot.document().text(*source);
        let mut data = Vec::new();
        let mut last = Position::default();
        for highlight in highlights(snapshot.document(), *source) {
            let Some(token_type) = index(highlight.kind) else { continue };
            for piece in lines(text, highlight.span) {
                let range = snapshot.range(*source, piece);
                let delta_line = range.start.line - last.line;
                let from = if delta_line == 0 { last.character } else { 0 };
                data.push(SemanticToken {
                    delta_line,
                    delta_start: range.start.character - from,
                    length: range.end.character - range.start.character,
                    token_type,
                    token_modifiers_bitset: 0,
                });
                last = range.start;
            }
        }
        Ok(Some(SemanticTokensResult::Tokens(SemanticTokens { result_id: None, data })))
    }
}

/// The place of a kind in the legend; none for signs, which the grammars colour.
fn index(kind: HighlightKind) -> Option<u32> {
    Some(match kind {
        HighlightKind::Verb | HighlightKind::Keyword => 0,
        HighlightKind::Table | HighlightKind::Sample => 1,
        HighlightKind::Comparison => 2,
        HighlightKind::Column => 3,
        HighlightKind::Level => 4,
        HighlightKind::View | HighlightKind::Function => 5,
        HighlightKind::Key => 6,
        HighlightKind::Number => 7,
        HighlightKind::Text => 8,
        HighlightKind::Comment => 9,
        HighlightKind::Operator => return None,
    })
}

/// The parts of a span that stand on one line each: not every client takes tokens of several.
fn lines(text: &str, span: Span) -> impl Iterator<Item = Span> {
    let mut start = span.start;
    span.of(text).split_inclusive('\n').filter_map(move |line| {
        let piece = Span::new(start, start + line.trim_end_matches(['\r', '\n']).len());
        start += line.len();
        (piece.start < piece.end).then_some(piece)
    })
}
