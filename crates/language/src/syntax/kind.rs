//! The kinds of tokens and nodes in the syntax tree.

/// What a token or a node of the tree is.
///
/// The parser decides what a word is from where it stands: the same letters may be a
/// [`SyntaxKind::Verb`], a [`SyntaxKind::Keyword`] or a [`SyntaxKind::Name`].
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
#[repr(u16)]
pub enum SyntaxKind {
    // Trivia.
    /// Blanks, tabs, a byte-order mark.
    Whitespace,
    /// The end of a line, in any of its three spellings.
    Newline,
    /// `# ...`
    Comment,

    // Tokens.
    /// The word that a statement starts with.
    Verb,
    /// A word of the grammar: of a clause, of a choice, of an expression.
    Keyword,
    /// `crew`
    Name,
    /// `` `Reaction time (ms)` ``, the last quote possibly missing.
    QuotedName,
    /// `12`, `.05`, `1e-3`, `95%`
    Number,
    /// `"..."`, the last quote possibly missing.
    String,
    /// `"""..."""`, the last quotes possibly missing.
    LongString,
    /// `,`
    Comma,
    /// `.`
    Dot,
    /// `..`
    DotDot,
    /// `=`
    Equals,
    /// `!=`
    Unequal,
    /// `<`
    Less,
    /// `<=`
    LessOrEqual,
    /// `>`
    Greater,
    /// `>=`
    GreaterOrEqual,
    /// `+`
    Plus,
    /// `-`
    Minus,
    /// `*`
    Star,
    /// `/`
    Slash,
    /// `^`
    Caret,
    /// `×`
    Cross,
    /// `[`
    OpenBracket,
    /// `]`
    CloseBracket,
    /// `(`
    OpenParenthesis,
    /// `)`
    CloseParenthesis,
    /// A character that is no part of the language.
    Unknown,

    // Nodes.
    /// A whole region.
    Root,
    /// From a verb to the last token before the next statement.
    Statement,
    /// The words of a clause and what follows them.
    Clause,
    /// Tokens that fit nowhere.
    Error,

    // Nodes that fill a slot of a verb or of a clause.
    /// A table that is mentioned.
    TableName,
    /// A table that is defined.
    NewTableName,
    /// A built-in sample.
    SampleName,
    /// A comparison that is mentioned.
    ComparisonName,
    /// A comparison that is defined.
    NewComparisonName,
    /// A view.
    ViewName,
    /// A column.
    ColumnName,
    /// `q1..q9`
    ColumnRange,
    /// `table.column`
    ColumnPath,
    /// A level of a factor.
    LevelName,
    /// A term of a design.
    Term,
    /// `main.omnibus.pillai`
    Path,
    /// One of a few words.
    Choice,
    /// A number, possibly negative.
    NumberValue,
    /// A text.
    TextValue,
    /// A text that is the path of a file.
    FileName,

    // Nodes of expressions.
    /// A number in an expression.
    NumberLiteral,
    /// A text in an expression.
    TextLiteral,
    /// A column, or a level of the column that it is compared with.
    NameReference,
    /// `-a`
    Negation,
    /// `not a`
    Denial,
    /// `a + b`
    Binary,
    /// `a in [...]`, `a not in [...]`
    Membership,
    /// `[...]`
    List,
    /// `if a then b else c`
    Conditional,
    /// `log(a)`
    Call,
    /// The function of a call.
    FunctionName,
    /// `(a)`
    Parenthesized,
}

impl SyntaxKind {
    /// Every kind, in the order of its number.
    const ALL: &'static [Self] = &[
        Self::Whitespace,
        Self::Newline,
        Self::Comment,
        Self::Verb,
        Self::Keyword,
        Self::Name,
        Self::QuotedName,
        Self::Number,
        Self::String,
        Self::LongString,
        Self::Comma,
        Self::Dot,
        Self::DotDot,
        Self::Equals,
        Self::Unequal,
        Self::Less,
        Self::LessOrEqual,
        Self::Greater,
        Self::GreaterOrEqual,
        Self::Plus,
        Self::Minus,
        Self::Star,
        Self::Slash,
        Self::Caret,
        Self::Cross,
        Self::OpenBracket,
        Self::CloseBracket,
        Self::OpenParenthesis,
        Self::CloseParenthesis,
        Self::Unknown,
        Self::Root,
        Self::Statement,
        Self::Clause,
        Self::Error,
        Self::TableName,
        Self::NewTableName,
        Self::SampleName,
        Self::ComparisonName,
        Self::NewComparisonName,
        Self::ViewName,
        Self::ColumnName,
        Self::ColumnRange,
        Self::ColumnPath,
        Self::LevelName,
        Self::Term,
        Self::Path,
        Self::Choice,
        Self::NumberValue,
        Self::TextValue,
        Self::FileName,
        Self::NumberLiteral,
        Self::TextLiteral,
        Self::NameReference,
        Self::Negation,
        Self::Denial,
        Self::Binary,
        Self::Membership,
        Self::List,
        Self::Conditional,
        Self::Call,
        Self::FunctionName,
        Self::Parenthesized,
    ];

    /// Whether the grammar passes over it.
    #[must_use]
    pub fn is_trivia(self) -> bool {
        matches!(self, Self::Whitespace | Self::Newline | Self::Comment)
    }

    /// Whether it is a name, plain or in back-quotes.
    #[must_use]
    pub fn is_name(self) -> bool {
        matches!(self, Self::Name | Self::QuotedName)
    }

    /// Whether it is a text, short or long.
    #[must_use]
    pub fn is_text(self) -> bool {
        matches!(self, Self::String | Self::LongString)
    }
}

/// Ties [`SyntaxKind`] to the tree library.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Tussock {}

impl rowan::Language for Tussock {
    type Kind = SyntaxKind;

    fn kind_from_raw(raw: rowan::SyntaxKind) -> SyntaxKind {
        SyntaxKind::ALL.get(usize::from(raw.0)).copied().unwrap_or(SyntaxKind::Error)
    }

    fn kind_to_raw(kind: SyntaxKind) -> rowan::SyntaxKind {
        rowan::SyntaxKind(kind as u16)
    }
}

/// A node of the tree.
pub type SyntaxNode = rowan::SyntaxNode<Tussock>;
/// A token of the tree.
pub type SyntaxToken = rowan::SyntaxToken<Tussock>;
/// A node or a token.
pub type SyntaxElement = rowan::SyntaxElement<Tussock>;

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_list_of_kinds_is_complete_and_in_order() {
        for (number, kind) in SyntaxKind::ALL.iter().enumerate() {
            assert_eq!(*kind as usize, number, "{kind:?}");
        }
        assert_eq!(SyntaxKind::ALL.len(), SyntaxKind::Parenthesized as usize + 1);
    }
}
