//! What stands in the way of an answer, ready to be shown.

use tussock_language::diagnostic::Diagnostic;

/// A result whose failure is a diagnostic.
pub(crate) type Answerable<T> = Result<T, Box<Diagnostic>>;

/// A diagnostic as a failure.
pub(crate) fn trouble(diagnostic: Diagnostic) -> Box<Diagnostic> {
    Box::new(diagnostic)
}

pub(crate) use tussock_language::nearest::nearest;
