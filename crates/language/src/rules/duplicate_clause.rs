//! `duplicate-clause`: see the page beside this file.

use super::{Finder, Rule};
use crate::diagnostic::Severity;
use crate::facts::Page;

pub(super) const RULE: Rule = Rule {
    page: Page::new("duplicate-clause", include_str!("duplicate-clause.md")),
    severity: Severity::Error,
    finder: Finder::Earlier,
};
