//! Words to whoever reads the kernel's standard error, which Jupyter shows in its own log.

use std::io::Write;

/// Writes one line. A reader that has gone away is no error.
pub(crate) fn log(text: &str) {
    let _closed = writeln!(std::io::stderr().lock(), "tussock kernel: {text}");
}
