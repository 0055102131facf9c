//! Problems on a terminal and as JSON.

use serde_json::{Value as Json, json};
use tussock_language::diagnostic::Diagnostic;
use tussock_language::present::{Line, present, severity_word};
use tussock_session::files::Opened;

use crate::output;

/// Tells each problem once on standard error, with its line and a caret.
pub(crate) fn tell<'a>(opened: &Opened, problems: impl Iterator<Item = &'a Diagnostic>) {
    let mut told: Vec<&Diagnostic> = Vec::new();
    for problem in problems {
        if !told.contains(&problem) {
            output::warn(&present(problem, &opened.document, &|at| opened.place(at)));
            told.push(problem);
        }
    }
}

/// A problem with its place counted from 1, columns in characters.
pub(crate) fn json(opened: &Opened, problem: &Diagnostic) -> Json {
    let text = opened.document.text(problem.location.source);
    let at = |offset: usize| {
        let line = Line::around(text, offset);
        let before = text.get(line.start..offset.min(text.len())).unwrap_or_default();
        json!({ "line": line.number, "column": before.chars().count() + 1 })
    };
    json!({
        "file": opened.path.display().to_string(),
        "cell": opened.cell(problem.location),
        "start": at(problem.location.span.start),
        "end": at(problem.location.span.end),
        "rule": problem.rule,
        "severity": severity_word(problem.severity),
        "message": problem.message,
        "help": problem.help,
    })
}
