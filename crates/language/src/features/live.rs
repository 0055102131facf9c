//! Live values as they are typed: `{{main.omnibus.pillai}}` in a text or in Markdown prose, and the
//! path of `pin`.

use crate::lower::text::bare_name;
use crate::span::{Name, Span, Spanned};
use crate::syntax::{SyntaxKind, Token, tokens};

/// What stands between `{{` and `}}` around a cursor. Without a closing `}}` it goes to the end of
/// the line.
pub(super) fn braces_around(text: &str, bounds: Span, offset: usize) -> Option<Span> {
    let before = text.get(bounds.start..offset)?;
    let start = bounds.start + before.rfind("{{")? + 2;
    if text.get(start..offset)?.contains("}}") {
        return None;
    }
    let after = text.get(offset..bounds.end)?;
    let end = ["}}", "{{", "\n", "\r"].iter().filter_map(|stop| after.find(stop)).min();
    Some(Span::new(start, offset + end.unwrap_or(after.len())))
}

/// The segments of the path that a text starts with, each with its place in the full text.
pub(super) fn segments(text: &str, span: Span) -> Vec<Name> {
    let tokens = significant(text, span);
    let mut segments = Vec::new();
    for (index, token) in tokens.iter().enumerate() {
        let expected =
            if index % 2 == 0 { is_segment(token.kind) } else { token.kind == SyntaxKind::Dot };
        if !expected {
            break;
        }
        if index % 2 == 0 {
            segments.push(Spanned {
                value: bare_name(token.span.of(text)).to_owned(),
                span: token.span,
            });
        }
    }
    segments
}

/// A path that is being typed.
#[derive(Debug, PartialEq)]
pub(super) struct Typed {
    /// The segments before the one under the cursor.
    pub(super) before: Vec<String>,
    /// The segment under the cursor; empty after a dot.
    pub(super) word: Span,
}

/// The path that is typed at a cursor in `span`, or none where the cursor stands behind it.
pub(super) fn typed_at(text: &str, span: Span, offset: usize) -> Option<Typed> {
    let tokens = significant(text, span);
    let started: Vec<&Token> =
        tokens.iter().take_while(|token| token.span.start < offset).collect();
    let (before, word) = match started.as_slice() {
        [before @ .., last] if is_segment(last.kind) && offset <= last.span.end => {
            (before, last.span)
        }
        all => (all, Span::new(offset, offset)),
    };
    let mut segments = Vec::new();
    for pair in before.chunks(2) {
        match pair {
            [segment, dot] if is_segment(segment.kind) && dot.kind == SyntaxKind::Dot => {
                segments.push(bare_name(segment.span.of(text)).to_owned());
            }
            _ => return None,
        }
    }
    Some(Typed { before: segments, word })
}

fn significant(text: &str, span: Span) -> Vec<Token> {
    tokens(span.of(text))
        .into_iter()
        .filter(|token| !token.kind.is_trivia())
        .map(|token| Token { kind: token.kind, span: token.span.shifted(span.start) })
        .collect()
}

fn is_segment(kind: SyntaxKind) -> bool {
    kind.is_name() || kind == SyntaxKind::Number
}

#[cfg(test)]
mod tests {
    use super::*;

    #[track_caller]
    fn typed(marked: &str) -> Option<(Vec<String>, String)> {
        let offset = marked.find("$0").expect("a cursor");
        let text = marked.replace("$0", "");
        let inner = braces_around(&text, Span::new(0, text.len()), offset)?;
        let typed = typed_at(&text, inner, offset)?;
        Some((typed.before, typed.word.of(&text).to_owned()))
    }

    #[test]
    fn a_path_is_known_up_to_the_segment_under_the_cursor() {
        let path = |segments: &[&str], word: &str| {
            Some((segments.iter().map(|s| (*s).to_owned()).collect(), word.to_owned()))
        };
        assert_eq!(typed("a {{$0"), path(&[], ""));
        assert_eq!(typed("a {{ma$0in}} b"), path(&[], "main"));
        assert_eq!(typed("a {{main.$0}} b"), path(&["main"], ""));
        assert_eq!(typed("{{main.functions.1.sh$0"), path(&["main", "functions", "1"], "sh"));
        assert_eq!(typed("{{main.groups.`day sh$0"), path(&["main", "groups"], "`day sh"));
    }

    #[test]
    fn outside_the_braces_and_behind_the_path_there_is_nothing_to_type() {
        assert_eq!(typed("{{main}} and $0"), None);
        assert_eq!(typed("plain $0"), None);
        assert_eq!(typed("{{main.omnibus.pillai $0}}"), None);
        assert_eq!(typed("{{main.omnibus.pillai 3$0}}"), None);
    }

    #[test]
    fn segments_keep_their_places() {
        let text = "x {{main.`a b`.2 3}}";
        let found: Vec<String> = segments(text, Span::new(4, 18))
            .iter()
            .map(|name| format!("{} {}", name.value, name.span.of(text)))
            .collect();
        assert_eq!(found, ["main main", "a b `a b`", "2 2"]);
    }
}
