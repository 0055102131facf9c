//! Text to tokens. Every byte of the text is in exactly one token, whatever the text is.

use logos::{Lexer, Logos};

use super::kind::SyntaxKind;
use crate::span::Span;

/// A token: what it is and which bytes it covers.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Token {
    /// What it is.
    pub kind: SyntaxKind,
    /// Which bytes of the text.
    pub span: Span,
}

/// The tokens of a text, in order and without gaps.
#[must_use]
pub fn tokens(text: &str) -> Vec<Token> {
    let mut tokens: Vec<Token> = Vec::new();
    for (raw, range) in Raw::lexer(text).spanned() {
        let span = Span::new(range.start, range.end);
        let kind = raw.map_or(SyntaxKind::Unknown, Raw::kind);
        if kind == SyntaxKind::Number
            && span.of(text).starts_with('.')
            && ends_a_path_segment(&tokens)
        {
            // `functions.1` is a path with a key of 1, not a name and the number .1.
            let dot = span.start + 1;
            tokens.push(Token { kind: SyntaxKind::Dot, span: Span::new(span.start, dot) });
            tokens.push(Token { kind, span: Span::new(dot, span.end) });
        } else {
            tokens.push(Token { kind, span });
        }
    }
    tokens
}

fn ends_a_path_segment(tokens: &[Token]) -> bool {
    match tokens {
        [.., dot, last] if last.kind == SyntaxKind::Number => dot.kind == SyntaxKind::Dot,
        [.., last] => last.kind.is_name(),
        [] => false,
    }
}

/// What to write instead of a sign that other notations use, where that is clear.
#[must_use]
pub fn meant(sign: &str) -> Option<&'static str> {
    Some(match sign {
        "==" => "=",
        "<>" | "≠" => "!=",
        "≤" => "<=",
        "≥" => ">=",
        "−" | "–" => "-",
        "&&" => "and",
        "||" => "or",
        "“" | "”" | "„" | "'" | "‘" | "’" => "\"",
        _ => return None,
    })
}

#[derive(Clone, Copy, Debug, PartialEq, Logos)]
enum Raw {
    #[regex(r"[ \t\u{000B}\u{000C}\u{00A0}\u{2000}-\u{200B}\u{202F}\u{3000}\u{FEFF}]+")]
    Whitespace,
    #[regex(r"\r\n|\n|\r")]
    Newline,
    #[regex(r"#[^\r\n]*", allow_greedy = true)]
    Comment,
    #[regex(r"[\p{L}_][\p{L}\p{M}\p{Nd}_]*")]
    Name,
    #[token("`", quoted_name)]
    QuotedName,
    #[regex(r"([0-9]+(\.[0-9]+)?|\.[0-9]+)([eE][+-]?[0-9]+)?%?")]
    Number,
    #[token("\"", short_string)]
    String,
    #[token("\"\"\"", long_string)]
    LongString,
    #[token(",")]
    Comma,
    #[token(".")]
    Dot,
    #[token("..")]
    DotDot,
    #[token("=")]
    Equals,
    #[token("!=")]
    Unequal,
    #[token("<")]
    Less,
    #[token("<=")]
    LessOrEqual,
    #[token(">")]
    Greater,
    #[token(">=")]
    GreaterOrEqual,
    #[token("+")]
    Plus,
    #[token("-")]
    Minus,
    #[token("*")]
    Star,
    #[token("/")]
    Slash,
    #[token("^")]
    Caret,
    #[token("×")]
    Cross,
    #[token("[")]
    OpenBracket,
    #[token("]")]
    CloseBracket,
    #[token("(")]
    OpenParenthesis,
    #[token(")")]
    CloseParenthesis,
    #[token("==")]
    #[token("<>")]
    #[token("&&")]
    #[token("||")]
    Foreign,
}

impl Raw {
    fn kind(self) -> SyntaxKind {
        match self {
            Self::Whitespace => SyntaxKind::Whitespace,
            Self::Newline => SyntaxKind::Newline,
            Self::Comment => SyntaxKind::Comment,
            Self::Name => SyntaxKind::Name,
            Self::QuotedName => SyntaxKind::QuotedName,
            Self::Number => SyntaxKind::Number,
            Self::String => SyntaxKind::String,
            Self::LongString => SyntaxKind::LongString,
            Self::Comma => SyntaxKind::Comma,
            Self::Dot => SyntaxKind::Dot,
            Self::DotDot => SyntaxKind::DotDot,
            Self::Equals => SyntaxKind::Equals,
            Self::Unequal => SyntaxKind::Unequal,
            Self::Less => SyntaxKind::Less,
            Self::LessOrEqual => SyntaxKind::LessOrEqual,
            Self::Greater => SyntaxKind::Greater,
            Self::GreaterOrEqual => SyntaxKind::GreaterOrEqual,
            Self::Plus => SyntaxKind::Plus,
            Self::Minus => SyntaxKind::Minus,
            Self::Star => SyntaxKind::Star,
            Self::Slash => SyntaxKind::Slash,
            Self::Caret => SyntaxKind::Caret,
            Self::Cross => SyntaxKind::Cross,
            Self::OpenBracket => SyntaxKind::OpenBracket,
            Self::CloseBracket => SyntaxKind::CloseBracket,
            Self::OpenParenthesis => SyntaxKind::OpenParenthesis,
            Self::CloseParenthesis => SyntaxKind::CloseParenthesis,
            Self::Foreign => SyntaxKind::Unknown,
        }
    }
}

/// To the closing quote, or to the end of the line where there is none.
fn quoted_name(lexer: &mut Lexer<'_, Raw>) {
    let rest = lexer.remainder();
    let line = rest.find(['\r', '\n']).unwrap_or(rest.len());
    let length = rest.find('`').filter(|quote| *quote < line).map_or(line, |quote| quote + 1);
    lexer.bump(length);
}

/// To the closing quote that is not escaped, or to the end of the line where there is none.
fn short_string(lexer: &mut Lexer<'_, Raw>) {
    let rest = lexer.remainder();
    let mut escaped = false;
    for (offset, character) in rest.char_indices() {
        match character {
            '\r' | '\n' => return lexer.bump(offset),
            _ if escaped => escaped = false,
            '\\' => escaped = true,
            '"' => return lexer.bump(offset + 1),
            _ => {}
        }
    }
    lexer.bump(rest.len());
}

/// To the closing quotes. Where there are none, to the next line that starts with a verb: a
/// paragraph that is being typed must not hide the rest of the document.
fn long_string(lexer: &mut Lexer<'_, Raw>) {
    let rest = lexer.remainder();
    if let Some(end) = closing_quotes(rest) {
        return lexer.bump(end);
    }
    let mut offset = 0;
    for line in rest.split_inclusive(['\r', '\n']) {
        let word = line.split(|character: char| !character.is_alphabetic()).next();
        if offset > 0 && word.is_some_and(|word| crate::verbs::find(word).is_some()) {
            break;
        }
        offset += line.len();
    }
    let taken = rest.get(..offset).unwrap_or(rest).trim_end_matches(['\r', '\n']);
    lexer.bump(taken.len());
}

fn closing_quotes(rest: &str) -> Option<usize> {
    let mut escaped = false;
    for (offset, character) in rest.char_indices() {
        match character {
            _ if escaped => escaped = false,
            '\\' => escaped = true,
            '"' if rest.get(offset..).is_some_and(|tail| tail.starts_with("\"\"\"")) => {
                return Some(offset + 3);
            }
            _ => {}
        }
    }
    None
}

#[cfg(test)]
mod tests {
    use super::*;
    use SyntaxKind::{Comma, Dot, DotDot, LongString, Minus, Name, Newline, Number, QuotedName};
    use SyntaxKind::{String, Unknown, Whitespace};

    #[track_caller]
    fn check(text: &str, kinds: &[SyntaxKind]) {
        let found: Vec<_> = tokens(text).iter().map(|token| token.kind).collect();
        assert_eq!(found, kinds, "{text:?}");
    }

    #[test]
    fn numbers_keep_their_forms() {
        for number in ["12", ".05", "1e-3", "95%", "0.5", "1.5e+10", "2E4"] {
            check(number, &[Number]);
        }
        check("-9", &[Minus, Number]);
    }

    #[test]
    fn a_number_after_a_dot_is_a_key_of_a_path() {
        check("functions.1.share", &[Name, Dot, Number, Dot, Name]);
        check("a.1.2", &[Name, Dot, Number, Dot, Number]);
        check("`a b`.1", &[QuotedName, Dot, Number]);
        check("1..5", &[Number, DotDot, Number]);
        check("q1..q9", &[Name, DotDot, Name]);
        check("a,.5", &[Name, Comma, Number]);
    }

    #[test]
    fn strings_end_at_the_quote_or_at_the_end_of_the_line() {
        check(r#""a \" b",c"#, &[String, Comma, Name]);
        check("\"half\nname", &[String, Newline, Name]);
        check("\"half\\\nname", &[String, Newline, Name]);
        check("`half\r\nname", &[QuotedName, Newline, Name]);
        check("\"\"", &[String]);
    }

    #[test]
    fn long_strings_cross_lines_and_an_open_one_stops_before_the_next_verb() {
        check("\"\"\"a\nb \"c\" \"\"\"", &[LongString]);
        check("\"\"\"a\nb\nshow", &[LongString, Newline, Name]);
        check("\"\"\"a\rshow", &[LongString, Newline, Name]);
        check("\"\"\"a\nshown", &[LongString]);
    }

    #[test]
    fn letters_of_any_script_make_names() {
        for name in ["Müdigkeit", "усталость", "疲労", "e\u{301}tat", "_x1"] {
            check(name, &[Name]);
        }
        check("🦭", &[Unknown]);
        check("\u{feff}a", &[Whitespace, Name]);
    }
}
