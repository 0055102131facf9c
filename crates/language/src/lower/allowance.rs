//! `# allow RULE: reason` comments above a statement.

use crate::ast::Allowance;
use crate::span::{Span, Spanned};
use crate::syntax::{SyntaxElement, SyntaxKind, SyntaxNode, SyntaxToken};

/// The allowances in the comments directly above a statement, without a blank line between.
#[expect(clippy::wildcard_enum_match_arm, reason = "tokens of every other kind are handled alike")]
pub(super) fn above(statement: &SyntaxNode, offset: usize) -> Vec<Allowance> {
    let mut allowed = Vec::new();
    let mut newlines = 0;
    let mut before = statement.prev_sibling_or_token();
    while let Some(SyntaxElement::Token(token)) = before {
        match token.kind() {
            SyntaxKind::Newline => newlines += 1,
            SyntaxKind::Comment if newlines == 1 && starts_its_line(&token) => {
                newlines = 0;
                let start = usize::from(token.text_range().start()) + offset;
                allowed.extend(read(token.text(), start));
            }
            SyntaxKind::Whitespace => {}
            _ => break,
        }
        if newlines > 1 {
            break;
        }
        before = token.prev_sibling_or_token();
    }
    allowed.reverse();
    allowed
}

fn starts_its_line(comment: &SyntaxToken) -> bool {
    let mut before = comment.prev_sibling_or_token();
    while let Some(SyntaxElement::Token(token)) = &before {
        if token.kind() != SyntaxKind::Whitespace {
            return token.kind() == SyntaxKind::Newline;
        }
        before = token.prev_sibling_or_token();
    }
    before.is_none()
}

/// Reads a comment. A word that is no rule's name and has no colon after it is plain English.
fn read(comment: &str, start: usize) -> Option<Allowance> {
    let after = comment.trim_start_matches('#').trim_start().strip_prefix("allow")?;
    let rest = after.trim_start();
    if rest.len() == after.len() {
        return None;
    }
    let from = comment.len() - rest.len();
    let length = rest
        .find(|character: char| !(character.is_ascii_alphanumeric() || character == '-'))
        .unwrap_or(rest.len());
    let (rule, rest) = rest.split_at(length);
    let reason = rest.trim_start().strip_prefix(':');
    if rule.is_empty() || (reason.is_none() && !rule.contains('-')) {
        return None;
    }
    let reason = reason.unwrap_or_default().trim().to_owned();
    let span = Span::new(start + from, start + from + length);
    Some(Allowance { rule: Spanned { value: rule.to_owned(), span }, reason })
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::syntax::parse;

    #[track_caller]
    fn allowed(text: &str) -> Vec<(String, String)> {
        let parse = parse(text, Span::new(0, text.len()));
        let statement = parse.statements.last().expect("the text has a statement");
        let allowed = statement.allowed.iter();
        allowed.map(|one| (one.rule.value.clone(), one.reason.clone())).collect()
    }

    #[test]
    fn comments_directly_above_allow() {
        let text = "# allow few-rows: a pilot\n# allow big-gap: planned\nshow groups of main";
        let expected =
            [("few-rows", "a pilot"), ("big-gap", "planned")].map(|(a, b)| (a.into(), b.into()));
        assert_eq!(allowed(text), expected);
        assert_eq!(allowed("# allow few-rows\r\nshow groups of main").len(), 1);
    }

    #[test]
    fn other_comments_do_not() {
        assert!(allowed("# allow few-rows: why\n\nshow groups of main").is_empty());
        assert!(allowed("# allow me a word\nshow groups of main").is_empty());
        assert!(allowed("pin a at 1 # allow few-rows: why\nshow groups of main").is_empty());
    }
}
