//! From the text of a cell to a number.

/// Why a text is not a number.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Unparsed {
    /// It means infinity, or a number too large to be told from it.
    Infinite,
    /// It is not written as a number is.
    Malformed,
}

/// The number that a cell holds: digits with at most one decimal sign, a sign before them (also the
/// true minus, U+2212), an exponent after them, blanks around them. It is the number nearest to the
/// digits; nothing is lost before that one rounding.
pub(crate) fn parse_number(cell: &str, decimal: char) -> Result<f64, Unparsed> {
    let cell = cell.trim();
    if !is_number(cell, decimal) {
        let word = cell.trim_start_matches(['+', '-', '\u{2212}']).to_ascii_lowercase();
        return Err(match word.as_str() {
            "inf" | "infinity" | "\u{221e}" => Unparsed::Infinite,
            _ => Unparsed::Malformed,
        });
    }
    let parsed: Result<f64, _> = match decimal == '.' && cell.is_ascii() {
        true => cell.parse(),
        false => cell.replace('\u{2212}', "-").replace(decimal, ".").parse(),
    };
    match parsed {
        Ok(number) if number.is_finite() => Ok(number),
        Ok(_) => Err(Unparsed::Infinite),
        Err(_) => Err(Unparsed::Malformed),
    }
}

fn is_number(cell: &str, decimal: char) -> bool {
    let unsigned = without_sign(cell);
    let (mantissa, exponent) = match unsigned.split_once(['e', 'E']) {
        Some((mantissa, exponent)) => (mantissa, Some(exponent)),
        None => (unsigned, None),
    };
    let (whole, fraction) = mantissa.split_once(decimal).unwrap_or((mantissa, ""));
    let digits = |text: &str| text.bytes().all(|byte| byte.is_ascii_digit());
    let exponent_holds = exponent.is_none_or(|exponent| {
        let exponent = without_sign(exponent);
        !exponent.is_empty() && digits(exponent)
    });
    digits(whole)
        && digits(fraction)
        && !(whole.is_empty() && fraction.is_empty())
        && exponent_holds
}

fn without_sign(text: &str) -> &str {
    text.strip_prefix(['+', '-', '\u{2212}']).unwrap_or(text)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    #[allow(clippy::float_cmp, reason = "the nearest number is one number")]
    fn numbers_are_understood_as_people_write_them() {
        let cases = [
            ("12", 12.0),
            (" 12.50\t", 12.5),
            ("\u{a0}7\u{a0}", 7.0),
            ("+3", 3.0),
            ("\u{2212}3.25", -3.25),
            (".5", 0.5),
            ("5.", 5.0),
            ("007", 7.0),
            ("1e3", 1000.0),
            ("1E+3", 1000.0),
            ("2.5e\u{2212}2", 0.025),
            ("1e-400", 0.0),
            ("0.1", 0.1),
        ];
        for (text, number) in cases {
            assert_eq!(parse_number(text, '.'), Ok(number), "{text:?}");
        }
    }

    #[test]
    fn a_decimal_comma_is_understood_only_where_it_was_declared() {
        assert_eq!(parse_number("-1,5", ','), Ok(-1.5));
        assert_eq!(parse_number("\u{2212}1,5e2", ','), Ok(-150.0));
        assert_eq!(parse_number("1.5", ','), Err(Unparsed::Malformed));
        assert_eq!(parse_number("1,5", '.'), Err(Unparsed::Malformed));
    }

    #[test]
    fn words_and_fragments_are_not_numbers() {
        let texts =
            ["", "NA", "nan", "NaN", "-", "+", ".", "1.2.3", "1 2", "1e", "e3", "--1", "0x1f"];
        for text in texts.iter().chain(&["1_000", "12%", "1e5.5", "\u{661}", "5 ms"]) {
            assert_eq!(parse_number(text, '.'), Err(Unparsed::Malformed), "{text:?}");
        }
    }

    #[test]
    fn infinity_is_not_a_number() {
        for text in ["inf", "-Inf", "+INFINITY", "\u{221e}", "\u{2212}\u{221e}", "1e999"] {
            assert_eq!(parse_number(text, '.'), Err(Unparsed::Infinite), "{text:?}");
        }
    }
}
