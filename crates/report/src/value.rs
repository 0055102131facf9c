//! Numbers on their way to a page: full precision until rendered, with the rule by which they are
//! to be printed. The rules themselves are in [`crate::number`].

use crate::number;

/// A number and how it is printed.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Value {
    /// Full precision. A p value that underflows is 0 here and lives on in `ln`.
    pub number: f64,
    /// How it is printed.
    pub style: NumberStyle,
    /// The natural logarithm, where the number may underflow.
    pub ln: Option<f64>,
}

/// Number rules of journal tables.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum NumberStyle {
    /// A count: no decimals.
    Count,
    /// Degrees of freedom: whole where whole, else two decimals.
    Df,
    /// A p value: three decimals, no leading zero, "< .001" below that.
    P,
    /// A quantity that cannot exceed 1 in absolute value: no leading zero.
    Bounded(u8),
    /// Any other statistic, with this many decimals.
    Statistic(u8),
    /// A quantity on a standardized scale, such as a weight, a score or a standardized difference, with
    /// this many decimals: what is next to nothing prints as zero, since its exact size says nothing.
    Standardized(u8),
    /// A percentage of a share, with this many decimals (`.995` prints `99.5`).
    Percent(u8),
}

impl Value {
    /// A number printed by `style`.
    #[must_use]
    pub fn new(number: f64, style: NumberStyle) -> Self {
        Self { number, style, ln: None }
    }

    /// A p value with its logarithm.
    #[must_use]
    pub fn p(p: f64, ln_p: f64) -> Self {
        Self { number: p, style: NumberStyle::P, ln: Some(ln_p) }
    }

    /// A count. Counts beyond 2^53 lose their last figures, as any `f64` does.
    #[must_use]
    #[allow(clippy::cast_precision_loss, reason = "stated in the documentation")]
    pub fn count(count: usize) -> Self {
        Self::new(count as f64, NumberStyle::Count)
    }

    /// Degrees of freedom.
    #[must_use]
    pub fn df(df: f64) -> Self {
        Self::new(df, NumberStyle::Df)
    }

    /// A quantity that cannot exceed 1 in absolute value, with two decimals.
    #[must_use]
    pub fn bounded(number: f64) -> Self {
        Self::new(number, NumberStyle::Bounded(2))
    }

    /// Any other statistic, with two decimals.
    #[must_use]
    pub fn statistic(number: f64) -> Self {
        Self::new(number, NumberStyle::Statistic(2))
    }

    /// As it is printed in a table: `.38`, `< .001`, `−1.20`; a dash where there is no number.
    #[must_use]
    pub fn text(&self) -> String {
        number::text(self.number, self.style, None)
    }

    /// The same with this many decimals in place of the style's own. Counts and whole degrees of
    /// freedom have none.
    #[must_use]
    pub fn text_with(&self, decimals: u8) -> String {
        number::text(self.number, self.style, Some(decimals))
    }

    /// As a limit of an interval: where it would print as zero or as one without being it, with the
    /// decimals that it takes to tell, because the sign of a limit decides what the interval holds.
    #[must_use]
    pub fn limit_text(&self) -> String {
        number::limit_text(self.number, self.style)
    }

    /// As it stands after its symbol in a sentence: `= .034`, `< .001`.
    #[must_use]
    pub fn equals(&self) -> String {
        let text = self.text();
        if text.starts_with(['<', '>']) { text } else { format!("= {text}") }
    }
}
