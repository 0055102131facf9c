//! Styled text as Markdown.

use super::text::{printable, unicode_subscript, unicode_superscript};
use super::{Rich, Style};

pub(super) fn markdown(rich: &Rich) -> String {
    let mut out = String::new();
    for (index, run) in rich.runs.iter().enumerate() {
        let text = printable(&run.text);
        let next = rich.runs.get(index + 1);
        let follower = next.and_then(|run| run.text.chars().next());
        match run.style {
            Style::Plain => escape(&mut out, &text, follower),
            Style::Italic => emphasis(&mut out, &text, follower, &ITALIC),
            Style::Strong => emphasis(&mut out, &text, follower, &STRONG),
            Style::Superscript => shifted(&mut out, &text, unicode_superscript(&text), "sup"),
            Style::Subscript => shifted(&mut out, &text, unicode_subscript(&text), "sub"),
        }
    }
    out
}

/// The mark of a style, and the tag that says the same.
struct Emphasis {
    mark: &'static str,
    tag: &'static str,
}

const ITALIC: Emphasis = Emphasis { mark: "*", tag: "em" };
const STRONG: Emphasis = Emphasis { mark: "**", tag: "strong" };

/// Marks are read as marks only where they cling to letters and figures or stand away from other
/// text, and not beside other marks; elsewhere the tag is safe.
fn emphasis(out: &mut String, text: &str, follower: Option<char>, style: &Emphasis) {
    let clings = |inner: Option<char>, outer: Option<char>| {
        let is_apart = outer.is_none_or(|outer| outer == ' ');
        inner.is_some_and(|inner| inner.is_alphanumeric() || (inner != ' ' && is_apart))
    };
    let legible = clings(text.chars().next(), out.chars().next_back())
        && clings(text.chars().next_back(), follower)
        && !out.ends_with('*')
        && follower != Some('*');
    let (open, close) = if legible {
        (style.mark.to_owned(), style.mark.to_owned())
    } else {
        (format!("<{}>", style.tag), format!("</{}>", style.tag))
    };
    out.push_str(&open);
    escape(out, text, None);
    out.push_str(&close);
}

fn shifted(out: &mut String, text: &str, unicode: Option<String>, tag: &str) {
    match unicode {
        Some(text) => out.push_str(&text),
        None => {
            out.push_str(&format!("<{tag}>"));
            escape(out, text, None);
            out.push_str(&format!("</{tag}>"));
        }
    }
}

/// Adds `text`, escaped; `follower` is the character that will stand after it.
fn escape(out: &mut String, text: &str, follower: Option<char>) {
    let mut characters = text.chars().peekable();
    while let Some(character) = characters.next() {
        let next = characters.peek().copied().or(follower);
        match character {
            '*' | '_' | '`' | '|' | '~' | '^' | '$' | '#' | '{' | '}' => {
                out.push('\\');
                out.push(character);
            }
            // An escaped backslash before a bracket opens a formula in notebooks.
            '\\' => out.push_str("&#92;"),
            '<' if next != Some(' ') => out.push_str("&lt;"),
            '&' if next.is_some_and(|next| next.is_alphanumeric() || next == '#') => {
                out.push_str("&amp;");
            }
            // An interval stays legible in the source: `[.12, .34]` can be no link.
            '[' if !next.is_some_and(|next| next.is_ascii_digit() || matches!(next, '.' | '−')) =>
            {
                out.push_str("\\[");
            }
            ']' if matches!(next, Some('(' | '[' | ':')) => out.push_str("\\]"),
            '-' | '+' | '=' | '>' if out.trim_start().is_empty() => {
                out.push('\\');
                out.push(character);
            }
            '.' | ')' if is_number(out) && next.is_none_or(|next| next == ' ') => {
                out.push('\\');
                out.push(character);
            }
            ' ' if out.is_empty() => {}
            other => out.push(other),
        }
    }
}

/// Whether a point or a bracket here would make a numbered list of the line.
fn is_number(line: &str) -> bool {
    !line.is_empty() && line.bytes().all(|byte| byte.is_ascii_digit())
}
