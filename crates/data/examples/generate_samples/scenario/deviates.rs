//! Random numbers that are the same on every machine.

use rand_chacha::ChaCha8Rng;
use rand_chacha::rand_core::{Rng, SeedableRng};

/// A stream of random numbers.
pub(super) struct Deviates(ChaCha8Rng);

impl Deviates {
    /// The stream of a seed.
    pub(super) fn new(seed: u8) -> Self {
        Self(ChaCha8Rng::from_seed([seed; 32]))
    }

    /// Between 0 and 1, from 53 random bits.
    fn uniform(&mut self) -> f64 {
        (self.0.next_u64() >> 11) as f64 / (1_u64 << 53) as f64
    }

    /// Close to standard normal: the sum of twelve uniform numbers less six (common practice). Unlike
    /// closer approximations it needs no logarithm, which differs in the last digit among machines.
    pub(super) fn normal(&mut self) -> f64 {
        (0..12).map(|_| self.uniform()).sum::<f64>() - 6.0
    }

    /// Whether something happens that happens this often.
    pub(super) fn chance(&mut self, often: f64) -> bool {
        self.uniform() < often
    }

    /// As many as a lower triangle of correlations has rows, correlated so.
    pub(super) fn correlated(&mut self, factor: &[Vec<f64>]) -> Vec<f64> {
        let independent: Vec<f64> = factor.iter().map(|_| self.normal()).collect();
        factor.iter().map(|row| row.iter().zip(&independent).map(|(l, z)| l * z).sum()).collect()
    }

    /// Puts items into a random order.
    pub(super) fn shuffle<T>(&mut self, items: &mut [T]) {
        for last in (1..items.len()).rev() {
            items.swap(last, (self.uniform() * (last + 1) as f64) as usize);
        }
    }
}

/// The Cholesky factor of a correlation matrix, both as rows of the lower triangle.
#[allow(clippy::indexing_slicing, reason = "a numeric kernel over a lower triangle")]
pub(super) fn cholesky(correlations: &[&[f64]]) -> Vec<Vec<f64>> {
    let mut factor: Vec<Vec<f64>> = Vec::new();
    for (i, row) in correlations.iter().enumerate() {
        let mut entries: Vec<f64> = Vec::new();
        for (j, correlation) in row.iter().enumerate() {
            let explained: f64 = (0..j)
                .map(|k| {
                    let other = if i == j { entries[k] } else { factor[j][k] };
                    entries[k] * other
                })
                .sum();
            let rest = correlation - explained;
            entries.push(if i == j { rest.sqrt() } else { rest / factor[j][j] });
        }
        factor.push(entries);
    }
    factor
}
