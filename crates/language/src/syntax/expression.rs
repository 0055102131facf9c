//! The grammar of expressions, by precedence climbing: from loose to tight `or`, `and`, `not`,
//! comparison and `in`, `+ -`, `* /`, unary `-`, `^`.

use super::error::SyntaxError;
use super::expected::Expected;
use super::kind::SyntaxKind;
use super::lexer::meant;
use super::parser::Parser;

/// How deep an expression may be nested. Deeper ones would only exhaust the stack.
const DEEPEST: usize = 200;

/// Words that belong to expressions; a column of such a name goes in back-quotes.
const RESERVED: &[&str] = &["and", "or", "not", "if", "then", "else"];

/// How tightly an operator binds.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
enum Power {
    Or,
    And,
    Not,
    Comparison,
    Sum,
    Product,
    Negation,
    Exponent,
}

impl Power {
    /// The next tighter one.
    fn tighter(self) -> Self {
        match self {
            Self::Or => Self::And,
            Self::And => Self::Not,
            Self::Not => Self::Comparison,
            Self::Comparison => Self::Sum,
            Self::Sum => Self::Product,
            Self::Product => Self::Negation,
            Self::Negation | Self::Exponent => Self::Exponent,
        }
    }
}

impl Parser<'_> {
    /// An expression; false, and an error, where none starts.
    pub(super) fn expression(&mut self, noun: &str) -> bool {
        self.binary(Power::Or, noun, None)
    }

    /// Operands with operators of at least the power `least` between them. `compared` is the
    /// column on the other side of a comparison.
    fn binary(&mut self, least: Power, noun: &str, compared: Option<&str>) -> bool {
        let outer = self.depth;
        self.depth += 1;
        let found = self.binary_within_bounds(least, noun, compared);
        self.depth = outer;
        found
    }

    fn binary_within_bounds(&mut self, least: Power, noun: &str, compared: Option<&str>) -> bool {
        if self.too_deep() {
            return false;
        }
        let mark = self.mark();
        let column = self.column_here();
        if !self.operand(noun, compared) {
            return false;
        }
        let mut has_comparison = false;
        loop {
            if self.at_membership() && least <= Power::Comparison {
                self.depth += 1;
                if self.too_deep() {
                    return false;
                }
                self.open_at(mark, SyntaxKind::Membership);
                let found = self.membership(column.as_deref());
                self.close();
                if !found {
                    return false;
                }
                continue;
            }
            let Some(power) = self.operator_power().filter(|power| *power >= least) else {
                self.expect(Expected::Operator);
                return true;
            };
            self.depth += 1;
            if self.too_deep() {
                return false;
            }
            if power == Power::Comparison {
                if has_comparison {
                    let error = SyntaxError::new(self.here(), "comparisons cannot be chained");
                    self.report(error.help("write `a < b and b < c`"));
                }
                has_comparison = true;
            }
            self.open_at(mark, SyntaxKind::Binary);
            let compared = column.as_deref().filter(|_| power == Power::Comparison);
            self.operator();
            // A power is right-associative and its exponent may be negative: `2^-1`.
            let next = if power == Power::Exponent { Power::Negation } else { power.tighter() };
            let found = self.binary(next, "a value", compared);
            self.close();
            if !found {
                return false;
            }
        }
    }

    /// Says so, and passes over the rest, where an expression is nested too deeply.
    fn too_deep(&mut self) -> bool {
        if self.depth <= DEEPEST {
            return false;
        }
        let message = format!("an expression may be nested {DEEPEST} levels deep at most");
        let error = SyntaxError::new(self.here(), message);
        self.report(error.help("derive a column for a part of it"));
        true
    }

    /// The column that an operand here would be, if it is a plain one.
    fn column_here(&self) -> Option<String> {
        let token = self.peek(0).filter(|token| token.kind.is_name())?;
        Some(crate::lower::text::bare_name(token.span.of(self.text)).to_owned())
    }

    fn operand(&mut self, noun: &str, compared: Option<&str>) -> bool {
        if let Some(column) = compared {
            self.expect(Expected::Level(column.to_owned()));
        }
        self.expect(Expected::Operand);
        match self.kind() {
            Some(SyntaxKind::Minus) => self.prefix(SyntaxKind::Negation, Power::Negation),
            Some(SyntaxKind::Unknown) if meant(self.next_text()) == Some("-") => {
                self.foreign_sign();
                self.prefix(SyntaxKind::Negation, Power::Negation)
            }
            Some(SyntaxKind::Name) if self.word_at(0, "not") => {
                self.prefix(SyntaxKind::Denial, Power::Not)
            }
            Some(SyntaxKind::Name) if self.word_at(0, "if") => self.conditional(),
            Some(SyntaxKind::Number) => self.literal(SyntaxKind::NumberLiteral),
            Some(SyntaxKind::String | SyntaxKind::LongString) => {
                self.open(SyntaxKind::TextLiteral);
                self.text_token();
                self.close();
                true
            }
            Some(SyntaxKind::OpenParenthesis) => self.parenthesized(),
            Some(kind) if kind.is_name() && !self.at_clause() => self.reference_or_call(),
            _ => {
                self.missing(noun);
                false
            }
        }
    }

    fn prefix(&mut self, kind: SyntaxKind, power: Power) -> bool {
        self.open(kind);
        let token =
            if kind == SyntaxKind::Denial { SyntaxKind::Keyword } else { SyntaxKind::Minus };
        self.bump_as(token);
        let found = self.binary(power, "a value", None);
        self.close();
        found
    }

    fn literal(&mut self, kind: SyntaxKind) -> bool {
        self.open(kind);
        self.bump();
        self.close();
        true
    }

    fn conditional(&mut self) -> bool {
        self.open(SyntaxKind::Conditional);
        self.bump_as(SyntaxKind::Keyword);
        let found = self.binary(Power::Or, "a condition", None)
            && self.fixed_word("then")
            && self.binary(Power::Or, "a value", None)
            && self.fixed_word("else")
            && self.binary(Power::Or, "a value", None);
        self.close();
        found
    }

    fn parenthesized(&mut self) -> bool {
        self.open(SyntaxKind::Parenthesized);
        self.bump();
        let found = self.binary(Power::Or, "a value", None) && self.closing(")");
        self.close();
        found
    }

    fn closing(&mut self, sign: &'static str) -> bool {
        let kind =
            if sign == ")" { SyntaxKind::CloseParenthesis } else { SyntaxKind::CloseBracket };
        self.expect(Expected::Sign(sign));
        if self.at(kind) {
            self.bump();
            return true;
        }
        self.missing(format!("`{sign}`"));
        false
    }

    fn reference_or_call(&mut self) -> bool {
        let word = self.next_text();
        if self.at(SyntaxKind::Name) && RESERVED.contains(&word) {
            let span = self.here();
            let error = SyntaxError::new(span, format!("a value is missing before `{word}`"));
            let help = format!("a column of that name is written `` `{word}` ``");
            self.report(error.help(help));
            return false;
        }
        let called = self.at(SyntaxKind::Name)
            && self.peek(1).is_some_and(|token| token.kind == SyntaxKind::OpenParenthesis);
        if !called {
            self.open(SyntaxKind::NameReference);
            self.name_token();
            self.close();
            return true;
        }
        self.open(SyntaxKind::Call);
        self.open(SyntaxKind::FunctionName);
        self.bump();
        self.close();
        self.bump();
        let found = self.arguments() && self.closing(")");
        self.close();
        found
    }

    fn arguments(&mut self) -> bool {
        if self.at(SyntaxKind::CloseParenthesis) {
            return true;
        }
        loop {
            if !self.binary(Power::Or, "a value", None) {
                return false;
            }
            self.expect(Expected::Sign(","));
            if !self.at(SyntaxKind::Comma) {
                return true;
            }
            self.bump();
        }
    }

    /// Whether `in [` or `not in` stands here. A bare `in` is the clause of a table.
    fn at_membership(&self) -> bool {
        let bracket =
            |ahead| self.peek(ahead).is_some_and(|token| token.kind == SyntaxKind::OpenBracket);
        (self.word_at(0, "in") && bracket(1)) || (self.word_at(0, "not") && self.word_at(1, "in"))
    }

    fn membership(&mut self, column: Option<&str>) -> bool {
        if self.word_at(0, "not") {
            self.bump_as(SyntaxKind::Keyword);
        }
        self.bump_as(SyntaxKind::Keyword);
        self.expect(Expected::Sign("["));
        if !self.at(SyntaxKind::OpenBracket) {
            self.missing("`[`");
            return false;
        }
        self.open(SyntaxKind::List);
        self.bump();
        let found = self.list_items(column) && self.closing("]");
        self.close();
        found
    }

    fn list_items(&mut self, column: Option<&str>) -> bool {
        if self.at(SyntaxKind::CloseBracket) {
            self.missing("a value");
            self.bump();
            return false;
        }
        loop {
            if let Some(column) = column {
                self.expect(Expected::Level(column.to_owned()));
            }
            if !self.list_item() {
                return false;
            }
            self.expect(Expected::Sign(","));
            if !self.at(SyntaxKind::Comma) {
                return true;
            }
            self.bump();
        }
    }

    /// A name, a text or a number, possibly negative.
    fn list_item(&mut self) -> bool {
        match self.kind() {
            Some(SyntaxKind::Number) => self.literal(SyntaxKind::NumberLiteral),
            Some(SyntaxKind::String | SyntaxKind::LongString) => {
                self.open(SyntaxKind::TextLiteral);
                self.text_token();
                self.close();
                true
            }
            Some(SyntaxKind::Minus) => {
                self.open(SyntaxKind::Negation);
                self.bump();
                let found = self.at(SyntaxKind::Number);
                if found {
                    self.literal(SyntaxKind::NumberLiteral);
                } else {
                    self.missing("a number");
                }
                self.close();
                found
            }
            Some(kind) if kind.is_name() => {
                self.open(SyntaxKind::NameReference);
                self.name_token();
                self.close();
                true
            }
            _ => {
                self.missing("a level, a text or a number");
                false
            }
        }
    }

    fn operator_power(&self) -> Option<Power> {
        let token = self.peek(0)?;
        let text = token.span.of(self.text);
        let sign = if token.kind == SyntaxKind::Unknown { meant(text)? } else { text };
        if token.kind == SyntaxKind::QuotedName {
            return None;
        }
        Some(match sign {
            "or" => Power::Or,
            "and" => Power::And,
            "=" | "!=" | "<" | "<=" | ">" | ">=" => Power::Comparison,
            "+" | "-" => Power::Sum,
            "*" | "/" => Power::Product,
            "^" => Power::Exponent,
            _ => return None,
        })
    }

    fn operator(&mut self) {
        if self.at(SyntaxKind::Unknown) {
            self.foreign_sign();
        }
        if self.word_at(0, "and") || self.word_at(0, "or") {
            self.bump_as(SyntaxKind::Keyword);
        } else {
            self.bump();
        }
    }
}
