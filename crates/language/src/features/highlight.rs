//! What each word is, for editors that colour by meaning.

use super::scope::Scope;
use crate::ast::ProsePart;
use crate::document::Document;
use crate::model::{Content, QuestionKind};
use crate::span::{SourceId, Span};
use crate::syntax::{SyntaxKind, SyntaxToken};

/// A word or sign and what it is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Highlight {
    /// Where it stands, on one line unless it is a text.
    pub span: Span,
    /// What it is.
    pub kind: HighlightKind,
}

/// What a word is.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum HighlightKind {
    /// The word that a statement starts with.
    Verb,
    /// A word of a clause or an expression, or one of a few words to choose from.
    Keyword,
    /// A table.
    Table,
    /// A comparison.
    Comparison,
    /// A column, or a name in an expression.
    Column,
    /// A level of a factor.
    Level,
    /// A view.
    View,
    /// A built-in table.
    Sample,
    /// A function.
    Function,
    /// A segment of a live value.
    Key,
    /// A number.
    Number,
    /// A text.
    Text,
    /// A remark.
    Comment,
    /// An operator.
    Operator,
}

/// The words of one source, in the order of the text, not overlapping.
#[must_use]
pub fn highlights(document: &Document, source: SourceId) -> Vec<Highlight> {
    let scope = Scope::of(document);
    let model = scope.model();
    let mut found = Vec::new();
    for region in model.regions.iter().filter(|region| region.source == source) {
        if let Content::Code(parse) = &region.content {
            let tokens =
                parse.root().descendants_with_tokens().filter_map(rowan::NodeOrToken::into_token);
            for token in tokens {
                if let Some(kind) = kind(&token) {
                    found.push(Highlight { span: parse.token_span(&token), kind });
                }
            }
        }
    }
    let questions = model.questions.iter().filter(|question| question.location.source == source);
    for question in questions {
        let values = match &question.kind {
            QuestionKind::ProseValue(value) => vec![value],
            QuestionKind::Write(write) => write
                .parts
                .iter()
                .filter_map(|part| match part {
                    ProsePart::Value(value) => Some(value),
                    ProsePart::Text(_) => None,
                })
                .collect(),
            QuestionKind::Show(_) | QuestionKind::Pin(_) => Vec::new(),
        };
        for value in values {
            cut_out(&mut found, value.span);
            for (index, segment) in value.path.segments.iter().enumerate() {
                let kind = if index == 0 { HighlightKind::Comparison } else { HighlightKind::Key };
                found.push(Highlight { span: segment.span, kind });
            }
        }
    }
    found.sort_by_key(|highlight| highlight.span);
    found
}

/// Divides the text around a live value in two.
fn cut_out(found: &mut Vec<Highlight>, hole: Span) {
    let around = found
        .iter()
        .position(|highlight| highlight.span.start <= hole.start && hole.end <= highlight.span.end);
    let Some(around) = around else { return };
    let Highlight { span, kind } = found.remove(around);
    found.push(Highlight { span: Span::new(span.start, hole.start), kind });
    found.push(Highlight { span: Span::new(hole.end, span.end), kind });
}

#[expect(clippy::wildcard_enum_match_arm, reason = "other words and signs keep their colour")]
fn kind(token: &SyntaxToken) -> Option<HighlightKind> {
    let parent = token.parent().map(|parent| parent.kind());
    Some(match token.kind() {
        SyntaxKind::Verb => HighlightKind::Verb,
        SyntaxKind::Keyword => HighlightKind::Keyword,
        SyntaxKind::Comment => HighlightKind::Comment,
        SyntaxKind::String | SyntaxKind::LongString => HighlightKind::Text,
        SyntaxKind::Number if parent == Some(SyntaxKind::Path) => HighlightKind::Key,
        SyntaxKind::Number => HighlightKind::Number,
        SyntaxKind::Name | SyntaxKind::QuotedName => match parent? {
            SyntaxKind::TableName | SyntaxKind::NewTableName => HighlightKind::Table,
            SyntaxKind::ComparisonName | SyntaxKind::NewComparisonName => HighlightKind::Comparison,
            SyntaxKind::ColumnName | SyntaxKind::NameReference | SyntaxKind::Term => {
                HighlightKind::Column
            }
            SyntaxKind::LevelName => HighlightKind::Level,
            SyntaxKind::ViewName => HighlightKind::View,
            SyntaxKind::SampleName => HighlightKind::Sample,
            SyntaxKind::FunctionName => HighlightKind::Function,
            SyntaxKind::Path if is_first(token) => HighlightKind::Comparison,
            SyntaxKind::Path => HighlightKind::Key,
            _ => return None,
        },
        SyntaxKind::Equals
        | SyntaxKind::Unequal
        | SyntaxKind::Less
        | SyntaxKind::LessOrEqual
        | SyntaxKind::Greater
        | SyntaxKind::GreaterOrEqual
        | SyntaxKind::Plus
        | SyntaxKind::Minus
        | SyntaxKind::Star
        | SyntaxKind::Slash
        | SyntaxKind::Caret
        | SyntaxKind::Cross => HighlightKind::Operator,
        _ => return None,
    })
}

fn is_first(token: &SyntaxToken) -> bool {
    token.parent().and_then(|parent| parent.first_token()).as_ref() == Some(token)
}
