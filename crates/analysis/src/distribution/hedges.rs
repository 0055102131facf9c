//! The small-sample correction of a standardized mean difference.

use super::stirling::stirling_error;

/// J(df) = Γ(df/2) / (√(df/2) Γ((df − 1)/2)), the factor that makes a standardized mean difference
/// unbiased (Hedges 1981, J. Educ. Stat. 6:107).
///
/// It exists for `df` > 1, tends to 0 there and to 1 as `df` grows. The two log-gammas are replaced
/// by the errors of Stirling's formula, because their difference would lose digits at large `df`.
pub fn correction(df: f64) -> f64 {
    if df.is_nan() || df < 1.0 {
        return f64::NAN;
    }
    if df == 1.0 {
        return 0.0;
    }
    if df.is_infinite() {
        return 1.0;
    }
    let z = 0.5 * (df - 1.0);
    let main = (z - 0.5) * (0.5 / z).ln_1p() - 0.5;
    (main + stirling_error(z + 0.5) - stirling_error(z)).exp()
}
