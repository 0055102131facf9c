//! The model of a document: what it defines and what it asks.
//!
//! Definitions are declarative: their order in the text does not matter. Each name has one meaning
//! here, the one that counts; what was defined twice is in the diagnostics.

mod cycles;
mod definitions;

use std::collections::{BTreeMap, BTreeSet};

use crate::ast::{
    Admit, Allowance, Compare, Derive, Label, Levels, LiveValue, Pin, Policy, Read, Settings, Show,
    Statement, StatementKind, Write,
};
use crate::diagnostic::{Diagnostic, Edit, Fix, Severity};
use crate::document::{Document, Region, RegionKind};
use crate::prose::{Prose, live_values};
use crate::span::{Location, SourceId};
use crate::syntax::{Parse, SyntaxError, parse};

/// What a second definition of a name means.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Redefinition {
    /// An error that names both places, as in a script or a file. The first counts.
    Error,
    /// Across sources the later one counts, silently, as when cells are run one after the other.
    /// Within one source it is an error all the same.
    NewestWins,
}

/// Something and where it was written.
#[derive(Clone, Debug, PartialEq)]
pub struct Located<T> {
    /// What was written.
    pub value: T,
    /// The whole statement, or the whole live value.
    pub location: Location,
}

/// What a document defines and asks.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Model {
    /// Every region of the document and what was read from it, in reading order.
    pub regions: Vec<ModelRegion>,
    /// Every statement, in reading order, those included that another one replaces.
    pub statements: Vec<Located<Statement>>,
    /// The tables, by name.
    pub tables: BTreeMap<String, TableDefinition>,
    /// The comparisons, by name.
    pub comparisons: BTreeMap<String, Located<Compare>>,
    /// The policy, where the document states one.
    pub policy: Option<Located<Policy>>,
    /// What is asked, in reading order.
    pub questions: Vec<Question>,
    /// Names of tables and comparisons whose definition has a syntax error: they are no unknown
    /// names, and nothing can be said about them.
    pub broken: BTreeSet<String>,
    /// What is wrong with the text and the definitions; [`crate::rules::diagnose`] finds more.
    pub diagnostics: Vec<Diagnostic>,
}

/// A region of a source and what was read from it.
#[derive(Clone, Debug, PartialEq)]
pub struct ModelRegion {
    /// The source.
    pub source: SourceId,
    /// The region in it.
    pub region: Region,
    /// What it says.
    pub content: Content,
}

/// What a region says.
#[derive(Clone, Debug, PartialEq)]
pub enum Content {
    /// Statements.
    Code(Parse),
    /// Prose with live values.
    Prose(Prose),
}

/// A table and everything that is said about its columns.
#[derive(Clone, Debug, PartialEq)]
pub struct TableDefinition {
    /// Where its rows come from.
    pub base: Located<TableBase>,
    /// Its derived columns, in reading order.
    pub derived: Vec<Located<Derive>>,
    /// Orders and repairs of levels, one for each column at most.
    pub levels: Vec<Located<Levels>>,
    /// Labels, one for each column at most.
    pub labels: Vec<Located<Label>>,
}

/// Where a table's rows come from.
#[derive(Clone, Debug, PartialEq)]
pub enum TableBase {
    /// A file or a built-in sample.
    Read(Read),
    /// The eligible rows of another table.
    Admit(Admit),
}

/// Something that is asked.
#[derive(Clone, Debug, PartialEq)]
pub struct Question {
    /// What.
    pub kind: QuestionKind,
    /// Where: the whole statement, or the whole live value.
    pub location: Location,
}

/// What is asked.
#[derive(Clone, Debug, PartialEq)]
#[expect(clippy::large_enum_variant, reason = "a document asks few questions")]
pub enum QuestionKind {
    /// A table.
    Show(Show),
    /// A paragraph.
    Write(Write),
    /// Whether a value still holds.
    Pin(Pin),
    /// A live value in the prose around the code.
    ProseValue(LiveValue),
}

impl Model {
    /// Reads a document.
    #[must_use]
    pub fn new(document: &Document, redefinition: Redefinition) -> Self {
        let mut model = Self::default();
        for (index, source) in document.sources.iter().enumerate() {
            for region in &source.regions {
                model.read(SourceId(index), &source.text, *region);
            }
        }
        definitions::resolve(&mut model, redefinition);
        cycles::report(&mut model);
        model
    }

    fn read(&mut self, source: SourceId, text: &str, region: Region) {
        let content = match region.kind {
            RegionKind::Code => {
                let parse = parse(text, region.span);
                self.add_statements(source, &parse);
                Content::Code(parse)
            }
            RegionKind::Prose => {
                let prose = live_values(text, region.span);
                self.questions.extend(prose.values.iter().map(|value| Question {
                    kind: QuestionKind::ProseValue(value.clone()),
                    location: Location { source, span: value.span },
                }));
                self.add_errors(source, &prose.errors);
                Content::Prose(prose)
            }
        };
        self.regions.push(ModelRegion { source, region, content });
    }

    fn add_statements(&mut self, source: SourceId, parse: &Parse) {
        self.add_errors(source, &parse.errors);
        for statement in &parse.statements {
            let location = Location { source, span: statement.span };
            let asked = match &statement.kind {
                StatementKind::Show(show) => Some(QuestionKind::Show(show.clone())),
                StatementKind::Write(write) => Some(QuestionKind::Write(write.clone())),
                StatementKind::Pin(pin) => Some(QuestionKind::Pin(pin.clone())),
                StatementKind::Broken { defines } => {
                    self.broken.extend(defines.iter().map(|name| name.value.clone()));
                    None
                }
                StatementKind::Read(_)
                | StatementKind::Admit(_)
                | StatementKind::Derive(_)
                | StatementKind::Levels(_)
                | StatementKind::Label(_)
                | StatementKind::Policy(_)
                | StatementKind::Compare(_) => None,
            };
            self.questions.extend(asked.map(|kind| Question { kind, location }));
            self.statements.push(Located { value: statement.clone(), location });
        }
    }

    fn add_errors(&mut self, source: SourceId, errors: &[SyntaxError]) {
        self.diagnostics.extend(errors.iter().map(|error| from_syntax(source, error)));
    }

    /// The policy's settings; all unset where the document states no policy.
    #[must_use]
    pub fn settings(&self) -> Settings {
        self.policy.as_ref().map(|policy| policy.value.settings.clone()).unwrap_or_default()
    }

    /// The allowance of a rule for the statement at a place, where there is one.
    #[must_use]
    pub fn allowance(&self, rule: &str, place: Location) -> Option<&Allowance> {
        self.statements
            .iter()
            .filter(|statement| holds(statement.location, place))
            .flat_map(|statement| &statement.value.allowed)
            .find(|allowance| allowance.rule.value == rule)
    }

    /// The diagnostics without the warnings and notes that the text allows. Errors stay.
    #[must_use]
    pub fn without_allowed(&self, diagnostics: Vec<Diagnostic>) -> Vec<Diagnostic> {
        let stays = |diagnostic: &Diagnostic| {
            diagnostic.severity == Severity::Error
                || self.allowance(diagnostic.rule, diagnostic.location).is_none()
        };
        diagnostics.into_iter().filter(stays).collect()
    }
}

fn holds(outer: Location, inner: Location) -> bool {
    outer.source == inner.source
        && outer.span.start <= inner.span.start
        && inner.span.end <= outer.span.end
}

fn from_syntax(source: SourceId, error: &SyntaxError) -> Diagnostic {
    let location = Location { source, span: error.span };
    let mut diagnostic = Diagnostic::error(error.rule, location, error.message.clone());
    diagnostic.help.clone_from(&error.help);
    diagnostic.fix = error.fix.as_ref().map(|fix| {
        let location = Location { source, span: fix.span };
        Fix { title: fix.title.clone(), edits: vec![Edit { location, text: fix.text.clone() }] }
    });
    diagnostic
}
