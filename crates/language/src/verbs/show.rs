//! `show omnibus of main`

use super::settings::{self, ALPHA, EFFECT, INTERVAL, MISSING, PAIRS, SCORES_ALPHA};
use super::{Choice, Clause, Presence, Verb, What, one};
use crate::ast::{Show, StatementKind};
use crate::facts::Page;
use crate::lower::Lowering;
use crate::syntax::SyntaxKind;

pub(super) static SHOW: Verb = Verb {
    page: Page::new("show", include_str!("show.md")),
    head: &[one("a view", What::View)],
    clauses: &[
        Clause {
            words: &["of"],
            summary: "the comparison",
            parts: &[one("a comparison", What::Comparison)],
            presence: Presence::Required,
        },
        Clause {
            words: &["for"],
            summary: "one term of the design",
            parts: &[one("a term", What::Term)],
            presence: Presence::Optional,
        },
        Clause {
            words: &["coefficients"],
            summary: "one kind of coefficient",
            parts: &[one("a kind", What::OneOf(COEFFICIENTS))],
            presence: Presence::Optional,
        },
        ALPHA,
        INTERVAL,
        PAIRS,
        SCORES_ALPHA,
        EFFECT,
        MISSING,
    ],
    lower,
};

const COEFFICIENTS: &[Choice] = &[
    Choice { word: "raw", summary: "weights of the outcomes in their own units" },
    Choice { word: "standardized", summary: "weights of the outcomes in within-group SDs" },
    Choice { word: "structure", summary: "correlations of the outcomes with the function" },
    Choice { word: "share", summary: "each outcome's share of the separation" },
];

fn lower(statement: &mut Lowering<'_>) -> Option<StatementKind> {
    let head = statement.head();
    let view = statement.name(&head, SyntaxKind::ViewName)?;
    let comparison = statement.clause("of")?;
    let comparison = statement.name(&comparison, SyntaxKind::ComparisonName)?;
    let term = match statement.clause("for") {
        Some(clause) => Some(statement.term(&clause)?),
        None => None,
    };
    let coefficients = match statement.clause("coefficients") {
        Some(clause) => Some(statement.name(&clause, SyntaxKind::Choice)?),
        None => None,
    };
    let settings = settings::lower(statement)?;
    Some(StatementKind::Show(Show { view, comparison, term, coefficients, settings }))
}
