//! The typed form of a document's statements. Each statement that the parser understood whole
//! becomes one variant; a statement with a syntax error becomes [`StatementKind::Broken`].

use crate::span::{Name, Span, Spanned};

/// One statement and where it stands in its source.
#[derive(Clone, Debug, PartialEq)]
pub struct Statement {
    /// From the verb to the end of the last token that is not trivia.
    pub span: Span,
    /// What it says.
    pub kind: StatementKind,
    /// Rules silenced by `# allow RULE: reason` comments directly above.
    pub allowed: Vec<Allowance>,
}

/// `# allow RULE: reason`.
#[derive(Clone, Debug, PartialEq)]
pub struct Allowance {
    /// The rule's name.
    pub rule: Name,
    /// The reason that was given.
    pub reason: String,
}

/// What a statement says, by verb.
#[derive(Clone, Debug, PartialEq)]
pub enum StatementKind {
    /// `read ...`
    Read(Read),
    /// `admit ...`
    Admit(Admit),
    /// `derive ...`
    Derive(Derive),
    /// `levels ...`
    Levels(Levels),
    /// `label ...`
    Label(Label),
    /// `policy ...`
    Policy(Policy),
    /// `compare ...`
    Compare(Compare),
    /// `show ...`
    Show(Show),
    /// `write ...`
    Write(Write),
    /// `pin ...`
    Pin(Pin),
    /// A statement with a syntax error; what it would define is known where it was legible, so
    /// that one mistake does not make every later mention of the name a second one.
    Broken {
        /// The name after `as`, where there is one.
        defines: Option<Name>,
    },
}

/// `read "crew.csv" as crew` or `read sample ferry as crew`.
#[derive(Clone, Debug, PartialEq)]
pub struct Read {
    /// A file or a built-in sample.
    pub source: ReadSource,
    /// The table's name.
    pub name: Name,
    /// `missing "NA", -9`: the texts that stand for a missing value, beside an empty cell.
    pub missing: Vec<Spanned<String>>,
    /// `separator ";"`
    pub separator: Option<Spanned<char>>,
    /// `decimal ","`
    pub decimal: Option<Spanned<char>>,
    /// `encoding "latin1"`
    pub encoding: Option<Spanned<String>>,
}

/// Where a table comes from.
#[derive(Clone, Debug, PartialEq)]
pub enum ReadSource {
    /// A path, relative to the document's folder.
    File(Spanned<String>),
    /// A table built into the program.
    Sample(Name),
}

/// `admit crew where age >= 18 as adults because "protocol 3.2"`.
#[derive(Clone, Debug, PartialEq)]
pub struct Admit {
    /// The table that rows come from.
    pub parent: Name,
    /// Which rows are eligible.
    pub condition: Expression,
    /// The new table's name.
    pub name: Name,
    /// The reason, for the exclusion log.
    pub because: Spanned<String>,
}

/// `derive crew.gain = post - pre`.
#[derive(Clone, Debug, PartialEq)]
pub struct Derive {
    /// The column that is defined.
    pub column: ColumnPath,
    /// Its value in each row.
    pub expression: Expression,
}

/// `levels crew.roster fixed, forward merging "fxd", "Fixed " into fixed`.
#[derive(Clone, Debug, PartialEq)]
pub struct Levels {
    /// The factor.
    pub column: ColumnPath,
    /// The order of its levels, the reference first; may be empty when only merging.
    pub order: Vec<Name>,
    /// Repairs of spellings.
    pub merging: Vec<Merging>,
}

/// `merging "fxd", "Fixed " into fixed`.
#[derive(Clone, Debug, PartialEq)]
pub struct Merging {
    /// Spellings as they stand in the file.
    pub spellings: Vec<Spanned<String>>,
    /// The level that they mean.
    pub level: Name,
}

/// `label crew.lapses "Attention lapses" unit "per 10 min" better low`.
#[derive(Clone, Debug, PartialEq)]
pub struct Label {
    /// The column.
    pub column: ColumnPath,
    /// What tables print.
    pub text: Spanned<String>,
    /// `unit "..."`
    pub unit: Option<Spanned<String>>,
    /// `better low` or `better high`
    pub better: Option<Spanned<Better>>,
}

/// Which end of an outcome is the good one.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Better {
    /// Higher values are better.
    High,
    /// Lower values are better.
    Low,
}

/// `policy alpha .05 interval 95% ...`.
#[derive(Clone, Debug, PartialEq)]
pub struct Policy {
    /// The settings that it states.
    pub settings: Settings,
}

/// Settings of the error-rate policy; every statement may override the document's.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Settings {
    /// `alpha .05`
    pub alpha: Option<Spanned<f64>>,
    /// `interval 95%`, as a share of 1
    pub interval: Option<Spanned<f64>>,
    /// `pairs holm`
    pub pairs: Option<Spanned<Adjustment>>,
    /// `scores alpha .001`
    pub scores_alpha: Option<Spanned<f64>>,
    /// `effect g`
    pub effect: Option<Spanned<Effect>>,
    /// `missing listwise`
    pub missing: Option<Spanned<MissingRule>>,
}

/// How p values of pairwise differences are adjusted.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Adjustment {
    /// None.
    Unadjusted,
    /// Bonferroni.
    Bonferroni,
    /// Holm (1979).
    Holm,
}

/// Which standardized difference is printed.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Effect {
    /// Cohen's d.
    D,
    /// Hedges' g.
    G,
}

/// What happens to rows with a missing value.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum MissingRule {
    /// A row with any missing value among the comparison's columns is left out.
    Listwise,
}

/// `compare alertness, mood across roster in crew where age > 20 as main`.
#[derive(Clone, Debug, PartialEq)]
pub struct Compare {
    /// The outcomes.
    pub outcomes: Vec<ColumnSelection>,
    /// The factors that form the groups; one for now.
    pub factors: Vec<Name>,
    /// The table.
    pub table: Name,
    /// `where ...`
    pub condition: Option<Expression>,
    /// The comparison's name.
    pub name: Name,
}

/// One column, or every column with a stem and a number in a range.
#[derive(Clone, Debug, PartialEq)]
pub enum ColumnSelection {
    /// `mood`
    One(Name),
    /// `q1..q9`
    Range {
        /// `q1`
        first: Name,
        /// `q9`
        last: Name,
    },
}

/// `show omnibus of main for roster alpha .01`.
#[derive(Clone, Debug, PartialEq)]
pub struct Show {
    /// The view.
    pub view: Name,
    /// The comparison.
    pub comparison: Name,
    /// `for roster`: one term of the design.
    pub term: Option<Name>,
    /// `coefficients structure`: one kind of coefficient.
    pub coefficients: Option<Name>,
    /// Settings that override the policy here.
    pub settings: Settings,
}

/// `write "..."`.
#[derive(Clone, Debug, PartialEq)]
pub struct Write {
    /// Text and live values in order.
    pub parts: Vec<ProsePart>,
}

/// A piece of prose.
#[derive(Clone, Debug, PartialEq)]
pub enum ProsePart {
    /// As it stands.
    Text(String),
    /// `{{main.omnibus.pillai.value 3}}`
    Value(LiveValue),
}

/// A live value in prose.
#[derive(Clone, Debug, PartialEq)]
pub struct LiveValue {
    /// Which value.
    pub path: Path,
    /// How many decimals were asked for.
    pub decimals: Option<usize>,
    /// From `{{` to `}}`.
    pub span: Span,
}

/// `pin main.omnibus.pillai.value at .381 within .001`.
#[derive(Clone, Debug, PartialEq)]
pub struct Pin {
    /// Which value.
    pub path: Path,
    /// What it must be.
    pub value: Spanned<f64>,
    /// How far it may be off; none means half a unit of the last digit that was written.
    pub within: Option<Spanned<f64>>,
    /// Half a unit of the last digit of `value` as written.
    pub rounding: f64,
}

/// `table.column`.
#[derive(Clone, Debug, PartialEq)]
pub struct ColumnPath {
    /// The table.
    pub table: Name,
    /// The column.
    pub column: Name,
}

/// `main.omnibus.roster.pillai.value`: segments between dots, back-quotes removed.
#[derive(Clone, Debug, PartialEq)]
pub struct Path {
    /// At least one.
    pub segments: Vec<Name>,
    /// The whole path.
    pub span: Span,
}

/// An expression over the columns of one table.
#[derive(Clone, Debug, PartialEq)]
pub struct Expression {
    /// Where.
    pub span: Span,
    /// What.
    pub kind: ExpressionKind,
}

impl Expression {
    /// The expressions directly in it, from left to right.
    #[must_use]
    pub fn operands(&self) -> Vec<&Self> {
        match &self.kind {
            ExpressionKind::Number(_) | ExpressionKind::Text(_) | ExpressionKind::Name(_) => {
                Vec::new()
            }
            ExpressionKind::Negate(operand) | ExpressionKind::Not(operand) => vec![operand],
            ExpressionKind::Binary { left, right, .. } => vec![left, right],
            ExpressionKind::If { condition, then, otherwise } => vec![condition, then, otherwise],
            ExpressionKind::In { value, list, .. } => {
                std::iter::once(value.as_ref()).chain(list).collect()
            }
            ExpressionKind::Call { arguments, .. } => arguments.iter().collect(),
        }
    }

    /// The name that it is, where it is a name and nothing else.
    #[must_use]
    pub fn name(&self) -> Option<&str> {
        if let ExpressionKind::Name(name) = &self.kind { Some(name) } else { None }
    }

    /// The text in quotation marks that it is, where it is nothing else.
    #[must_use]
    pub fn text(&self) -> Option<&str> {
        if let ExpressionKind::Text(text) = &self.kind { Some(text) } else { None }
    }

    /// It and every expression in it, from the outside in and from left to right.
    #[must_use]
    pub fn parts(&self) -> Vec<&Self> {
        let mut parts = vec![self];
        for operand in self.operands() {
            parts.extend(operand.parts());
        }
        parts
    }
}

/// The forms of an expression.
#[derive(Clone, Debug, PartialEq)]
pub enum ExpressionKind {
    /// `12`, `.05`, `95%`
    Number(f64),
    /// `"north"`
    Text(String),
    /// A column, or a level of the column that it is compared with.
    Name(String),
    /// `-a`
    Negate(Box<Expression>),
    /// `not a`
    Not(Box<Expression>),
    /// `a + b` and the like
    Binary {
        /// Left side.
        left: Box<Expression>,
        /// Operator.
        operator: Operator,
        /// Right side.
        right: Box<Expression>,
    },
    /// `if a then b else c`
    If {
        /// `a`
        condition: Box<Expression>,
        /// `b`
        then: Box<Expression>,
        /// `c`
        otherwise: Box<Expression>,
    },
    /// `site in [north, "east 2", 3]`, `site not in [...]`
    In {
        /// What is looked for.
        value: Box<Expression>,
        /// Among what: names, texts, numbers.
        list: Vec<Expression>,
        /// Whether `not in` was written.
        negated: bool,
    },
    /// `log(a)`
    Call {
        /// The function.
        function: Name,
        /// Its arguments.
        arguments: Vec<Expression>,
    },
}

/// Binary operators.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Operator {
    /// `+`
    Add,
    /// `-`
    Subtract,
    /// `*`
    Multiply,
    /// `/`
    Divide,
    /// `^`
    Power,
    /// `=`
    Equal,
    /// `!=`
    Unequal,
    /// `<`
    Less,
    /// `<=`
    LessOrEqual,
    /// `>`
    Greater,
    /// `>=`
    GreaterOrEqual,
    /// `and`
    And,
    /// `or`
    Or,
}
