//! Statistics for comparing groups on several outcomes: numbers in, numbers out.
//!
//! No text, no files, no data frames, no rendering, no global state. Every procedure takes matrices
//! and indices and returns a named struct, or an error that says which group, outcome or row.

pub mod distribution;
pub mod error;
pub mod test;
