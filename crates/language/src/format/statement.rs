//! The layout of one statement without syntax errors.

use rowan::NodeOrToken;

use super::INDENTATION;
use crate::syntax::{SyntaxKind, SyntaxNode, SyntaxToken};

/// How many characters a line holds.
const WIDTH: usize = 88;

/// How far a part of a clause is indented that does not fit on the clause's line.
const INNER_INDENTATION: &str = "    ";

/// Where a line may end before a token.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Break {
    /// Nowhere.
    Never,
    /// Inside a list or an expression.
    Inner,
    /// Before a clause.
    Clause,
}

/// A token, what stands before it, and the comments after it.
struct Atom {
    text: String,
    spaced: bool,
    line_break: Break,
    comments: Vec<Comment>,
}

struct Comment {
    text: String,
    own_line: bool,
}

/// Lays a statement out. `margin` stands before each of its lines but the first.
pub(super) fn format(statement: &SyntaxNode, margin: &str, line_break: &str) -> String {
    let atoms = atoms(statement);
    let mut page = Page {
        out: String::new(),
        margin,
        line_break,
        column: width(margin),
        must_break: false,
        fresh: true,
    };
    let mut rest = atoms.as_slice();
    while let Some((clause, after)) = split_clause(rest) {
        page.clause(clause);
        rest = after;
    }
    page.out
}

/// The atoms up to the next clause, and those from there on.
fn split_clause(atoms: &[Atom]) -> Option<(&[Atom], &[Atom])> {
    let rest = atoms.get(1..)?;
    let length = rest.iter().position(|atom| atom.line_break == Break::Clause);
    atoms.split_at_checked(length.map_or(atoms.len(), |length| length + 1))
}

#[expect(clippy::wildcard_enum_match_arm, reason = "tokens of every other kind are handled alike")]
fn atoms(statement: &SyntaxNode) -> Vec<Atom> {
    let mut atoms: Vec<Atom> = Vec::new();
    let mut before: Option<SyntaxToken> = None;
    let mut new_line = false;
    for token in statement.descendants_with_tokens().filter_map(NodeOrToken::into_token) {
        match token.kind() {
            SyntaxKind::Whitespace => {}
            SyntaxKind::Newline => new_line = true,
            SyntaxKind::Comment => {
                let text = token.text().trim_end().to_owned();
                if let Some(atom) = atoms.last_mut() {
                    atom.comments.push(Comment { text, own_line: new_line });
                }
                new_line = false;
            }
            _ => {
                atoms.push(Atom {
                    text: token.text().to_owned(),
                    spaced: before.as_ref().is_some_and(|before| is_spaced(before, &token)),
                    line_break: before
                        .as_ref()
                        .map_or(Break::Never, |before| line_break(before, &token)),
                    comments: Vec::new(),
                });
                new_line = false;
                before = Some(token);
            }
        }
    }
    atoms
}

#[expect(clippy::wildcard_enum_match_arm, reason = "tokens of every other kind are handled alike")]
fn is_spaced(before: &SyntaxToken, token: &SyntaxToken) -> bool {
    use SyntaxKind::{
        CloseBracket, CloseParenthesis, Comma, Dot, DotDot, FunctionName, Minus, Negation,
        NumberValue, OpenBracket, OpenParenthesis,
    };
    let in_node =
        |token: &SyntaxToken, kind| token.parent().is_some_and(|node| node.kind() == kind);
    if matches!(token.kind(), Comma | Dot | DotDot | CloseParenthesis | CloseBracket) {
        return false;
    }
    match before.kind() {
        Dot | DotDot | OpenParenthesis | OpenBracket => false,
        Minus => !in_node(before, Negation) && !in_node(before, NumberValue),
        _ => !(token.kind() == OpenParenthesis && in_node(before, FunctionName)),
    }
}

fn line_break(before: &SyntaxToken, token: &SyntaxToken) -> Break {
    let starts_clause = token.parent().is_some_and(|node| {
        node.kind() == SyntaxKind::Clause && node.text_range().start() == token.text_range().start()
    });
    let joins = matches!(token.text(), "and" | "or" | "then" | "else");
    if starts_clause {
        Break::Clause
    } else if before.kind() == SyntaxKind::Comma || (token.kind() == SyntaxKind::Keyword && joins) {
        Break::Inner
    } else {
        Break::Never
    }
}

/// The lines of a statement.
struct Page<'t> {
    out: String,
    margin: &'t str,
    line_break: &'t str,
    /// How wide the current line is.
    column: usize,
    /// Whether a comment ends the current line.
    must_break: bool,
    /// Whether nothing but blanks stands on the current line.
    fresh: bool,
}

impl Page<'_> {
    /// A head or a clause: on the current line if it fits, on a line of its own if it fits there,
    /// or else over several lines.
    fn clause(&mut self, atoms: &[Atom]) {
        let commented = atoms.iter().rev().skip(1).any(|atom| !atom.comments.is_empty());
        let flat: usize =
            atoms.iter().map(|atom| usize::from(atom.spaced) + first_width(atom)).sum();
        let crosses = atoms.iter().any(|atom| atom.text.contains(['\r', '\n']));
        let whole = !commented && !crosses;
        let is_clause = atoms.first().is_some_and(|atom| atom.line_break == Break::Clause);
        if is_clause && !self.must_break && !(whole && self.column + flat <= WIDTH) {
            self.new_line(INDENTATION);
        }
        let saved = usize::from(self.fresh && atoms.first().is_some_and(|atom| atom.spaced));
        let fits = whole && self.column + flat <= WIDTH + saved;
        let mut rest = atoms;
        while let Some((unit, after)) = split_unit(rest) {
            let unit_width: usize =
                unit.iter().map(|atom| usize::from(atom.spaced) + first_width(atom)).sum();
            let inner = unit.first().is_some_and(|atom| atom.line_break == Break::Inner);
            if inner && !fits && !self.must_break && self.column + unit_width > WIDTH {
                self.new_line(INNER_INDENTATION);
            }
            for atom in unit {
                self.atom(atom);
            }
            rest = after;
        }
    }

    fn atom(&mut self, atom: &Atom) {
        if self.must_break {
            let is_clause = atom.line_break == Break::Clause;
            self.new_line(if is_clause { INDENTATION } else { INNER_INDENTATION });
        } else if atom.spaced && !self.fresh {
            self.out.push(' ');
            self.column += 1;
        }
        self.out.push_str(&atom.text);
        self.fresh = false;
        self.column = match atom.text.rsplit_once(['\r', '\n']) {
            Some((_, last)) => width(last),
            None => self.column + width(&atom.text),
        };
        for comment in &atom.comments {
            if comment.own_line || self.must_break {
                self.new_line(INDENTATION);
            } else {
                self.out.push(' ');
            }
            self.out.push_str(&comment.text);
            self.must_break = true;
        }
    }

    fn new_line(&mut self, indentation: &str) {
        self.out.push_str(self.line_break);
        self.out.push_str(self.margin);
        self.out.push_str(indentation);
        self.column = width(self.margin) + width(indentation);
        self.must_break = false;
        self.fresh = true;
    }
}

/// The atoms up to the next place where a line may end, and those from there on.
fn split_unit(atoms: &[Atom]) -> Option<(&[Atom], &[Atom])> {
    let rest = atoms.get(1..)?;
    let length = rest.iter().position(|atom| atom.line_break != Break::Never);
    atoms.split_at_checked(length.map_or(atoms.len(), |length| length + 1))
}

fn width(text: &str) -> usize {
    text.chars().count()
}

/// The width of an atom's first line.
fn first_width(atom: &Atom) -> usize {
    atom.text.lines().next().map_or(0, width)
}
