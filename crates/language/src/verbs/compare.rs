//! `compare alertness, mood, lapses, sleep across roster in crew as main`

use super::{Clause, Presence, Verb, What, many, one};
use crate::ast::{Compare, StatementKind};
use crate::facts::Page;
use crate::lower::Lowering;
use crate::syntax::{SyntaxError, SyntaxKind};

pub(super) static COMPARE: Verb = Verb {
    page: Page::new("compare", include_str!("compare.md")),
    head: &[many("an outcome", What::Columns)],
    clauses: &[
        Clause {
            words: &["across"],
            summary: "the factor whose levels are the groups",
            parts: &[many("a factor", What::Column)],
            presence: Presence::Required,
        },
        Clause {
            words: &["in"],
            summary: "the table",
            parts: &[one("a table", What::Table)],
            presence: Presence::Required,
        },
        Clause {
            words: &["where"],
            summary: "which rows are compared",
            parts: &[one("a condition", What::Expression)],
            presence: Presence::Optional,
        },
        Clause {
            words: &["as"],
            summary: "the comparison's name",
            parts: &[one("a name", What::NewComparison)],
            presence: Presence::Required,
        },
    ],
    lower,
};

fn lower(statement: &mut Lowering<'_>) -> Option<StatementKind> {
    let head = statement.head();
    let outcomes = statement.column_selections(&head);
    let across = statement.clause("across")?;
    let factors = statement.names(&across, SyntaxKind::ColumnName);
    if let [_, second, ..] = factors.as_slice() {
        let message = "`across` names more than one factor";
        let error = SyntaxError::of("several-factors", second.span, message);
        statement.report(
            error.help(
                "compare one factor at a time: write one `compare` statement for each factor",
            ),
        );
        return None;
    }
    let table = statement.clause("in")?;
    let table = statement.name(&table, SyntaxKind::TableName)?;
    let condition = match statement.clause("where") {
        Some(clause) => Some(statement.expression(&clause)?),
        None => None,
    };
    let name = statement.clause("as")?;
    let name = statement.name(&name, SyntaxKind::NewComparisonName)?;
    Some(StatementKind::Compare(Compare { outcomes, factors, table, condition, name }))
}
