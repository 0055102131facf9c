//! The linear algebra under the procedures: sums that do not drift, a triangular factor that takes
//! rows in blocks, and singular values.

pub(crate) mod householder;
pub(crate) mod jacobi;
pub(crate) mod sum;

/// Unit roundoff: the largest relative error of rounding a real number to a double.
pub(crate) const ROUNDOFF: f64 = f64::EPSILON / 2.0;
