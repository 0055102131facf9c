//! A document and its answers as a page to be read.

use tussock_language::diagnostic::{Diagnostic, Severity};
use tussock_language::document::{RegionKind, Source};
use tussock_language::span::{SourceId, Span};
use tussock_report::page::{self, Block, Page};

use crate::answer::{Answer, Answers, Output};
use crate::files::Opened;

/// Prose as it stands, live values put in, code, and after the code what it answered.
#[must_use]
pub fn page(opened: &Opened, answers: &Answers) -> Page {
    let title = opened
        .path
        .file_stem()
        .map_or_else(String::new, |stem| stem.to_string_lossy().into_owned());
    let mut page = Page::new(title);
    for (index, source) in opened.document.sources.iter().enumerate() {
        let id = SourceId(index);
        let here: Vec<&Answer> =
            answers.list.iter().filter(|answer| answer.location.source == id).collect();
        for region in &source.regions {
            let within = |answer: &&&Answer| {
                let at = answer.location.span.start;
                region.span.start <= at && at < region.span.end.max(region.span.start + 1)
            };
            let inside: Vec<&Answer> = here.iter().filter(within).copied().collect();
            match region.kind {
                RegionKind::Prose => prose(&mut page, opened, source, region.span, &inside),
                RegionKind::Code => code(&mut page, opened, source, region.span, &inside),
            }
        }
    }
    page
}

fn prose(page: &mut Page, opened: &Opened, source: &Source, span: Span, answers: &[&Answer]) {
    let mut text = String::new();
    let mut done = span.start;
    for answer in answers {
        if let Output::Value(value) = &answer.output {
            let at = answer.location.span;
            text.push_str(source.text.get(done..at.start).unwrap_or_default());
            text.push_str(&value.markdown());
            done = at.end;
        }
    }
    text.push_str(source.text.get(done..span.end).unwrap_or_default());
    if !text.trim().is_empty() {
        page.blocks.push(Block::Prose(text));
    }
    for answer in answers {
        if let Output::Problem(problem) = &answer.output {
            page.blocks.push(problem_block(opened, problem));
        }
    }
}

fn code(page: &mut Page, opened: &Opened, source: &Source, span: Span, answers: &[&Answer]) {
    let text = span.of(&source.text).trim_matches('\n');
    if !text.trim().is_empty() {
        page.blocks.push(Block::Code { text: text.to_owned(), language: "tussock".to_owned() });
    }
    for answer in answers {
        page.blocks.push(match &answer.output {
            Output::Table(table) => Block::Table(table.clone()),
            Output::Paragraph(rich) => Block::Paragraph(rich.clone()),
            Output::Problem(problem) => problem_block(opened, problem),
            Output::Note(_) | Output::Value(_) => continue,
        });
    }
}

fn problem_block(opened: &Opened, problem: &Diagnostic) -> Block {
    let mut lines = vec![opened.place(problem.location)];
    lines.extend(problem.help.iter().cloned());
    Block::Problem {
        severity: match problem.severity {
            Severity::Error => page::Severity::Error,
            Severity::Warning => page::Severity::Warning,
            Severity::Information => page::Severity::Information,
        },
        title: problem.message.clone(),
        lines,
    }
}
