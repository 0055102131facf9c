//! From text to a lossless tree, and from the tree to typed statements.

mod error;
mod expected;
mod expression;
mod grammar;
mod kind;
mod layout;
mod lexer;
mod parser;
mod slot;

pub use error::{SyntaxError, TextFix};
pub use expected::{Expectation, Expected, expected_at};
pub use kind::{SyntaxElement, SyntaxKind, SyntaxNode, SyntaxToken, Tussock};
pub use lexer::{Token, meant, tokens};

use crate::ast::Statement;
use crate::span::Span;

/// What a region of code says: the tree, its statements, and what is wrong with it.
#[derive(Clone, Debug, PartialEq)]
pub struct Parse {
    /// Every byte of the region. A green tree may be sent to other threads; [`Parse::root`] gives
    /// the tree to walk.
    pub tree: rowan::GreenNode,
    /// The region, in the full text.
    pub region: Span,
    /// One for each statement node of the tree, in the same order.
    pub statements: Vec<Statement>,
    /// In the order of the text.
    pub errors: Vec<SyntaxError>,
}

impl Parse {
    /// The tree, with offsets from the start of the region.
    #[must_use]
    pub fn root(&self) -> SyntaxNode {
        SyntaxNode::new_root(self.tree.clone())
    }

    /// Where a node lies in the full text.
    #[must_use]
    pub fn span(&self, node: &SyntaxNode) -> Span {
        span_of(node.text_range()).shifted(self.region.start)
    }

    /// Where a token lies in the full text.
    #[must_use]
    pub fn token_span(&self, token: &SyntaxToken) -> Span {
        span_of(token.text_range()).shifted(self.region.start)
    }
}

/// Parses a region of a text. Never fails: what cannot be understood is in the tree all the same,
/// and its statement is [`crate::ast::StatementKind::Broken`].
#[must_use]
pub fn parse(text: &str, region: Span) -> Parse {
    let code = region.of(text);
    let parsed = parser::parse(code);
    let root = SyntaxNode::new_root(parsed.tree.clone());
    let mut errors: Vec<SyntaxError> =
        parsed.errors.into_iter().map(|error| error.shifted(region.start)).collect();
    let statements = crate::lower::statements(&root, region.start, &mut errors);
    errors.sort_by_key(|error| error.span);
    Parse { tree: parsed.tree, region, statements, errors }
}

pub(crate) fn span_of(range: rowan::TextRange) -> Span {
    Span::new(range.start().into(), range.end().into())
}
