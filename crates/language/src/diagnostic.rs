//! One shape for everything that is wrong, from a missing comma to a group of one: kernel, server
//! and command line only render it.

use crate::span::Location;

/// How much it matters.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Severity {
    /// No answer can be given.
    Error,
    /// An answer is given, and a reviewer would ask.
    Warning,
    /// Worth knowing.
    Information,
}

/// One finding: where, what, and what to do.
#[derive(Clone, Debug, PartialEq)]
pub struct Diagnostic {
    /// The rule's kebab-case name; it has a page.
    pub rule: &'static str,
    /// How much it matters.
    pub severity: Severity,
    /// Where.
    pub location: Location,
    /// What is wrong, in one sentence that also reads well alone.
    pub message: String,
    /// What to do about it.
    pub help: Option<String>,
    /// Other places that belong to it, each with a word.
    pub related: Vec<Related>,
    /// A mend that an editor can apply.
    pub fix: Option<Fix>,
}

/// Another place that belongs to a diagnostic.
#[derive(Clone, Debug, PartialEq)]
pub struct Related {
    /// Where.
    pub location: Location,
    /// Why it belongs.
    pub message: String,
}

/// A mend.
#[derive(Clone, Debug, PartialEq)]
pub struct Fix {
    /// What it does, as a menu would say it.
    pub title: String,
    /// Replacements, not overlapping.
    pub edits: Vec<Edit>,
}

/// One replacement.
#[derive(Clone, Debug, PartialEq)]
pub struct Edit {
    /// What is replaced.
    pub location: Location,
    /// By what.
    pub text: String,
}

impl Diagnostic {
    /// An error of `rule` at `location`.
    pub fn error(rule: &'static str, location: Location, message: impl Into<String>) -> Self {
        Self::new(rule, Severity::Error, location, message)
    }

    /// A warning of `rule` at `location`.
    pub fn warning(rule: &'static str, location: Location, message: impl Into<String>) -> Self {
        Self::new(rule, Severity::Warning, location, message)
    }

    /// A finding of `rule` at `location`.
    pub fn new(
        rule: &'static str,
        severity: Severity,
        location: Location,
        message: impl Into<String>,
    ) -> Self {
        let message = message.into();
        Self { rule, severity, location, message, help: None, related: Vec::new(), fix: None }
    }

    /// The same with a word on what to do.
    #[must_use]
    pub fn help(mut self, help: impl Into<String>) -> Self {
        self.help = Some(help.into());
        self
    }

    /// The same with another place that belongs to it.
    #[must_use]
    pub fn related(mut self, location: Location, message: impl Into<String>) -> Self {
        self.related.push(Related { location, message: message.into() });
        self
    }

    /// The same with a mend that replaces the text at its own location.
    #[must_use]
    pub fn replace_by(mut self, title: impl Into<String>, text: impl Into<String>) -> Self {
        let edit = Edit { location: self.location, text: text.into() };
        self.fix = Some(Fix { title: title.into(), edits: vec![edit] });
        self
    }
}
