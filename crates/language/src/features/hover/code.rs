//! Hover in code: by the node of the tree that the word under the cursor fills.

use super::{Hover, on_written_path};
use crate::document::Region;
use crate::facts::Facts;
use crate::features::describe::{self, Describe, EXPRESSION_WORDS};
use crate::features::explain::rules;
use crate::features::live::braces_around;
use crate::features::place::{CodeCursor, allowed_rule_start, name_in, token_at};
use crate::lower::text::bare_name;
use crate::span::Span;
use crate::syntax::{SyntaxKind, SyntaxNode};
use crate::terms;
use crate::verbs::{self, Clause, Part, Slot, Verb, What};

/// The word at `offset` of a code region.
#[expect(clippy::wildcard_enum_match_arm, reason = "words of any other kind are handled alike")]
pub(super) fn hover(
    names: &Describe<'_>,
    text: &str,
    region: Region,
    offset: usize,
) -> Option<Hover> {
    let cursor = token_at(text, region, offset)?;
    let span = cursor.parse.token_span(&cursor.token);
    if cursor.token.kind() == SyntaxKind::Comment {
        return on_comment(names.facts, cursor.token.text(), span, offset);
    }
    let node = cursor.token.parent()?;
    let word = Word { names, cursor: &cursor, node, span };
    match cursor.token.kind() {
        SyntaxKind::Verb => {
            let verb = verbs::find(cursor.token.text())?;
            Some(Hover { span, markdown: verb.page.text.to_owned() })
        }
        SyntaxKind::String | SyntaxKind::LongString => word.text(text, offset),
        _ => word.filled_slot(text, offset).or_else(|| word.keyword()),
    }
}

fn on_comment(facts: &dyn Facts, comment: &str, span: Span, offset: usize) -> Option<Hover> {
    let start = allowed_rule_start(comment, offset.saturating_sub(span.start))?;
    let name = comment.get(start..)?;
    let length = name
        .find(|character: char| !(character.is_ascii_alphanumeric() || character == '-'))
        .unwrap_or(name.len());
    let rules = rules(facts);
    let page = rules.iter().find(|page| Some(page.name) == name.get(..length))?;
    let start = span.start + start;
    Some(Hover { span: Span::new(start, start + length), markdown: page.text.to_owned() })
}

/// The word under the cursor and what it is part of.
struct Word<'a> {
    names: &'a Describe<'a>,
    cursor: &'a CodeCursor,
    node: SyntaxNode,
    span: Span,
}

impl Word<'_> {
    #[expect(clippy::wildcard_enum_match_arm, reason = "other nodes are no slots")]
    fn filled_slot(&self, text: &str, offset: usize) -> Option<Hover> {
        let names = self.names;
        let name = bare_name(self.cursor.token.text());
        let markdown = match self.node.kind() {
            SyntaxKind::TableName | SyntaxKind::NewTableName => names.table(name),
            SyntaxKind::SampleName => {
                let page = names.facts.samples().iter().find(|page| page.name == name)?;
                Some(page.text.to_owned())
            }
            SyntaxKind::ComparisonName | SyntaxKind::NewComparisonName => names.comparison(name),
            SyntaxKind::ViewName => {
                let page = names.facts.views().iter().find(|page| page.name == name)?;
                Some(page.text.to_owned())
            }
            SyntaxKind::ColumnName => names.column(&self.table()?, name),
            SyntaxKind::LevelName => names.level(&self.table()?, &self.column()?, name),
            SyntaxKind::NameReference => self.reference(name),
            SyntaxKind::FunctionName => {
                let page = names.facts.functions().iter().find(|page| page.name == name)?;
                Some(page.text.to_owned())
            }
            SyntaxKind::Term => names.term(&self.comparison()?, name),
            SyntaxKind::Choice => self.choice(name),
            SyntaxKind::Path => {
                return on_written_path(names, text, self.cursor.parse.span(&self.node), offset);
            }
            _ => None,
        };
        Some(Hover { span: self.span, markdown: markdown? })
    }

    /// A column, or a level of the column on the other side of the comparison.
    fn reference(&self, name: &str) -> Option<String> {
        let table = self.table()?;
        if let Some(column) = self.names.column(&table, name) {
            return Some(column);
        }
        let compared = self
            .node
            .ancestors()
            .find(|node| matches!(node.kind(), SyntaxKind::Binary | SyntaxKind::Membership))?;
        let column = name_in(&compared, SyntaxKind::NameReference)?;
        self.names.level(&table, &column, name)
    }

    fn choice(&self, word: &str) -> Option<String> {
        if let Some(term) = terms::of_word(word) {
            return Some(self.names.trade_term(term, self.comparison().as_deref()));
        }
        let slots = self.clause()?.parts.iter().filter_map(|part| match part {
            Part::Slot(Slot { what: What::OneOf(choices), .. }) => Some(*choices),
            Part::Slot(_) | Part::Word(_) | Part::Sign(..) | Part::Either(_) => None,
        });
        slots.flatten().find(|choice| choice.word == word).map(describe::choice)
    }

    /// A word of a clause, of a head, or of an expression.
    #[expect(
        clippy::wildcard_enum_match_arm,
        reason = "the other nodes with words are expressions"
    )]
    fn keyword(&self) -> Option<Hover> {
        if self.cursor.token.kind() != SyntaxKind::Keyword {
            return None;
        }
        let word = self.cursor.token.text();
        match self.node.kind() {
            SyntaxKind::Clause => {
                let markdown = describe::clause(self.verb()?, self.clause()?);
                Some(Hover { span: self.words_of_clause()?, markdown })
            }
            SyntaxKind::Statement => {
                let markdown = self.verb()?.page.text.to_owned();
                Some(Hover { span: self.span, markdown })
            }
            _ => {
                let known = EXPRESSION_WORDS.iter().find(|known| known.word == word)?;
                Some(Hover { span: self.span, markdown: describe::choice(known) })
            }
        }
    }

    /// A text: a live value of a paragraph, or the table that a file becomes.
    #[expect(clippy::wildcard_enum_match_arm, reason = "other texts stand for themselves")]
    fn text(&self, text: &str, offset: usize) -> Option<Hover> {
        match self.node.kind() {
            SyntaxKind::TextValue => {
                let inner = braces_around(text, self.span, offset)?;
                on_written_path(self.names, text, inner, offset)
            }
            SyntaxKind::FileName => {
                let table = name_in(&self.statement()?, SyntaxKind::NewTableName)?;
                Some(Hover { span: self.span, markdown: self.names.table(&table)? })
            }
            _ => None,
        }
    }

    fn statement(&self) -> Option<SyntaxNode> {
        self.node.ancestors().find(|node| node.kind() == SyntaxKind::Statement)
    }

    fn verb(&self) -> Option<&'static Verb> {
        verbs::find(self.statement()?.first_token()?.text())
    }

    fn clause(&self) -> Option<&'static Clause> {
        let words = self.clause_keywords()?;
        let clauses = self.verb()?.clauses.iter();
        clauses
            .filter(|clause| {
                words
                    .iter()
                    .map(String::as_str)
                    .take(clause.words.len())
                    .eq(clause.words.iter().copied())
            })
            .max_by_key(|clause| clause.words.len())
    }

    fn clause_node(&self) -> Option<SyntaxNode> {
        self.node.ancestors().find(|node| node.kind() == SyntaxKind::Clause)
    }

    fn clause_keywords(&self) -> Option<Vec<String>> {
        Some(crate::lower::words(&self.clause_node()?))
    }

    /// Where the words of the clause stand, or the word alone where it comes later in the clause.
    fn words_of_clause(&self) -> Option<Span> {
        let start = self.cursor.parse.span(&self.clause_node()?).start;
        let clause = self.clause()?;
        let is_first = clause.words.first() == Some(&self.cursor.token.text());
        let is_one_of = clause.words.contains(&self.cursor.token.text());
        let start = if is_one_of && !is_first { start } else { self.span.start };
        Some(Span::new(start, self.span.end))
    }

    /// The table that a column belongs to: that of its path, or that of the statement.
    fn table(&self) -> Option<String> {
        let path = self.node.ancestors().find(|node| node.kind() == SyntaxKind::ColumnPath);
        name_in(&path.or_else(|| self.statement())?, SyntaxKind::TableName)
    }

    fn column(&self) -> Option<String> {
        name_in(&self.statement()?, SyntaxKind::ColumnName)
    }

    fn comparison(&self) -> Option<String> {
        name_in(&self.statement()?, SyntaxKind::ComparisonName)
    }
}
