//! `unknown-word`: see the page beside this file.

use super::{Finder, Rule};
use crate::diagnostic::Severity;
use crate::facts::Page;

pub(super) const RULE: Rule = Rule {
    page: Page::new("unknown-word", include_str!("unknown-word.md")),
    severity: Severity::Error,
    finder: Finder::Earlier,
};
