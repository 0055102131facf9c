use tussock_language::facts::Page;

use super::{Function, one_number};
use crate::evaluate::vector::Vector;

/// `round`
pub(super) struct Round;

static PAGE: Page = Page {
    name: "round",
    summary: "round(a) or round(a, 2): rounded to whole numbers or to some decimals",
    text: include_str!("round.md"),
};

impl Function for Round {
    fn page(&self) -> &'static Page {
        &PAGE
    }

    fn call(&self, arguments: &[Vector]) -> Result<Vector, String> {
        let [values, decimals] = arguments else {
            return Ok(Vector::number(one_number(arguments)?.iter().map(|x| x.round())));
        };
        let values = one_number(std::slice::from_ref(values))?;
        let decimals = one_number(std::slice::from_ref(decimals))?;
        Ok(Vector::number(values.iter().zip(decimals).map(|(x, decimals)| {
            let unit = 10f64.powf(decimals.round());
            (x * unit).round() / unit
        })))
    }
}
