//! Probability distributions, one file each: tails on the log scale, limits of noncentrality.
//!
//! Every tail is a [`PValue`](crate::test::PValue) whose logarithm holds where the probability
//! itself underflows. Of the two tails of a law the smaller is computed and the larger is its
//! complement, so that both keep their digits and add up to 1. A result is NaN only where an
//! argument is NaN, a number of degrees of freedom is not positive, or a level or a probability
//! lies outside 0 to 1.
//!
//! The special functions are our own because those of statrs 0.19 do not have the digits. Against
//! 50-digit values its `erfc` is off by 4·10⁻¹¹ (relative) from 1 to 26, its `ln_gamma` by 5·10⁻¹³
//! (absolute, so relative in a density) at 10³ and 6·10⁻¹⁰ at 10⁶, its `beta_reg(a, a, ½)` by
//! 8·10⁻¹⁴ at a = 50, 2·10⁻¹¹ at 5·10³ and 10⁻⁹ at 5·10⁴, its `gamma_ur` by 10⁻¹³ at 50; none has
//! a logarithm where the result underflows. What stands here was compared with values of 40 digits
//! and more at random points, with degrees of freedom from 0.1 to 3·10⁸ and tails down to
//! 10⁻¹⁰⁰⁰⁰: the largest relative errors of the logarithm of a tail were 8·10⁻¹⁵ (F), 7·10⁻¹⁵
//! (noncentral F), 10⁻¹⁵ (noncentral t) and 5·10⁻¹⁶ (normal).

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
