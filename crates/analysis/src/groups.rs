//! Checks that every procedure makes of its input before it computes.

use crate::error::AnalysisError;

/// Values beyond this have squares beyond the range of a double.
const LARGEST: f64 = 1e150;

/// The sizes of the groups, if there are two or more, none is empty and every row has one.
pub(crate) fn group_sizes(
    rows: usize,
    codes: &[usize],
    group_count: usize,
) -> Result<Vec<usize>, AnalysisError> {
    if codes.len() != rows {
        return Err(AnalysisError::Shape { rows, groups: codes.len() });
    }
    if group_count < 2 {
        return Err(AnalysisError::TooFewGroups { groups: group_count });
    }
    let mut sizes = vec![0; group_count];
    for (row, &code) in codes.iter().enumerate() {
        match sizes.get_mut(code) {
            Some(size) => *size += 1,
            None => return Err(AnalysisError::GroupCode { row, code, groups: group_count }),
        }
    }
    match sizes.iter().position(|&size| size == 0) {
        Some(group) => Err(AnalysisError::EmptyGroup { group }),
        None => Ok(sizes),
    }
}

/// Refuses values that are not finite or too large to be squared.
pub(crate) fn check_values(values: &[f64], outcome: usize) -> Result<(), AnalysisError> {
    for (row, value) in values.iter().enumerate() {
        if !value.is_finite() {
            return Err(AnalysisError::NotFinite { outcome, row });
        }
        if value.abs() > LARGEST {
            return Err(AnalysisError::TooLarge { outcome, row });
        }
    }
    Ok(())
}
