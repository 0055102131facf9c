//! What an editor asks of a document: completion, hover, symbols, pages.
//!
//! One file a feature, all in byte offsets and strings. Each reads the same declarations that the
//! parser reads, and asks [`crate::facts::Facts`] for what only the data and the results can tell.

pub mod completion;
pub mod definition;
mod describe;
pub mod explain;
pub mod highlight;
pub mod hover;
mod live;
mod markdown;
mod mentions;
mod place;
pub mod references;
pub mod rename;
mod scope;
pub mod symbols;
