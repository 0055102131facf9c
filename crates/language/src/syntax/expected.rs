//! What may stand at a place in the text. Completion asks the same parser that reads the text, so
//! what is offered is what is understood.

use super::kind::{SyntaxKind, SyntaxNode};
use super::parser::expected_at_end;
use super::span_of;
use crate::span::Span;
use crate::verbs::{Clause, Presence, Slot, Verb};

/// One thing that may stand at a place.
#[derive(Clone, Debug, PartialEq)]
pub enum Expected {
    /// The word that a statement starts with.
    Verb,
    /// What fills a slot of the verb or of one of its clauses.
    Slot(&'static Slot),
    /// A clause of the statement that it does not have yet.
    Clause(&'static Clause),
    /// A fixed word: `into`, `sample`, `then`, `else`.
    Word(&'static str),
    /// A fixed sign.
    Sign(&'static str),
    /// A column of the table of [`Expectation::table`], after `table.`.
    Column,
    /// A level of this column, which an expression compares.
    Level(String),
    /// A value in an expression: a column, a function, `not`, `if`, a number, a text.
    Operand,
    /// An operator in an expression.
    Operator,
    /// The next key of a path that so far has these segments.
    Key(Vec<String>),
}

/// Everything that may stand at a place, and what surrounds it.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Expectation {
    /// The verb of the statement around the place.
    pub verb: Option<&'static Verb>,
    /// The table whose columns the statement speaks of, wherever in the statement it is named.
    pub table: Option<String>,
    /// The column that the statement's levels belong to: of `levels crew.roster ...`.
    pub column: Option<String>,
    /// What may stand there, in the order of the grammar.
    pub expected: Vec<Expected>,
    /// The word that is being typed, from its start to its end, in the full text; empty between
    /// words.
    pub word: Span,
    /// Whether the place is inside a text or a comment, where nothing of the grammar may stand;
    /// `expected` then says what the whole text fills.
    pub in_text: bool,
}

impl PartialEq for Verb {
    fn eq(&self, other: &Self) -> bool {
        self.name() == other.name()
    }
}

/// What may stand at `offset` of the full text, which lies in the code region `region`.
#[must_use]
pub fn expected_at(text: &str, region: Span, offset: usize) -> Expectation {
    let code = region.of(text);
    let offset = offset.clamp(region.start, region.end.max(region.start)) - region.start;
    let offset = floor_to_character(code, offset.min(code.len()));
    let token = super::tokens(code)
        .into_iter()
        .find(|token| token.span.start < offset && offset <= token.span.end);
    let (word, in_text) = match token {
        Some(token) if is_word(token.kind) => (token.span, false),
        Some(token) if token.kind == SyntaxKind::Comment => {
            return Expectation {
                word: Span::new(offset, offset).shifted(region.start),
                in_text: true,
                ..Expectation::default()
            };
        }
        Some(token) if token.kind.is_text() && in_text(code, token.span, offset) => {
            (token.span, true)
        }
        _ => (Span::new(offset, offset), false),
    };
    let ending = expected_at_end(code.get(..word.start).unwrap_or_default());
    let root = SyntaxNode::new_root(super::parser::parse(code).tree);
    let statement = statement_around(&root, word.start).filter(|_| ending.verb.is_some());
    let present = statement.as_ref().map(clause_words).unwrap_or_default();
    let mut expected = ending.expected;
    expected.retain(|expected| {
        let Expected::Clause(clause) = expected else { return true };
        let elsewhere = present.iter().any(|(start, words)| {
            *start != word.start
                && words.iter().map(String::as_str).eq(clause.words.iter().copied())
        });
        clause.presence == Presence::Repeatable || !elsewhere
    });
    Expectation {
        verb: ending.verb,
        table: statement.as_ref().and_then(|node| first_name(node, SyntaxKind::TableName)),
        column: statement.as_ref().and_then(|node| {
            let path = node.descendants().find(|node| node.kind() == SyntaxKind::ColumnPath)?;
            first_name(&path, SyntaxKind::ColumnName)
        }),
        expected,
        word: word.shifted(region.start),
        in_text,
    }
}

fn is_word(kind: SyntaxKind) -> bool {
    kind.is_name() || kind == SyntaxKind::Number
}

/// Whether a cursor in or at the end of a text is inside its quotes.
fn in_text(code: &str, span: Span, offset: usize) -> bool {
    let text = span.of(code);
    let quotes = if text.starts_with("\"\"\"") { "\"\"\"" } else { "\"" };
    let closed = crate::lower::text::is_closed(text, quotes);
    offset < span.end || !closed
}

fn floor_to_character(text: &str, offset: usize) -> usize {
    (0..=offset).rev().find(|offset| text.is_char_boundary(*offset)).unwrap_or(0)
}

/// The last statement that starts at or before the place.
fn statement_around(root: &SyntaxNode, offset: usize) -> Option<SyntaxNode> {
    root.children()
        .filter(|node| node.kind() == SyntaxKind::Statement)
        .take_while(|node| span_of(node.text_range()).start <= offset)
        .last()
}

/// Where each clause of a statement starts, and its words.
fn clause_words(statement: &SyntaxNode) -> Vec<(usize, Vec<String>)> {
    statement
        .children()
        .filter(|node| node.kind() == SyntaxKind::Clause)
        .map(|clause| {
            let words = crate::lower::words(&clause);
            (span_of(clause.text_range()).start, words)
        })
        .collect()
}

fn first_name(node: &SyntaxNode, kind: SyntaxKind) -> Option<String> {
    let name = node.descendants().find(|node| node.kind() == kind)?;
    Some(crate::lower::text::bare_name(&name.text().to_string()).to_owned())
}
