//! The one-factor comparison against values from outside the project.

#![allow(
    clippy::unwrap_used,
    clippy::indexing_slicing,
    clippy::panic,
    reason = "a test may stop where it stands"
)]

mod certified;
mod hard_cases;
mod identities;
mod precision;
mod published;
mod rank;
mod reference_values;
mod refusals;
mod support;
