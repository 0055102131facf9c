//! The formatter: one layout for what the code says.
//!
//! One space between words, each clause that does not fit on its line on an indented line of its
//! own, comments and blank lines where they were. A statement with a syntax error stays as it is.

mod statement;

use crate::diagnostic::Edit;
use crate::document::{Document, Form, RegionKind};
use crate::span::{Location, SourceId, Span};
use crate::syntax::{Parse, SyntaxElement, SyntaxKind, SyntaxNode, SyntaxToken, parse};

/// How far a statement's continuation is indented.
const INDENTATION: &str = "  ";

/// Formats code from end to end. Ends with a line break if the text does.
#[must_use]
pub fn format(text: &str) -> String {
    region(text, Span::new(0, text.len()), "")
}

/// Formats the code in the fences of a Markdown text; the prose stays as it is.
#[must_use]
pub fn format_markdown(text: &str) -> String {
    let document = Document::markdown(text);
    let mut formatted = text.to_owned();
    for edit in edits(&document).iter().rev() {
        formatted.replace_range(edit.location.span.range(), &edit.text);
    }
    formatted
}

/// The replacements that format a document, in reading order. Each is as short as its region
/// allows, so that an editor's cursors stay where they are.
#[must_use]
pub fn edits(document: &Document) -> Vec<Edit> {
    let mut edits = Vec::new();
    for (index, source) in document.sources.iter().enumerate() {
        let code = source.regions.iter().filter(|region| region.kind == RegionKind::Code);
        for found in code {
            let before = found.span.of(&source.text);
            let margin = match document.form {
                Form::Markdown => margin(before),
                Form::Script | Form::Notebook => "",
            };
            let after = region(&source.text, found.span, margin);
            edits.extend(shortest(SourceId(index), found.span, before, &after));
        }
    }
    edits
}

/// The blanks before the first statement: the margin of an indented fence.
fn margin(code: &str) -> &str {
    let line = code.lines().find(|line| !line.trim().is_empty()).unwrap_or_default();
    let length = line.len() - line.trim_start().len();
    line.get(..length).unwrap_or_default()
}

/// The replacement of the part in which the two texts differ.
fn shortest(source: SourceId, region: Span, before: &str, after: &str) -> Option<Edit> {
    if before == after {
        return None;
    }
    let pairs = before.char_indices().zip(after.chars());
    let start = pairs
        .take_while(|((_, one), other)| one == other)
        .last()
        .map_or(0, |((offset, character), _)| offset + character.len_utf8());
    let (old, new) = (before.get(start..)?, after.get(start..)?);
    let pairs = old.chars().rev().zip(new.chars().rev());
    let end: usize =
        pairs.take_while(|(one, other)| one == other).map(|(one, _)| one.len_utf8()).sum();
    let span = Span::new(region.start + start, region.start + before.len() - end);
    let text = new.get(..new.len() - end)?.to_owned();
    Some(Edit { location: Location { source, span }, text })
}

/// Formats a region of a text; every statement starts at `margin`.
fn region(text: &str, region: Span, margin: &str) -> String {
    let code = region.of(text);
    let parse = parse(text, region);
    let root = parse.root();
    let line_break = line_break(&root);
    let mut layout = Layout::new(code, margin, &line_break);
    for element in root.children_with_tokens() {
        match element {
            SyntaxElement::Node(node) if node.kind() == SyntaxKind::Statement => {
                let formatted = if has_error(&parse, parse.span(&node)) {
                    as_it_is(&node, &line_break)
                } else {
                    statement::format(&node, margin, &line_break)
                };
                layout.item(&formatted, "");
            }
            SyntaxElement::Node(node) => layout.item(&as_it_is(&node, &line_break), ""),
            SyntaxElement::Token(token) => layout.trivia(&token),
        }
    }
    layout.finish()
}

/// The line break of a text, which is its first one. Those within texts in quotes do not count.
fn line_break(root: &SyntaxNode) -> String {
    tokens(root)
        .find(|token| token.kind() == SyntaxKind::Newline)
        .map_or_else(|| "\n".to_owned(), |token| token.text().to_owned())
}

/// A statement as it is, but for the spelling of its line breaks.
fn as_it_is(statement: &SyntaxNode, line_break: &str) -> String {
    let text = |token: SyntaxToken| {
        let is_break = token.kind() == SyntaxKind::Newline;
        if is_break { line_break.to_owned() } else { token.text().to_owned() }
    };
    tokens(statement).map(text).collect()
}

fn tokens(node: &SyntaxNode) -> impl Iterator<Item = SyntaxToken> + use<> {
    node.descendants_with_tokens().filter_map(rowan::NodeOrToken::into_token)
}

fn has_error(parse: &Parse, statement: Span) -> bool {
    parse
        .errors
        .iter()
        .any(|error| statement.touches(error.span.start) || statement.touches(error.span.end))
}

/// The lines of a region as they are laid out.
struct Layout<'t> {
    out: String,
    margin: &'t str,
    line_break: &'t str,
    ends_with_line_break: bool,
    /// Line breaks since the last statement or comment.
    breaks: usize,
    /// Whether anything but blank lines has been laid out.
    started: bool,
    /// The blanks before the next token, if they are the first on their line.
    indentation: usize,
}

impl<'t> Layout<'t> {
    fn new(code: &str, margin: &'t str, line_break: &'t str) -> Self {
        let mark = if code.starts_with('\u{feff}') { "\u{feff}" } else { "" };
        Self {
            out: mark.to_owned(),
            margin,
            line_break,
            ends_with_line_break: code.ends_with(['\r', '\n']),
            breaks: 0,
            started: false,
            indentation: 0,
        }
    }

    #[expect(
        clippy::wildcard_enum_match_arm,
        reason = "what else stands between statements is a comment"
    )]
    fn trivia(&mut self, token: &SyntaxToken) {
        match token.kind() {
            SyntaxKind::Newline => {
                self.breaks += 1;
                self.indentation = 0;
            }
            SyntaxKind::Whitespace => {
                self.indentation = token.text().trim_matches('\u{feff}').len()
            }
            _ => self.comment(token.text().trim_end()),
        }
    }

    /// A comment stays on its line. On a line of its own it stands at the margin, or under the
    /// statement above where it was indented.
    fn comment(&mut self, comment: &str) {
        if self.started && self.breaks == 0 {
            self.out.push(' ');
            self.out.push_str(comment);
            return;
        }
        let deeper = self.started && self.indentation > self.margin.len();
        self.item(comment, if deeper { INDENTATION } else { "" });
    }

    /// A statement or a comment on a new line, after as many blank lines as there were.
    fn item(&mut self, text: &str, indentation: &str) {
        if self.started {
            for _ in 0..self.breaks.max(1) {
                self.out.push_str(self.line_break);
            }
        }
        self.out.push_str(self.margin);
        self.out.push_str(indentation);
        self.out.push_str(text);
        self.started = true;
        self.breaks = 0;
    }

    fn finish(mut self) -> String {
        if self.started && self.ends_with_line_break {
            self.out.push_str(self.line_break);
        }
        self.out
    }
}
