//! From the tree to typed statements.

mod allowance;
mod expression;
pub(crate) mod text;

use crate::ast::{
    Allowance, ColumnPath, ColumnSelection, Expression, Path, ProsePart, Statement, StatementKind,
};
use crate::span::{Name, Span, Spanned};
use crate::syntax::{SyntaxError, SyntaxKind, SyntaxNode, SyntaxToken, span_of};
use crate::verbs;

/// The typed statements of a tree. `errors` holds what the parser found, with offsets in the full
/// text; what is found here is added to it.
pub(crate) fn statements(
    root: &SyntaxNode,
    offset: usize,
    errors: &mut Vec<SyntaxError>,
) -> Vec<Statement> {
    let mut places: Vec<usize> = errors.iter().map(|error| error.span.start).collect();
    places.sort_unstable();
    let mut statements = Vec::new();
    for node in root.children().filter(|node| node.kind() == SyntaxKind::Statement) {
        let span = span_of(node.text_range()).shifted(offset);
        let first = places.partition_point(|place| *place < span.start);
        let sound = places.get(first).is_none_or(|place| *place > span.end);
        let allowed: Vec<Allowance> = allowance::above(&node, offset);
        let mut lowering = Lowering { node, offset, errors };
        let kind = if sound { lowering.kind() } else { lowering.broken() };
        statements.push(Statement { span, kind, allowed });
    }
    statements
}

/// The plain words that a node starts with.
pub(crate) fn words(node: &SyntaxNode) -> Vec<String> {
    node.children_with_tokens()
        .filter_map(rowan::NodeOrToken::into_token)
        .filter(|token| !token.kind().is_trivia())
        .take_while(|token| token.kind() == SyntaxKind::Keyword)
        .map(|token| token.text().to_owned())
        .collect()
}

/// One statement on its way from the tree to its typed form.
pub(crate) struct Lowering<'e> {
    node: SyntaxNode,
    offset: usize,
    errors: &'e mut Vec<SyntaxError>,
}

impl Lowering<'_> {
    fn kind(&mut self) -> StatementKind {
        let before = self.errors.len();
        let verb = self.node.first_token().and_then(|verb| verbs::find(verb.text()));
        if let Some(kind) = verb.and_then(|verb| (verb.lower)(self)) {
            return kind;
        }
        if self.errors.len() == before {
            let message = "this statement could not be understood";
            self.report(SyntaxError::new(self.span(), message));
        }
        self.broken()
    }

    fn broken(&self) -> StatementKind {
        let defines = [SyntaxKind::NewTableName, SyntaxKind::NewComparisonName]
            .into_iter()
            .find_map(|kind| self.name(&self.node, kind))
            .or_else(|| self.name_after_as());
        StatementKind::Broken { defines }
    }

    /// The name after a word `as` that the grammar did not get to.
    fn name_after_as(&self) -> Option<Name> {
        let mut tokens = tokens(&self.node).skip_while(|token| token.text() != "as").skip(1);
        let name = tokens.next().filter(|token| token.kind().is_name())?;
        let span = span_of(name.text_range()).shifted(self.offset);
        Some(Spanned { value: text::bare_name(name.text()).to_owned(), span })
    }

    /// Reports an error; the statement cannot be used.
    pub(crate) fn report(&mut self, error: SyntaxError) {
        self.errors.push(error);
    }

    /// The whole statement, in the full text.
    pub(crate) fn span(&self) -> Span {
        self.span_of(&self.node)
    }

    /// The statement, for what stands before its clauses.
    pub(crate) fn head(&self) -> SyntaxNode {
        self.node.clone()
    }

    /// The clause with these words.
    pub(crate) fn clause(&self, name: &str) -> Option<SyntaxNode> {
        self.clauses(name).into_iter().next()
    }

    /// Every clause with these words.
    pub(crate) fn clauses(&self, name: &str) -> Vec<SyntaxNode> {
        self.node
            .children()
            .filter(|node| node.kind() == SyntaxKind::Clause && starts_with(node, name))
            .collect()
    }

    /// The first name of a kind directly in a head or a clause, or anywhere in it if it is nested.
    pub(crate) fn name(&self, node: &SyntaxNode, kind: SyntaxKind) -> Option<Name> {
        node.descendants().find(|node| node.kind() == kind).map(|node| self.name_of(&node))
    }

    /// Every name of a kind directly in a head or a clause.
    pub(crate) fn names(&self, node: &SyntaxNode, kind: SyntaxKind) -> Vec<Name> {
        children(node, kind).map(|node| self.name_of(&node)).collect()
    }

    fn name_of(&self, node: &SyntaxNode) -> Name {
        let value = text::bare_name(&node.text().to_string()).to_owned();
        Spanned { value, span: self.span_of(node) }
    }

    /// The outcomes of a comparison.
    #[expect(clippy::wildcard_enum_match_arm, reason = "other nodes are no outcomes")]
    pub(crate) fn column_selections(&self, node: &SyntaxNode) -> Vec<ColumnSelection> {
        node.children()
            .filter_map(|node| match node.kind() {
                SyntaxKind::ColumnName => Some(ColumnSelection::One(self.name_of(&node))),
                SyntaxKind::ColumnRange => {
                    let mut ends = self.names(&node, SyntaxKind::ColumnName).into_iter();
                    let (first, last) = (ends.next()?, ends.next()?);
                    Some(ColumnSelection::Range { first, last })
                }
                _ => None,
            })
            .collect()
    }

    /// `table.column`
    pub(crate) fn column_path(&self, node: &SyntaxNode) -> Option<ColumnPath> {
        let path = children(node, SyntaxKind::ColumnPath).next()?;
        let table = self.name(&path, SyntaxKind::TableName)?;
        let column = self.name(&path, SyntaxKind::ColumnName)?;
        Some(ColumnPath { table, column })
    }

    /// A term of a design, with `x` between its factors.
    pub(crate) fn term(&self, node: &SyntaxNode) -> Option<Name> {
        let term = children(node, SyntaxKind::Term).next()?;
        let factors: Vec<String> = tokens(&term)
            .filter(|token| token.kind().is_name())
            .map(|token| text::bare_name(token.text()).to_owned())
            .collect();
        Some(Spanned { value: factors.join(" x "), span: self.span_of(&term) })
    }

    /// The path of a live value.
    pub(crate) fn path(&self, node: &SyntaxNode) -> Option<Path> {
        let path = children(node, SyntaxKind::Path).next()?;
        let segments = tokens(&path)
            .filter(|token| token.kind().is_name() || token.kind() == SyntaxKind::Number)
            .map(|token| Spanned {
                value: text::bare_name(token.text()).to_owned(),
                span: span_of(token.text_range()).shifted(self.offset),
            })
            .collect();
        Some(Path { segments, span: self.span_of(&path) })
    }

    /// The number of a clause.
    pub(crate) fn number(&mut self, node: &SyntaxNode) -> Option<Spanned<f64>> {
        let number = children(node, SyntaxKind::NumberValue).next()?;
        let span = self.span_of(&number);
        let written: String = tokens(&number).map(|token| token.text().to_owned()).collect();
        self.number_from(&written, span).map(|value| Spanned { value, span })
    }

    fn number_from(&mut self, written: &str, span: Span) -> Option<f64> {
        let value = text::number(written);
        if value.is_none() {
            self.report(SyntaxError::new(span, format!("`{written}` is too large for a number")));
        }
        value
    }

    /// What fills a slot, as written, without blanks.
    pub(crate) fn written(&self, node: &SyntaxNode, kind: SyntaxKind) -> Option<String> {
        let node = children(node, kind).next()?;
        Some(tokens(&node).map(|token| token.text().to_owned()).collect())
    }

    /// The text of a head or a clause, its escapes resolved.
    pub(crate) fn text(&mut self, node: &SyntaxNode, kind: SyntaxKind) -> Option<Spanned<String>> {
        let node = children(node, kind).next()?;
        let token = tokens(&node).next()?;
        let span = span_of(token.text_range()).shifted(self.offset);
        let value = text::Cooked::new(token.text(), span.start, self.errors)?.text;
        Some(Spanned { value, span })
    }

    /// The texts and numbers of a list, each as a text.
    #[expect(clippy::wildcard_enum_match_arm, reason = "other nodes are no items of the list")]
    pub(crate) fn texts_as_written(&mut self, node: &SyntaxNode) -> Vec<Spanned<String>> {
        let mut texts = Vec::new();
        for item in node.children() {
            let span = self.span_of(&item);
            let written: String = tokens(&item).map(|token| token.text().to_owned()).collect();
            match item.kind() {
                SyntaxKind::TextValue => {
                    if let Some(cooked) = text::Cooked::new(&written, span.start, self.errors) {
                        texts.push(Spanned { value: cooked.text, span });
                    }
                }
                SyntaxKind::NumberValue => texts.push(Spanned { value: written, span }),
                _ => {}
            }
        }
        texts
    }

    /// The value that a chosen word stands for.
    pub(crate) fn choice<T: Copy>(
        &self,
        node: &SyntaxNode,
        values: &[(&str, T)],
    ) -> Option<Spanned<T>> {
        let choice = children(node, SyntaxKind::Choice).next()?;
        let word = choice.text().to_string();
        let (_, value) = values.iter().find(|(known, _)| *known == word)?;
        Some(Spanned { value: *value, span: self.span_of(&choice) })
    }

    /// The expression of a head or a clause.
    pub(crate) fn expression(&mut self, node: &SyntaxNode) -> Option<Expression> {
        let node = node.children().find(|node| expression::is_expression(node.kind()))?;
        expression::lower(self, &node)
    }

    /// The prose of a head, with its live values.
    pub(crate) fn prose(&mut self, node: &SyntaxNode) -> Option<Vec<ProsePart>> {
        let node = children(node, SyntaxKind::TextValue).next()?;
        let token = tokens(&node).next()?;
        let start = usize::from(token.text_range().start()) + self.offset;
        let before = self.errors.len();
        let cooked = text::Cooked::new(token.text(), start, self.errors)?;
        let parts = crate::prose::parts(&cooked, self.errors);
        (self.errors.len() == before).then_some(parts)
    }

    fn span_of(&self, node: &SyntaxNode) -> Span {
        span_of(node.text_range()).shifted(self.offset)
    }
}

fn starts_with(clause: &SyntaxNode, name: &str) -> bool {
    let words = words(clause);
    let wanted = name.split(' ').count();
    words.get(..wanted).is_some_and(|words| words.join(" ") == name)
}

fn children(node: &SyntaxNode, kind: SyntaxKind) -> impl Iterator<Item = SyntaxNode> + use<> {
    node.children().filter(move |node| node.kind() == kind)
}

/// The tokens of a node that are not trivia.
fn tokens(node: &SyntaxNode) -> impl Iterator<Item = SyntaxToken> + use<> {
    node.descendants_with_tokens()
        .filter_map(rowan::NodeOrToken::into_token)
        .filter(|token| !token.kind().is_trivia())
}
