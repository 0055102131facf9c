//! The known word that a misspelled one most likely means.

/// The candidate nearest to `word` by edits (insertions, deletions, replacements, swaps of
/// neighbours), letter case aside, or none where even the nearest differs in more than a third of
/// its letters. The first of equals wins.
pub fn nearest<'a>(word: &str, candidates: impl IntoIterator<Item = &'a str>) -> Option<&'a str> {
    let lower = word.to_lowercase();
    let length = lower.chars().count();
    let allowed = (length / 3).max(1);
    candidates
        .into_iter()
        .map(|candidate| {
            let distance = strsim::damerau_levenshtein(&lower, &candidate.to_lowercase());
            (distance, candidate)
        })
        .filter(|(distance, candidate)| {
            let shares_a_letter = *distance < length.max(candidate.chars().count());
            *distance <= allowed && shares_a_letter && *candidate != word
        })
        .min_by_key(|(distance, _)| *distance)
        .map(|(_, candidate)| candidate)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_slip_of_the_finger_is_understood() {
        assert_eq!(nearest("moood", ["mood", "sleep"]), Some("mood"));
        assert_eq!(nearest("compair", ["compare", "admit"]), Some("compare"));
        assert_eq!(nearest("Mood", ["mood"]), Some("mood"));
    }

    #[test]
    fn another_word_is_not_guessed_at() {
        assert_eq!(nearest("report", ["read", "compare"]), None);
        assert_eq!(nearest("x", ["mood"]), None);
        assert_eq!(nearest("x", ["g"]), None);
    }
}
