//! The order of levels.

use std::cmp::Ordering;
use std::collections::BTreeSet;

use super::number::parse_number;

/// The distinct texts among cells: numbers first, by their size and then by how they are written, then
/// all others, by their characters. Letter case and blanks make texts distinct.
#[must_use]
pub fn levels<'a>(cells: impl Iterator<Item = &'a str>, decimal: char) -> Vec<&'a str> {
    let distinct: BTreeSet<&str> = cells.collect();
    let mut keyed: Vec<(Option<f64>, &str)> =
        distinct.into_iter().map(|text| (parse_number(text, decimal).ok(), text)).collect();
    keyed.sort_by(|(a, _), (b, _)| match (a, b) {
        (Some(a), Some(b)) => a.partial_cmp(b).unwrap_or(Ordering::Equal),
        (Some(_), None) => Ordering::Less,
        (None, Some(_)) => Ordering::Greater,
        (None, None) => Ordering::Equal,
    });
    keyed.into_iter().map(|(_, text)| text).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn numbers_come_first_by_size_and_words_after_them() {
        let cells = ["ten", "10", "9", "Ten", "01", "1", "-2", "1.0", "9"];
        let ordered = ["-2", "01", "1", "1.0", "9", "10", "Ten", "ten"];
        assert_eq!(levels(cells.into_iter(), '.'), ordered);
    }

    #[test]
    fn the_declared_decimal_sign_decides_what_is_a_number() {
        assert_eq!(levels(["10", "2,5", "2.7"].into_iter(), ','), ["2,5", "10", "2.7"]);
    }
}
