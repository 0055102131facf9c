//! What is told of a panic.

use std::any::Any;

/// The words of a panic.
pub(crate) fn words(panic: &(dyn Any + Send)) -> &str {
    let fixed = panic.downcast_ref::<&str>().copied();
    fixed.or_else(|| panic.downcast_ref::<String>().map(String::as_str)).unwrap_or("no message")
}
