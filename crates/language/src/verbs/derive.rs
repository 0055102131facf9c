//! `derive crew.gain = post - pre`

use super::{Part, Verb, What, one};
use crate::ast::{Derive, StatementKind};
use crate::facts::Page;
use crate::lower::Lowering;
use crate::syntax::SyntaxKind;

pub(super) static DERIVE: Verb = Verb {
    page: Page::new("derive", include_str!("derive.md")),
    head: &[
        one("a column", What::NewColumnPath),
        Part::Sign(SyntaxKind::Equals, "="),
        one("an expression", What::Expression),
    ],
    clauses: &[],
    lower,
};

fn lower(statement: &mut Lowering<'_>) -> Option<StatementKind> {
    let head = statement.head();
    let column = statement.column_path(&head)?;
    let expression = statement.expression(&head)?;
    Some(StatementKind::Derive(Derive { column, expression }))
}
