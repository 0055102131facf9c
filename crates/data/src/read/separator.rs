//! Which separator a file seems to have.

use super::records::Records;

/// The separators that files commonly have, the likeliest first among equals.
const CANDIDATES: [u8; 4] = [b';', b'\t', b',', b'|'];

/// How many records have to agree.
const RECORDS: usize = 21;

/// The separator, other than the one that was tried, that splits the header into several cells and the
/// first rows into just as many. Where several do, the one that makes the most cells.
pub(super) fn likely(text: &str, tried: u8) -> Option<char> {
    let counted = CANDIDATES
        .into_iter()
        .filter(|candidate| *candidate != tried)
        .filter_map(|candidate| Some((columns(text, candidate)?, candidate)));
    let mut best: Option<(usize, u8)> = None;
    for (columns, candidate) in counted {
        if best.is_none_or(|(most, _)| columns > most) {
            best = Some((columns, candidate));
        }
    }
    best.map(|(_, candidate)| char::from(candidate))
}

/// How many columns a separator makes, where that is more than one and the first records agree.
fn columns(text: &str, separator: u8) -> Option<usize> {
    let mut columns = None;
    for record in Records::new(text, separator).take(RECORDS) {
        let record = record.ok()?;
        if record.blank {
            continue;
        }
        if record.cells < 2 || columns.is_some_and(|columns| columns != record.cells) {
            return None;
        }
        columns = Some(record.cells);
    }
    columns
}
