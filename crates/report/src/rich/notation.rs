//! Reading the notation of styled text.

use super::{Rich, Style};

/// A mark, and the style of what stands between two of them.
struct Mark {
    sign: &'static str,
    style: Style,
    /// Whether spaces may stand between the marks.
    spaces: bool,
}

/// The longer sign comes first where one begins with the other.
const MARKS: [Mark; 4] = [
    Mark { sign: "**", style: Style::Strong, spaces: true },
    Mark { sign: "*", style: Style::Italic, spaces: true },
    Mark { sign: "^", style: Style::Superscript, spaces: false },
    Mark { sign: "~", style: Style::Subscript, spaces: false },
];

pub(super) fn parse(notation: &str) -> Rich {
    let mut rich = Rich::default();
    parse_into(&mut rich, notation, Style::Plain);
    rich
}

/// Adds `notation` to `rich`; `outer` is the style of whatever has no mark of its own.
fn parse_into(rich: &mut Rich, notation: &str, outer: Style) {
    let mut rest = notation;
    let mut text = String::new();
    while let Some(character) = rest.chars().next() {
        let marked =
            MARKS.iter().find_map(|mark| mark.enclosed(rest).map(|enclosed| (mark, enclosed)));
        if let Some((mark, enclosed)) = marked {
            rich.push(std::mem::take(&mut text), outer);
            parse_into(rich, enclosed.inner, mark.style);
            rest = enclosed.after;
            continue;
        }
        let (taken, after) = one_character(rest, character);
        text.push(taken);
        rest = after;
    }
    rich.push(text, outer);
}

/// The next character of the text and what follows it: the one after a backslash, where there is
/// one, else the one that stands there.
fn one_character(rest: &str, first: char) -> (char, &str) {
    let mut characters = rest.chars();
    characters.next();
    if first == '\\' {
        let mut escaped = characters.clone();
        if let Some(next) = escaped.next() {
            return (next, escaped.as_str());
        }
    }
    (first, characters.as_str())
}

/// What stands between two marks, and what follows the second.
struct Enclosed<'a> {
    inner: &'a str,
    after: &'a str,
}

impl Mark {
    fn enclosed<'a>(&self, rest: &'a str) -> Option<Enclosed<'a>> {
        let body = rest.strip_prefix(self.sign)?;
        let end = self.closing(body)?;
        let (inner, closing) = (body.get(..end)?, body.get(end..)?);
        let touches_space =
            inner.starts_with(char::is_whitespace) || inner.ends_with(char::is_whitespace);
        let spaced = !self.spaces && inner.contains(char::is_whitespace);
        if inner.is_empty() || touches_space || spaced {
            return None;
        }
        Some(Enclosed { inner, after: closing.strip_prefix(self.sign)? })
    }

    /// Where the partner of this mark begins in `body`.
    fn closing(&self, body: &str) -> Option<usize> {
        let mut characters = body.char_indices().peekable();
        while let Some((at, character)) = characters.next() {
            let here = body.get(at..)?;
            let is_strong = self.sign == "*" && here.starts_with("**");
            if character == '\\' || is_strong {
                characters.next();
            } else if here.starts_with(self.sign) {
                return Some(at);
            }
        }
        None
    }
}

/// Puts texts into the slots of a sentence.
pub(super) fn fill(sentence: &Rich, slots: &[(&str, Rich)]) -> Rich {
    let mut filled = Rich::default();
    for run in &sentence.runs {
        let mut rest = run.text.as_str();
        while let Some((before, slot)) = next_slot(rest, slots) {
            filled.push(before, run.style);
            filled.append(slot.text.clone());
            rest = slot.after;
        }
        filled.push(rest, run.style);
    }
    filled
}

/// A slot in a text: what goes in, and what follows it.
struct Slot<'a> {
    text: &'a Rich,
    after: &'a str,
}

/// The first slot of `text` that something is given for, and the text before it.
fn next_slot<'a>(text: &'a str, slots: &'a [(&str, Rich)]) -> Option<(&'a str, Slot<'a>)> {
    text.match_indices('{').find_map(|(at, _)| {
        let (name, after) = text.get(at + 1..)?.split_once('}')?;
        let (_, filling) = slots.iter().find(|(slot, _)| *slot == name)?;
        Some((text.get(..at)?, Slot { text: filling, after }))
    })
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::rich::Run;

    fn runs(notation: &str) -> Vec<(String, Style)> {
        parse(notation).runs.into_iter().map(|Run { text, style }| (text, style)).collect()
    }

    #[test]
    fn each_mark_gives_its_style() {
        assert_eq!(
            runs("η^2^~p~ of *F*, **all**"),
            [
                ("η".to_owned(), Style::Plain),
                ("2".to_owned(), Style::Superscript),
                ("p".to_owned(), Style::Subscript),
                (" of ".to_owned(), Style::Plain),
                ("F".to_owned(), Style::Italic),
                (", ".to_owned(), Style::Plain),
                ("all".to_owned(), Style::Strong),
            ]
        );
    }

    #[test]
    fn a_mark_without_a_partner_stands_for_itself() {
        for text in ["a * b * c", "2 ^ 3 ^", "~5 and ~6", "**", "*", "** x**", "a^b c^"] {
            assert_eq!(runs(text), [(text.to_owned(), Style::Plain)], "{text}");
        }
    }

    #[test]
    fn a_backslash_takes_the_next_character_as_it_is() {
        assert_eq!(runs(r"\*x\* \\ \"), [(r"*x* \ \".to_owned(), Style::Plain)]);
        assert_eq!(runs(r"*a\*b*"), [("a*b".to_owned(), Style::Italic)]);
    }

    #[test]
    fn a_raised_figure_may_stand_inside_italics() {
        assert_eq!(
            runs("*T^2^*"),
            [("T".to_owned(), Style::Italic), ("2".to_owned(), Style::Superscript)]
        );
    }

    #[test]
    fn what_fills_a_slot_is_not_read_as_notation_or_as_a_slot() {
        let slots = [("a", Rich::plain("{b} *x*")), ("b", Rich::plain("wrong"))];
        assert_eq!(fill(&parse("{a} and {c} {"), &slots), Rich::plain("{b} *x* and {c} {"));
    }
}
