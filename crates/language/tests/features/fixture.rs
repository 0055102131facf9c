//! Texts with a cursor.

use tussock_language::document::{Document, Source};
use tussock_language::span::SourceId;

/// A document and a place in it.
pub(crate) struct Fixture {
    pub(crate) document: Document,
    pub(crate) source: SourceId,
    pub(crate) offset: usize,
}

impl Fixture {
    /// A script, with the cursor at `$0`.
    #[track_caller]
    pub(crate) fn script(marked: &str) -> Self {
        let (text, offset) = unmarked(marked);
        Self { document: Document::script(text), source: SourceId(0), offset }
    }

    /// A Markdown file, with the cursor at `$0`: what stands in fences is code.
    #[track_caller]
    pub(crate) fn markdown(marked: &str) -> Self {
        let (text, offset) = unmarked(marked);
        Self { document: Document::markdown(text), source: SourceId(0), offset }
    }

    /// A notebook of code cells, with the cursor at `$0` in one of them.
    #[track_caller]
    pub(crate) fn cells(marked: &[&str]) -> Self {
        let place = marked.iter().position(|cell| cell.contains("$0")).expect("a cursor");
        let (_, offset) = unmarked(marked.get(place).expect("the cell with the cursor"));
        let sources = marked.iter().map(|cell| Source::code(cell.replace("$0", ""))).collect();
        Self { document: Document::notebook_cells(sources), source: SourceId(place), offset }
    }

    pub(crate) fn text(&self) -> &str {
        self.document.text(self.source)
    }
}

#[track_caller]
fn unmarked(marked: &str) -> (String, usize) {
    let offset = marked.find("$0").expect("the text has a cursor");
    (marked.replacen("$0", "", 1), offset)
}
