//! An evaluator of a few words, so that a test says what a cell does: `note TEXT`, `table`, `many
//! N`, `wrong`, `fall`, `stay` (until it is stopped), `stubborn` (which can't be stopped), `count`
//! (how many cells were run).

use std::time::Duration;

use tussock_kernel::evaluator::{Completeness, Evaluator, Suggestion};
use tussock_language::diagnostic::Diagnostic;
use tussock_language::document::Document;
use tussock_language::span::{Location, SourceId, Span};
use tussock_report::rich::Rich;
use tussock_report::table::{Cell, Column, ColumnKind, Row, Table};
use tussock_session::answer::{Answer, Answers, Output};
use tussock_session::cancel::Cancel;
use tussock_session::notebook::Reply;

#[derive(Default)]
pub(crate) struct Scripted {
    runs: usize,
}

impl Evaluator for Scripted {
    fn run(&mut self, cell: Option<&str>, code: &str, cancel: &Cancel) -> Reply {
        self.runs += 1;
        let mut answers = Answers::default();
        let mut start = 0;
        for line in code.split_inclusive('\n') {
            let location =
                Location { source: SourceId(0), span: Span::new(start, start + line.trim().len()) };
            start += line.len();
            for output in self.obey(line.trim(), cell, location, cancel, &mut answers.interrupted) {
                answers.list.push(Answer { location, output });
            }
        }
        Reply { answers, document: Document::script(code), source: SourceId(0) }
    }

    /// The word before the offset, doubled.
    fn complete(&self, code: &str, offset: usize) -> Vec<Suggestion> {
        let before = &code[..offset];
        let start = before.rfind(' ').map_or(0, |at| at + 1);
        let word = &before[start..];
        vec![Suggestion {
            text: format!("{word}{word}"),
            kind: "word",
            detail: "twice".to_owned(),
            start,
            end: offset,
        }]
    }

    /// What stands after the offset, as a small page; nothing at the end.
    fn inspect(&self, code: &str, offset: usize) -> Option<String> {
        let rest = &code[offset..];
        (!rest.is_empty()).then(|| format!("**{rest}**\n\n| a | b |\n|---|---|\n| 1 | 2 |\n"))
    }

    fn is_complete(&self, code: &str) -> Completeness {
        match code {
            "more" => Completeness::Incomplete { indent: "  ".to_owned() },
            "never" => Completeness::Invalid,
            _ => Completeness::Complete,
        }
    }
}

impl Scripted {
    fn obey(
        &self,
        line: &str,
        cell: Option<&str>,
        location: Location,
        cancel: &Cancel,
        interrupted: &mut bool,
    ) -> Vec<Output> {
        let note = |text: &str| Output::Note(Rich::plain(text));
        let (word, rest) = line.split_once(' ').unwrap_or((line, ""));
        match word {
            "note" => vec![note(rest)],
            "cell" => vec![note(cell.unwrap_or("unnamed"))],
            "count" => vec![note(&self.runs.to_string())],
            "many" => (0..rest.parse().unwrap()).map(|n: usize| note(&n.to_string())).collect(),
            "table" => vec![Output::Table(table(rest))],
            "wrong" => vec![Output::Problem(
                Diagnostic::error("made-up", location, format!("{rest} is wrong")).help("mend it"),
            )],
            "doubtful" => vec![Output::Problem(Diagnostic::warning(
                "made-up-doubt",
                location,
                format!("{rest} is <doubtful>"),
            ))],
            "fall" => panic!("fell over {rest}"),
            "stay" => {
                while !cancel.is_cancelled() {
                    std::thread::sleep(Duration::from_millis(2));
                }
                *interrupted = true;
                vec![]
            }
            "stubborn" => {
                std::thread::sleep(Duration::from_secs(20));
                vec![]
            }
            _ => vec![],
        }
    }
}

fn table(text: &str) -> Table {
    let column = Column { head: Rich::plain("roster"), spanner: None, kind: ColumnKind::RowHead };
    Table {
        title: Rich::plain("A table"),
        columns: vec![column],
        rows: vec![Row { cells: vec![Cell::Text(Rich::plain(text))], opens_block: false }],
        ..Table::default()
    }
}
