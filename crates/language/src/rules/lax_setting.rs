//! `lax-setting`: see the page beside this file.

use super::mentions::place;
use super::{Context, Finder, Rule};
use crate::ast::{Adjustment, StatementKind};
use crate::diagnostic::{Diagnostic, Severity};
use crate::facts::Page;
use crate::span::{Span, Spanned};

pub(super) const RULE: Rule = Rule {
    page: Page::new("lax-setting", include_str!("lax-setting.md")),
    severity: Severity::Warning,
    finder: Finder::Check(check),
};

/// A setting of one statement that is laxer than the policy's.
struct Lax {
    setting: &'static str,
    here: Span,
    policy: Span,
}

fn check(context: &Context<'_>) -> Vec<Diagnostic> {
    let Some(policy) = &context.model.policy else { return Vec::new() };
    let stated = &policy.value.settings;
    let mut found = Vec::new();
    for statement in &context.model.statements {
        let StatementKind::Show(show) = &statement.value.kind else { continue };
        let own = &show.settings;
        let lax = [
            laxer("alpha", &own.alpha, &stated.alpha, |own, stated| own > stated),
            laxer("scores alpha", &own.scores_alpha, &stated.scores_alpha, |own, stated| {
                own > stated
            }),
            laxer("interval", &own.interval, &stated.interval, |own, stated| own < stated),
            laxer("pairs", &own.pairs, &stated.pairs, |own, stated| {
                own == Adjustment::Unadjusted && stated != Adjustment::Unadjusted
            }),
        ];
        found.extend(lax.into_iter().flatten().map(|lax| {
            let message = format!("`{}` is laxer here than in the policy", lax.setting);
            let there = place(policy, lax.policy);
            Diagnostic::warning("lax-setting", place(statement, lax.here), message)
                .help("keep to the policy, or allow it with a reason: `# allow lax-setting: ...`")
                .related(there, "the policy states it here")
        }));
    }
    found
}

fn laxer<T: Copy>(
    setting: &'static str,
    own: &Option<Spanned<T>>,
    stated: &Option<Spanned<T>>,
    is_laxer: impl Fn(T, T) -> bool,
) -> Option<Lax> {
    let (own, stated) = (own.as_ref()?, stated.as_ref()?);
    let lax = Lax { setting, here: own.span, policy: stated.span };
    is_laxer(own.value, stated.value).then_some(lax)
}
