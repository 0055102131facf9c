use tussock_language::facts::Page;

use super::Function;
use crate::evaluate::vector::Vector;

/// `missing`
pub(super) struct Missing;

static PAGE: Page = Page {
    name: "missing",
    summary: "missing(a): whether the value is missing",
    text: include_str!("missing.md"),
};

impl Function for Missing {
    fn page(&self) -> &'static Page {
        &PAGE
    }

    fn call(&self, arguments: &[Vector]) -> Result<Vector, String> {
        match arguments {
            [Vector::Number(values)] => {
                Ok(Vector::truth(values.iter().map(|value| Some(value.is_nan()))))
            }
            [Vector::Text(values)] => {
                Ok(Vector::truth(values.iter().map(|value| Some(value.is_none()))))
            }
            [Vector::Truth(values)] => {
                Ok(Vector::truth(values.iter().map(|value| Some(value.is_none()))))
            }
            _ => Err(format!("takes one argument, here are {}", arguments.len())),
        }
    }
}
