//! The requests about a text, one file each.

mod completion;
mod definition;
mod folding;
mod formatting;
mod hover;
mod mentions;
mod quick_fixes;
mod references;
mod rename;
mod semantic_tokens;
mod symbols;

use tower_lsp::lsp_types::ServerCapabilities;

use crate::ask::Feature;

pub(crate) use completion::Completion;
pub(crate) use definition::Definition;
pub(crate) use folding::Folding;
pub(crate) use formatting::Formatting;
pub(crate) use hover::HoverText;
pub(crate) use mentions::Mentions;
pub(crate) use quick_fixes::QuickFixes;
pub(crate) use references::References;
pub(crate) use rename::{PrepareRename, Rename};
pub(crate) use semantic_tokens::WordKinds;
pub(crate) use symbols::Symbols;

/// How each request makes itself known to the client.
pub(crate) const ANNOUNCEMENTS: &[fn(&mut ServerCapabilities)] = &[
    Completion::announce,
    Definition::announce,
    Folding::announce,
    Formatting::announce,
    HoverText::announce,
    Mentions::announce,
    PrepareRename::announce,
    QuickFixes::announce,
    References::announce,
    Rename::announce,
    Symbols::announce,
    WordKinds::announce,
];
