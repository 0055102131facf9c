//! Where a line must not be broken: a statistic stays together.

pub(super) const NO_BREAK_SPACE: char = '\u{a0}';

/// The text with spaces that no line may be broken at around the signs before a number, as in
/// `p < .001`, and within brackets that hold nothing but numbers, as in `F(8, 290)` and
/// `[.12, .34]`.
pub(super) fn unbreakable(text: &str) -> String {
    let mut out = String::with_capacity(text.len());
    let mut rest = text;
    while let Some(character) = rest.chars().next() {
        let together = signed(rest).or_else(|| bracketed(rest)).unwrap_or_default();
        if together.is_empty() {
            out.push(character);
            rest = rest.strip_prefix(character).unwrap_or_default();
        } else {
            out.extend(
                together.chars().map(|part| if part == ' ' { NO_BREAK_SPACE } else { part }),
            );
            rest = rest.strip_prefix(together).unwrap_or_default();
        }
    }
    out
}

/// The sign that the text begins with, where a number follows it.
fn signed(text: &str) -> Option<&str> {
    let sign = SIGNS.iter().find(|sign| {
        text.strip_prefix(**sign).is_some_and(|after| after.starts_with(begins_number))
    })?;
    text.get(..sign.len())
}

/// The brackets that the text begins with, where they hold nothing but numbers.
fn bracketed(text: &str) -> Option<&str> {
    let inner = text.strip_prefix(['(', '['])?;
    let length = inner.find([')', ']'])?;
    let numbers = inner.get(..length)?;
    let is_numbers = numbers.starts_with(begins_number)
        && numbers.chars().all(|part| begins_number(part) || matches!(part, ',' | ' '));
    is_numbers.then(|| text.get(..length + 2)).flatten()
}

const SIGNS: [&str; 4] = [" = ", " < ", " > ", " × "];

fn begins_number(character: char) -> bool {
    character.is_ascii_digit() || matches!(character, '.' | '−')
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_statistic_stays_together() {
        let shown = |text: &str| unbreakable(text).replace(NO_BREAK_SPACE, "·");
        assert_eq!(
            shown("V = .38, F(8, 290) = 8.52, p < .001, 90% CI [.12, .25] (3 of us)"),
            "V·=·.38, F(8,·290)·=·8.52, p·<·.001, 90% CI [.12,·.25] (3 of us)"
        );
        assert_eq!(shown("a = b < c ("), "a = b < c (");
    }
}
