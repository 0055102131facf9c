//! Live values, segment by segment.

use super::{Completion, CompletionKind};
use crate::features::describe::Describe;
use crate::features::live::{braces_around, typed_at};
use crate::features::scope::Defines;
use crate::names::quoted;
use crate::span::Span;

/// The path inside the `{{ }}` around the cursor.
pub(super) fn in_braces(
    names: &Describe<'_>,
    text: &str,
    bounds: Span,
    offset: usize,
) -> Vec<Completion> {
    let typed = braces_around(text, bounds, offset).and_then(|inner| typed_at(text, inner, offset));
    match typed {
        Some(typed) if typed.before.is_empty() => comparisons(names, typed.word, "."),
        Some(typed) => keys(names, &typed.before, typed.word),
        None => Vec::new(),
    }
}

/// The comparisons of the document, followed by `sign`.
pub(super) fn comparisons(names: &Describe<'_>, replace: Span, sign: &str) -> Vec<Completion> {
    names
        .scope
        .names(Defines::Comparison)
        .into_iter()
        .map(|name| Completion {
            insert: format!("{}{sign}", quoted(&name)),
            replace,
            kind: CompletionKind::Comparison,
            detail: names.first_line(Defines::Comparison, &name),
            page: names.comparison_as_defined(&name),
            label: name,
        })
        .collect()
}

/// The keys that may follow the segments before.
pub(super) fn keys(names: &Describe<'_>, before: &[String], replace: Span) -> Vec<Completion> {
    let known = names.facts.keys(before);
    if known.is_empty() && before.len() == 1 {
        // Nothing is known of the results yet, but the views are.
        let views = names.facts.views().iter();
        return views.map(|page| super::from_page(page, CompletionKind::View, replace)).collect();
    }
    known
        .into_iter()
        .map(|key| {
            let mut path = before.to_vec();
            path.push(key.key.clone());
            let is_number = !key.key.is_empty() && key.key.chars().all(|c| c.is_ascii_digit());
            Completion {
                insert: if is_number { key.key.clone() } else { quoted(&key.key) },
                replace,
                kind: if before.len() == 1 { CompletionKind::View } else { CompletionKind::Key },
                detail: key.detail,
                page: names.meaning(&path),
                label: key.key,
            }
        })
        .collect()
}
