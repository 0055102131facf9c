//! Where a name gets its meaning.

use super::mentions::{Referent, mention_at, mentions};
use super::scope::Scope;
use crate::document::Document;
use crate::span::{Location, SourceId};

/// Where the table, comparison or column under the cursor is defined. A column that no statement
/// derives comes from a file, and leads to the name of the table that is read from it.
#[must_use]
pub fn definition(document: &Document, source: SourceId, offset: usize) -> Option<Location> {
    let scope = Scope::of(document);
    let wanted = mention_at(&scope, source, offset)?.referent;
    let mentions = mentions(&scope);
    let defined = |referent: &Referent| {
        let mut places = mentions
            .iter()
            .filter(|mention| mention.defines && mention.referent == *referent)
            .map(|mention| mention.location);
        if scope.newest_wins() { places.next_back() } else { places.next() }
    };
    defined(&wanted).or_else(|| match &wanted {
        Referent::Column { table, .. } => defined(&Referent::Table(table.clone())),
        Referent::Table(_) | Referent::Comparison(_) => None,
    })
}
