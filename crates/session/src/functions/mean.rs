use tussock_language::facts::Page;

use super::{Function, rowwise};
use crate::evaluate::vector::Vector;

/// `mean`
pub(super) struct Mean;

static PAGE: Page = Page {
    name: "mean",
    summary: "mean(a, b, ...): the mean in each row",
    text: include_str!("mean.md"),
};

impl Function for Mean {
    fn page(&self) -> &'static Page {
        &PAGE
    }

    fn call(&self, arguments: &[Vector]) -> Result<Vector, String> {
        rowwise(arguments, |row| row.iter().sum::<f64>() / row.len() as f64)
    }
}
