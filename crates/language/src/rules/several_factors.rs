//! `several-factors`: see the page beside this file.

use super::{Finder, Rule};
use crate::diagnostic::Severity;
use crate::facts::Page;

pub(super) const RULE: Rule = Rule {
    page: Page::new("several-factors", include_str!("several-factors.md")),
    severity: Severity::Error,
    finder: Finder::Earlier,
};
