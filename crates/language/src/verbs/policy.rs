//! `policy alpha .05 interval 95% pairs holm scores alpha .001 effect g missing listwise`

use super::Verb;
use super::settings::{self, ALPHA, EFFECT, INTERVAL, MISSING, PAIRS, SCORES_ALPHA};
use crate::ast::{Policy, Settings, StatementKind};
use crate::facts::Page;
use crate::lower::Lowering;
use crate::syntax::SyntaxError;

pub(super) static POLICY: Verb = Verb {
    page: Page::new("policy", include_str!("policy.md")),
    head: &[],
    clauses: &[ALPHA, INTERVAL, PAIRS, SCORES_ALPHA, EFFECT, MISSING],
    lower,
};

fn lower(statement: &mut Lowering<'_>) -> Option<StatementKind> {
    let settings = settings::lower(statement)?;
    if settings == Settings::default() {
        let message = "`policy` states no setting";
        let help = "write for example `policy alpha .05 interval 95% pairs holm`";
        statement.report(SyntaxError::new(statement.span(), message).help(help));
        return None;
    }
    Some(StatementKind::Policy(Policy { settings }))
}
