//! The outline of a document: what it defines and what it asks.

use super::scope::Scope;
use crate::ast::StatementKind;
use crate::document::Document;
use crate::names::{dotted, quoted};
use crate::span::{SourceId, Span};

/// A line of the outline.
#[derive(Clone, Debug, PartialEq)]
pub struct Symbol {
    /// What is defined, or what is asked.
    pub name: String,
    /// What sort of thing it is.
    pub kind: SymbolKind,
    /// One line about it.
    pub detail: String,
    /// The whole statement.
    pub span: Span,
    /// What an editor selects: the name, or the statement's first word.
    pub selection: Span,
}

/// Sorts of symbols.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum SymbolKind {
    /// A table.
    Table,
    /// A column that is derived or described.
    Column,
    /// A comparison.
    Comparison,
    /// The document's policy.
    Policy,
    /// Something that is shown, written or pinned.
    Question,
}

/// The outline of one source, in the order of the text.
#[must_use]
pub fn symbols(document: &Document, source: SourceId) -> Vec<Symbol> {
    let scope = Scope::of(document);
    scope
        .statements(source)
        .filter_map(|statement| {
            let text = scope.text(statement);
            let span = statement.location.span;
            let first_word = text.split_whitespace().next().unwrap_or_default().len();
            let verb = Span::new(span.start, span.start + first_word);
            let line = |name: String, kind, detail: String, selection: Option<Span>| Symbol {
                name,
                kind,
                detail,
                span,
                selection: selection.unwrap_or(verb),
            };
            Some(match &statement.value.kind {
                StatementKind::Read(read) => {
                    let name = &read.name;
                    line(name.value.clone(), SymbolKind::Table, "read".to_owned(), Some(name.span))
                }
                StatementKind::Admit(admit) => {
                    let detail = format!("admitted from {}", quoted(&admit.parent.value));
                    let name = &admit.name;
                    line(name.value.clone(), SymbolKind::Table, detail, Some(name.span))
                }
                StatementKind::Derive(derive) => {
                    let name = column_name(&derive.column);
                    let span = derive.column.column.span;
                    line(name, SymbolKind::Column, "derived".to_owned(), Some(span))
                }
                StatementKind::Levels(levels) => {
                    let name = column_name(&levels.column);
                    let span = levels.column.column.span;
                    line(name, SymbolKind::Column, "levels".to_owned(), Some(span))
                }
                StatementKind::Label(label) => {
                    let name = column_name(&label.column);
                    let span = label.column.column.span;
                    line(name, SymbolKind::Column, label.text.value.clone(), Some(span))
                }
                StatementKind::Compare(compare) => {
                    let factors: Vec<String> =
                        compare.factors.iter().map(|factor| quoted(&factor.value)).collect();
                    let table = quoted(&compare.table.value);
                    let detail = format!("across {} in {table}", factors.join(", "));
                    let name = &compare.name;
                    line(name.value.clone(), SymbolKind::Comparison, detail, Some(name.span))
                }
                StatementKind::Policy(_) => {
                    let settings = text.strip_prefix("policy").unwrap_or_default();
                    let settings = settings.split_whitespace().collect::<Vec<_>>().join(" ");
                    line("policy".to_owned(), SymbolKind::Policy, settings, None)
                }
                StatementKind::Show(show) => {
                    let name = format!(
                        "{} of {}",
                        quoted(&show.view.value),
                        quoted(&show.comparison.value)
                    );
                    line(name, SymbolKind::Question, "show".to_owned(), None)
                }
                StatementKind::Pin(pin) => {
                    let segments: Vec<String> =
                        pin.path.segments.iter().map(|segment| segment.value.clone()).collect();
                    line(dotted(&segments), SymbolKind::Question, "pin".to_owned(), None)
                }
                StatementKind::Write(_) => {
                    line(opening(text), SymbolKind::Question, "write".to_owned(), None)
                }
                StatementKind::Broken { .. } => {
                    let (defines, name) = scope.definition_by(statement)?;
                    let kind = match defines {
                        super::scope::Defines::Table => SymbolKind::Table,
                        super::scope::Defines::Comparison => SymbolKind::Comparison,
                    };
                    line(name.value.clone(), kind, "incomplete".to_owned(), Some(name.span))
                }
            })
        })
        .collect()
}

fn column_name(column: &crate::ast::ColumnPath) -> String {
    format!("{}.{}", quoted(&column.table.value), quoted(&column.column.value))
}

/// The first words of a paragraph.
fn opening(text: &str) -> String {
    const LONGEST: usize = 40;
    let words = text.strip_prefix("write").unwrap_or(text).trim().trim_matches('"');
    let line = words.trim_start().lines().next().unwrap_or_default();
    if line.chars().count() <= LONGEST {
        return line.to_owned();
    }
    let head: String = line.chars().take(LONGEST).collect();
    format!("{}…", head.trim_end())
}
