//! The rules that a text is held to. Each is one file with its page beside it, and one line here.

mod broken_range;
mod contradictory_clauses;
mod cycle;
mod duplicate_clause;
mod duplicate_definition;
mod factor_as_outcome;
mod lax_setting;
mod mentions;
mod out_of_range;
mod repeated_level;
mod repeated_outcome;
mod several_factors;
mod syntax;
mod unexplained_allowance;
mod unknown_column;
mod unknown_comparison;
mod unknown_function;
mod unknown_level;
mod unknown_path;
mod unknown_rule;
mod unknown_sample;
mod unknown_table;
mod unknown_term;
mod unknown_view;
mod unknown_word;

use crate::diagnostic::{Diagnostic, Severity};
use crate::facts::{Facts, Page};
use crate::model::Model;

/// Every rule that needs no more than the text and the facts that editors have.
pub static RULES: &[Rule] = &[
    syntax::RULE,
    unknown_word::RULE,
    duplicate_clause::RULE,
    several_factors::RULE,
    duplicate_definition::RULE,
    cycle::RULE,
    unknown_table::RULE,
    unknown_comparison::RULE,
    unknown_sample::RULE,
    unknown_view::RULE,
    unknown_term::RULE,
    unknown_column::RULE,
    unknown_level::RULE,
    unknown_function::RULE,
    unknown_path::RULE,
    broken_range::RULE,
    repeated_outcome::RULE,
    repeated_level::RULE,
    factor_as_outcome::RULE,
    contradictory_clauses::RULE,
    out_of_range::RULE,
    lax_setting::RULE,
    unknown_rule::RULE,
    unexplained_allowance::RULE,
];

/// A rule. Its name reads well after "allow": it names what is wrong, not the mend.
#[derive(Clone, Copy, Debug)]
pub struct Rule {
    /// Its page, under its name, with an example that breaks it and one that keeps it.
    pub page: Page,
    /// How much it matters when it is broken.
    pub severity: Severity,
    /// Who finds where it is broken.
    finder: Finder,
}

#[derive(Clone, Copy, Debug)]
enum Finder {
    /// The parser or the model, on the way.
    Earlier,
    /// A look at the finished model.
    Check(fn(&Context<'_>) -> Vec<Diagnostic>),
}

/// What a rule looks at.
#[derive(Clone, Copy)]
struct Context<'a> {
    model: &'a Model,
    facts: &'a dyn Facts,
}

/// The pages of the rules.
pub fn pages() -> impl Iterator<Item = &'static Page> {
    RULES.iter().map(|rule| &rule.page)
}

/// Everything that is wrong with a document as far as text and facts tell, in the order of the
/// text, without what the text allows.
#[must_use]
pub fn diagnose(model: &Model, facts: &dyn Facts) -> Vec<Diagnostic> {
    let context = Context { model, facts };
    let mut found = model.diagnostics.clone();
    for rule in RULES {
        if let Finder::Check(check) = rule.finder {
            found.extend(check(&context));
        }
    }
    let mut found = model.without_allowed(found);
    found.sort_by_key(|diagnostic| diagnostic.location);
    found
}

/// An example on a rule's page.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Example {
    /// Whether it breaks the rule.
    pub breaks: bool,
    /// The code.
    pub code: String,
}

/// The examples of a page: fenced code with the words `tussock breaks` or `tussock keeps`.
#[must_use]
pub fn examples(page: &Page) -> Vec<Example> {
    let mut examples = Vec::new();
    let mut open: Option<Example> = None;
    for line in page.text.lines() {
        match &mut open {
            Some(example) if line != "```" => {
                example.code.push_str(line);
                example.code.push('\n');
            }
            Some(_) => examples.extend(open.take()),
            None => {
                let breaks = match line {
                    "```tussock breaks" => true,
                    "```tussock keeps" => false,
                    _ => continue,
                };
                open = Some(Example { breaks, code: String::new() });
            }
        }
    }
    examples
}
