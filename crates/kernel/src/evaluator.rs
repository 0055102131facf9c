//! What a kernel asks of a language. The session's notebook answers it; tests answer it with less.

use tussock_session::cancel::Cancel;
use tussock_session::notebook::Reply;

/// Answers cells and questions about cells. Offsets are bytes of the code.
pub trait Evaluator: Send + 'static {
    /// Runs a cell. `cell` is the front end's name for it, where it tells one. Work that takes long
    /// looks at `cancel` now and then.
    fn run(&mut self, cell: Option<&str>, code: &str, cancel: &Cancel) -> Reply;

    /// What may stand at an offset of a cell as it is being typed, best first.
    fn complete(&self, code: &str, offset: usize) -> Vec<Suggestion>;

    /// What the word at an offset means, in Markdown.
    fn inspect(&self, code: &str, offset: usize) -> Option<String>;

    /// Whether the code is whole.
    fn is_complete(&self, code: &str) -> Completeness;
}

/// Something that may stand at a place.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Suggestion {
    /// The text.
    pub text: String,
    /// In one word, what it is: a column, a view.
    pub kind: &'static str,
    /// One line about it.
    pub detail: String,
    /// The first byte that it replaces.
    pub start: usize,
    /// One past the last byte that it replaces.
    pub end: usize,
}

/// Whether code is whole.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Completeness {
    /// It can be run.
    Complete,
    /// More is needed, and would be indented by this.
    Incomplete {
        /// White space.
        indent: String,
    },
    /// No continuation would mend it.
    Invalid,
}
