//! Messages and their wire format: identities, a mark, a signature, four dictionaries in JSON, and
//! buffers that no message of this kernel has.

use std::time::{Duration, SystemTime, UNIX_EPOCH};

use serde::de::DeserializeOwned;
use serde_json::{Map, Value, json};
use uuid::Uuid;

use crate::signature::Signer;

/// The version of the protocol that this kernel speaks: 5.5, the first with a word of welcome to
/// each subscriber.
pub(crate) const PROTOCOL_VERSION: &str = "5.5";

/// What divides the addresses of a message from the message.
const MARK: &[u8] = b"<IDS|MSG>";

/// A message from a client.
#[derive(Clone, Debug)]
pub(crate) struct Request {
    /// To whom a reply goes.
    pub(crate) identities: Vec<Vec<u8>>,
    /// The header as it came: the parent of everything that follows from the request.
    pub(crate) header: Value,
    /// The header's `msg_type`.
    pub(crate) kind: String,
    pub(crate) metadata: Value,
    content: Value,
}

/// A message to a client, or to all.
#[derive(Clone, Debug)]
pub(crate) struct Message {
    /// Who gets it, or the topic under which it is published.
    pub(crate) identities: Vec<Vec<u8>>,
    pub(crate) kind: String,
    /// The header of the request from which it follows, `{}` where there is none.
    pub(crate) parent: Value,
    pub(crate) content: Value,
}

/// A content that lacks a field or has a wrong one.
#[derive(Debug, thiserror::Error)]
#[error("a `{kind}` whose content can't be read: {source}")]
pub(crate) struct BadContent {
    kind: String,
    source: serde_json::Error,
}

impl Request {
    /// The content as one of the request's type.
    pub(crate) fn content<T: DeserializeOwned>(&self) -> Result<T, BadContent> {
        serde_json::from_value(self.content.clone())
            .map_err(|source| BadContent { kind: self.kind.clone(), source })
    }

    /// The reply: a message of the matching type that goes to whom the request came from.
    pub(crate) fn reply(&self, content: Value) -> Message {
        let stem = self.kind.strip_suffix("_request").unwrap_or(&self.kind);
        Message {
            identities: self.identities.clone(),
            kind: format!("{stem}_reply"),
            parent: self.header.clone(),
            content,
        }
    }
}

/// Why bytes are no message.
#[derive(Debug, thiserror::Error)]
pub(crate) enum WireError {
    #[error("it lacks the mark that divides addresses from content")]
    NoMark,
    #[error("it has fewer parts than a message has")]
    TooShort,
    #[error("its signature is wrong")]
    WrongSignature,
    #[error("its {part} is not a JSON object")]
    NotJson { part: &'static str },
    #[error("its header names no message type")]
    NoType,
}

/// Between messages and bytes, under one key and for one kernel.
#[derive(Clone)]
pub(crate) struct Wire {
    signer: Signer,
    session: String,
}

impl Wire {
    pub(crate) fn new(key: &str) -> Self {
        Self { signer: Signer::new(key), session: Uuid::new_v4().to_string() }
    }

    /// The message that the parts hold. The signature is checked before anything is read.
    pub(crate) fn decode(&self, parts: &[Vec<u8>]) -> Result<Request, WireError> {
        let mark = parts.iter().position(|part| part == MARK).ok_or(WireError::NoMark)?;
        let (identities, rest) = parts.split_at(mark);
        let [_, signature, header, parent, metadata, content, ..] = rest else {
            return Err(WireError::TooShort);
        };
        let signed: [&[u8]; 4] = [header, parent, metadata, content];
        if !self.signer.verifies(signed, signature) {
            return Err(WireError::WrongSignature);
        }
        let header = object("header", header)?;
        let kind = header.get("msg_type").and_then(Value::as_str).ok_or(WireError::NoType)?;
        Ok(Request {
            identities: identities.to_vec(),
            kind: kind.to_owned(),
            header,
            metadata: object("metadata", metadata)?,
            content: object("content", content)?,
        })
    }

    /// The parts of a message, with a new header and a signature.
    pub(crate) fn encode(&self, message: &Message) -> Vec<Vec<u8>> {
        let header = json!({
            "msg_id": Uuid::new_v4().to_string(),
            "session": self.session,
            "username": "kernel",
            "date": date(SystemTime::now()),
            "msg_type": message.kind,
            "version": PROTOCOL_VERSION,
        });
        let metadata = Value::Object(Map::new());
        let dictionaries = [&header, &message.parent, &metadata, &message.content]
            .map(|dictionary| dictionary.to_string().into_bytes());
        let signature = self.signer.sign(dictionaries.iter().map(Vec::as_slice));
        let mut parts = message.identities.clone();
        parts.push(MARK.to_vec());
        parts.push(signature.into_bytes());
        parts.extend(dictionaries);
        parts
    }
}

fn object(part: &'static str, bytes: &[u8]) -> Result<Value, WireError> {
    serde_json::from_slice(bytes).ok().filter(Value::is_object).ok_or(WireError::NotJson { part })
}

/// A moment in UTC, as ISO 8601 writes it.
fn date(moment: SystemTime) -> String {
    let since = moment.duration_since(UNIX_EPOCH).unwrap_or(Duration::ZERO);
    let day = Day::after_epoch(since.as_secs() / 86_400);
    let second = since.as_secs() % 86_400;
    format!(
        "{:04}-{:02}-{:02}T{:02}:{:02}:{:02}.{:06}Z",
        day.year,
        day.month,
        day.day,
        second / 3_600,
        second / 60 % 60,
        second % 60,
        since.subsec_micros()
    )
}

/// A day of the Gregorian calendar.
#[derive(Debug, PartialEq, Eq)]
struct Day {
    year: u64,
    month: u64,
    day: u64,
}

impl Day {
    /// The day that many days after 1 January 1970. Years are counted from March here, so that a
    /// leap day comes last in its year and every block of 400 years has 146 097 days.
    fn after_epoch(days: u64) -> Self {
        let days = days + 719_468;
        let day_of_era = days % 146_097;
        let year_of_era =
            (day_of_era - day_of_era / 1_460 + day_of_era / 36_524 - day_of_era / 146_096) / 365;
        let day_of_year = day_of_era - (365 * year_of_era + year_of_era / 4 - year_of_era / 100);
        let month_from_march = (5 * day_of_year + 2) / 153;
        let day = day_of_year - (153 * month_from_march + 2) / 5 + 1;
        let month = if month_from_march < 10 { month_from_march + 3 } else { month_from_march - 9 };
        let year = year_of_era + days / 146_097 * 400 + u64::from(month <= 2);
        Self { year, month, day }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn request(wire: &Wire, header: &str) -> Vec<Vec<u8>> {
        let dictionaries = [header, "{}", r#"{"cellId":"c1"}"#, r#"{"code":"show é"}"#];
        let signature = wire.signer.sign(dictionaries.iter().map(|part| part.as_bytes()));
        let mut parts = vec![b"client".to_vec(), MARK.to_vec(), signature.into_bytes()];
        parts.extend(dictionaries.map(|part| part.as_bytes().to_vec()));
        parts
    }

    #[test]
    fn a_request_is_read_with_its_addresses_and_its_header_as_it_came() {
        let wire = Wire::new("key");
        let parts = request(&wire, r#"{"msg_type":"execute_request","msg_id":"1","odd":[1.50]}"#);
        let request = wire.decode(&parts).unwrap();
        assert_eq!(request.identities, [b"client".to_vec()]);
        assert_eq!(request.kind, "execute_request");
        assert_eq!(request.metadata["cellId"], "c1");
        let reply = request.reply(json!({"status": "ok"}));
        assert_eq!(reply.kind, "execute_reply");
        assert_eq!(reply.parent["odd"], json!([1.50]));
    }

    #[test]
    fn buffers_after_the_content_are_no_harm() {
        let wire = Wire::new("key");
        let mut parts = request(&wire, r#"{"msg_type":"comm_msg"}"#);
        parts.push(vec![0xff, 0x00]);
        assert!(wire.decode(&parts).is_ok());
    }

    #[test]
    fn what_is_sent_is_what_the_other_side_reads() {
        let wire = Wire::new("key");
        let message = Message {
            identities: vec![b"status".to_vec()],
            kind: "status".to_owned(),
            parent: json!({}),
            content: json!({"execution_state": "busy"}),
        };
        let read = Wire::new("key").decode(&wire.encode(&message)).unwrap();
        assert_eq!(read.kind, "status");
        assert_eq!(read.content, json!({"execution_state": "busy"}));
        for field in ["msg_id", "session", "username", "date", "msg_type", "version"] {
            assert!(read.header[field].is_string(), "{field}");
        }
    }

    #[test]
    fn a_message_that_was_changed_or_signed_with_another_key_is_refused() {
        let wire = Wire::new("key");
        let mut parts = request(&wire, r#"{"msg_type":"execute_request"}"#);
        assert!(matches!(Wire::new("other").decode(&parts), Err(WireError::WrongSignature)));
        *parts.last_mut().unwrap() = br#"{"code":"show e"}"#.to_vec();
        assert!(matches!(wire.decode(&parts), Err(WireError::WrongSignature)));
    }

    #[test]
    fn bytes_that_are_no_message_are_refused_with_a_word_on_why() {
        let wire = Wire::new("");
        let words = |parts: &[&[u8]]| {
            let parts: Vec<Vec<u8>> = parts.iter().map(|part| part.to_vec()).collect();
            wire.decode(&parts).unwrap_err().to_string()
        };
        assert!(words(&[]).contains("mark"));
        assert!(words(&[MARK, b"", b"{}"]).contains("fewer parts"));
        assert!(words(&[MARK, b"", b"[]", b"{}", b"{}", b"{}"]).contains("header"));
        assert!(words(&[MARK, b"", b"{}", b"{}", b"{}", b"{}"]).contains("type"));
        let named: &[u8] = br#"{"msg_type":"x"}"#;
        assert!(words(&[MARK, b"", named, b"{}", b"{}", b"{\xff}"]).contains("content"));
    }

    #[test]
    fn dates_are_those_of_the_calendar() {
        for (seconds, written) in [
            (0, "1970-01-01T00:00:00.000000Z"),
            (951_782_400, "2000-02-29T00:00:00.000000Z"),
            (1_709_251_199, "2024-02-29T23:59:59.000000Z"),
            (1_735_689_600, "2025-01-01T00:00:00.000000Z"),
            (4_107_542_400, "2100-03-01T00:00:00.000000Z"),
        ] {
            assert_eq!(date(UNIX_EPOCH + Duration::from_secs(seconds)), written);
        }
        assert_eq!(date(UNIX_EPOCH + Duration::from_micros(7)), "1970-01-01T00:00:00.000007Z");
    }
}
