//! Inside quotes: data files, live values of a paragraph, spellings of levels.

use super::{Completion, CompletionKind, Request, columns, paths};
use crate::span::Span;
use crate::syntax::Expected;
use crate::verbs::{Slot, What};

/// What the text under the cursor may hold.
pub(super) fn inside(request: &Request<'_>) -> Vec<Completion> {
    let verb = request.expectation.verb.map(crate::verbs::Verb::name);
    let mut found = Vec::new();
    for expected in &request.expectation.expected {
        match (expected, verb) {
            (Expected::Slot(Slot { what: What::File, .. }), _) => found.extend(files(request)),
            (Expected::Slot(Slot { what: What::Text, .. }), Some("write")) => {
                let token = request.expectation.word;
                found.extend(paths::in_braces(request.names, request.text, token, request.offset));
            }
            (Expected::Slot(Slot { what: What::Text, .. }), Some("levels")) => {
                found.extend(spellings(request));
            }
            (Expected::Level(column), _) => {
                found.extend(texts(
                    request,
                    columns::spellings(request, column),
                    CompletionKind::Level,
                ));
            }
            _ => {}
        }
    }
    found
}

/// Data files, where no quote has been typed yet.
pub(super) fn quoted_files(request: &Request<'_>) -> Vec<Completion> {
    let files = request.names.facts.files("");
    files
        .into_iter()
        .map(|file| Completion {
            insert: format!("\"{}\"", escaped(&file)),
            replace: request.expectation.word,
            kind: CompletionKind::File,
            detail: "a data file".to_owned(),
            page: None,
            label: file,
        })
        .collect()
}

fn files(request: &Request<'_>) -> Vec<Completion> {
    let inner = Inner::of(request);
    let typed = request.text.get(inner.span.start..request.offset).unwrap_or_default();
    texts(request, request.names.facts.files(typed), CompletionKind::File)
}

fn spellings(request: &Request<'_>) -> Vec<Completion> {
    let Some(column) = request.expectation.column.clone() else { return Vec::new() };
    texts(request, columns::spellings(request, &column), CompletionKind::Level)
}

fn texts(request: &Request<'_>, texts: Vec<String>, kind: CompletionKind) -> Vec<Completion> {
    let inner = Inner::of(request);
    texts
        .into_iter()
        .map(|text| Completion {
            // A folder is not the end of a path.
            insert: format!(
                "{}{}",
                escaped(&text),
                if text.ends_with('/') { "" } else { inner.closing }
            ),
            replace: inner.span,
            kind,
            detail: String::new(),
            page: None,
            label: text,
        })
        .collect()
}

/// What stands between the quotes around the cursor.
struct Inner {
    span: Span,
    /// The quotes that are missing at the end.
    closing: &'static str,
}

impl Inner {
    fn of(request: &Request<'_>) -> Self {
        let token = request.expectation.word;
        let text = token.of(request.text);
        let quotes = if text.starts_with("\"\"\"") { "\"\"\"" } else { "\"" };
        let start = token.start + quotes.len();
        if crate::lower::text::is_closed(text, quotes) {
            return Self { span: Span::new(start, token.end - quotes.len()), closing: "" };
        }
        // What follows an open quote on the line is more likely the rest of the statement.
        Self { span: Span::new(start, request.offset.max(start)), closing: quotes }
    }
}

fn escaped(text: &str) -> String {
    text.replace('\\', "\\\\").replace('"', "\\\"")
}
