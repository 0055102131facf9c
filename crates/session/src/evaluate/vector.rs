//! A column of values on its way through an expression.

use std::sync::Arc;

/// One value a row.
#[derive(Clone, Debug, PartialEq)]
pub(crate) enum Vector {
    /// Numbers; NaN is missing.
    Number(Arc<Vec<f64>>),
    /// Texts; none is missing.
    Text(Arc<Vec<Option<String>>>),
    /// Truth values; none where a missing value left it open.
    Truth(Arc<Vec<Option<bool>>>),
}

impl Vector {
    /// A column of numbers.
    pub(crate) fn number(values: impl IntoIterator<Item = f64>) -> Self {
        Self::Number(Arc::new(values.into_iter().collect()))
    }

    /// A column of texts.
    pub(crate) fn text(values: impl IntoIterator<Item = Option<String>>) -> Self {
        Self::Text(Arc::new(values.into_iter().collect()))
    }

    /// A column of truth values.
    pub(crate) fn truth(values: impl IntoIterator<Item = Option<bool>>) -> Self {
        Self::Truth(Arc::new(values.into_iter().collect()))
    }

    /// The word for its kind.
    pub(crate) fn kind(&self) -> &'static str {
        match self {
            Self::Number(_) => "numbers",
            Self::Text(_) => "text",
            Self::Truth(_) => "a condition",
        }
    }

    /// The rows at `kept`, in that order.
    pub(crate) fn select(&self, kept: &[usize]) -> Self {
        match self {
            Self::Number(values) => {
                Self::number(kept.iter().map(|&row| values.get(row).copied().unwrap_or(f64::NAN)))
            }
            Self::Text(values) => {
                Self::text(kept.iter().map(|&row| values.get(row).cloned().flatten()))
            }
            Self::Truth(values) => {
                Self::truth(kept.iter().map(|&row| values.get(row).copied().flatten()))
            }
        }
    }
}
