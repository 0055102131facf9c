//! Columns of the statement's table, and levels of its factors.

use super::{Completion, CompletionKind, Request};
use crate::facts::{ColumnFact, ColumnKind};
use crate::features::describe::{kind_word, level_among, written};
use crate::features::place::statement_at;
use crate::features::scope::Defines;
use crate::lower::text::bare_name;
use crate::names::quoted;
use crate::syntax::{SyntaxKind, span_of};

/// Columns as they stand in the file.
pub(super) fn in_file_order(request: &Request<'_>) -> Vec<Completion> {
    ordered(request, columns(request), None)
}

/// Outcomes: numbers first, without what the statement names already.
pub(super) fn numbers_first(request: &Request<'_>) -> Vec<Completion> {
    ordered(
        request,
        unnamed(request, SyntaxKind::ColumnName, columns(request)),
        Some(ColumnKind::Number),
    )
}

/// Factors: texts first, without what the statement names already.
pub(super) fn groups_first(request: &Request<'_>) -> Vec<Completion> {
    ordered(
        request,
        unnamed(request, SyntaxKind::ColumnName, columns(request)),
        Some(ColumnKind::Text),
    )
}

/// The column after `table.`: for `levels` factors first, otherwise numbers first.
pub(super) fn after_dot(request: &Request<'_>) -> Vec<Completion> {
    let verb = request.expectation.verb.map(crate::verbs::Verb::name);
    let first = if verb == Some("levels") { ColumnKind::Text } else { ColumnKind::Number };
    ordered(request, columns(request), Some(first))
}

fn ordered(
    request: &Request<'_>,
    mut columns: Vec<ColumnFact>,
    first: Option<ColumnKind>,
) -> Vec<Completion> {
    if let Some(first) = first {
        columns.sort_by_key(|column| column.kind != first);
    }
    let table = table(request).unwrap_or_default();
    columns
        .into_iter()
        .map(|column| Completion {
            insert: written(&column.name),
            replace: request.expectation.word,
            kind: CompletionKind::Column,
            detail: detail(&column),
            page: Some(request.names.column_with(&table, &column.name, Some(&column))),
            label: column.name,
        })
        .collect()
}

fn detail(column: &ColumnFact) -> String {
    if column.detail.is_empty() {
        return kind_word(column.kind).to_owned();
    }
    column.detail.clone()
}

/// The table that the statement speaks of; while it names none, the newest one.
fn table(request: &Request<'_>) -> Option<String> {
    let newest = || request.names.scope.names(Defines::Table).pop();
    request.expectation.table.clone().or_else(newest)
}

/// The columns of the table. Without its file, those that the document derives.
fn columns(request: &Request<'_>) -> Vec<ColumnFact> {
    let Some(table) = table(request) else { return Vec::new() };
    request.names.facts.columns(&table).unwrap_or_else(|| {
        let derived = request.names.scope.derived(&table).iter().map(|derive| ColumnFact {
            name: derive.value.column.column.value.clone(),
            kind: ColumnKind::Number,
            detail: "derived".to_owned(),
        });
        derived.collect()
    })
}

/// What the statement does not name yet, the word under the cursor aside.
fn unnamed<T: Named>(request: &Request<'_>, kind: SyntaxKind, all: Vec<T>) -> Vec<T> {
    let parse = crate::syntax::parse(request.text, request.region);
    let named: Vec<String> = statement_at(&parse, request.offset)
        .map(|statement| {
            statement
                .descendants()
                .filter(|node| node.kind() == kind)
                .filter(|node| {
                    let span = span_of(node.text_range()).shifted(request.region.start);
                    span.start != request.expectation.word.start
                })
                .map(|node| bare_name(&node.text().to_string()).to_owned())
                .collect()
        })
        .unwrap_or_default();
    all.into_iter().filter(|one| !named.iter().any(|name| name == one.name())).collect()
}

trait Named {
    fn name(&self) -> &str;
}

impl Named for ColumnFact {
    fn name(&self) -> &str {
        &self.name
    }
}

impl Named for String {
    fn name(&self) -> &str {
        self
    }
}

/// Levels of the column that a `levels` statement is about, without those that it lists already.
pub(super) fn slot_levels(request: &Request<'_>) -> Vec<Completion> {
    let Some(column) = request.expectation.column.clone() else { return Vec::new() };
    let levels = unnamed(request, SyntaxKind::LevelName, levels(request, &column));
    let as_name = |level: &str| quoted(level);
    level_completions(request, &column, levels, &as_name)
}

/// Levels of a column that an expression compares. A level that is a number stands bare beside a
/// column of numbers.
pub(super) fn compared_levels(request: &Request<'_>, column: &str) -> Vec<Completion> {
    let is_number =
        columns(request).iter().any(|fact| fact.name == column && fact.kind == ColumnKind::Number);
    let as_operand = |level: &str| {
        let is_bare = is_number && level.parse::<f64>().is_ok();
        if is_bare { level.to_owned() } else { written(level) }
    };
    level_completions(request, column, levels(request, column), &as_operand)
}

/// Levels of a column as texts inside quotes, which hold them already.
pub(super) fn spellings(request: &Request<'_>, column: &str) -> Vec<String> {
    levels(request, column)
}

fn levels(request: &Request<'_>, column: &str) -> Vec<String> {
    let Some(table) = table(request) else { return Vec::new() };
    request.names.facts.levels(&table, column).unwrap_or_default()
}

fn level_completions(
    request: &Request<'_>,
    column: &str,
    levels: Vec<String>,
    as_written: &dyn Fn(&str) -> String,
) -> Vec<Completion> {
    let all = self::levels(request, column);
    levels
        .into_iter()
        .map(|level| Completion {
            insert: as_written(&level),
            replace: request.expectation.word,
            kind: CompletionKind::Level,
            detail: format!("a level of {column}"),
            page: level_among(column, &level, &all),
            label: level,
        })
        .collect()
}
