//! Styled text as plain text.

use super::{Rich, Style};

pub(super) fn text(rich: &Rich) -> String {
    let mut out = String::new();
    for run in &rich.runs {
        let text = printable(&run.text);
        match run.style {
            Style::Plain | Style::Italic | Style::Strong => out.push_str(&text),
            Style::Superscript => out.push_str(&shifted(&text, '^', unicode_superscript)),
            Style::Subscript => out.push_str(&shifted(&text, '_', unicode_subscript)),
        }
    }
    out
}

/// The text in raised or lowered characters, or after `sign` where one of them does not exist.
fn shifted(text: &str, sign: char, unicode: fn(&str) -> Option<String>) -> String {
    unicode(text).unwrap_or_else(|| {
        if text.contains(char::is_whitespace) {
            format!("{sign}({text})")
        } else {
            format!("{sign}{text}")
        }
    })
}

/// The text as the renderers may print it on one line: a line break or tab is a space, any other
/// control character (a terminal would obey it) and any character that would reorder its
/// neighbours is the replacement character.
pub(crate) fn printable(text: &str) -> String {
    text.chars()
        .map(|character| match character {
            '\n' | '\r' | '\t' | '\u{b}' | '\u{c}' | '\u{85}' | '\u{2028}' | '\u{2029}' => ' ',
            '\u{202a}'..='\u{202e}' | '\u{2066}'..='\u{2069}' => char::REPLACEMENT_CHARACTER,
            other if other.is_control() => char::REPLACEMENT_CHARACTER,
            other => other,
        })
        .collect()
}

/// The text in Unicode's raised characters, where all of them exist.
pub(crate) fn unicode_superscript(text: &str) -> Option<String> {
    text.chars()
        .map(|character| {
            Some(match character {
                '0' => '⁰',
                '1' => '¹',
                '2' => '²',
                '3' => '³',
                '4' => '⁴',
                '5' => '⁵',
                '6' => '⁶',
                '7' => '⁷',
                '8' => '⁸',
                '9' => '⁹',
                '+' => '⁺',
                '-' | '−' => '⁻',
                '=' => '⁼',
                '(' => '⁽',
                ')' => '⁾',
                'i' => 'ⁱ',
                'n' => 'ⁿ',
                _ => return None,
            })
        })
        .collect()
}

/// The text in Unicode's lowered characters, where all of them exist.
pub(super) fn unicode_subscript(text: &str) -> Option<String> {
    text.chars()
        .map(|character| {
            Some(match character {
                '0' => '₀',
                '1' => '₁',
                '2' => '₂',
                '3' => '₃',
                '4' => '₄',
                '5' => '₅',
                '6' => '₆',
                '7' => '₇',
                '8' => '₈',
                '9' => '₉',
                '+' => '₊',
                '-' | '−' => '₋',
                '=' => '₌',
                '(' => '₍',
                ')' => '₎',
                'a' => 'ₐ',
                'e' => 'ₑ',
                'h' => 'ₕ',
                'i' => 'ᵢ',
                'j' => 'ⱼ',
                'k' => 'ₖ',
                'l' => 'ₗ',
                'm' => 'ₘ',
                'n' => 'ₙ',
                'o' => 'ₒ',
                'p' => 'ₚ',
                'r' => 'ᵣ',
                's' => 'ₛ',
                't' => 'ₜ',
                'u' => 'ᵤ',
                'v' => 'ᵥ',
                'x' => 'ₓ',
                _ => return None,
            })
        })
        .collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn shifted_figures_are_unicode_where_they_exist() {
        for (notation, expected) in [
            ("η^2^~p~", "η²ₚ"),
            ("R~c~", "R_c"),
            ("10^−11^", "10⁻¹¹"),
            ("x^T^", "x^T"),
            ("a\\*b *F* **s**", "a*b F s"),
        ] {
            assert_eq!(Rich::parse(notation).text(), expected, "{notation}");
        }
    }

    #[test]
    fn control_characters_reach_no_terminal() {
        assert_eq!(printable("a\nb\u{1b}[31mc\u{202e}d"), "a b\u{fffd}[31mc\u{fffd}d");
    }
}
