//! Every place in a document where a name stands for something that the document defines.

use super::place::name_in;
use super::scope::Scope;
use crate::ast::{ColumnSelection, Path, ProsePart};
use crate::lower::text::bare_name;
use crate::model::{Content, Model, QuestionKind, TableBase};
use crate::names::NumberRange;
use crate::span::{Location, SourceId, Span};
use crate::syntax::{Parse, SyntaxKind, SyntaxNode, span_of};
use crate::terms;

/// What a name stands for.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(super) enum Referent {
    /// A table.
    Table(String),
    /// A comparison.
    Comparison(String),
    /// A column of the table that it first occurs in: a table of admitted rows has the columns of
    /// the table that they come from.
    Column { table: String, column: String },
}

/// A name, what it stands for, and where.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Mention {
    pub(super) referent: Referent,
    /// The name with its back-quotes.
    pub(super) location: Location,
    /// Whether the name gets its meaning here.
    pub(super) defines: bool,
}

/// All mentions, source by source in the order of the text.
pub(super) fn mentions(scope: &Scope<'_>) -> Vec<Mention> {
    let model = scope.model();
    let mut found = Vec::new();
    for region in &model.regions {
        if let Content::Code(parse) = &region.content {
            in_code(model, region.source, parse, &mut found);
        }
    }
    for question in &model.questions {
        let source = question.location.source;
        match &question.kind {
            QuestionKind::Write(write) => {
                for part in &write.parts {
                    if let ProsePart::Value(value) = part {
                        in_path(model, source, &value.path, &mut found);
                    }
                }
            }
            QuestionKind::Pin(pin) => in_path(model, source, &pin.path, &mut found),
            QuestionKind::ProseValue(value) => in_path(model, source, &value.path, &mut found),
            QuestionKind::Show(_) => {}
        }
    }
    found.sort_by_key(|mention| mention.location);
    found
}

/// The mention under a cursor.
pub(super) fn mention_at(scope: &Scope<'_>, source: SourceId, offset: usize) -> Option<Mention> {
    mentions(scope)
        .into_iter()
        .find(|mention| mention.location.source == source && mention.location.span.touches(offset))
}

fn in_code(model: &Model, source: SourceId, parse: &Parse, found: &mut Vec<Mention>) {
    for node in parse.root().descendants() {
        let Some((referent, defines)) = referent(model, &node) else { continue };
        let Some(token) = node.first_token() else { continue };
        let span = parse.token_span(&token);
        found.push(Mention { referent, location: Location { source, span }, defines });
    }
}

#[expect(clippy::wildcard_enum_match_arm, reason = "few kinds of nodes are names of something")]
fn referent(model: &Model, node: &SyntaxNode) -> Option<(Referent, bool)> {
    let name = || bare_name(&node.text().to_string()).to_owned();
    Some(match node.kind() {
        SyntaxKind::TableName => (Referent::Table(name()), false),
        SyntaxKind::NewTableName => (Referent::Table(name()), true),
        SyntaxKind::ComparisonName => (Referent::Comparison(name()), false),
        SyntaxKind::NewComparisonName => (Referent::Comparison(name()), true),
        SyntaxKind::ColumnName | SyntaxKind::NameReference => {
            let statement = node.ancestors().find(|node| node.kind() == SyntaxKind::Statement)?;
            let path = node.ancestors().find(|node| node.kind() == SyntaxKind::ColumnPath);
            let derives = path.is_some() && statement.first_token()?.text() == "derive";
            let table = name_in(path.as_ref().unwrap_or(&statement), SyntaxKind::TableName)?;
            (column(model, &table, &name()), derives)
        }
        SyntaxKind::Term => {
            let statement = node.ancestors().find(|node| node.kind() == SyntaxKind::Statement)?;
            let comparison = name_in(&statement, SyntaxKind::ComparisonName)?;
            let table = &model.comparisons.get(&comparison)?.value.table.value;
            let plain = node.first_token().map(|token| span_of(token.text_range()))
                == Some(span_of(node.text_range()));
            return plain.then(|| (column(model, table, &name()), false));
        }
        _ => return None,
    })
}

/// The comparison that a path begins with, and the columns that are among its keys.
fn in_path(model: &Model, source: SourceId, path: &Path, found: &mut Vec<Mention>) {
    let Some((first, keys)) = path.segments.split_first() else { return };
    let mut mention = |referent, span: Span| {
        found.push(Mention { referent, location: Location { source, span }, defines: false });
    };
    mention(Referent::Comparison(first.value.clone()), first.span);
    let Some(compare) = model.comparisons.get(&first.value).map(|comparison| &comparison.value)
    else {
        return;
    };
    let Some((view, keys)) = keys.split_first() else { return };
    for key in keys {
        let is_column = compare.factors.iter().any(|factor| factor.value == key.value)
            || compare.outcomes.iter().any(|outcome| names(outcome, &key.value));
        if is_column && terms::of_key(&view.value, &key.value).is_none() {
            mention(column(model, &compare.table.value, &key.value), key.span);
        }
    }
}

/// Whether an outcome is the column of this name.
fn names(outcome: &ColumnSelection, column: &str) -> bool {
    match outcome {
        ColumnSelection::One(name) => name.value == column,
        ColumnSelection::Range { first, last } => {
            NumberRange::new(&first.value, &last.value).is_some_and(|range| range.contains(column))
        }
    }
}

/// The column as it is called in the table that it first occurs in.
fn column(model: &Model, table: &str, column: &str) -> Referent {
    let mut owner = table;
    // Tables of admitted rows cannot be nested more deeply than there are tables.
    for _ in 0..model.tables.len() {
        let Some(definition) = model.tables.get(owner) else { break };
        let derived_here =
            definition.derived.iter().any(|derive| derive.value.column.column.value == column);
        match &definition.base.value {
            TableBase::Admit(admit) if !derived_here => owner = &admit.parent.value,
            TableBase::Admit(_) | TableBase::Read(_) => break,
        }
    }
    Referent::Column { table: owner.to_owned(), column: column.to_owned() }
}
