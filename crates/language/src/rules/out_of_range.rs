//! `out-of-range`: see the page beside this file.

use super::mentions::place;
use super::{Context, Finder, Rule};
use crate::ast::{Settings, Statement, StatementKind};
use crate::diagnostic::{Diagnostic, Severity};
use crate::facts::Page;
use crate::model::Located;
use crate::span::Spanned;

pub(super) const RULE: Rule = Rule {
    page: Page::new("out-of-range", include_str!("out-of-range.md")),
    severity: Severity::Error,
    finder: Finder::Check(check),
};

fn check(context: &Context<'_>) -> Vec<Diagnostic> {
    let mut found = Vec::new();
    for statement in &context.model.statements {
        match &statement.value.kind {
            StatementKind::Policy(policy) => found.extend(settings(statement, &policy.settings)),
            StatementKind::Show(show) => found.extend(settings(statement, &show.settings)),
            StatementKind::Pin(pin) => {
                let negative = pin.within.iter().filter(|within| within.value < 0.0);
                found.extend(negative.map(|within| {
                    let location = place(statement, within.span);
                    Diagnostic::error("out-of-range", location, "a distance cannot be negative")
                }));
            }
            StatementKind::Read(_)
            | StatementKind::Admit(_)
            | StatementKind::Derive(_)
            | StatementKind::Levels(_)
            | StatementKind::Label(_)
            | StatementKind::Compare(_)
            | StatementKind::Write(_)
            | StatementKind::Broken { .. } => {}
        }
    }
    found
}

fn settings(statement: &Located<Statement>, settings: &Settings) -> Vec<Diagnostic> {
    let alphas = [&settings.alpha, &settings.scores_alpha].into_iter().flatten();
    let alphas = alphas.filter(|alpha| !(alpha.value > 0.0 && alpha.value <= 0.5));
    let intervals = settings.interval.iter();
    let intervals = intervals.filter(|level| !(level.value >= 0.5 && level.value < 1.0));
    let alphas = alphas.map(|alpha| {
        let message = "an error rate lies above 0 and is at most .5";
        percent(statement, alpha, message, "write for example `.05` or `5%`", 0.0..=50.0)
    });
    let intervals = intervals.map(|level| {
        let message = "a confidence level is at least .5 and lies below 1";
        percent(statement, level, message, "write for example `95%` or `.95`", 50.0..=99.999)
    });
    alphas.chain(intervals).collect()
}

/// The error, with a mend where a number in percent lacks its sign.
fn percent(
    statement: &Located<Statement>,
    number: &Spanned<f64>,
    message: &str,
    help: &str,
    percentages: std::ops::RangeInclusive<f64>,
) -> Diagnostic {
    let location = place(statement, number.span);
    let diagnostic = Diagnostic::error("out-of-range", location, message).help(help);
    if number.value >= 1.0 && percentages.contains(&number.value) {
        let text = format!("{}%", number.value);
        return diagnostic.replace_by(format!("Write `{text}`"), text);
    }
    diagnostic
}
