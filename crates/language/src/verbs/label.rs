//! `label crew.lapses "Attention lapses" unit "per 10 min" better low`

use super::{Choice, Clause, Presence, Verb, What, one};
use crate::ast::{Better, Label, StatementKind};
use crate::facts::Page;
use crate::lower::Lowering;
use crate::syntax::SyntaxKind;

pub(super) static LABEL: Verb = Verb {
    page: Page::new("label", include_str!("label.md")),
    head: &[one("a column", What::ColumnPath), one("a label", What::Text)],
    clauses: &[
        Clause {
            words: &["unit"],
            summary: "the unit of measurement that tables and figures print",
            parts: &[one("a unit", What::Text)],
            presence: Presence::Optional,
        },
        Clause {
            words: &["better"],
            summary: "which end of the outcome is the good one",
            parts: &[one("a direction", What::OneOf(DIRECTIONS))],
            presence: Presence::Optional,
        },
    ],
    lower,
};

const DIRECTIONS: &[Choice] = &[
    Choice { word: "high", summary: "higher values are better" },
    Choice { word: "low", summary: "lower values are better" },
];

fn lower(statement: &mut Lowering<'_>) -> Option<StatementKind> {
    let head = statement.head();
    let column = statement.column_path(&head)?;
    let text = statement.text(&head, SyntaxKind::TextValue)?;
    let unit = match statement.clause("unit") {
        Some(clause) => Some(statement.text(&clause, SyntaxKind::TextValue)?),
        None => None,
    };
    let better = match statement.clause("better") {
        Some(clause) => {
            Some(statement.choice(&clause, &[("high", Better::High), ("low", Better::Low)])?)
        }
        None => None,
    };
    Some(StatementKind::Label(Label { column, text, unit, better }))
}
