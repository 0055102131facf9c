//! A test as it is cited in a sentence: `V = .38, F(8, 290) = 8.52, p < .001`.

use crate::rich::Rich;
use crate::value::Value;

/// Symbols and numbers, each with what stands in brackets after it.
///
/// ```
/// use tussock_report::citation::Citation;
/// use tussock_report::value::Value;
/// let citation = Citation::new()
///     .value("*V*", Value::bounded(0.3812))
///     .test("*F*", [Value::df(8.0), Value::df(290.0)], Value::statistic(8.521))
///     .value("*p*", Value::p(3e-10, -21.9))
///     .interval("90% CI", Value::bounded(0.1), Value::bounded(0.248));
/// assert_eq!(
///     citation.rich().text(),
///     "V = .38, F(8, 290) = 8.52, p < .001, 90% CI [.10, .25]"
/// );
/// ```
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Citation {
    /// The parts, in order.
    pub parts: Vec<Part>,
}

/// One part of a citation.
#[derive(Clone, Debug, PartialEq)]
pub enum Part {
    /// `symbol(arguments) = value`.
    Statement {
        /// Latin letters in italics, Greek ones upright.
        symbol: Rich,
        /// What stands in brackets after the symbol, such as degrees of freedom.
        arguments: Vec<Argument>,
        /// The number.
        value: Value,
    },
    /// `label [lower, upper]`.
    Interval {
        /// What kind of interval it is.
        label: Rich,
        /// The lower limit.
        lower: Value,
        /// The upper limit.
        upper: Value,
    },
}

/// A number in the brackets after a symbol.
#[derive(Clone, Debug, PartialEq)]
pub struct Argument {
    /// Its own symbol, where it has one, as in `χ²(8, N = 150)`.
    pub symbol: Option<Rich>,
    /// The number.
    pub value: Value,
}

impl From<Value> for Argument {
    fn from(value: Value) -> Self {
        Self { symbol: None, value }
    }
}

impl Argument {
    /// A number that is named within the brackets.
    pub fn named(symbol: impl Into<Rich>, value: Value) -> Self {
        Self { symbol: Some(symbol.into()), value }
    }
}

impl Citation {
    /// No parts yet.
    #[must_use]
    pub fn new() -> Self {
        Self::default()
    }

    /// The same with `symbol = value` added.
    #[must_use]
    pub fn value(self, symbol: impl Into<Rich>, value: Value) -> Self {
        self.test(symbol, Vec::<Argument>::new(), value)
    }

    /// The same with `symbol(arguments) = value` added.
    #[must_use]
    pub fn test(
        mut self,
        symbol: impl Into<Rich>,
        arguments: impl IntoIterator<Item = impl Into<Argument>>,
        value: Value,
    ) -> Self {
        let arguments = arguments.into_iter().map(Into::into).collect();
        self.parts.push(Part::Statement { symbol: symbol.into(), arguments, value });
        self
    }

    /// The same with `label [lower, upper]` added.
    #[must_use]
    pub fn interval(mut self, label: impl Into<Rich>, lower: Value, upper: Value) -> Self {
        self.parts.push(Part::Interval { label: label.into(), lower, upper });
        self
    }

    /// The citation as styled text.
    #[must_use]
    pub fn rich(&self) -> Rich {
        Rich::join(self.parts.iter().map(Part::rich), ", ")
    }
}

impl From<Citation> for Rich {
    fn from(citation: Citation) -> Self {
        citation.rich()
    }
}

impl Part {
    fn rich(&self) -> Rich {
        match self {
            Self::Statement { symbol, arguments, value } => {
                let mut rich = symbol.clone();
                if !arguments.is_empty() {
                    let inner = Rich::join(arguments.iter().map(Argument::rich), ", ");
                    rich = rich.then(Rich::plain("(")).then(inner).then(Rich::plain(")"));
                }
                rich.then(Rich::plain(format!(" {}", value.equals())))
            }
            Self::Interval { label, lower, upper } => {
                let limits = format!(" [{}, {}]", lower.limit_text(), upper.limit_text());
                label.clone().then(Rich::plain(limits))
            }
        }
    }
}

impl Argument {
    fn rich(&self) -> Rich {
        match &self.symbol {
            Some(symbol) => symbol.clone().then(Rich::plain(format!(" {}", self.value.equals()))),
            None => Rich::plain(self.value.text()),
        }
    }
}
