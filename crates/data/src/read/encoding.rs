//! From bytes to text.

use std::borrow::Cow;

use encoding_rs::{Encoding, UTF_8};

use super::error::ReadError;

/// Labels that an unknown one may have meant.
const LABELS: [&str; 13] = [
    "utf-8",
    "latin1",
    "latin2",
    "latin9",
    "windows-1250",
    "windows-1251",
    "windows-1252",
    "macintosh",
    "utf-16le",
    "utf-16be",
    "shift_jis",
    "gb18030",
    "euc-kr",
];

/// First bytes of files that are no text, and what they are.
const SIGNATURES: [(&[u8], &str, &str); 8] = [
    (b"PK\x03\x04", "a workbook or another zip archive", SAVE_SHEET),
    (b"\xd0\xcf\x11\xe0", "a workbook of the old kind", SAVE_SHEET),
    (b"PAR1", "a Parquet file", "export it as CSV and read that file"),
    (b"ARROW1", "an Arrow file", "export it as CSV and read that file"),
    (b"\x1f\x8b", "a compressed file", UNPACK),
    (b"\x28\xb5\x2f\xfd", "a compressed file", UNPACK),
    (b"BZh", "a compressed file", UNPACK),
    (b"%PDF-", "a PDF document", "a table must be a CSV or TSV file"),
];

const SAVE_SHEET: &str = "save the sheet as CSV in UTF-8 and read that file";
const UNPACK: &str = "unpack it and read the file inside";

/// Text in the encoding that was declared, or that a byte order mark tells, or else in UTF-8; without
/// the mark.
pub(super) fn decode<'a>(bytes: &'a [u8], label: Option<&str>) -> Result<Cow<'a, str>, ReadError> {
    if let Some((_, kind, help)) = SIGNATURES.iter().find(|(start, ..)| bytes.starts_with(start)) {
        return Err(ReadError::NotText { kind, help });
    }
    let declared = match label {
        Some(label) => Encoding::for_label_no_replacement(label.as_bytes()).ok_or_else(|| {
            let near = LABELS.iter().map(|near| (strsim::damerau_levenshtein(label, near), near));
            let near = near.filter(|(edits, _)| *edits <= 3).min_by_key(|(edits, _)| *edits);
            ReadError::UnknownEncoding {
                label: label.to_owned(),
                near: near.map(|(_, near)| *near),
            }
        })?,
        None => UTF_8,
    };
    let (encoding, mark) = Encoding::for_bom(bytes).unwrap_or((declared, 0));
    let content = bytes.get(mark..).unwrap_or_default();
    let text = match encoding.decode_without_bom_handling_and_without_replacement(content) {
        Some(text) => text,
        None if encoding == UTF_8 => return Err(not_utf8(content)),
        None => {
            let (text, _) = encoding.decode_without_bom_handling(content);
            let before = text.split('\u{fffd}').next().unwrap_or_default();
            let line = line_after(before.as_bytes());
            return Err(ReadError::Misencoded { encoding: encoding.name(), line });
        }
    };
    if text.contains('\0') {
        return Err(binary(content));
    }
    Ok(text)
}

fn not_utf8(content: &[u8]) -> ReadError {
    if content.contains(&0) {
        return binary(content);
    }
    let valid = match std::str::from_utf8(content) {
        Ok(text) => text.len(),
        Err(error) => error.valid_up_to(),
    };
    let line = line_after(content.get(..valid).unwrap_or_default());
    ReadError::NotUtf8 { line, byte: content.get(valid).copied().unwrap_or_default() }
}

/// Bytes with zeros among them: text of two bytes a character where every other byte is zero, as it
/// is for most alphabets, else no text at all.
fn binary(content: &[u8]) -> ReadError {
    let zeros = |offset| {
        let every_other = content.iter().skip(offset).step_by(2);
        every_other.clone().filter(|byte| **byte == 0).count() * 4 > every_other.count() * 3
    };
    let (little, big) = (zeros(1), zeros(0));
    match (little, big) {
        (true, false) => ReadError::TwoByteText { label: "utf-16le" },
        (false, true) => ReadError::TwoByteText { label: "utf-16be" },
        _ => {
            ReadError::NotText { kind: "a binary file", help: "a table must be a CSV or TSV file" }
        }
    }
}

fn line_after(text: &[u8]) -> usize {
    1 + text.iter().filter(|byte| **byte == b'\n').count()
}
