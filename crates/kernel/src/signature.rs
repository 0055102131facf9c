//! The signature of a message: HMAC-SHA-256 (RFC 2104, FIPS 180-4) over its four dictionaries, in
//! lower-case hexadecimal digits.

use hmac::{Hmac, KeyInit, Mac};
use sha2::Sha256;

/// Signs and verifies by one key, or does neither where the key is empty, which is how Jupyter
/// turns signatures off.
#[derive(Clone)]
pub(crate) struct Signer {
    keyed: Option<Hmac<Sha256>>,
}

impl Signer {
    pub(crate) fn new(key: &str) -> Self {
        let keyed = (!key.is_empty())
            .then(|| Hmac::new_from_slice(key.as_bytes()).expect("HMAC takes a key of any length"));
        Self { keyed }
    }

    /// The signature of the parts, one after the other.
    pub(crate) fn sign<'a>(&self, parts: impl IntoIterator<Item = &'a [u8]>) -> String {
        let Some(mac) = self.fed(parts) else { return String::new() };
        mac.finalize().into_bytes().iter().map(|byte| format!("{byte:02x}")).collect()
    }

    /// Whether the signature is the right one. The comparison takes the same time wherever the
    /// first difference lies.
    pub(crate) fn verifies<'a>(
        &self,
        parts: impl IntoIterator<Item = &'a [u8]>,
        signature: &[u8],
    ) -> bool {
        let Some(mac) = self.fed(parts) else { return true };
        bytes_of(signature).is_some_and(|bytes| mac.verify_slice(&bytes).is_ok())
    }

    fn fed<'a>(&self, parts: impl IntoIterator<Item = &'a [u8]>) -> Option<Hmac<Sha256>> {
        let mut mac = self.keyed.clone()?;
        for part in parts {
            mac.update(part);
        }
        Some(mac)
    }
}

/// The bytes that hexadecimal digits write; nothing where they aren't pairs of such digits.
fn bytes_of(hexadecimal: &[u8]) -> Option<Vec<u8>> {
    let text = std::str::from_utf8(hexadecimal).ok()?;
    if !text.len().is_multiple_of(2) || !text.bytes().all(|byte| byte.is_ascii_hexdigit()) {
        return None;
    }
    (0..text.len())
        .step_by(2)
        .map(|at| u8::from_str_radix(text.get(at..at + 2)?, 16).ok())
        .collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    /// RFC 4231, test case 2.
    const JEFE: &str = "5bdcc146bf60754e6a042426089575c75a003f089d2739839dec58b964ec3843";

    #[test]
    fn the_signature_is_that_of_a_published_test_case_however_the_text_is_divided() {
        let signer = Signer::new("Jefe");
        let parts: [&[u8]; 2] = [b"what do ya want ", b"for nothing?"];
        assert_eq!(signer.sign(parts), JEFE);
        assert!(signer.verifies(parts, JEFE.as_bytes()));
    }

    #[test]
    fn every_other_signature_is_wrong() {
        let signer = Signer::new("Jefe");
        let parts: [&[u8]; 1] = [b"what do ya want for nothing?"];
        let last_digit_differs = format!("{}4", &JEFE[..63]);
        for wrong in ["", "5b", "zz", "é", &JEFE[..62], &last_digit_differs] {
            assert!(!signer.verifies(parts, wrong.as_bytes()), "{wrong}");
        }
    }

    #[test]
    fn an_empty_key_turns_signatures_off() {
        let signer = Signer::new("");
        let parts: [&[u8]; 1] = [b"anything"];
        assert_eq!(signer.sign(parts), "");
        assert!(signer.verifies(parts, b""));
        assert!(signer.verifies(parts, b"anything"));
    }
}
