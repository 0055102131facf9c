//! A document for export: prose, code, tables and what there is to say about them, in reading order.

use crate::rich::Rich;
use crate::table::Table;

/// A document.
#[derive(Clone, Debug, PartialEq)]
pub struct Page {
    /// The title, as plain text.
    pub title: String,
    /// The language of the text, as a BCP 47 tag such as `en`.
    pub language: String,
    /// What the document says, in order.
    pub blocks: Vec<Block>,
}

/// A part of a document.
#[derive(Clone, Debug, PartialEq)]
pub enum Block {
    /// Prose in Markdown, live values already put in.
    Prose(String),
    /// Program text.
    Code {
        /// The text.
        text: String,
        /// The name of its language, empty where it has none.
        language: String,
    },
    /// A table.
    Table(Table),
    /// A paragraph.
    Paragraph(Rich),
    /// A remark beside the text.
    Note(Rich),
    /// What is wrong or worth knowing.
    Problem {
        /// How much it matters.
        severity: Severity,
        /// What is wrong, in one sentence.
        title: String,
        /// More on it, such as the line that it is about, to be printed as they stand.
        lines: Vec<String>,
    },
}

/// How much a problem matters.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Severity {
    /// No answer could be given.
    Error,
    /// An answer was given, and a reviewer would ask.
    Warning,
    /// Worth knowing.
    Information,
}

impl Severity {
    /// The word that names it to a reader.
    #[must_use]
    pub fn word(self) -> &'static str {
        match self {
            Self::Error => "Error",
            Self::Warning => "Warning",
            Self::Information => "Note",
        }
    }
}

impl Page {
    /// An empty document in English.
    pub fn new(title: impl Into<String>) -> Self {
        Self { title: title.into(), language: "en".to_owned(), blocks: Vec::new() }
    }

    /// The same with a block added.
    #[must_use]
    pub fn block(mut self, block: Block) -> Self {
        self.blocks.push(block);
        self
    }

    /// Whether the title has to be printed: not where the prose begins with a title of its own.
    pub(crate) fn prints_title(&self) -> bool {
        let begins_with_title = match self.blocks.first() {
            Some(Block::Prose(markdown)) => markdown.trim_start().starts_with("# "),
            Some(_) | None => false,
        };
        !self.title.trim().is_empty() && !begins_with_title
    }
}
