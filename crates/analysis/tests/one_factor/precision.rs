//! How closely each answer must agree with its reference: one table, which may only be tightened.

/// The tolerance of everything that is not named below, relative.
const USUAL: f64 = 1e-12;

/// A case whose answers are limited by the rounding of doubles to less.
struct Exception {
    case: &'static str,
    tolerance: f64,
    reason: &'static str,
}

const EXCEPTIONS: [Exception; 8] = [
    Exception {
        case: "offset_1e6",
        tolerance: 5e-11,
        reason: "spread 1 at 1e6, where a double is off by up to 6e-11",
    },
    Exception {
        case: "offset_1e9",
        tolerance: 5e-8,
        reason: "spread 1 at 1e9, where a double is off by up to 6e-8",
    },
    Exception {
        case: "offset_1e12",
        tolerance: 5e-5,
        reason: "spread 1 at 1e12, where a double is off by up to 6e-5",
    },
    Exception {
        case: "nearsing_1e-4",
        tolerance: 2e-11,
        reason: "1e-4 is left of an outcome of size 4, whose residuals are rounded at 4e-16",
    },
    Exception {
        case: "nearsing_1e-7",
        tolerance: 2e-8,
        reason: "1e-7 is left of an outcome of size 4, whose residuals are rounded at 4e-16",
    },
    Exception {
        case: "nearsing_1e-10",
        tolerance: 2e-5,
        reason: "1e-10 is left of an outcome of size 4, whose residuals are rounded at 4e-16",
    },
    Exception {
        case: "huge_effect",
        tolerance: 1e-11,
        reason: "an effect of 1e5 standard deviations beside others of 1: one rounding of it is 1e-11",
    },
    Exception {
        case: "huge_effect as doubles",
        tolerance: 1e-11,
        reason: "an effect of 1e5 standard deviations beside others of 1: one rounding of it is 1e-11",
    },
];

/// The comparison of one case with its reference.
pub(crate) struct Check {
    case: String,
    tolerance: f64,
    reason: &'static str,
}

impl Check {
    pub(crate) fn new(case: &str) -> Check {
        let exception = EXCEPTIONS.iter().find(|exception| exception.case == case);
        Check {
            case: case.to_owned(),
            tolerance: exception.map_or(USUAL, |exception| exception.tolerance),
            reason: exception.map_or("the usual limit", |exception| exception.reason),
        }
    }

    /// Relative agreement; a reference of zero must be met exactly.
    #[track_caller]
    pub(crate) fn close(&self, what: &str, found: f64, expected: f64) {
        self.close_on_scale(what, found, expected, expected.abs());
    }

    /// Agreement relative to a scale, for values that may be near zero beside others of that scale.
    #[track_caller]
    pub(crate) fn close_on_scale(&self, what: &str, found: f64, expected: f64, scale: f64) {
        let error = if found == expected { 0.0 } else { (found - expected).abs() / scale };
        assert!(
            error <= self.tolerance,
            "{}: {what} is {found:e}, expected {expected:e}: off by {error:.1e} of {scale:e}, limit {:e} ({})",
            self.case,
            self.tolerance,
            self.reason
        );
    }
}
