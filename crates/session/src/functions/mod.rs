//! The functions that an expression may call, one file each.

mod abs;
mod log;
mod max;
mod mean;
mod min;
mod missing;
mod round;
mod sqrt;
mod sum;
mod zscore;

use tussock_language::diagnostic::Diagnostic;
use tussock_language::facts::Page;
use tussock_language::span::Location;

use crate::evaluate::vector::Vector;
use crate::trouble::{nearest, trouble};

/// A function of columns.
pub(crate) trait Function: Sync {
    /// Its page, headed by its name.
    fn page(&self) -> &'static Page;
    /// Its value in every row; a refusal completes the sentence that begins with its name.
    fn call(&self, arguments: &[Vector]) -> Result<Vector, String>;
}

static FUNCTIONS: &[&dyn Function] = &[
    &abs::Abs,
    &log::Log,
    &max::Max,
    &mean::Mean,
    &min::Min,
    &missing::Missing,
    &round::Round,
    &sqrt::Sqrt,
    &sum::Sum,
    &zscore::Zscore,
];

/// The function of a name.
pub(crate) fn find(name: &str) -> Option<&'static dyn Function> {
    FUNCTIONS.iter().copied().find(|function| function.page().name == name)
}

/// The pages of all functions.
pub(crate) fn pages() -> Vec<Page> {
    FUNCTIONS.iter().map(|function| *function.page()).collect()
}

/// What is said of a function that does not exist.
pub(crate) fn unknown(name: &str, location: Location) -> Box<Diagnostic> {
    let message = format!("there is no function `{name}`");
    let found = Diagnostic::error("unknown-function", location, message);
    let names = FUNCTIONS.iter().map(|function| function.page().name);
    trouble(match nearest(name, names.clone()) {
        Some(near) => found.help(format!("did you mean `{near}`?")).replace_by(near, near),
        None => found.help(format!("there are {}", names.collect::<Vec<_>>().join(", "))),
    })
}

/// The only argument, as numbers.
fn one_number(arguments: &[Vector]) -> Result<&[f64], String> {
    match arguments {
        [Vector::Number(values)] => Ok(values),
        [other] => Err(format!("takes numbers, and this is {}", other.kind())),
        _ => Err(format!("takes one argument, here are {}", arguments.len())),
    }
}

/// Combines the arguments row by row; a row with a missing value is missing.
fn rowwise(arguments: &[Vector], combine: impl Fn(&[f64]) -> f64) -> Result<Vector, String> {
    let mut columns: Vec<&[f64]> = Vec::new();
    for argument in arguments {
        match argument {
            Vector::Number(values) => columns.push(values),
            Vector::Text(_) | Vector::Truth(_) => {
                return Err(format!("takes numbers, and this is {}", argument.kind()));
            }
        }
    }
    let rows = columns.first().ok_or("takes one column or more")?.len();
    Ok(Vector::number((0..rows).map(|row| {
        let values: Vec<f64> =
            columns.iter().map(|column| column.get(row).copied().unwrap_or(f64::NAN)).collect();
        if values.iter().any(|value| value.is_nan()) { f64::NAN } else { combine(&values) }
    })))
}

#[cfg(test)]
mod tests;
