//! The regularized incomplete beta function.

use super::Tails;

/// Both tails of the beta distribution with parameters `a` and `b` at `x`, with `y = 1 − x`.
pub fn tails(a: f64, b: f64, x: f64, y: f64) -> Tails {
    if x <= 0.0 || y >= 1.0 {
        return Tails::from_probabilities(0.0, 1.0);
    }
    if y <= 0.0 {
        return Tails::from_probabilities(1.0, 0.0);
    }
    let lower = statrs::function::beta::beta_reg(a, b, x.clamp(0.0, 1.0));
    let upper = statrs::function::beta::beta_reg(b, a, y.clamp(0.0, 1.0));
    Tails::from_probabilities(lower, upper)
}
