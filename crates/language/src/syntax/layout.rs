//! Which tokens start a statement: the first on a line that is not indented deeper than the margin.

use super::lexer::Token;

/// How far a tab moves to the right.
const TAB: usize = 4;

/// Where statements start.
pub(super) struct Layout {
    /// For each token whether it starts a statement.
    pub(super) starts: Vec<bool>,
    /// Whether a word that is added to the end of the text would start a statement.
    pub(super) ends_at_margin: bool,
}

/// Divides tokens into statements.
///
/// The margin is the indentation of the first line that holds a token other than a comment, so that
/// code in an indented fence of a Markdown list reads as it would at the left edge.
#[expect(clippy::wildcard_enum_match_arm, reason = "tokens of every other kind are handled alike")]
pub(super) fn layout(text: &str, tokens: &[Token]) -> Layout {
    let mut margin: Option<usize> = None;
    let mut indentation = Some(0);
    let mut starts = Vec::with_capacity(tokens.len());
    for token in tokens {
        let mut starts_here = false;
        match token.kind {
            super::SyntaxKind::Newline => indentation = Some(0),
            super::SyntaxKind::Whitespace => {
                if let Some(column) = &mut indentation {
                    *column = width(token.span.of(text), *column);
                }
            }
            super::SyntaxKind::Comment => indentation = None,
            _ => {
                if let Some(column) = indentation.take() {
                    starts_here = column <= *margin.get_or_insert(column);
                }
            }
        }
        starts.push(starts_here);
    }
    let ends_at_margin =
        indentation.is_some_and(|column| margin.is_none_or(|margin| column <= margin));
    Layout { starts, ends_at_margin }
}

fn width(blanks: &str, from: usize) -> usize {
    blanks.chars().fold(from, |column, blank| match blank {
        '\t' => (column / TAB + 1) * TAB,
        '\u{feff}' | '\u{200b}' => column,
        _ => column + 1,
    })
}
