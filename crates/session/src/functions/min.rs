use tussock_language::facts::Page;

use super::{Function, rowwise};
use crate::evaluate::vector::Vector;

/// `min`
pub(super) struct Min;

static PAGE: Page = Page {
    name: "min",
    summary: "min(a, b, ...): the smallest in each row",
    text: include_str!("min.md"),
};

impl Function for Min {
    fn page(&self) -> &'static Page {
        &PAGE
    }

    fn call(&self, arguments: &[Vector]) -> Result<Vector, String> {
        rowwise(arguments, |row| row.iter().copied().fold(f64::INFINITY, f64::min))
    }
}
