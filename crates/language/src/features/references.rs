//! Every place that mentions the same thing.

use super::mentions::{mention_at, mentions};
use super::scope::Scope;
use crate::document::Document;
use crate::span::{Location, SourceId};

/// Where a thing is mentioned.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Reference {
    /// The name.
    pub location: Location,
    /// Whether the name gets its meaning here.
    pub defines: bool,
}

/// Every mention of the table, comparison or column under the cursor, source by source in the
/// order of the text.
#[must_use]
pub fn references(document: &Document, source: SourceId, offset: usize) -> Vec<Reference> {
    let scope = Scope::of(document);
    let Some(wanted) = mention_at(&scope, source, offset) else { return Vec::new() };
    mentions(&scope)
        .into_iter()
        .filter(|mention| mention.referent == wanted.referent)
        .map(|mention| Reference { location: mention.location, defines: mention.defines })
        .collect()
}
