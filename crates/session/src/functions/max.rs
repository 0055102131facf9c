use tussock_language::facts::Page;

use super::{Function, rowwise};
use crate::evaluate::vector::Vector;

/// `max`
pub(super) struct Max;

static PAGE: Page = Page {
    name: "max",
    summary: "max(a, b, ...): the largest in each row",
    text: include_str!("max.md"),
};

impl Function for Max {
    fn page(&self) -> &'static Page {
        &PAGE
    }

    fn call(&self, arguments: &[Vector]) -> Result<Vector, String> {
        rowwise(arguments, |row| row.iter().copied().fold(f64::NEG_INFINITY, f64::max))
    }
}
