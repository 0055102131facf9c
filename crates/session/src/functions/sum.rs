use tussock_language::facts::Page;

use super::{Function, rowwise};
use crate::evaluate::vector::Vector;

/// `sum`
pub(super) struct Sum;

static PAGE: Page = Page {
    name: "sum",
    summary: "sum(a, b, ...): the sum in each row",
    text: include_str!("sum.md"),
};

impl Function for Sum {
    fn page(&self) -> &'static Page {
        &PAGE
    }

    fn call(&self, arguments: &[Vector]) -> Result<Vector, String> {
        rowwise(arguments, |row| row.iter().sum())
    }
}
