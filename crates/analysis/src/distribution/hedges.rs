//! The small-sample correction of a standardized mean difference.

use statrs::function::gamma::ln_gamma;

/// J(df) = Γ(df/2) / (√(df/2) Γ((df − 1)/2)) (Hedges 1981, J. Educ. Stat. 6:107).
pub fn correction(df: f64) -> f64 {
    (ln_gamma(df / 2.0) - ln_gamma((df - 1.0) / 2.0) - 0.5 * (df / 2.0).ln()).exp()
}
