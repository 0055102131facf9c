//! Live values in prose: `{{main.omnibus.pillai}}`, `{{main.omnibus.pillai.value 3}}`.

mod markdown;

pub use markdown::{Prose, live_values};

use crate::ast::{LiveValue, Path, ProsePart};
use crate::lower::text::{Cooked, bare_name};
use crate::span::{Span, Spanned};
use crate::syntax::{SyntaxError, SyntaxKind, Token, tokens};

/// More decimals than a double has digits mean nothing.
const MOST_DECIMALS: usize = 15;

/// Divides the text of `write` into plain text and live values.
pub(crate) fn parts(cooked: &Cooked, errors: &mut Vec<SyntaxError>) -> Vec<ProsePart> {
    let text = cooked.text.as_str();
    let mut parts = Vec::new();
    let mut plain = 0;
    let mut from = 0;
    while let Some(open) = text.get(from..).and_then(|rest| rest.find("{{")).map(|at| from + at) {
        if cooked.escaped_braces.contains(&open) {
            from = open + 1;
            continue;
        }
        let inner = open + 2;
        let Some(length) = text.get(inner..).and_then(closing) else {
            errors.push(unclosed(cooked.span(open, inner)));
            break;
        };
        let close = inner + length + 2;
        let content = text.get(inner..inner + length).unwrap_or_default();
        let place = |span: Span| cooked.span(inner + span.start, inner + span.end);
        match live_value(content, cooked.span(open, close), place) {
            Ok(value) => {
                if open > plain {
                    let text = text.get(plain..open).unwrap_or_default().to_owned();
                    parts.push(ProsePart::Text(text));
                }
                parts.push(ProsePart::Value(value));
                plain = close;
            }
            Err(error) => errors.push(*error),
        }
        from = close;
    }
    if let Some(rest) = text.get(plain..).filter(|rest| !rest.is_empty()) {
        parts.push(ProsePart::Text(rest.to_owned()));
    }
    parts
}

/// How far it is to the `}}` that closes a live value. Back-quotes hide what is in them.
fn closing(text: &str) -> Option<usize> {
    let mut quoted = false;
    for (offset, character) in text.char_indices() {
        match character {
            '`' => quoted = !quoted,
            '}' if !quoted && text.get(offset..).is_some_and(|rest| rest.starts_with("}}")) => {
                return Some(offset);
            }
            '{' if !quoted && text.get(offset..).is_some_and(|rest| rest.starts_with("{{")) => {
                return None;
            }
            _ => {}
        }
    }
    None
}

fn unclosed(span: Span) -> SyntaxError {
    SyntaxError::new(span, "the closing `}}` of this live value is missing")
        .help("to print two braces as they stand, write `\\{{`")
}

/// Reads what stands between the braces. `place` turns a span of the content into one of the full
/// text.
fn live_value(
    content: &str,
    span: Span,
    place: impl Fn(Span) -> Span,
) -> Result<LiveValue, Box<SyntaxError>> {
    let tokens: Vec<Token> =
        tokens(content).into_iter().filter(|token| !token.kind.is_trivia()).collect();
    let mut rest = tokens.as_slice();
    let mut segments = Vec::new();
    loop {
        let (token, after) = match rest.split_first() {
            Some((token, after)) if is_key(*token, content, segments.is_empty()) => (token, after),
            Some((token, _)) => {
                let written = token.span.of(content);
                let message = format!("`{written}` is no key of a live value");
                let help = "a key that is not a plain name goes in back-quotes";
                return Err(Box::new(SyntaxError::new(place(token.span), message).help(help)));
            }
            None => {
                let message = match segments.as_slice() {
                    [] => "a live value needs a path",
                    _ => "a key is missing after the dot",
                };
                let error = SyntaxError::new(span, message);
                return Err(Box::new(error.help("write for example `{{main.omnibus.pillai}}`")));
            }
        };
        let value = bare_name(token.span.of(content)).to_owned();
        segments.push(Spanned { value, span: place(token.span) });
        rest = after;
        match rest.split_first() {
            Some((dot, after)) if dot.kind == SyntaxKind::Dot => rest = after,
            _ => break,
        }
    }
    let decimals = match rest {
        [] => None,
        [token] if is_whole(*token, content) => {
            let decimals: Option<usize> = token.span.of(content).parse().ok();
            match decimals.filter(|decimals| *decimals <= MOST_DECIMALS) {
                Some(decimals) => Some(decimals),
                None => {
                    let message = format!("a live value has {MOST_DECIMALS} decimals at most");
                    return Err(Box::new(SyntaxError::new(place(token.span), message)));
                }
            }
        }
        [token, ..] => {
            let message = "after the path only the number of decimals may follow";
            let help = "write for example `{{main.omnibus.pillai.value 3}}`";
            return Err(Box::new(SyntaxError::new(place(token.span), message).help(help)));
        }
    };
    let path_span = match (segments.first(), segments.last()) {
        (Some(first), Some(last)) => Span::new(first.span.start, last.span.end),
        _ => span,
    };
    Ok(LiveValue { path: Path { segments, span: path_span }, decimals, span })
}

#[expect(clippy::wildcard_enum_match_arm, reason = "tokens of other kinds are no keys")]
fn is_key(token: Token, content: &str, first: bool) -> bool {
    match token.kind {
        SyntaxKind::Name => true,
        SyntaxKind::QuotedName => {
            let written = token.span.of(content);
            written.len() > 2 && written.ends_with('`')
        }
        SyntaxKind::Number => !first && is_whole(token, content),
        _ => false,
    }
}

fn is_whole(token: Token, content: &str) -> bool {
    token.kind == SyntaxKind::Number
        && token.span.of(content).bytes().all(|byte| byte.is_ascii_digit())
}
