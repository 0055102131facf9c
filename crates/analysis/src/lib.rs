//! Statistics for comparing groups on several outcomes: numbers in, numbers out.
//!
//! No text, no files, no data frames, no rendering, no global state. Every procedure takes matrices
//! and indices and returns a named struct, or an error that says which group, outcome or row.

mod centring;
pub mod centroids;
pub mod coefficients;
pub mod correlations;
pub mod covariances;
pub mod criteria;
pub mod descriptives;
pub mod distribution;
pub mod error;
pub mod functions;
mod groups;
pub mod hypothesis;
pub mod multiplicity;
mod numeric;
pub mod pairs;
pub mod residuals;
pub mod sample;
pub mod test;
pub mod univariate;
