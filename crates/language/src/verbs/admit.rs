//! `admit crew where age >= 18 as adults because "protocol 3.2"`

use super::{Clause, Presence, Verb, What, one};
use crate::ast::{Admit, StatementKind};
use crate::facts::Page;
use crate::lower::Lowering;
use crate::syntax::SyntaxKind;

pub(super) static ADMIT: Verb = Verb {
    page: Page::new("admit", include_str!("admit.md")),
    head: &[one("a table", What::Table)],
    clauses: &[
        Clause {
            words: &["where"],
            summary: "which rows are eligible",
            parts: &[one("a condition", What::Expression)],
            presence: Presence::Required,
        },
        Clause {
            words: &["as"],
            summary: "the new table's name",
            parts: &[one("a name", What::NewTable)],
            presence: Presence::Required,
        },
        Clause {
            words: &["because"],
            summary: "the reason, for the log of exclusions",
            parts: &[one("a reason", What::Text)],
            presence: Presence::Required,
        },
    ],
    lower,
};

fn lower(statement: &mut Lowering<'_>) -> Option<StatementKind> {
    let head = statement.head();
    let parent = statement.name(&head, SyntaxKind::TableName)?;
    let condition = statement.clause("where")?;
    let condition = statement.expression(&condition)?;
    let name = statement.clause("as")?;
    let name = statement.name(&name, SyntaxKind::NewTableName)?;
    let because = statement.clause("because")?;
    let because = statement.text(&because, SyntaxKind::TextValue)?;
    Some(StatementKind::Admit(Admit { parent, condition, name, because }))
}
