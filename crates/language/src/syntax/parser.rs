//! The parser's machinery: where it is, what it has built, what it has to say. The grammar itself
//! is in `grammar`, `slot` and `expression`.

use rowan::{Checkpoint, GreenNode, GreenNodeBuilder, Language};

use super::error::SyntaxError;
use super::expected::Expected;
use super::kind::{SyntaxKind, Tussock};
use super::layout::{Layout, layout};
use super::lexer::{Token, tokens};
use crate::span::Span;
use crate::verbs::Verb;

/// A tree and what is wrong with it, with offsets from the start of the text.
pub(super) struct Parsed {
    pub(super) tree: GreenNode,
    pub(super) errors: Vec<SyntaxError>,
}

/// Parses a text of statements.
pub(super) fn parse(text: &str) -> Parsed {
    let mut parser = Parser::new(text);
    parser.root();
    Parsed { tree: parser.builder.finish(), errors: parser.errors }
}

/// What may stand at the end of a text of statements.
pub(super) fn expected_at_end(text: &str) -> Ending {
    let mut parser = Parser::new(text);
    parser.ending = Some(Ending::default());
    parser.root();
    parser.ending.unwrap_or_default()
}

/// What the parser knew when it reached the end of the text.
#[derive(Default)]
pub(super) struct Ending {
    pub(super) verb: Option<&'static Verb>,
    pub(super) expected: Vec<Expected>,
}

pub(super) struct Parser<'t> {
    pub(super) text: &'t str,
    tokens: Vec<Token>,
    layout: Layout,
    /// The next token, trivia included.
    position: usize,
    /// One past the last token of the current statement.
    limit: usize,
    builder: GreenNodeBuilder<'static>,
    pub(super) errors: Vec<SyntaxError>,
    /// Filled only when the caller wants to know what may stand at the end of the text.
    ending: Option<Ending>,
    pub(super) verb: Option<&'static Verb>,
    /// The clauses that the current statement has so far.
    pub(super) clauses: Vec<&'static [&'static str]>,
    /// How deep the current expression is nested.
    pub(super) depth: usize,
}

impl<'t> Parser<'t> {
    fn new(text: &'t str) -> Self {
        let tokens = tokens(text);
        let layout = layout(text, &tokens);
        Self {
            text,
            tokens,
            layout,
            position: 0,
            limit: 0,
            builder: GreenNodeBuilder::new(),
            errors: Vec::new(),
            ending: None,
            verb: None,
            clauses: Vec::new(),
            depth: 0,
        }
    }

    fn root(&mut self) {
        self.builder.start_node(Tussock::kind_to_raw(SyntaxKind::Root));
        loop {
            self.limit = self.tokens.len();
            if self.peek(0).is_none() {
                break;
            }
            self.trivia();
            self.limit = self.next_start(self.position + 1);
            self.statement();
            debug_assert!(self.peek(0).is_none(), "a statement ends where the next one starts");
        }
        self.trivia_to(self.tokens.len());
        if let Some(ending) = &mut self.ending
            && self.layout.ends_at_margin
        {
            *ending = Ending { verb: None, expected: vec![Expected::Verb] };
        }
        self.builder.finish_node();
    }

    fn next_start(&self, from: usize) -> usize {
        let starts = self.layout.starts.iter().enumerate().skip(from);
        starts
            .filter(|(_, starts)| **starts)
            .map(|(index, _)| index)
            .next()
            .unwrap_or(self.tokens.len())
    }

    /// The token that is `ahead` tokens away, not counting trivia, within the statement.
    pub(super) fn peek(&self, ahead: usize) -> Option<Token> {
        let rest = self.tokens.get(self.position..self.limit).unwrap_or_default();
        rest.iter().filter(|token| !token.kind.is_trivia()).nth(ahead).copied()
    }

    /// The kind of the next token.
    pub(super) fn kind(&self) -> Option<SyntaxKind> {
        self.peek(0).map(|token| token.kind)
    }

    /// Whether the next token is of a kind.
    pub(super) fn at(&self, kind: SyntaxKind) -> bool {
        self.kind() == Some(kind)
    }

    /// Whether the token `ahead` is this plain word.
    pub(super) fn word_at(&self, ahead: usize, word: &str) -> bool {
        self.peek(ahead)
            .is_some_and(|token| token.kind == SyntaxKind::Name && token.span.of(self.text) == word)
    }

    /// Whether the statement has no more tokens.
    pub(super) fn at_end(&self) -> bool {
        self.peek(0).is_none()
    }

    /// The text of the next token.
    pub(super) fn next_text(&self) -> &'t str {
        self.peek(0).map_or("", |token| token.span.of(self.text))
    }

    /// Where to point when something is missing: at the next token, or just after the last one.
    pub(super) fn here(&self) -> Span {
        match self.peek(0) {
            Some(token) => token.span,
            None => {
                let end = self.end_of_last_token();
                Span::new(end, end)
            }
        }
    }

    /// One past the last byte of the last token that is not trivia.
    pub(super) fn end_of_last_token(&self) -> usize {
        let before = self.tokens.get(..self.position).unwrap_or_default();
        before.iter().rev().find(|token| !token.kind.is_trivia()).map_or(0, |token| token.span.end)
    }

    /// Takes the next token into the tree.
    pub(super) fn bump(&mut self) {
        if let Some(token) = self.peek(0) {
            self.bump_as(token.kind);
        }
    }

    /// Takes the next token into the tree as another kind.
    pub(super) fn bump_as(&mut self, kind: SyntaxKind) {
        self.trivia();
        if let Some(token) = self.tokens.get(self.position).copied() {
            self.builder.token(Tussock::kind_to_raw(kind), token.span.of(self.text));
            self.position += 1;
        }
    }

    /// Takes the trivia before the next token, if the statement has one.
    fn trivia(&mut self) {
        let rest = self.tokens.get(self.position..self.limit).unwrap_or_default();
        if let Some(count) = rest.iter().position(|token| !token.kind.is_trivia()) {
            self.trivia_to(self.position + count);
        }
    }

    fn trivia_to(&mut self, end: usize) {
        while self.position < end
            && let Some(token) = self.tokens.get(self.position)
        {
            self.builder.token(Tussock::kind_to_raw(token.kind), token.span.of(self.text));
            self.position += 1;
        }
    }

    pub(super) fn open(&mut self, kind: SyntaxKind) {
        self.trivia();
        self.builder.start_node(Tussock::kind_to_raw(kind));
    }

    pub(super) fn mark(&mut self) -> Checkpoint {
        self.trivia();
        self.builder.checkpoint()
    }

    pub(super) fn open_at(&mut self, mark: Checkpoint, kind: SyntaxKind) {
        self.builder.start_node_at(mark, Tussock::kind_to_raw(kind));
    }

    pub(super) fn close(&mut self) {
        self.builder.finish_node();
    }

    /// Reports an error, unless the same place has one already: the first says it best.
    pub(super) fn report(&mut self, error: SyntaxError) {
        let known = self.errors.last().is_some_and(|earlier| earlier.span == error.span);
        if !known {
            self.errors.push(error);
        }
    }

    /// Whether the caller wants to know what may stand at the end of this statement.
    pub(super) fn is_asked_what_follows(&self) -> bool {
        self.ending.is_some() && self.limit == self.tokens.len()
    }

    /// Notes that something may stand here, if here is the end of the text.
    pub(super) fn expect(&mut self, expected: Expected) {
        let verb = self.verb;
        let at_end = self.is_asked_what_follows() && self.at_end();
        if let Some(ending) = &mut self.ending
            && at_end
        {
            ending.verb = verb;
            if !ending.expected.contains(&expected) {
                ending.expected.push(expected);
            }
        }
    }
}
