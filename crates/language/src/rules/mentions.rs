//! What statements mention, and how to say that it is unknown.

use super::Context;
use crate::ast::{
    ColumnPath, ColumnSelection, Expression, Path, ProsePart, Statement, StatementKind,
};
use crate::diagnostic::Diagnostic;
use crate::model::{Located, QuestionKind};
use crate::names::{listed, quoted};
use crate::nearest::nearest;
use crate::span::{Location, Name, Span};

/// The place of a part of a statement.
pub(super) fn place<T>(statement: &Located<T>, span: Span) -> Location {
    Location { span, ..statement.location }
}

/// The table that a statement speaks of.
pub(super) fn table(statement: &Statement) -> Option<&Name> {
    match &statement.kind {
        StatementKind::Admit(admit) => Some(&admit.parent),
        StatementKind::Compare(compare) => Some(&compare.table),
        StatementKind::Derive(_) | StatementKind::Levels(_) | StatementKind::Label(_) => {
            column_path(statement).map(|path| &path.table)
        }
        StatementKind::Read(_)
        | StatementKind::Policy(_)
        | StatementKind::Show(_)
        | StatementKind::Write(_)
        | StatementKind::Pin(_)
        | StatementKind::Broken { .. } => None,
    }
}

/// The `table.column` of a statement.
pub(super) fn column_path(statement: &Statement) -> Option<&ColumnPath> {
    match &statement.kind {
        StatementKind::Derive(derive) => Some(&derive.column),
        StatementKind::Levels(levels) => Some(&levels.column),
        StatementKind::Label(label) => Some(&label.column),
        StatementKind::Read(_)
        | StatementKind::Admit(_)
        | StatementKind::Policy(_)
        | StatementKind::Compare(_)
        | StatementKind::Show(_)
        | StatementKind::Write(_)
        | StatementKind::Pin(_)
        | StatementKind::Broken { .. } => None,
    }
}

/// The columns that a statement mentions outside its expression, ranges aside.
pub(super) fn columns(statement: &Statement) -> Vec<&Name> {
    match &statement.kind {
        StatementKind::Levels(levels) => vec![&levels.column.column],
        StatementKind::Label(label) => vec![&label.column.column],
        StatementKind::Compare(compare) => {
            let outcomes = compare.outcomes.iter().filter_map(|outcome| match outcome {
                ColumnSelection::One(name) => Some(name),
                ColumnSelection::Range { .. } => None,
            });
            outcomes.chain(&compare.factors).collect()
        }
        StatementKind::Read(_)
        | StatementKind::Admit(_)
        | StatementKind::Derive(_)
        | StatementKind::Policy(_)
        | StatementKind::Show(_)
        | StatementKind::Write(_)
        | StatementKind::Pin(_)
        | StatementKind::Broken { .. } => Vec::new(),
    }
}

/// The expression of a statement.
pub(super) fn expression(statement: &Statement) -> Option<&Expression> {
    match &statement.kind {
        StatementKind::Admit(admit) => Some(&admit.condition),
        StatementKind::Derive(derive) => Some(&derive.expression),
        StatementKind::Compare(compare) => compare.condition.as_ref(),
        StatementKind::Read(_)
        | StatementKind::Levels(_)
        | StatementKind::Label(_)
        | StatementKind::Policy(_)
        | StatementKind::Show(_)
        | StatementKind::Write(_)
        | StatementKind::Pin(_)
        | StatementKind::Broken { .. } => None,
    }
}

/// Every live-value path of the document, in statements and in prose.
pub(super) fn paths<'a>(context: &Context<'a>) -> Vec<Located<&'a Path>> {
    let mut paths = Vec::new();
    for question in &context.model.questions {
        let found: Vec<&Path> = match &question.kind {
            QuestionKind::Show(_) => Vec::new(),
            QuestionKind::Write(write) => write
                .parts
                .iter()
                .filter_map(|part| match part {
                    ProsePart::Text(_) => None,
                    ProsePart::Value(value) => Some(&value.path),
                })
                .collect(),
            QuestionKind::Pin(pin) => vec![&pin.path],
            QuestionKind::ProseValue(value) => vec![&value.path],
        };
        let source = question.location.source;
        paths.extend(
            found.into_iter().map(|path| Located {
                value: path,
                location: Location { source, span: path.span },
            }),
        );
    }
    paths
}

/// Adds to a diagnostic what was probably meant, with the mend, or else what there is to choose
/// from. `kinds` names the choices: "the tables".
pub(super) fn suggest<'a>(
    diagnostic: Diagnostic,
    wanted: &str,
    known: impl Iterator<Item = &'a str> + Clone,
    kinds: &str,
) -> Diagnostic {
    /// A longer list helps nobody.
    const MOST: usize = 12;
    if let Some(near) = nearest(wanted, known.clone()) {
        let written = quoted(near);
        return diagnostic
            .help(format!("did you mean `{near}`?"))
            .replace_by(format!("Write `{near}`"), written);
    }
    match known.clone().count() {
        0 => diagnostic,
        1..=MOST => diagnostic.help(format!("{kinds}: {}", listed(known))),
        more => {
            let first = listed(known.take(MOST));
            diagnostic.help(format!("{kinds}: {first}, and {} more", more - MOST))
        }
    }
}
