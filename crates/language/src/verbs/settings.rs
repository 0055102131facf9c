//! The settings of the error-rate policy: clauses of `policy`, and of every statement that may
//! override it.

use super::{Choice, Clause, Presence, What, one};
use crate::ast::{Adjustment, Effect, MissingRule, Settings};
use crate::lower::Lowering;

pub(super) const ALPHA: Clause = Clause {
    words: &["alpha"],
    summary: "the error rate of a test",
    parts: &[one("a rate", What::Number)],
    presence: Presence::Optional,
};

pub(super) const INTERVAL: Clause = Clause {
    words: &["interval"],
    summary: "the confidence level of intervals",
    parts: &[one("a level", What::Number)],
    presence: Presence::Optional,
};

pub(super) const PAIRS: Clause = Clause {
    words: &["pairs"],
    summary: "how p values of pairwise differences are adjusted",
    parts: &[one("an adjustment", What::OneOf(ADJUSTMENTS))],
    presence: Presence::Optional,
};

pub(super) const SCORES_ALPHA: Clause = Clause {
    words: &["scores", "alpha"],
    summary: "the error rate of tests on discriminant scores",
    parts: &[one("a rate", What::Number)],
    presence: Presence::Optional,
};

pub(super) const EFFECT: Clause = Clause {
    words: &["effect"],
    summary: "which standardized difference is printed",
    parts: &[one("an effect size", What::OneOf(EFFECTS))],
    presence: Presence::Optional,
};

pub(super) const MISSING: Clause = Clause {
    words: &["missing"],
    summary: "what happens to rows with a missing value",
    parts: &[one("a rule", What::OneOf(MISSING_RULES))],
    presence: Presence::Optional,
};

const ADJUSTMENTS: &[Choice] = &[
    Choice { word: "unadjusted", summary: "p values as they come" },
    Choice { word: "bonferroni", summary: "each p value times the number of pairs" },
    Choice { word: "holm", summary: "Holm's step-down adjustment (1979)" },
];

const EFFECTS: &[Choice] = &[
    Choice { word: "d", summary: "Cohen's d" },
    Choice { word: "g", summary: "Hedges' g, without the small-sample bias of d" },
];

const MISSING_RULES: &[Choice] = &[Choice {
    word: "listwise",
    summary: "a row with any missing value among the comparison's columns is left out",
}];

/// The settings among a statement's clauses, or none after an error.
pub(super) fn lower(statement: &mut Lowering<'_>) -> Option<Settings> {
    let mut settings = Settings::default();
    if let Some(clause) = statement.clause("alpha") {
        settings.alpha = Some(statement.number(&clause)?);
    }
    if let Some(clause) = statement.clause("interval") {
        settings.interval = Some(statement.number(&clause)?);
    }
    if let Some(clause) = statement.clause("pairs") {
        settings.pairs = Some(statement.choice(
            &clause,
            &[
                ("unadjusted", Adjustment::Unadjusted),
                ("bonferroni", Adjustment::Bonferroni),
                ("holm", Adjustment::Holm),
            ],
        )?);
    }
    if let Some(clause) = statement.clause("scores alpha") {
        settings.scores_alpha = Some(statement.number(&clause)?);
    }
    if let Some(clause) = statement.clause("effect") {
        settings.effect = Some(statement.choice(&clause, &[("d", Effect::D), ("g", Effect::G)])?);
    }
    if let Some(clause) = statement.clause("missing") {
        settings.missing = Some(statement.choice(&clause, &[("listwise", MissingRule::Listwise)])?);
    }
    Some(settings)
}
