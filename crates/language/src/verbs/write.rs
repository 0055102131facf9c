//! `write "The rosters differed, {{main.omnibus.pillai}}."`

use super::{Verb, What, one};
use crate::ast::{StatementKind, Write};
use crate::facts::Page;
use crate::lower::Lowering;

pub(super) static WRITE: Verb = Verb {
    page: Page::new("write", include_str!("write.md")),
    head: &[one("a text", What::Text)],
    clauses: &[],
    lower,
};

fn lower(statement: &mut Lowering<'_>) -> Option<StatementKind> {
    let head = statement.head();
    let parts = statement.prose(&head)?;
    Some(StatementKind::Write(Write { parts }))
}
