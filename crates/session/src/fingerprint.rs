//! Content hashes: what an answer rests on, boiled down to a key.

use sha2::{Digest, Sha256};

/// A hash of content.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub(crate) struct Fingerprint([u8; 32]);

impl Fingerprint {
    /// The hash of some parts; their boundaries count.
    pub(crate) fn of<'a>(parts: impl IntoIterator<Item = &'a [u8]>) -> Self {
        let mut hasher = Sha256::new();
        for part in parts {
            hasher.update((part.len() as u64).to_le_bytes());
            hasher.update(part);
        }
        Self(hasher.finalize().into())
    }

    /// The hash as bytes, to be a part of another one.
    pub(crate) fn bytes(&self) -> &[u8] {
        &self.0
    }
}
