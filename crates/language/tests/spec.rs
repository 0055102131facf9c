//! The specification of the language, `spec/*.md`, held against the language.
//!
//! A block of code states what is wrong with it in comments under the line that is meant:
//! `#    ^^^^ error[unknown-word]: part of the message`. A `#` directly before the carets counts as
//! the first of them. A block without such comments has nothing wrong with it. A block
//! `tussock unformatted` is formatted into the block `tussock formatted` that follows it, and a
//! block `markdown` is a whole document, with the comments in `<!-- -->`.

#![allow(clippy::indexing_slicing, reason = "a helper of a test fails as the test does")]

mod support;

use std::path::{Path, PathBuf};

use support::FerryFacts;
use tussock_language::diagnostic::Diagnostic;
use tussock_language::document::Document;
use tussock_language::format::format;
use tussock_language::model::{Model, Redefinition};
use tussock_language::present::{Line, severity_word};
use tussock_language::rules::diagnose;

fn pages() -> Vec<(PathBuf, String)> {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/spec");
    let mut pages: Vec<_> = std::fs::read_dir(folder)
        .expect("the folder of the specification exists")
        .map(|entry| entry.expect("the folder can be read").path())
        .filter(|path| path.extension().is_some_and(|extension| extension == "md"))
        .map(|path| (path.clone(), std::fs::read_to_string(path).expect("a page can be read")))
        .collect();
    pages.sort();
    pages
}

/// A fenced block of a page.
struct Block {
    info: String,
    text: String,
    /// The number of its first line.
    line: usize,
}

fn blocks(page: &str) -> Vec<Block> {
    let mut blocks = Vec::new();
    let mut lines = page.lines().enumerate();
    while let Some((_, line)) = lines.next() {
        let fence: String = line.chars().take_while(|character| *character == '`').collect();
        if fence.len() < 3 {
            continue;
        }
        let info = line[fence.len()..].to_owned();
        let mut text = String::new();
        let mut first = None;
        for (number, line) in lines.by_ref() {
            first.get_or_insert(number + 1);
            if line == fence {
                break;
            }
            text.push_str(line);
            text.push('\n');
        }
        blocks.push(Block { info, text, line: first.unwrap_or_default() });
    }
    blocks
}

/// What a comment says about the line above it.
#[derive(Clone, Debug, PartialEq, Eq, PartialOrd, Ord)]
struct Finding {
    line: usize,
    start: usize,
    length: usize,
    severity: String,
    rule: String,
    message: String,
}

fn stated(text: &str) -> Vec<Finding> {
    let mut findings = Vec::new();
    let mut meant = 0;
    for (number, line) in text.lines().enumerate() {
        match finding(line) {
            Some(finding) => findings.push(Finding { line: meant, ..finding }),
            None => meant = number + 1,
        }
    }
    findings
}

fn finding(line: &str) -> Option<Finding> {
    let comment = line.trim_start();
    if !(comment.starts_with('#') || comment.starts_with("<!--")) {
        return None;
    }
    let carets = line.find('^')?;
    let (before, rest) = line.split_at(carets);
    let length = rest.chars().take_while(|character| *character == '^').count();
    let (severity, rest) = rest[length..].trim_start().split_once('[')?;
    let (rule, message) = rest.split_once(']')?;
    let message = message.trim_start_matches(':').trim_end_matches("-->").trim();
    // The `#` of a comment stands where the first caret of a line's first word would.
    let extra = usize::from(before.ends_with('#'));
    Some(Finding {
        line: 0,
        start: before.chars().count() - extra,
        length: length + extra,
        severity: severity.trim().to_owned(),
        rule: rule.to_owned(),
        message: message.to_owned(),
    })
}

fn found(text: &str, diagnostic: &Diagnostic) -> Finding {
    let span = diagnostic.location.span;
    let line = Line::around(text, span.start);
    let end = span.end.min(line.end).max(span.start);
    Finding {
        line: line.number,
        start: text[line.start..span.start].chars().count(),
        length: text[span.start..end].chars().count().max(1),
        severity: severity_word(diagnostic.severity).to_owned(),
        rule: diagnostic.rule.to_owned(),
        message: diagnostic.message.clone(),
    }
}

/// What is wrong with a block other than what it states itself.
fn differences(document: &Document) -> Vec<String> {
    let text = &document.sources[0].text;
    let model = Model::new(document, Redefinition::Error);
    let diagnostics = diagnose(&model, &FerryFacts::of(document));
    let mut found: Vec<Finding> = diagnostics.iter().map(|one| self::found(text, one)).collect();
    let mut differences = Vec::new();
    for stated in stated(text) {
        let place = found.iter().position(|found| {
            let part = found.message.contains(&stated.message) && !stated.message.is_empty();
            part && *found == Finding { message: found.message.clone(), ..stated.clone() }
        });
        match place {
            Some(place) => drop(found.remove(place)),
            None => differences.push(format!("not found: {stated:?}")),
        }
    }
    for found in found {
        let Finding { line, start, length, severity, rule, message } = &found;
        let (before, carets) = match start {
            0 => ("#".to_owned(), length - 1),
            _ => (format!("#{}", " ".repeat(start - 1)), *length),
        };
        let carets = "^".repeat(carets);
        differences.push(format!(
            "not stated, line {line}:\n{before}{carets} {severity}[{rule}]: {message}"
        ));
    }
    differences
}

#[test]
fn the_language_is_as_specified() {
    let mut wrong = Vec::new();
    let mut checked = 0;
    for (path, page) in pages() {
        let blocks = blocks(&page);
        for (index, block) in blocks.iter().enumerate() {
            let differences = match block.info.as_str() {
                "tussock" => differences(&Document::script(block.text.as_str())),
                "markdown" => differences(&Document::markdown(block.text.as_str())),
                "tussock unformatted" => {
                    let after = blocks.get(index + 1).expect("a formatted block follows");
                    assert_eq!(after.info, "tussock formatted");
                    let formatted = format(&block.text);
                    let same = formatted == after.text && format(&formatted) == formatted;
                    if same { Vec::new() } else { vec![format!("formatted:\n{formatted}")] }
                }
                "tussock formatted" | "text" => continue,
                other => vec![format!("an unknown kind of block: {other:?}")],
            };
            checked += 1;
            wrong.extend(
                differences
                    .into_iter()
                    .map(|difference| format!("{}:{}: {difference}", path.display(), block.line)),
            );
        }
    }
    assert!(wrong.is_empty(), "\n{}\n", wrong.join("\n\n"));
    assert!(checked > 40, "the specification has {checked} examples");
}

#[test]
fn a_finding_is_read_from_its_comment() {
    let text = "show a of b\n#^^^ error[syntax]: what\n  # ^^ note[some-rule]\n# plain ^ comment\n";
    let found = stated(text);
    assert_eq!(found.len(), 2);
    assert_eq!((found[0].line, found[0].start, found[0].length), (1, 0, 4));
    assert_eq!((found[1].line, found[1].start, found[1].length), (1, 4, 2));
    assert_eq!(found[1].rule, "some-rule");
}
