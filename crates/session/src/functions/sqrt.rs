use tussock_language::facts::Page;

use super::{Function, one_number};
use crate::evaluate::vector::Vector;

/// `sqrt`
pub(super) struct Sqrt;

static PAGE: Page = Page {
    name: "sqrt",
    summary: "sqrt(a): the square root; missing where a is below 0",
    text: include_str!("sqrt.md"),
};

impl Function for Sqrt {
    fn page(&self) -> &'static Page {
        &PAGE
    }

    fn call(&self, arguments: &[Vector]) -> Result<Vector, String> {
        Ok(Vector::number(one_number(arguments)?.iter().map(|x| x.sqrt())))
    }
}
