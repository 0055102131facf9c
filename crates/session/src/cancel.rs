//! A flag by which a front end asks running work to stop.

use std::sync::Arc;
use std::sync::atomic::{AtomicBool, Ordering};

/// A shared flag; clones refer to the same one.
#[derive(Clone, Debug, Default)]
pub struct Cancel(Arc<AtomicBool>);

impl Cancel {
    /// A flag that is down.
    #[must_use]
    pub fn new() -> Self {
        Self::default()
    }

    /// Raises the flag.
    pub fn cancel(&self) {
        self.0.store(true, Ordering::Release);
    }

    /// Lowers it again, before the next piece of work.
    pub fn reset(&self) {
        self.0.store(false, Ordering::Release);
    }

    /// Whether it is up.
    #[must_use]
    pub fn is_cancelled(&self) -> bool {
        self.0.load(Ordering::Acquire)
    }
}
