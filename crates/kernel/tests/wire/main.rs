//! The kernel over real sockets, with a client of our own and an evaluator of a few words.

#![allow(
    clippy::indexing_slicing,
    clippy::panic,
    clippy::unwrap_used,
    reason = "a test fails by panicking, in its helpers too"
)]

mod client;
mod execution;
mod life;
mod questions;
mod scripted;
