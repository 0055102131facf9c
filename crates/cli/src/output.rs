//! The only place of this program that writes to the terminal.

use std::io::Write;

/// Writes `text` to standard output. A reader that has gone away (a closed pipe) is no error.
pub(crate) fn say(text: &str) {
    let _closed = std::io::stdout().lock().write_all(text.as_bytes());
}

/// Writes one complaint to standard error.
pub(crate) fn complain(text: &str) {
    let _closed = writeln!(std::io::stderr().lock(), "tussock: {text}");
}

/// Writes a text of several lines to standard error.
pub(crate) fn warn(text: &str) {
    let _closed = std::io::stderr().lock().write_all(text.as_bytes());
}
