//! The barrier that turns a panic into a failure which asks for a report: the session goes on.

use std::any::Any;
use std::panic::{AssertUnwindSafe, catch_unwind};

use crate::failure::Failure;

/// Does some work. Where the program itself fails at it, the failure says during `what`.
pub(crate) fn guarded<T>(what: &str, work: impl FnOnce() -> T) -> Result<T, Failure> {
    // What the work touches may be left half changed. Everything that a session keeps is either
    // replaced as a whole or computed anew, so it is safe to go on; the user is told all the same.
    catch_unwind(AssertUnwindSafe(work)).map_err(|panic| report(what, panic.as_ref()))
}

fn report(what: &str, panic: &(dyn Any + Send)) -> Failure {
    let said = panic
        .downcast_ref::<&str>()
        .copied()
        .or_else(|| panic.downcast_ref::<String>().map(String::as_str))
        .unwrap_or("nothing was said");
    let message = "Tussock itself failed here; this is a mistake in the program, not in your text";
    let traceback = [
        format!("error [internal-error]: {message}"),
        format!("  {said}"),
        format!(
            "  during {what}, Tussock {} on {} {}",
            env!("CARGO_PKG_VERSION"),
            std::env::consts::OS,
            std::env::consts::ARCH
        ),
        "  help: please report it with these lines and the cell; what earlier cells defined still \
         stands, and you can go on"
            .to_owned(),
    ];
    Failure {
        name: "internal-error".to_owned(),
        message: message.to_owned(),
        traceback: vec![traceback.join("\n")],
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_panic_becomes_a_failure_that_asks_for_a_report() {
        let failure =
            guarded("execute_request", || -> () { panic!("row {} of 3", 4) }).unwrap_err();
        assert_eq!(failure.name, "internal-error");
        let text = failure.traceback.concat();
        for part in ["row 4 of 3", "execute_request", "please report", env!("CARGO_PKG_VERSION")] {
            assert!(text.contains(part), "{text}");
        }
    }

    #[test]
    fn work_that_succeeds_passes_through() {
        assert_eq!(guarded("anything", || 7), Ok(7));
    }
}
