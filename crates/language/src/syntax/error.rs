//! What the parser and the lowering report: an error with its place, its reason and a mend.

use crate::span::Span;

/// Something that the language does not allow, found from the text alone.
#[derive(Clone, Debug, PartialEq)]
pub struct SyntaxError {
    /// The rule that it breaks: `syntax`, `unknown-word`, `duplicate-clause`, ...
    pub rule: &'static str,
    /// Where, in the full text.
    pub span: Span,
    /// What is wrong, in one sentence.
    pub message: String,
    /// What to do about it.
    pub help: Option<String>,
    /// A mend that an editor can apply.
    pub fix: Option<TextFix>,
}

/// One replacement in the same text.
#[derive(Clone, Debug, PartialEq)]
pub struct TextFix {
    /// What it does, as a menu would say it.
    pub title: String,
    /// What is replaced, in the full text.
    pub span: Span,
    /// By what.
    pub text: String,
}

impl SyntaxError {
    /// An error of the rule `syntax`.
    pub fn new(span: Span, message: impl Into<String>) -> Self {
        Self::of("syntax", span, message)
    }

    /// An error of a rule.
    pub fn of(rule: &'static str, span: Span, message: impl Into<String>) -> Self {
        Self { rule, span, message: message.into(), help: None, fix: None }
    }

    /// The same with a word on what to do.
    #[must_use]
    pub fn help(mut self, help: impl Into<String>) -> Self {
        self.help = Some(help.into());
        self
    }

    /// The same with a mend.
    #[must_use]
    pub fn fix(mut self, title: impl Into<String>, span: Span, text: impl Into<String>) -> Self {
        self.fix = Some(TextFix { title: title.into(), span, text: text.into() });
        self
    }

    /// The same, moved right by `by` bytes.
    #[must_use]
    pub fn shifted(mut self, by: usize) -> Self {
        self.span = self.span.shifted(by);
        if let Some(fix) = &mut self.fix {
            fix.span = fix.span.shifted(by);
        }
        self
    }
}
