//! `levels crew.roster fixed, forward, backward`

use super::{Clause, Count, Part, Presence, Slot, Verb, What, many, one};
use crate::ast::{Levels, Merging, StatementKind};
use crate::facts::Page;
use crate::lower::Lowering;
use crate::syntax::{SyntaxError, SyntaxKind};

pub(super) static LEVELS: Verb = Verb {
    page: Page::new("levels", include_str!("levels.md")),
    head: &[
        one("a factor", What::ColumnPath),
        Part::Slot(Slot { noun: "a level", what: What::Level, count: Count::Any }),
    ],
    clauses: &[Clause {
        words: &["merging"],
        summary: "spellings that mean one level",
        parts: &[many("a spelling", What::Text), Part::Word("into"), one("a level", What::Level)],
        presence: Presence::Repeatable,
    }],
    lower,
};

fn lower(statement: &mut Lowering<'_>) -> Option<StatementKind> {
    let head = statement.head();
    let column = statement.column_path(&head)?;
    let order = statement.names(&head, SyntaxKind::LevelName);
    let mut merging = Vec::new();
    for clause in statement.clauses("merging") {
        let spellings = statement.texts_as_written(&clause);
        let level = statement.name(&clause, SyntaxKind::LevelName)?;
        merging.push(Merging { spellings, level });
    }
    if order.is_empty() && merging.is_empty() {
        let message = "`levels` states neither an order nor a merging";
        let help =
            "list the levels with the reference first, or write `merging \"fxd\" into fixed`";
        statement.report(SyntaxError::new(statement.span(), message).help(help));
        return None;
    }
    Some(StatementKind::Levels(Levels { column, order, merging }))
}
