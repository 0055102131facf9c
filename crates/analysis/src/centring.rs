//! One outcome split into grand mean, group effects and residuals.

use crate::error::AnalysisError;
use crate::numeric::sum::{Sum, norm, sum};

/// An outcome as y = grand mean + effect of the group + residual.
///
/// Every group is shifted by its first value before anything is summed, and every mean is corrected by
/// the mean of what it left over, so that a large common part of the values takes nothing away from
/// the differences among them.
#[derive(Clone, Debug)]
pub(crate) struct Centred {
    /// The mean of all units.
    pub(crate) grand_mean: f64,
    /// The mean of every group minus the mean of all units; weighted by size they sum to zero.
    pub(crate) effects: Vec<f64>,
    /// Deviations from the group means, in the order of the units.
    pub(crate) residuals: Vec<f64>,
    /// The norm of the values as they came in, which bounds what their rounding can add up to.
    pub(crate) input_norm: f64,
}

/// Splits one outcome. The codes must lie in the range of the sizes and count up to them.
pub(crate) fn centre(values: &[f64], codes: &[usize], sizes: &[usize]) -> Centred {
    let first = first_values(values, codes, sizes.len());
    let mut residuals: Vec<f64> =
        values.iter().zip(codes).map(|(y, &code)| y - at(&first, code)).collect();
    let mut offsets = vec![0.0; sizes.len()];
    for _ in 0..2 {
        let left_over = group_means(&residuals, codes, sizes);
        residuals.iter_mut().zip(codes).for_each(|(r, &code)| *r -= at(&left_over, code));
        offsets.iter_mut().zip(left_over).for_each(|(offset, mean)| *offset += mean);
    }

    let origin = at(&first, 0);
    let mut effects: Vec<f64> =
        first.iter().zip(&offsets).map(|(y, offset)| (y - origin) + offset).collect();
    let mut grand_offset = 0.0;
    for _ in 0..2 {
        let weighted = effects.iter().zip(sizes).map(|(effect, &n)| effect * n as f64);
        let left_over = sum(weighted) / values.len() as f64;
        effects.iter_mut().for_each(|effect| *effect -= left_over);
        grand_offset += left_over;
    }
    Centred {
        grand_mean: origin + grand_offset,
        effects,
        residuals,
        input_norm: norm(values.iter().copied()),
    }
}

/// Splits one outcome, ignoring the groups: the residuals are deviations from the mean of all units.
pub(crate) fn centre_total(values: &[f64]) -> Centred {
    centre(values, &vec![0; values.len()], &[values.len()])
}

impl Centred {
    /// The norm of the residuals: the square root of the sum of squares within groups.
    pub(crate) fn norm_within(&self) -> f64 {
        norm(self.residuals.iter().copied())
    }

    /// The square root of the sum of squares between groups.
    pub(crate) fn norm_between(&self, sizes: &[usize]) -> f64 {
        norm(self.weighted_effects(sizes))
    }

    /// The effects times the square roots of the group sizes.
    pub(crate) fn weighted_effects<'a>(
        &'a self,
        sizes: &'a [usize],
    ) -> impl Iterator<Item = f64> + Clone + 'a {
        self.effects.iter().zip(sizes).map(|(effect, &n)| effect * (n as f64).sqrt())
    }
}

/// Refuses an outcome that does not vary, or does not vary inside any group.
///
/// Two values count as equal up to two units in the last place of the largest value, since that is
/// what one rounding each of two values that were equal can make of them.
pub(crate) fn check_varies(
    values: &[f64],
    codes: &[usize],
    group_count: usize,
    outcome: usize,
) -> Result<(), AnalysisError> {
    let largest = values.iter().fold(0.0, |largest: f64, y| largest.max(y.abs()));
    let equal = 2.0 * f64::EPSILON * largest;
    if range_within(values, &vec![0; values.len()], 1) <= equal {
        return Err(AnalysisError::ConstantOutcome { outcome });
    }
    if range_within(values, codes, group_count) <= equal {
        return Err(AnalysisError::ConstantWithinGroups { outcome });
    }
    Ok(())
}

/// The largest difference between two values of the same group.
fn range_within(values: &[f64], codes: &[usize], group_count: usize) -> f64 {
    let mut ranges = vec![(f64::INFINITY, f64::NEG_INFINITY); group_count];
    for (&y, &code) in values.iter().zip(codes) {
        if let Some((low, high)) = ranges.get_mut(code) {
            (*low, *high) = (low.min(y), high.max(y));
        }
    }
    ranges.iter().fold(0.0, |largest: f64, (low, high)| largest.max(high - low))
}

fn first_values(values: &[f64], codes: &[usize], group_count: usize) -> Vec<f64> {
    let mut first = vec![None; group_count];
    for (&y, &code) in values.iter().zip(codes) {
        if let Some(slot) = first.get_mut(code) {
            slot.get_or_insert(y);
        }
    }
    first.into_iter().map(Option::unwrap_or_default).collect()
}

fn group_means(values: &[f64], codes: &[usize], sizes: &[usize]) -> Vec<f64> {
    let mut sums = vec![Sum::default(); sizes.len()];
    for (&y, &code) in values.iter().zip(codes) {
        if let Some(sum) = sums.get_mut(code) {
            sum.add(y);
        }
    }
    sums.iter().zip(sizes).map(|(sum, &n)| sum.value() / n as f64).collect()
}

/// The value of one group. Codes are checked before they come here.
fn at(values: &[f64], group: usize) -> f64 {
    values.get(group).copied().unwrap_or_default()
}
