//! `duplicate-definition`: see the page beside this file.

use super::{Finder, Rule};
use crate::diagnostic::Severity;
use crate::facts::Page;

pub(super) const RULE: Rule = Rule {
    page: Page::new("duplicate-definition", include_str!("duplicate-definition.md")),
    severity: Severity::Error,
    finder: Finder::Earlier,
};
