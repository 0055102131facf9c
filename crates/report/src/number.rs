//! How numbers are printed: the rules of journal tables, with no locale and no rounding that lies.
//!
//! The rules are those of the psychological and health journals, common practice in most fields
//! that compare groups: no leading zero where a quantity cannot exceed 1, a true minus sign, exact p
//! values to three decimals and a floor below that. No number that differs from zero prints as
//! zero, no bounded number that differs from one prints as one, zero has no sign, and what is not a
//! finite number prints as a dash. Quantities on a standardized scale are the exception: the exact size
//! of one that is next to nothing says nothing.

use crate::rich::unicode_superscript;
use crate::value::NumberStyle;

/// What stands where there is no number.
pub const DASH: &str = "—";

/// The sign of a negative number.
const MINUS: char = '−';

/// From here on a statistic is printed with a power of ten.
const LARGE: f64 = 1e7;

/// A number of a bounded quantity this near to 1 is 1 but for rounding error.
const ROUNDING_ERROR: f64 = 1e-12;

/// The number by the rules of its style, or with `decimals` in place of the style's own.
pub(crate) fn text(number: f64, style: NumberStyle, decimals: Option<u8>) -> String {
    if !number.is_finite() {
        return DASH.to_owned();
    }
    match style {
        NumberStyle::Count => fixed(number, 0),
        NumberStyle::Df if is_whole(number) => fixed(number, 0),
        NumberStyle::Df => statistic(number, decimals.unwrap_or(2)),
        NumberStyle::P => probability(number, decimals.unwrap_or(3)),
        NumberStyle::Bounded(own) => bounded(number, decimals.unwrap_or(own)),
        NumberStyle::Statistic(own) => statistic(number, decimals.unwrap_or(own)),
        NumberStyle::Standardized(own) if number.abs() < LARGE => {
            fixed(number, decimals.unwrap_or(own))
        }
        NumberStyle::Standardized(own) => scientific(number, decimals.unwrap_or(own)),
        NumberStyle::Percent(own) => percent(number, decimals.unwrap_or(own)),
    }
}

/// The number as a limit of an interval, see [`crate::value::Value::limit_text`].
pub(crate) fn limit_text(number: f64, style: NumberStyle) -> String {
    let own = match style {
        NumberStyle::Bounded(own)
        | NumberStyle::Statistic(own)
        | NumberStyle::Standardized(own) => own,
        NumberStyle::Count | NumberStyle::Df | NumberStyle::P | NumberStyle::Percent(_) => {
            return text(number, style, None);
        }
    };
    let bounded = matches!(style, NumberStyle::Bounded(_));
    let tells = |decimals: u8| {
        let printed = fixed(number, decimals);
        (number == 0.0 || !is_zero(&printed)) && !(bounded && is_false_one(number, &printed))
    };
    // Six decimals more than the style asks for are still easier to read than a power of ten.
    let decimals = (own..=own.saturating_add(6)).find(|decimals| tells(*decimals));
    text(number, style, decimals)
}

/// Whether this is a whole number but for rounding error.
pub(crate) fn is_whole(number: f64) -> bool {
    (number - number.round()).abs() <= 1e-9 * number.abs().max(1.0)
}

/// A p value. What lies outside of 0 to 1 by more than rounding error is no probability and prints
/// as a dash.
fn probability(p: f64, decimals: u8) -> String {
    if !(-ROUNDING_ERROR..=1.0 + ROUNDING_ERROR).contains(&p) {
        return DASH.to_owned();
    }
    let printed = fixed(p.clamp(0.0, 1.0), decimals);
    if p < smallest(decimals) || is_zero(&printed) {
        format!("< {}", without_leading_zero(&step(decimals)))
    } else if printed.starts_with('1') {
        format!("> {}", without_leading_zero(&below_one(decimals)))
    } else {
        without_leading_zero(&printed)
    }
}

fn bounded(number: f64, decimals: u8) -> String {
    if number.abs() >= LARGE {
        return scientific(number, decimals);
    }
    let printed = fixed(number, decimals);
    let (above, below) = if number < 0.0 { ("> −", "< −") } else { ("< ", "> ") };
    if is_zero(&printed) && number != 0.0 {
        format!("{above}{}", without_leading_zero(&step(decimals)))
    } else if is_false_one(number, &printed) {
        format!("{below}{}", without_leading_zero(&below_one(decimals)))
    } else {
        without_leading_zero(&printed)
    }
}

fn statistic(number: f64, decimals: u8) -> String {
    let printed = fixed(number, decimals);
    if number.abs() >= LARGE || (is_zero(&printed) && number != 0.0) {
        scientific(number, decimals)
    } else {
        printed
    }
}

/// A share as a percentage, without the sign; the column's head has it.
fn percent(share: f64, decimals: u8) -> String {
    let printed = fixed(share * 100.0, decimals);
    if is_zero(&printed) && share != 0.0 {
        let (sign, minus) = if share < 0.0 { (">", "−") } else { ("<", "") };
        format!("{sign} {minus}{}", step(decimals))
    } else if share < 1.0 - ROUNDING_ERROR && printed == fixed(100.0, decimals) {
        let nines = below_one(decimals.saturating_add(2));
        let digits = nines.trim_start_matches("0.");
        let (whole, fraction) = digits.split_at_checked(2).unwrap_or((digits, ""));
        let point = if fraction.is_empty() { "" } else { "." };
        format!("> {whole}{point}{fraction}")
    } else {
        printed
    }
}

/// `1.44 × 10⁻¹¹`, with at least two decimals.
fn scientific(number: f64, decimals: u8) -> String {
    let decimals = usize::from(decimals.max(2));
    let printed = format!("{:.*e}", decimals, number.abs());
    let (mantissa, exponent) = printed.split_once('e').unwrap_or((&printed, "0"));
    let exponent = unicode_superscript(exponent).unwrap_or_else(|| format!("^{exponent}"));
    format!("{}{mantissa} × 10{exponent}", sign_of(number))
}

/// The number with this many decimals; zero has no sign.
fn fixed(number: f64, decimals: u8) -> String {
    let printed = format!("{:.*}", usize::from(decimals), number.abs());
    if is_zero(&printed) { printed } else { format!("{}{printed}", sign_of(number)) }
}

fn sign_of(number: f64) -> String {
    if number < 0.0 { MINUS.to_string() } else { String::new() }
}

/// Whether a printed number is zero.
fn is_zero(printed: &str) -> bool {
    !printed.contains(|character: char| matches!(character, '1'..='9'))
}

/// Whether a number that lies within ±1 prints as one without being it.
fn is_false_one(number: f64, printed: &str) -> bool {
    number.abs() < 1.0 - ROUNDING_ERROR && printed.trim_start_matches(MINUS).starts_with('1')
}

/// The smallest number that this many decimals can tell from zero.
fn smallest(decimals: u8) -> f64 {
    step(decimals).parse().unwrap_or(0.0)
}

/// `0.001`.
fn step(decimals: u8) -> String {
    match decimals {
        0 => "1".to_owned(),
        _ => format!("0.{}1", "0".repeat(usize::from(decimals) - 1)),
    }
}

/// `0.999`; with no decimals there is nothing between zero and one, so `0.5` stands in.
fn below_one(decimals: u8) -> String {
    match decimals {
        0 => "0.5".to_owned(),
        _ => format!("0.{}", "9".repeat(usize::from(decimals))),
    }
}

/// `.38` and `−.38`; numbers beyond 1 keep their figures.
fn without_leading_zero(printed: &str) -> String {
    match printed.split_once('.') {
        Some(("0", fraction)) => format!(".{fraction}"),
        Some(("−0", fraction)) => format!("−.{fraction}"),
        Some(_) | None => printed.to_owned(),
    }
}
