//! The cells that were run since the kernel started.

/// The number of the one session that is kept.
pub(crate) const SESSION: i64 = 1;

/// A cell that was run.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) struct Entry {
    /// Its execution count.
    pub(crate) number: u32,
    /// Its code.
    pub(crate) input: String,
    /// What it showed, as plain text, where it showed anything.
    pub(crate) output: Option<String>,
}

/// The cells, in the order of running.
#[derive(Debug, Default)]
pub(crate) struct History {
    entries: Vec<Entry>,
}

impl History {
    pub(crate) fn add(&mut self, entry: Entry) {
        self.entries.push(entry);
    }

    /// The count under which a text was run last.
    pub(crate) fn number_of(&self, input: &str) -> Option<u32> {
        self.entries.iter().rev().find(|entry| entry.input == input).map(|entry| entry.number)
    }

    /// The last `n`, or all.
    pub(crate) fn tail(&self, n: Option<usize>) -> Vec<&Entry> {
        last(self.entries.iter().collect(), n)
    }

    /// Those from `start` up to, not including, `stop`. Session 0 is the current one; others are
    /// not kept.
    pub(crate) fn range(&self, session: i64, start: Option<i64>, stop: Option<i64>) -> Vec<&Entry> {
        let start = start.unwrap_or(0);
        let stop = stop.unwrap_or(i64::MAX);
        let current = session == 0 || session == SESSION;
        let wanted = |entry: &&Entry| current && (start..stop).contains(&i64::from(entry.number));
        self.entries.iter().filter(wanted).collect()
    }

    /// Those whose code matches the pattern; of equal ones, if so wished, the last alone.
    pub(crate) fn search(&self, pattern: &str, unique: bool, n: Option<usize>) -> Vec<&Entry> {
        let pattern: Vec<char> = pattern.chars().collect();
        let mut found: Vec<&Entry> = Vec::new();
        for entry in &self.entries {
            if !matches(&pattern, &entry.input) {
                continue;
            }
            if unique {
                found.retain(|earlier| earlier.input != entry.input);
            }
            found.push(entry);
        }
        last(found, n)
    }
}

fn last(entries: Vec<&Entry>, n: Option<usize>) -> Vec<&Entry> {
    let skipped = n.map_or(0, |n| entries.len().saturating_sub(n));
    entries.into_iter().skip(skipped).collect()
}

/// Whether the whole text matches a pattern in which `*` stands for any text and `?` for any one
/// character.
fn matches(pattern: &[char], text: &str) -> bool {
    // `reached` tells which beginnings of the pattern match the text so far; a star may match
    // nothing.
    let mut reached = vec![false; pattern.len() + 1];
    let spread = |reached: &mut [bool]| {
        let mut before = false;
        for (place, here) in reached.iter_mut().enumerate() {
            let after_star = place > 0 && pattern.get(place - 1) == Some(&'*');
            *here |= before && after_star;
            before = *here;
        }
    };
    if let Some(first) = reached.first_mut() {
        *first = true;
    }
    spread(&mut reached);
    for c in text.chars() {
        let mut next = vec![false; reached.len()];
        for (place, (&wanted, &here)) in pattern.iter().zip(&reached).enumerate() {
            let target = if wanted == '*' { place } else { place + 1 };
            let fits = here && (wanted == '*' || wanted == '?' || wanted == c);
            if let Some(target) = next.get_mut(target) {
                *target |= fits;
            }
        }
        spread(&mut next);
        reached = next;
    }
    reached.last().copied().unwrap_or(false)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn history(inputs: &[&str]) -> History {
        let mut history = History::default();
        for (input, number) in inputs.iter().zip(1..) {
            history.add(Entry { number, input: (*input).to_owned(), output: None });
        }
        history
    }

    fn numbers(entries: &[&Entry]) -> Vec<u32> {
        entries.iter().map(|entry| entry.number).collect()
    }

    #[test]
    fn the_tail_is_the_last_entries_in_their_order() {
        let history = history(&["a", "b", "c"]);
        assert_eq!(numbers(&history.tail(Some(2))), [2, 3]);
        assert_eq!(numbers(&history.tail(Some(9))), [1, 2, 3]);
        assert_eq!(numbers(&history.tail(None)), [1, 2, 3]);
    }

    #[test]
    fn a_range_leaves_out_its_stop_and_other_sessions() {
        let history = history(&["a", "b", "c"]);
        assert_eq!(numbers(&history.range(0, Some(1), Some(3))), [1, 2]);
        assert_eq!(numbers(&history.range(1, Some(2), None)), [2, 3]);
        assert_eq!(numbers(&history.range(0, None, None)), [1, 2, 3]);
        assert!(history.range(-1, None, None).is_empty());
    }

    #[test]
    fn a_search_finds_whole_texts_by_pattern() {
        let history = history(&["show a", "draw a", "show b", "show a"]);
        assert_eq!(numbers(&history.search("show*", false, None)), [1, 3, 4]);
        assert_eq!(numbers(&history.search("show*", true, None)), [3, 4]);
        assert_eq!(numbers(&history.search("show*", true, Some(1))), [4]);
        assert_eq!(numbers(&history.search("?how ?", false, None)), [1, 3, 4]);
        assert_eq!(numbers(&history.search("*a", false, None)), [1, 2, 4]);
        assert!(history.search("show", false, None).is_empty());
    }

    #[test]
    fn stars_match_nothing_as_well_as_much() {
        for (pattern, text, expected) in [
            ("", "", true),
            ("*", "", true),
            ("**", "é🌾", true),
            ("a*b*c", "abc", true),
            ("a*b*c", "a-b-b-c", true),
            ("a*b*c", "a-c-b", false),
            ("?", "🌾", true),
            ("?", "", false),
        ] {
            let pattern: Vec<char> = pattern.chars().collect();
            assert_eq!(matches(&pattern, text), expected, "{pattern:?} {text}");
        }
    }
}
