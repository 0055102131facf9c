//! The kernel without the rest of the program: `kernel CONNECTION_FILE`.

use std::path::Path;
use std::process::ExitCode;

fn main() -> ExitCode {
    let Some(file) = std::env::args_os().last() else { return ExitCode::from(2) };
    match tussock_kernel::run(Path::new(&file)) {
        Ok(()) => ExitCode::SUCCESS,
        Err(error) => {
            use std::io::Write;
            let _closed = writeln!(std::io::stderr(), "{error}");
            ExitCode::FAILURE
        }
    }
}
