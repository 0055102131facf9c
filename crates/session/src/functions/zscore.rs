use tussock_language::facts::Page;

use super::{Function, one_number};
use crate::evaluate::vector::Vector;

/// `zscore`
pub(super) struct Zscore;

static PAGE: Page = Page {
    name: "zscore",
    summary: "zscore(a): distance from the column's mean in standard deviations",
    text: include_str!("zscore.md"),
};

impl Function for Zscore {
    fn page(&self) -> &'static Page {
        &PAGE
    }

    fn call(&self, arguments: &[Vector]) -> Result<Vector, String> {
        let values = one_number(arguments)?;
        let present: Vec<f64> = values.iter().copied().filter(|x| !x.is_nan()).collect();
        let n = present.len() as f64;
        let mean = present.iter().sum::<f64>() / n;
        let variance = present.iter().map(|x| (x - mean).powi(2)).sum::<f64>() / (n - 1.0);
        let sd = variance.sqrt();
        if sd > 0.0 {
            Ok(Vector::number(values.iter().map(|x| (x - mean) / sd)))
        } else {
            Err("needs a column that varies".to_owned())
        }
    }
}
