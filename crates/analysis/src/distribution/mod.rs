//! Probability distributions, one file each: tails on the log scale, limits of noncentrality.
//!
//! Every tail is a [`PValue`](crate::test::PValue) whose logarithm holds where the probability
//! itself underflows. Of the two tails of a law the smaller is computed and the larger is its
//! complement, so that both keep their digits and add up to 1. A result is NaN only where an
//! argument is NaN, a number of degrees of freedom is not positive, or a level or a probability
//! lies outside 0 to 1.

pub mod central_f;
pub mod chi_square;
pub mod hedges;
pub mod incomplete_beta;
pub mod incomplete_gamma;
mod large_parameters;
pub mod noncentral_f;
pub mod noncentral_t;
mod normal;
mod poisson_mixture;
mod root;
mod stirling;
pub mod student_t;
mod tails;

pub use tails::Tails;
