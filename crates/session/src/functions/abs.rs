use tussock_language::facts::Page;

use super::{Function, one_number};
use crate::evaluate::vector::Vector;

/// `abs`
pub(super) struct Abs;

static PAGE: Page =
    Page { name: "abs", summary: "abs(a): the absolute value", text: include_str!("abs.md") };

impl Function for Abs {
    fn page(&self) -> &'static Page {
        &PAGE
    }

    fn call(&self, arguments: &[Vector]) -> Result<Vector, String> {
        Ok(Vector::number(one_number(arguments)?.iter().map(|x| x.abs())))
    }
}
