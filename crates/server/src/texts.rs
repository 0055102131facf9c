//! A text that a client has open: a file, or one cell of a notebook.

use tower_lsp::lsp_types::{TextDocumentContentChangeEvent, TextDocumentItem, Url};
use tussock_language::document::{Document, Form, Region, RegionKind, Source};
use tussock_language::span::Span;

use crate::convert::{self, Encoding};

/// What a text is written in.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Language {
    /// All code.
    Tussock,
    /// Markdown, with code in fences.
    Markdown,
    /// Nothing that is known here; such a text has no features.
    Other,
}

impl Language {
    /// By the client's word where it is one of ours, otherwise by the file's name. Notebook front
    /// ends join all cells of a notebook into one text and give it the notebook's own name.
    pub(crate) fn of(language_id: &str, uri: &Url) -> Self {
        match language_id {
            "tussock" => return Self::Tussock,
            "markdown" => return Self::Markdown,
            "json" => return Self::Other,
            _ => {}
        }
        match uri.path().rsplit_once('.').map(|(_, extension)| extension) {
            Some("tus" | "ipynb") => Self::Tussock,
            Some("md" | "markdown") => Self::Markdown,
            _ => Self::Other,
        }
    }
}

/// An open text.
#[derive(Clone, Debug)]
pub(crate) struct Text {
    /// The client's number for the present state of it.
    pub(crate) version: i32,
    /// What it is written in.
    pub(crate) language: Language,
    /// The text itself.
    pub(crate) content: String,
}

impl Text {
    /// A text as it was opened.
    pub(crate) fn opened(item: TextDocumentItem) -> Self {
        let language = Language::of(&item.language_id, &item.uri);
        Self { version: item.version, language, content: item.text }
    }

    /// Applies edits in their order.
    pub(crate) fn edit(
        &mut self,
        version: i32,
        changes: Vec<TextDocumentContentChangeEvent>,
        encoding: Encoding,
    ) {
        convert::apply(&mut self.content, changes, encoding);
        self.version = version;
    }

    /// The text as a document of its own; none for a language that is not known here.
    pub(crate) fn document(&self) -> Option<Document> {
        match self.language {
            Language::Tussock => Some(Document { form: Form::Script, sources: vec![self.code()] }),
            Language::Markdown => Some(Document::markdown(self.content.clone())),
            Language::Other => None,
        }
    }

    /// The text as a cell of a notebook. A cell in another language keeps its place and says
    /// nothing.
    pub(crate) fn cell(&self) -> Source {
        match self.language {
            Language::Tussock => self.code(),
            Language::Markdown => Source::prose(self.content.clone()),
            Language::Other => Source { text: self.content.clone(), regions: Vec::new() },
        }
    }

    /// All code, after a byte order mark where the client sends one.
    fn code(&self) -> Source {
        let start = if self.content.starts_with('\u{feff}') { '\u{feff}'.len_utf8() } else { 0 };
        let span = Span::new(start, self.content.len());
        let regions = vec![Region { kind: RegionKind::Code, span }];
        Source { text: self.content.clone(), regions }
    }
}
