//! Numbers on their way to a page: full precision until rendered, with the rule by which they are
//! to be printed.

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
}
