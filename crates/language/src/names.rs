//! Names as they are written.

/// Whether a name may stand without back-quotes: a letter or `_`, then letters, digits, `_`.
#[must_use]
pub fn is_plain(name: &str) -> bool {
    let mut characters = name.chars();
    characters.next().is_some_and(|first| first.is_alphabetic() || first == '_')
        && characters.all(|c| c.is_alphanumeric() || c == '_')
}

/// A name as it must be written: as it is, or in back-quotes.
#[must_use]
pub fn quoted(name: &str) -> String {
    if is_plain(name) { name.to_owned() } else { format!("`{name}`") }
}

/// The segments of a path joined by dots, each as it must be written; numbers stand bare.
#[must_use]
pub fn dotted(segments: &[String]) -> String {
    let written = |segment: &String| {
        let is_number = !segment.is_empty() && segment.chars().all(|c| c.is_ascii_digit());
        if is_number { segment.clone() } else { quoted(segment) }
    };
    segments.iter().map(written).collect::<Vec<_>>().join(".")
}

/// Every name with one stem and a number in a range, as `q1..q9` states it.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct NumberRange {
    stem: String,
    first: u64,
    last: u64,
}

impl NumberRange {
    /// The range between two names; none where their stems differ, where one has no number, or
    /// where the first number is the larger one.
    #[must_use]
    pub fn new(first: &str, last: &str) -> Option<Self> {
        let (stem, first) = stem_and_number(first)?;
        let (other, last) = stem_and_number(last)?;
        (stem == other && first <= last).then(|| Self { stem: stem.to_owned(), first, last })
    }

    /// Whether a name is in the range.
    #[must_use]
    pub fn contains(&self, name: &str) -> bool {
        stem_and_number(name).is_some_and(|(stem, number)| {
            stem == self.stem && (self.first..=self.last).contains(&number)
        })
    }
}

fn stem_and_number(name: &str) -> Option<(&str, u64)> {
    let stem = name.trim_end_matches(|character: char| character.is_ascii_digit());
    let number = name.get(stem.len()..)?.parse().ok()?;
    Some((stem, number))
}

/// A list for a sentence: `a`, `b` and `c`, each in back-quotes.
#[must_use]
pub fn listed<'a>(names: impl IntoIterator<Item = &'a str>) -> String {
    let shown: Vec<String> = names.into_iter().map(|name| format!("`{name}`")).collect();
    match shown.as_slice() {
        [] => String::new(),
        [only] => only.clone(),
        [first @ .., last] => format!("{} and {last}", first.join(", ")),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn only_names_that_need_it_are_quoted() {
        assert_eq!(quoted("größe_2"), "größe_2");
        assert_eq!(quoted("Reaction time (ms)"), "`Reaction time (ms)`");
        assert_eq!(quoted("2nd"), "`2nd`");
        assert_eq!(quoted(""), "``");
    }

    #[test]
    fn numbers_in_a_path_stand_bare() {
        let path = ["main", "centroids", "fixed day", "1", "mean"].map(str::to_owned);
        assert_eq!(dotted(&path), "main.centroids.`fixed day`.1.mean");
    }

    #[test]
    fn a_list_reads_as_a_sentence() {
        assert_eq!(listed(["a"]), "`a`");
        assert_eq!(listed(["a", "b", "c"]), "`a`, `b` and `c`");
    }

    #[test]
    fn a_range_holds_its_stem_and_its_numbers() {
        let range = NumberRange::new("q2", "q10").expect("the stems agree");
        let names = ["q1", "q2", "q02", "q10", "q11", "p5", "q", "q5b", "qq5"];
        let inside: Vec<_> = names.into_iter().filter(|name| range.contains(name)).collect();
        assert_eq!(inside, ["q2", "q02", "q10"]);
        assert_eq!(NumberRange::new("q1", "p9"), None);
        assert_eq!(NumberRange::new("q9", "q1"), None);
        assert_eq!(NumberRange::new("q", "q9"), None);
    }
}
