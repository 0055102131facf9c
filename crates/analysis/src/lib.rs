//! Statistics for comparing groups on several outcomes: numbers in, numbers out.
//!
//! No text, no files, no data frames, no rendering, no global state. Every procedure takes matrices
//! and indices and returns a named struct, or an error that says which group, outcome or row.
//!
//! ```
//! use nalgebra::DMatrix;
//! use tussock_analysis::{criteria::criteria, hypothesis::one_way, sample::Sample};
//!
//! // Eight units, two outcomes, three groups.
//! let outcomes = DMatrix::from_row_slice(8, 2, &[
//!     9.0, 3.0, 6.0, 2.0, 9.0, 7.0, 0.0, 4.0, 2.0, 0.0, 3.0, 8.0, 1.0, 9.0, 2.0, 7.0,
//! ]);
//! let sample = Sample::new(outcomes, vec![0, 0, 0, 1, 1, 2, 2, 2], 3)?;
//! let wilks = criteria(&one_way(&sample)?, 0.90).wilks;
//! assert!((wilks.value - 239.0 / 6215.0).abs() < 1e-15);
//! assert_eq!((wilks.test.df1, wilks.test.df2), (4.0, 8.0));
//! # Ok::<(), tussock_analysis::error::AnalysisError>(())
//! ```

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
mod residuals;
pub mod sample;
pub mod test;
pub mod univariate;
