//! `textDocument/completion`: what can be written at the cursor.

use tower_lsp::jsonrpc::Result;
use tower_lsp::lsp_types::{
    CompletionItem, CompletionItemKind, CompletionOptions, CompletionParams, CompletionResponse,
    CompletionTextEdit, Documentation, MarkupContent, MarkupKind, ServerCapabilities, TextEdit,
    Url, request,
};
use tussock_language::features::completion::{self, CompletionKind, complete};

use crate::ask::{Feature, Question};

/// What can be written at the cursor.
pub(crate) struct Completion;

impl Feature for Completion {
    type Request = request::Completion;

    fn announce(capabilities: &mut ServerCapabilities) {
        // Words bring up the list by themselves. A space does not: it would have a line break
        // after a finished line take the first suggestion.
        let characters = [".", "`", "{", "\""];
        capabilities.completion_provider = Some(CompletionOptions {
            trigger_characters: Some(characters.map(str::to_owned).to_vec()),
            ..CompletionOptions::default()
        });
    }

    fn text(params: &CompletionParams) -> &Url {
        &params.text_document_position.text_document.uri
    }

    fn answer(question: &Question, params: CompletionParams) -> Result<Option<CompletionResponse>> {
        let Question { snapshot, source, .. } = question;
        let offset = snapshot.offset(*source, params.text_document_position.position);
        let found = complete(snapshot.document(), *source, offset, &snapshot.knowledge());
        let items = found.into_iter().enumerate().map(|(rank, found)| item(question, rank, found));
        Ok(Some(CompletionResponse::Array(items.collect())))
    }
}

fn item(question: &Question, rank: usize, found: completion::Completion) -> CompletionItem {
    let Question { snapshot, source, .. } = question;
    // Clients compare what is typed with this; a name that must be quoted is found by its letters,
    // or with its quote where that was typed.
    let quoted = found.replace.of(snapshot.document().text(*source)).starts_with('`');
    let filter = if quoted { &found.insert } else { &found.label };
    CompletionItem {
        label: found.label.clone(),
        kind: Some(kind(found.kind)),
        detail: Some(found.detail).filter(|detail| !detail.is_empty()),
        documentation: found.page.map(|page| {
            let kind = MarkupKind::Markdown;
            Documentation::MarkupContent(MarkupContent { kind, value: page })
        }),
        // Clients sort by name; the order of the language is by what is likely.
        sort_text: Some(format!("{rank:05}")),
        filter_text: Some(filter.clone()),
        text_edit: Some(CompletionTextEdit::Edit(TextEdit {
            range: snapshot.range(*source, found.replace),
            new_text: found.insert,
        })),
        ..CompletionItem::default()
    }
}

fn kind(kind: CompletionKind) -> CompletionItemKind {
    match kind {
        CompletionKind::Verb | CompletionKind::Clause => CompletionItemKind::KEYWORD,
        CompletionKind::Word => CompletionItemKind::VALUE,
        CompletionKind::Table | CompletionKind::Sample => CompletionItemKind::STRUCT,
        CompletionKind::Comparison => CompletionItemKind::CLASS,
        CompletionKind::Column | CompletionKind::Term => CompletionItemKind::FIELD,
        CompletionKind::Level => CompletionItemKind::ENUM_MEMBER,
        CompletionKind::View | CompletionKind::Function => CompletionItemKind::FUNCTION,
        CompletionKind::File => CompletionItemKind::FILE,
        CompletionKind::Key => CompletionItemKind::PROPERTY,
        CompletionKind::Rule => CompletionItemKind::CONSTANT,
    }
}
