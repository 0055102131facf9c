//! The program that started the kernel. A kernel whose notebook server was killed would otherwise
//! stay forever, for nobody can ask it to end any more.

use std::time::Duration;

/// How often to look.
pub(crate) const INTERVAL: Duration = Duration::from_secs(3);

/// What a launcher names itself by, unless the kernel is to outlive it.
const VARIABLE: &str = "JPY_PARENT_PID";

/// The process whose end is the kernel's end, where there is one.
pub(crate) struct Parent {
    process: Option<u32>,
}

impl Parent {
    /// The launcher, where it says so and is the parent of this process. A kernel that was started
    /// through some other program has a parent that means nothing.
    pub(crate) fn of_this_process() -> Self {
        Self::named(std::env::var(VARIABLE).ok().as_deref())
    }

    fn named(named: Option<&str>) -> Self {
        let named: Option<u32> = named.and_then(|text| text.parse().ok());
        Self { process: named.filter(|process| parent_now() == Some(*process)) }
    }

    /// Whether it has ended: the system then gives this process another parent.
    pub(crate) fn has_ended(&self) -> bool {
        self.process.is_some() && self.process != parent_now()
    }
}

#[cfg(unix)]
fn parent_now() -> Option<u32> {
    Some(std::os::unix::process::parent_id())
}

#[cfg(not(unix))]
fn parent_now() -> Option<u32> {
    None
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    #[cfg(unix)]
    fn only_a_launcher_that_is_the_parent_is_watched() {
        let parent = std::os::unix::process::parent_id().to_string();
        assert!(Parent::named(Some(&parent)).process.is_some());
        for other in [None, Some(""), Some("0"), Some("no number"), Some("4294967295")] {
            let parent = Parent::named(other);
            assert!(parent.process.is_none() && !parent.has_ended(), "{other:?}");
        }
    }

    #[test]
    #[cfg(unix)]
    fn a_parent_that_is_no_longer_the_parent_has_ended() {
        assert!(Parent { process: Some(u32::MAX) }.has_ended());
        assert!(!Parent { process: parent_now() }.has_ended());
    }
}
