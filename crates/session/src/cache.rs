//! A bounded cache by content. Nothing in it can be stale: its keys are hashes of everything that
//! the value rests on.

use std::collections::BTreeMap;
use std::sync::{Mutex, PoisonError};

use crate::fingerprint::Fingerprint;

/// Keeps the values that were used last.
#[derive(Debug)]
pub(crate) struct Cache<V> {
    capacity: usize,
    entries: Mutex<Entries<V>>,
}

#[derive(Debug)]
struct Entries<V> {
    clock: u64,
    values: BTreeMap<Fingerprint, Entry<V>>,
}

#[derive(Debug)]
struct Entry<V> {
    used: u64,
    value: V,
}

impl<V: Clone> Cache<V> {
    /// A cache of at most `capacity` values.
    pub(crate) fn new(capacity: usize) -> Self {
        Self { capacity, entries: Mutex::new(Entries { clock: 0, values: BTreeMap::new() }) }
    }

    /// The value of a key, made by `make` where it is not kept. Two threads may make the same
    /// value; both then hold equal ones.
    pub(crate) fn get_or_make<E>(
        &self,
        key: Fingerprint,
        make: impl FnOnce() -> Result<V, E>,
    ) -> Result<V, E> {
        if let Some(value) = self.get(key) {
            return Ok(value);
        }
        let value = make()?;
        self.put(key, value.clone());
        Ok(value)
    }

    fn get(&self, key: Fingerprint) -> Option<V> {
        let mut entries = self.entries.lock().unwrap_or_else(PoisonError::into_inner);
        entries.clock += 1;
        let now = entries.clock;
        let entry = entries.values.get_mut(&key)?;
        entry.used = now;
        Some(entry.value.clone())
    }

    fn put(&self, key: Fingerprint, value: V) {
        let mut entries = self.entries.lock().unwrap_or_else(PoisonError::into_inner);
        entries.clock += 1;
        let used = entries.clock;
        entries.values.insert(key, Entry { used, value });
        while entries.values.len() > self.capacity {
            let oldest = entries.values.iter().min_by_key(|(_, entry)| entry.used);
            let Some(key) = oldest.map(|(key, _)| *key) else { break };
            entries.values.remove(&key);
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn key(name: &str) -> Fingerprint {
        Fingerprint::of([name.as_bytes()])
    }

    #[test]
    fn the_value_used_longest_ago_makes_room() {
        let cache = Cache::new(2);
        let made = |name: &str| cache.get_or_make(key(name), || Ok::<_, ()>(name.to_owned()));
        made("a").unwrap();
        made("b").unwrap();
        made("a").unwrap();
        made("c").unwrap();
        assert_eq!(cache.get(key("a")).as_deref(), Some("a"));
        assert_eq!(cache.get(key("b")), None);
    }

    #[test]
    fn a_failure_is_not_kept() {
        let cache = Cache::new(2);
        assert_eq!(cache.get_or_make(key("a"), || Err::<u8, _>("no")), Err("no"));
        assert_eq!(cache.get_or_make(key("a"), || Ok::<u8, &str>(1)), Ok(1));
    }
}
