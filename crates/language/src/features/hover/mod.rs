//! What the word under a cursor means, here and now.

mod code;

use super::describe::Describe;
use super::live::segments;
use super::place::region_at;
use super::scope::Scope;
use crate::document::{Document, Region, RegionKind};
use crate::facts::Facts;
use crate::prose::live_values;
use crate::span::{Name, SourceId, Span};

/// An explanation and the words that it is about.
#[derive(Clone, Debug, PartialEq)]
pub struct Hover {
    /// The words.
    pub span: Span,
    /// The explanation.
    pub markdown: String,
}

/// What the word at `offset` means: the page of a word of the language, what a name stands for,
/// the value at a path.
#[must_use]
pub fn hover(
    document: &Document,
    source: SourceId,
    offset: usize,
    facts: &dyn Facts,
) -> Option<Hover> {
    let text = document.text(source);
    let region = region_at(document, source, offset)?;
    let names = Describe { scope: Scope::of(document), facts };
    match region.kind {
        RegionKind::Code => code::hover(&names, text, region, offset),
        RegionKind::Prose => in_prose(&names, text, region, offset),
    }
}

fn in_prose(names: &Describe<'_>, text: &str, region: Region, offset: usize) -> Option<Hover> {
    let prose = live_values(text, region.span);
    let value = prose.values.iter().find(|value| value.span.touches(offset))?;
    on_path(names, &value.path.segments, offset)
}

/// The segment of a path under the cursor; the whole path where the cursor is beside it.
fn on_path(names: &Describe<'_>, path: &[Name], offset: usize) -> Option<Hover> {
    let (first, last) = (path.first()?, path.last()?);
    let place = path.iter().rposition(|segment| segment.span.touches(offset));
    let upto = path.get(..=place.unwrap_or(path.len() - 1))?;
    let span = match place.and_then(|place| path.get(place)) {
        Some(segment) => segment.span,
        None => Span::new(first.span.start.min(offset), last.span.end.max(offset)),
    };
    let segments: Vec<String> = upto.iter().map(|segment| segment.value.clone()).collect();
    let markdown = names.path(&segments, upto.len() == path.len())?;
    Some(Hover { span, markdown })
}

/// The path that starts at the beginning of `span`.
fn on_written_path(names: &Describe<'_>, text: &str, span: Span, offset: usize) -> Option<Hover> {
    on_path(names, &segments(text, span), offset)
}
