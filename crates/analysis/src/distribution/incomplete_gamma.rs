//! The regularized incomplete gamma function.

use super::Tails;

/// Both tails of the gamma distribution with shape `a` and scale 1 at `x`.
pub fn tails(a: f64, x: f64) -> Tails {
    if x <= 0.0 {
        return Tails::from_probabilities(0.0, 1.0);
    }
    if x.is_infinite() {
        return Tails::from_probabilities(1.0, 0.0);
    }
    let lower = statrs::function::gamma::gamma_lr(a, x);
    let upper = statrs::function::gamma::gamma_ur(a, x);
    Tails::from_probabilities(lower, upper)
}
