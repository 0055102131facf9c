//! `read "crew.csv" as crew`

use super::{Clause, Part, Presence, Verb, What, many, one};
use crate::ast::{Read, ReadSource, StatementKind};
use crate::facts::Page;
use crate::lower::Lowering;
use crate::span::Spanned;
use crate::syntax::{SyntaxError, SyntaxKind};

pub(super) static READ: Verb = Verb {
    page: Page::new("read", include_str!("read.md")),
    head: &[Part::Either(&[
        &[Part::Word("sample"), one("a sample", What::Sample)],
        &[one("a file", What::File)],
    ])],
    clauses: &[
        Clause {
            words: &["as"],
            summary: "the table's name",
            parts: &[one("a name", What::NewTable)],
            presence: Presence::Required,
        },
        Clause {
            words: &["missing"],
            summary: "what stands for a missing value, beside an empty cell",
            parts: &[many("a value", What::TextOrNumber)],
            presence: Presence::Optional,
        },
        Clause {
            words: &["separator"],
            summary: "the character between the columns of the file",
            parts: &[one("a separator", What::Text)],
            presence: Presence::Optional,
        },
        Clause {
            words: &["decimal"],
            summary: "the decimal sign of the file's numbers",
            parts: &[one("a decimal sign", What::Text)],
            presence: Presence::Optional,
        },
        Clause {
            words: &["encoding"],
            summary: "how the file's bytes stand for characters",
            parts: &[one("an encoding", What::Text)],
            presence: Presence::Optional,
        },
    ],
    lower,
};

fn lower(statement: &mut Lowering<'_>) -> Option<StatementKind> {
    let head = statement.head();
    let source = match statement.name(&head, SyntaxKind::SampleName) {
        Some(sample) => ReadSource::Sample(sample),
        None => ReadSource::File(statement.text(&head, SyntaxKind::FileName)?),
    };
    let name = statement.clause("as")?;
    let name = statement.name(&name, SyntaxKind::NewTableName)?;
    let missing = match statement.clause("missing") {
        Some(clause) => statement.texts_as_written(&clause),
        None => Vec::new(),
    };
    let separator = character(statement, "separator")?;
    let decimal = character(statement, "decimal")?;
    let encoding = match statement.clause("encoding") {
        Some(clause) => Some(statement.text(&clause, SyntaxKind::TextValue)?),
        None => None,
    };
    Some(StatementKind::Read(Read { source, name, missing, separator, decimal, encoding }))
}

/// The one character of a clause. The outer option is none after an error.
#[expect(clippy::option_option, reason = "a clause may be absent, and it may be wrong")]
fn character(statement: &mut Lowering<'_>, clause: &str) -> Option<Option<Spanned<char>>> {
    let Some(node) = statement.clause(clause) else { return Some(None) };
    let text = statement.text(&node, SyntaxKind::TextValue)?;
    let mut characters = text.value.chars();
    match (characters.next(), characters.next()) {
        (Some(value), None) => Some(Some(Spanned { value, span: text.span })),
        _ => {
            let message = format!("`{clause}` takes a text of exactly one character");
            let help = format!("write `{clause} \";\"`, or `{clause} \"\\t\"` for a tab");
            statement.report(SyntaxError::new(text.span, message).help(help));
            None
        }
    }
}
