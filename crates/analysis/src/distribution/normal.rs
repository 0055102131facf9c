//! The standard normal distribution.

use std::f64::consts::{FRAC_1_SQRT_2, PI};

use super::Tails;

/// The probabilities that a standard normal variable is at most as far from 0 as `z`, and farther.
pub(super) fn central(z: f64) -> Tails {
    let x = z.abs() * FRAC_1_SQRT_2;
    if x <= ERF_UP_TO {
        Tails::from_ln_lower(erf(x).ln())
    } else {
        Tails::from_ln_upper(scaled_erfc(x).ln() - x * x)
    }
}

/// ln Φ(z).
pub(super) fn ln_cumulative(z: f64) -> f64 {
    let scaled = 0.5 * scaled_erfc(z.abs() * FRAC_1_SQRT_2);
    if z < 0.0 { scaled.ln() - 0.5 * z * z } else { (-scaled * (-0.5 * z * z).exp()).ln_1p() }
}

/// φ(z)/Φ(z), the slope of ln Φ.
pub(super) fn ln_cumulative_slope(z: f64) -> f64 {
    let density_constant = (2.0 * PI).sqrt().recip();
    let scaled = 0.5 * scaled_erfc(z.abs() * FRAC_1_SQRT_2);
    if z < 0.0 {
        return density_constant / scaled;
    }
    let bell = (-0.5 * z * z).exp();
    density_constant * bell / (1.0 - scaled * bell)
}

/// Where the error function itself gives way to its complement.
const ERF_UP_TO: f64 = 0.46875;
/// erf(x)/x as a quotient of polynomials in x², for |x| ≤ 0.46875.
const ERF_NUMERATOR: [f64; 5] = [
    1.857_777_061_846_031_5e-1,
    3.161_123_743_870_565_6,
    1.138_641_541_510_501_6e2,
    3.774_852_376_853_02e2,
    3.209_377_589_138_469_5e3,
];
const ERF_DENOMINATOR: [f64; 5] = [
    1.0,
    2.360_129_095_234_412_1e1,
    2.440_246_379_344_441_7e2,
    1.282_616_526_077_372_3e3,
    2.844_236_833_439_171e3,
];
/// exp(x²) erfc(x) as a quotient of polynomials in x, for 0.46875 ≤ x ≤ 4.
const MIDDLE_NUMERATOR: [f64; 9] = [
    2.153_115_354_744_038_5e-8,
    5.641_884_969_886_701e-1,
    8.883_149_794_388_377,
    6.611_919_063_714_163e1,
    2.986_351_381_974_001e2,
    8.819_522_212_417_69e2,
    1.712_047_612_634_070_6e3,
    2.051_078_377_826_071_5e3,
    1.230_339_354_797_997_2e3,
];
const MIDDLE_DENOMINATOR: [f64; 9] = [
    1.0,
    1.574_492_611_070_983_5e1,
    1.176_939_508_913_125e2,
    5.371_811_018_620_099e2,
    1.621_389_574_566_690_2e3,
    3.290_799_235_733_459_6e3,
    4.362_619_090_143_247e3,
    3.439_367_674_143_721_6e3,
    1.230_339_354_803_749_4e3,
];
/// What x exp(x²) erfc(x) lacks of 1/√π, as a quotient of polynomials in 1/x², for x > 4.
const FAR_NUMERATOR: [f64; 6] = [
    1.631_538_713_730_209_8e-2,
    3.053_266_349_612_323_4e-1,
    3.603_448_999_498_044_4e-1,
    1.257_817_261_112_292_5e-1,
    1.608_378_514_874_228e-2,
    6.587_491_615_298_378e-4,
];
const FAR_DENOMINATOR: [f64; 6] = [
    1.0,
    2.568_520_192_289_822,
    1.872_952_849_923_46,
    5.279_051_029_514_284e-1,
    6.051_834_131_244_132e-2,
    2.335_204_976_268_691_8e-3,
];

/// erf(x) for 0 ≤ x ≤ 0.46875 (Cody 1969, Math. Comp. 23:631).
fn erf(x: f64) -> f64 {
    let square = x * x;
    x * polynomial(&ERF_NUMERATOR, square) / polynomial(&ERF_DENOMINATOR, square)
}

/// exp(x²) erfc(x) for x ≥ 0 (Cody 1969).
pub(super) fn scaled_erfc(x: f64) -> f64 {
    if x <= ERF_UP_TO {
        (x * x).exp() * (1.0 - erf(x))
    } else if x <= 4.0 {
        polynomial(&MIDDLE_NUMERATOR, x) / polynomial(&MIDDLE_DENOMINATOR, x)
    } else {
        let square = (x * x).recip();
        let lack =
            square * polynomial(&FAR_NUMERATOR, square) / polynomial(&FAR_DENOMINATOR, square);
        (PI.sqrt().recip() - lack) / x
    }
}

/// A polynomial by Horner's scheme, the highest power first.
fn polynomial(coefficients: &[f64], x: f64) -> f64 {
    coefficients.iter().fold(0.0, |sum, coefficient| sum * x + coefficient)
}
