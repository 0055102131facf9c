//! A document: one or more source texts, each divided into code and prose.

mod markdown;

use crate::span::{SourceId, Span};

/// What kind of file a document is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Form {
    /// A `.tus` script: all code.
    Script,
    /// A Markdown file with fenced code.
    Markdown,
    /// A notebook, one source a code cell (and a Markdown cell).
    Notebook,
}

/// A set of definitions and a list of questions, over one or more texts.
#[derive(Clone, Debug, PartialEq)]
pub struct Document {
    /// The kind of file.
    pub form: Form,
    /// The texts, in reading order; a [`SourceId`] is an index into this list.
    pub sources: Vec<Source>,
}

/// One text.
#[derive(Clone, Debug, PartialEq)]
pub struct Source {
    /// The text.
    pub text: String,
    /// What of it is code and what is prose, in order and not overlapping. The lines of the fences
    /// around code are neither.
    pub regions: Vec<Region>,
}

/// A part of a text.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Region {
    /// What it holds.
    pub kind: RegionKind,
    /// Where.
    pub span: Span,
}

/// What a region holds.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum RegionKind {
    /// Statements.
    Code,
    /// Markdown with `{{ }}`.
    Prose,
}

impl Document {
    /// A script.
    pub fn script(text: impl Into<String>) -> Self {
        Self { form: Form::Script, sources: vec![Source::code(text)] }
    }

    /// A Markdown text: what stands in `tussock` fences is code, the rest is prose.
    pub fn markdown(text: impl Into<String>) -> Self {
        Self { form: Form::Markdown, sources: vec![Source::markdown(text)] }
    }

    /// A notebook, from its code and Markdown cells in their order: [`Source::code`] and
    /// [`Source::prose`].
    #[must_use]
    pub fn notebook_cells(cells: Vec<Source>) -> Self {
        Self { form: Form::Notebook, sources: cells }
    }

    /// The text of a source, empty where there is no such source.
    #[must_use]
    pub fn text(&self, source: SourceId) -> &str {
        self.sources.get(source.0).map_or("", |source| source.text.as_str())
    }
}

impl Source {
    /// A text that is code from end to end.
    pub fn code(text: impl Into<String>) -> Self {
        Self::whole(text, RegionKind::Code)
    }

    /// A text that is prose from end to end.
    pub fn prose(text: impl Into<String>) -> Self {
        Self::whole(text, RegionKind::Prose)
    }

    /// A Markdown text with fenced code.
    pub fn markdown(text: impl Into<String>) -> Self {
        let text = text.into();
        let regions = markdown::regions(&text);
        Self { text, regions }
    }

    fn whole(text: impl Into<String>, kind: RegionKind) -> Self {
        let text = text.into();
        let span = Span::new(0, text.len());
        Self { text, regions: vec![Region { kind, span }] }
    }
}
