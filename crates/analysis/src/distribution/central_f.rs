//! The F distribution.

use super::incomplete_beta;
use crate::test::PValue;

/// The probability that an F variable with `df1` and `df2` degrees of freedom exceeds `f`.
pub fn survival(f: f64, df1: f64, df2: f64) -> PValue {
    if df2.is_infinite() {
        return super::chi_square::survival(f * df1, df1);
    }
    let ratio = df2 / df1;
    let (x, y) = if f.is_infinite() { (1.0, 0.0) } else { (f / (f + ratio), ratio / (f + ratio)) };
    incomplete_beta::tails(df1 / 2.0, df2 / 2.0, x, y).upper
}
