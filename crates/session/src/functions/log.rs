use tussock_language::facts::Page;

use super::{Function, one_number};
use crate::evaluate::vector::Vector;

/// `log`
pub(super) struct Log;

static PAGE: Page = Page {
    name: "log",
    summary: "log(a): the natural logarithm; missing where a is not above 0",
    text: include_str!("log.md"),
};

impl Function for Log {
    fn page(&self) -> &'static Page {
        &PAGE
    }

    fn call(&self, arguments: &[Vector]) -> Result<Vector, String> {
        let log = |x: &f64| if *x > 0.0 { x.ln() } else { f64::NAN };
        Ok(Vector::number(one_number(arguments)?.iter().map(log)))
    }
}
