//! Student's t distribution.

use statrs::distribution::{ContinuousCDF, StudentsT};

use super::central_f;
use crate::test::PValue;

/// The probability that a t variable with `df` degrees of freedom is farther from 0 than `t`.
pub fn two_sided(t: f64, df: f64) -> PValue {
    central_f::survival(t * t, 1.0, df)
}

/// The value that a t variable with `df` degrees of freedom stays below with `probability`.
pub fn quantile(probability: f64, df: f64) -> f64 {
    StudentsT::new(0.0, 1.0, df).map_or(f64::NAN, |law| law.inverse_cdf(probability))
}
