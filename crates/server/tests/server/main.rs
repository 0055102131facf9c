//! The server in the same process, an editor at the other end of a pipe.

#![allow(clippy::indexing_slicing, clippy::panic, reason = "a test may fail by them")]

mod conversion;
mod diagnostics;
mod editors;
mod lifecycle;
mod notebooks;
mod requests;
mod support;
mod synchronization;
