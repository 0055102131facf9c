//! `unknown-path`: see the page beside this file.

use super::mentions::{paths, place, suggest};
use super::{Context, Finder, Rule};
use crate::ast::Path;
use crate::diagnostic::{Diagnostic, Severity};
use crate::facts::Page;
use crate::model::Located;
use crate::names::{dotted, listed};
use crate::span::Name;

pub(super) const RULE: Rule = Rule {
    page: Page::new("unknown-path", include_str!("unknown-path.md")),
    severity: Severity::Error,
    finder: Finder::Check(check),
};

fn check(context: &Context<'_>) -> Vec<Diagnostic> {
    paths(context).iter().filter_map(|path| look(context, path)).collect()
}

fn look(context: &Context<'_>, path: &Located<&Path>) -> Option<Diagnostic> {
    let segments = &path.value.segments;
    let keys: Vec<String> = segments.iter().map(|segment| segment.value.clone()).collect();
    if !context.model.comparisons.contains_key(keys.first()?) {
        return None;
    }
    // The first key is a view, which is known even where the data cannot be read.
    if let Some(view) = segments.get(1) {
        let views = context.facts.views();
        if !views.is_empty() && !views.iter().any(|page| page.name == view.value) {
            let known = views.iter().map(|page| page.name.to_owned()).collect();
            return Some(unknown(path, view, keys.get(..1)?, known));
        }
    }
    for (length, segment) in segments.iter().enumerate().skip(1) {
        let before = keys.get(..length)?;
        let known: Vec<String> =
            context.facts.keys(before).into_iter().map(|fact| fact.key).collect();
        if known.is_empty() {
            // Either a value stands here already, or nothing is known.
            context.facts.value(before)?;
            let message = format!("`{}` is a value, and nothing is below it", dotted(before));
            return Some(Diagnostic::error("unknown-path", place(path, segment.span), message));
        }
        if !known.contains(&segment.value) {
            return Some(unknown(path, segment, before, known));
        }
    }
    ends_early(context, path, &keys)
}

fn unknown(
    path: &Located<&Path>,
    segment: &Name,
    before: &[String],
    known: Vec<String>,
) -> Diagnostic {
    let message = format!("`{}` has no key `{}`", dotted(before), segment.value);
    let diagnostic = Diagnostic::error("unknown-path", place(path, segment.span), message);
    let mut diagnostic =
        suggest(diagnostic, &segment.value, known.iter().map(String::as_str), "its keys are");
    // A key may be a bare number, which a name may not.
    for edit in diagnostic.fix.iter_mut().flat_map(|fix| &mut fix.edits) {
        let bare = edit.text.trim_matches('`');
        if !bare.is_empty() && bare.bytes().all(|byte| byte.is_ascii_digit()) {
            edit.text = bare.to_owned();
        }
    }
    diagnostic
}

/// A path must lead all the way to a value or to a test.
fn ends_early(context: &Context<'_>, path: &Located<&Path>, keys: &[String]) -> Option<Diagnostic> {
    let location = path.location;
    if keys.len() < 2 {
        let message = format!("`{}` is a comparison, not a value", dotted(keys));
        let help = format!("say which of its values: `{}.omnibus.pillai`", dotted(keys));
        return Some(Diagnostic::error("unknown-path", location, message).help(help));
    }
    let next: Vec<String> = context.facts.keys(keys).into_iter().map(|fact| fact.key).collect();
    if next.is_empty() || context.facts.value(keys).is_some() {
        return None;
    }
    let message = format!("`{}` is not a value yet", dotted(keys));
    let help = format!("it goes on with {}", listed(next.iter().take(12).map(String::as_str)));
    Some(Diagnostic::error("unknown-path", location, message).help(help))
}
