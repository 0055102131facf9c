//! The verbs. Each is one file that declares its grammar, its lowering and its page; the parser,
//! completion, hints and error messages all read that one declaration.

mod admit;
mod compare;
mod derive;
mod label;
mod levels;
mod pin;
mod policy;
mod read;
mod settings;
mod show;
mod write;

use crate::ast::StatementKind;
use crate::facts::Page;
use crate::lower::Lowering;
use crate::syntax::SyntaxKind;

/// Every verb, in the order in which a document uses them.
pub static VERBS: &[&Verb] = &[
    &policy::POLICY,
    &read::READ,
    &admit::ADMIT,
    &derive::DERIVE,
    &levels::LEVELS,
    &label::LABEL,
    &compare::COMPARE,
    &show::SHOW,
    &write::WRITE,
    &pin::PIN,
];

/// The verb of a name.
#[must_use]
pub fn find(name: &str) -> Option<&'static Verb> {
    VERBS.iter().copied().find(|verb| verb.name() == name)
}

/// A verb: what a statement that starts with it may say.
#[derive(Debug)]
pub struct Verb {
    /// Its page in the manual, under its name.
    pub page: Page,
    /// What follows the verb, in this order.
    pub head: &'static [Part],
    /// What follows the head, in any order, each at most once unless it may be repeated.
    pub clauses: &'static [Clause],
    /// Makes the typed form of a statement without syntax errors.
    pub(crate) lower: fn(&mut Lowering<'_>) -> Option<StatementKind>,
}

/// A clause: its words and what follows them.
#[derive(Debug, PartialEq)]
pub struct Clause {
    /// `["across"]`, `["scores", "alpha"]`
    pub words: &'static [&'static str],
    /// One line for completion and hover.
    pub summary: &'static str,
    /// What follows the words, in this order.
    pub parts: &'static [Part],
    /// How often it stands in a statement.
    pub presence: Presence,
}

/// How often a clause stands in a statement.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Presence {
    /// Exactly once.
    Required,
    /// At most once.
    Optional,
    /// As often as one likes.
    Repeatable,
}

/// A part of a head or of a clause.
#[derive(Debug, PartialEq)]
pub enum Part {
    /// Something to fill in.
    Slot(Slot),
    /// A fixed word.
    Word(&'static str),
    /// A fixed sign.
    Sign(SyntaxKind, &'static str),
    /// One of several sequences, told apart by the first token.
    Either(&'static [&'static [Part]]),
}

/// Something to fill in.
#[derive(Debug, PartialEq)]
pub struct Slot {
    /// What it is for, with its article: `"an outcome"`.
    pub noun: &'static str,
    /// What may stand there.
    pub what: What,
    /// Whether it is one or several, and whether it may be left out.
    pub count: Count,
}

/// How many things fill a slot.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Count {
    /// One.
    One,
    /// One or more, with commas between them.
    Many,
    /// None or more, with commas between them.
    Any,
}

/// What may stand in a slot.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum What {
    /// The name of a table that is defined elsewhere.
    Table,
    /// The name that a table gets here.
    NewTable,
    /// A built-in sample.
    Sample,
    /// The name of a comparison that is defined elsewhere.
    Comparison,
    /// The name that a comparison gets here.
    NewComparison,
    /// A view of a comparison.
    View,
    /// A column of the statement's table.
    Column,
    /// A column of the statement's table, or a range of them such as `q1..q9`.
    Columns,
    /// `table.column`, a column that exists.
    ColumnPath,
    /// `table.column`, a column that is defined here.
    NewColumnPath,
    /// A level of the statement's column.
    Level,
    /// A term of the comparison's design.
    Term,
    /// The path of a live value.
    Path,
    /// A number.
    Number,
    /// A text in quotes.
    Text,
    /// A text in quotes, or a number.
    TextOrNumber,
    /// The path of a data file, in quotes.
    File,
    /// An expression over the columns of the statement's table.
    Expression,
    /// One of a few words.
    OneOf(&'static [Choice]),
}

/// One of a few words that a slot takes.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Choice {
    /// The word.
    pub word: &'static str,
    /// One line for completion and hover.
    pub summary: &'static str,
}

impl Verb {
    /// The word.
    #[must_use]
    pub fn name(&self) -> &'static str {
        self.page.name
    }

    /// The clause that starts with these words.
    #[must_use]
    pub fn clause(&self, words: &[&str]) -> Option<&'static Clause> {
        self.clauses.iter().find(|clause| clause.words == words)
    }

    /// The whole form: `compare OUTCOME, ... across FACTOR in TABLE [where CONDITION] as NAME`.
    #[must_use]
    pub fn usage(&self) -> String {
        let mut usage = vec![self.name().to_owned()];
        usage.extend(self.head.iter().map(Part::usage));
        usage.extend(self.clauses.iter().map(|clause| match clause.presence {
            Presence::Required => clause.usage(),
            Presence::Optional => format!("[{}]", clause.usage()),
            Presence::Repeatable => format!("[{}] ...", clause.usage()),
        }));
        usage.join(" ")
    }
}

impl Clause {
    /// Its words with blanks between them.
    #[must_use]
    pub fn name(&self) -> String {
        self.words.join(" ")
    }

    /// Its form: `across FACTOR`.
    #[must_use]
    pub fn usage(&self) -> String {
        let words = self.words.iter().map(|word| (*word).to_owned());
        words.chain(self.parts.iter().map(Part::usage)).collect::<Vec<_>>().join(" ")
    }
}

impl Part {
    /// Its form, as [`Verb::usage`] shows it.
    #[must_use]
    pub fn usage(&self) -> String {
        match self {
            Self::Slot(slot) => slot.usage(),
            Self::Word(word) => (*word).to_owned(),
            Self::Sign(_, sign) => (*sign).to_owned(),
            Self::Either(alternatives) => {
                let alternatives: Vec<String> = alternatives
                    .iter()
                    .map(|parts| parts.iter().map(Part::usage).collect::<Vec<_>>().join(" "))
                    .collect();
                alternatives.join(" | ")
            }
        }
    }
}

impl Slot {
    /// The noun without its article.
    #[must_use]
    pub fn bare_noun(&self) -> &'static str {
        self.noun.split_once(' ').map_or(self.noun, |(_, noun)| noun)
    }

    #[expect(clippy::wildcard_enum_match_arm, reason = "the noun says what any other thing is")]
    fn usage(&self) -> String {
        let one = match self.what {
            What::OneOf(choices) => {
                choices.iter().map(|choice| choice.word).collect::<Vec<_>>().join("|")
            }
            What::Text | What::File => format!("\"{}\"", self.bare_noun()),
            What::ColumnPath | What::NewColumnPath => "TABLE.COLUMN".to_owned(),
            _ => self.bare_noun().to_uppercase(),
        };
        match self.count {
            Count::One => one,
            Count::Many => format!("{one}, ..."),
            Count::Any => format!("[{one}, ...]"),
        }
    }
}

/// Shorthand for the declarations in this folder.
const fn one(noun: &'static str, what: What) -> Part {
    Part::Slot(Slot { noun, what, count: Count::One })
}

/// Shorthand for the declarations in this folder.
const fn many(noun: &'static str, what: What) -> Part {
    Part::Slot(Slot { noun, what, count: Count::Many })
}
