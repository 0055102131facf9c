//! Another name for something that the document defines.

use super::describe::written;
use super::mentions::{Mention, Referent, mention_at, mentions};
use super::scope::Scope;
use crate::diagnostic::Edit;
use crate::document::Document;
use crate::span::{SourceId, Span};

/// Why a name cannot be changed.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
pub enum RenameError {
    /// There is no name under the cursor.
    #[error("only the name of a table, of a comparison or of a derived column can be changed")]
    NothingToRename,
    /// The thing is not defined in the document.
    #[error("`{0}` is not defined in this document")]
    NotDefined(String),
    /// The column comes from a file.
    #[error("`{0}` is a column of the data file; `label` gives it another name in print")]
    FromFile(String),
    /// The new name cannot be written.
    #[error("a name needs a character, and cannot hold a back-quote or a line break")]
    NotAName,
    /// The new name has a meaning already.
    #[error("`{0}` is defined already")]
    Taken(String),
}

/// The name under the cursor, where it can be changed.
///
/// # Errors
/// Why it cannot.
pub fn renamable(
    document: &Document,
    source: SourceId,
    offset: usize,
) -> Result<Span, RenameError> {
    let scope = Scope::of(document);
    Ok(renamable_mention(&scope, source, offset)?.location.span)
}

/// The edits that change the name under the cursor wherever it stands.
///
/// # Errors
/// Why the name cannot be changed, or not to this one.
pub fn rename(
    document: &Document,
    source: SourceId,
    offset: usize,
    new_name: &str,
) -> Result<Vec<Edit>, RenameError> {
    let scope = Scope::of(document);
    let wanted = renamable_mention(&scope, source, offset)?.referent;
    let new_name = crate::lower::text::bare_name(new_name.trim());
    if new_name.trim().is_empty() || new_name.contains(['`', '\n', '\r']) {
        return Err(RenameError::NotAName);
    }
    let all = mentions(&scope);
    let taken = all.iter().filter(|mention| mention.referent != wanted).any(|mention| {
        match (&wanted, &mention.referent) {
            // Tables and comparisons share one space of names.
            (
                Referent::Table(_) | Referent::Comparison(_),
                Referent::Table(name) | Referent::Comparison(name),
            ) => name == new_name,
            (Referent::Column { table: one, .. }, Referent::Column { table: other, column }) => {
                one == other && column == new_name
            }
            _ => false,
        }
    });
    if taken {
        return Err(RenameError::Taken(new_name.to_owned()));
    }
    let edits = all.into_iter().filter(|mention| mention.referent == wanted);
    Ok(edits.map(|mention| Edit { location: mention.location, text: written(new_name) }).collect())
}

fn renamable_mention(
    scope: &Scope<'_>,
    source: SourceId,
    offset: usize,
) -> Result<Mention, RenameError> {
    let mention = mention_at(scope, source, offset).ok_or(RenameError::NothingToRename)?;
    let defined = mentions(scope).iter().any(|one| one.defines && one.referent == mention.referent);
    match &mention.referent {
        _ if defined => Ok(mention),
        Referent::Column { column, .. } => Err(RenameError::FromFile(column.clone())),
        Referent::Table(name) | Referent::Comparison(name) => {
            Err(RenameError::NotDefined(name.clone()))
        }
    }
}
