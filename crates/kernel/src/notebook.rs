//! The session's notebook as a kernel's evaluator.

use tussock_language::features::completion::{Completion, CompletionKind, complete};
use tussock_language::features::hover::hover;
use tussock_session::cancel::Cancel;
use tussock_session::notebook::{Notebook, Reply};

use crate::completeness::completeness;
use crate::evaluator::{Completeness, Evaluator, Suggestion};

impl Evaluator for Notebook {
    fn run(&mut self, cell: Option<&str>, code: &str, cancel: &Cancel) -> Reply {
        Notebook::run(self, cell, code, cancel)
    }

    fn complete(&self, code: &str, offset: usize) -> Vec<Suggestion> {
        let (document, cell) = self.with_cell(code);
        let facts = self.knowledge(&document);
        complete(&document, cell, offset, &facts).into_iter().map(suggestion).collect()
    }

    fn inspect(&self, code: &str, offset: usize) -> Option<String> {
        let (document, cell) = self.with_cell(code);
        let facts = self.knowledge(&document);
        hover(&document, cell, offset, &facts).map(|hover| hover.markdown)
    }

    fn is_complete(&self, code: &str) -> Completeness {
        completeness(code)
    }
}

fn suggestion(completion: Completion) -> Suggestion {
    Suggestion {
        text: completion.insert,
        kind: word_for(completion.kind),
        detail: completion.detail,
        start: completion.replace.start,
        end: completion.replace.end,
    }
}

fn word_for(kind: CompletionKind) -> &'static str {
    match kind {
        CompletionKind::Verb => "verb",
        CompletionKind::Clause => "clause",
        CompletionKind::Word => "word",
        CompletionKind::Table => "table",
        CompletionKind::Comparison => "comparison",
        CompletionKind::Column => "column",
        CompletionKind::Level => "level",
        CompletionKind::Term => "term",
        CompletionKind::View => "view",
        CompletionKind::Sample => "sample",
        CompletionKind::Function => "function",
        CompletionKind::File => "file",
        CompletionKind::Key => "key",
        CompletionKind::Rule => "rule",
    }
}
