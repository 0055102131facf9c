//! What a document answers, in reading order.

use tussock_language::diagnostic::{Diagnostic, Severity};
use tussock_language::span::Location;
use tussock_report::rich::Rich;
use tussock_report::table::Table;

/// One piece of output and the statement that it belongs to.
#[derive(Clone, Debug, PartialEq)]
pub struct Answer {
    /// The statement.
    pub location: Location,
    /// What it gave.
    pub output: Output,
}

/// A piece of output.
#[derive(Clone, Debug, PartialEq)]
pub enum Output {
    /// A table, for `show`.
    Table(Table),
    /// A paragraph, for `write`.
    Paragraph(Rich),
    /// A word on what a definition defined, for a notebook; documents leave it out.
    Note(Rich),
    /// What a `{{ }}` in a document's prose stands for; its location is that of the braces.
    Value(Rich),
    /// What is wrong or worth knowing.
    Problem(Diagnostic),
}

/// Everything that a document, or one cell of it, answered.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Answers {
    /// In reading order.
    pub list: Vec<Answer>,
    /// Whether work was stopped before its end.
    pub interrupted: bool,
}

impl Answers {
    /// Whether any of them is an error.
    #[must_use]
    pub fn failed(&self) -> bool {
        self.problems().any(|problem| problem.severity == Severity::Error)
    }

    /// The diagnostics among them.
    pub fn problems(&self) -> impl Iterator<Item = &Diagnostic> {
        self.list.iter().filter_map(|answer| match &answer.output {
            Output::Problem(problem) => Some(problem),
            Output::Table(_) | Output::Paragraph(_) | Output::Note(_) | Output::Value(_) => None,
        })
    }
}
