//! Sums, means and norms whose error does not grow with the number of terms.

/// A running sum with the lost low-order parts kept beside it (Neumaier 1974, Zeitschrift für
/// Angewandte Mathematik und Mechanik 54).
#[derive(Clone, Copy, Debug, Default)]
pub(crate) struct Sum {
    sum: f64,
    lost: f64,
}

impl Sum {
    /// Adds one term.
    pub(crate) fn add(&mut self, term: f64) {
        let sum = self.sum + term;
        self.lost += if self.sum.abs() >= term.abs() {
            (self.sum - sum) + term
        } else {
            (term - sum) + self.sum
        };
        self.sum = sum;
    }

    /// The sum so far.
    pub(crate) fn value(self) -> f64 {
        self.sum + self.lost
    }
}

/// The sum of the terms.
pub(crate) fn sum(terms: impl IntoIterator<Item = f64>) -> f64 {
    let mut total = Sum::default();
    terms.into_iter().for_each(|term| total.add(term));
    total.value()
}

/// The Euclidean norm. The values are scaled by a power of two, which rounds nothing, so that no
/// square overflows or vanishes.
pub(crate) fn norm(values: impl IntoIterator<Item = f64> + Clone) -> f64 {
    let largest = values.clone().into_iter().fold(0.0, |largest: f64, x| largest.max(x.abs()));
    if largest == 0.0 {
        return 0.0;
    }
    let scale = power_of_two_below(largest);
    let squares = sum(values.into_iter().map(|x| {
        let scaled = x / scale;
        scaled * scaled
    }));
    scale * squares.sqrt()
}

/// The largest power of two that does not exceed a positive number.
fn power_of_two_below(x: f64) -> f64 {
    const EXPONENT: u64 = 0x7ff0_0000_0000_0000;
    f64::from_bits(x.to_bits() & EXPONENT).max(f64::MIN_POSITIVE)
}

/// The inner product, in eight interleaved sums: the compiler turns them into vector instructions.
pub(crate) fn dot(a: &[f64], b: &[f64]) -> f64 {
    let mut sums = [0.0; 8];
    let (a_blocks, b_blocks) = (a.chunks_exact(8), b.chunks_exact(8));
    let rest: f64 = a_blocks.remainder().iter().zip(b_blocks.remainder()).map(|(x, y)| x * y).sum();
    for (a_block, b_block) in a_blocks.zip(b_blocks) {
        for ((sum, x), y) in sums.iter_mut().zip(a_block).zip(b_block) {
            *sum += x * y;
        }
    }
    sums.iter().sum::<f64>() + rest
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_sum_keeps_what_a_large_term_would_swallow() {
        assert_eq!(sum([1.0, 1e100, 1.0, -1e100]), 2.0);
    }

    #[test]
    fn a_norm_survives_squares_that_overflow_or_vanish() {
        for scale in [1e-300, 1.0, 1e300] {
            let norm = norm([3.0 * scale, 4.0 * scale]);
            assert!((norm / scale - 5.0).abs() < 1e-14, "{norm} at {scale}");
        }
        assert_eq!(norm([0.0, 0.0]), 0.0);
    }

    #[test]
    fn an_inner_product_counts_every_term() {
        for n in 0..40 {
            let a: Vec<f64> = (0..n).map(f64::from).collect();
            let expected: f64 = a.iter().map(|x| x * x).sum();
            assert_eq!(dot(&a, &a), expected);
        }
    }
}
