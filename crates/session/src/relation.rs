//! A table as the analyst defined it: rows of a file, less those not admitted, plus what was
//! derived, with levels put in order and spellings repaired.

use std::collections::BTreeMap;
use std::fmt;
use std::sync::{Arc, Mutex, PoisonError};

use tussock_data::frame::{Frame, Kind};
use tussock_language::ast::{Derive, Expression, Label, Levels};
use tussock_language::diagnostic::Diagnostic;
use tussock_language::model::Located;
use tussock_language::span::{Location, SourceId};

use crate::evaluate::vector::Vector;
use crate::evaluate::{Columns, Evaluator};
use crate::fingerprint::Fingerprint;
use crate::trouble::{Answerable, nearest, trouble};

/// A table, evaluated column by column as asked.
#[derive(Debug)]
pub(crate) struct Relation {
    /// Its name in the document.
    pub(crate) name: String,
    /// A hash of everything that it rests on.
    pub(crate) fingerprint: Fingerprint,
    /// Where its rows come from.
    pub(crate) base: Base,
    /// The columns derived for it.
    pub(crate) derived: Vec<Located<Derive>>,
    /// Orders of levels and repairs of spellings stated for it.
    pub(crate) levels: Vec<Located<Levels>>,
    /// Labels stated for it.
    pub(crate) labels: Vec<Located<Label>>,
    /// Columns that were evaluated.
    pub(crate) evaluated: Mutex<BTreeMap<String, Vector>>,
}

/// Where the rows of a table come from.
#[derive(Debug)]
pub(crate) enum Base {
    /// All rows of a file.
    File(Arc<Frame>),
    /// Some rows of another table.
    Part {
        /// The other table.
        parent: Arc<Relation>,
        /// Which of its rows.
        rows: Vec<usize>,
        /// The entry for the exclusion log.
        admission: Admission,
    },
}

/// An entry of the exclusion log.
#[derive(Clone, Debug, PartialEq)]
pub(crate) struct Admission {
    /// The reason that was given, or a word for a comparison's own condition.
    pub(crate) because: String,
    /// The condition as written.
    pub(crate) condition: String,
    /// How many rows were left out because the condition is false.
    pub(crate) excluded: usize,
    /// How many were left out because a missing value leaves the condition open.
    pub(crate) undecided: usize,
}

impl fmt::Display for Admission {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(out, "Kept: {} ({}", self.because, self.condition)?;
        match self.undecided {
            0 => write!(out, ")"),
            1 => write!(out, "; 1 row left open by a missing value)"),
            rows => write!(out, "; {rows} rows left open by missing values)"),
        }
    }
}

/// A condition, and what the exclusion log says of it.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Condition<'a> {
    /// The condition.
    pub(crate) expression: &'a Expression,
    /// The source that its spans refer to.
    pub(crate) source: SourceId,
    /// As written.
    pub(crate) text: &'a str,
    /// Why.
    pub(crate) because: &'a str,
}

impl Base {
    /// The rows of `parent` for which a condition holds.
    pub(crate) fn part(parent: Arc<Relation>, condition: Condition<'_>) -> Answerable<Self> {
        let evaluator = Evaluator { source: condition.source, columns: &*parent };
        let truths = evaluator.truths(condition.expression)?;
        let rows: Vec<usize> =
            (0..truths.len()).filter(|&row| truths.get(row) == Some(&Some(true))).collect();
        let undecided = truths.iter().filter(|truth| truth.is_none()).count();
        let admission = Admission {
            because: condition.because.to_owned(),
            condition: condition.text.split_whitespace().collect::<Vec<_>>().join(" "),
            excluded: truths.len() - rows.len() - undecided,
            undecided,
        };
        Ok(Self::Part { parent, rows, admission })
    }
}

impl Relation {
    /// The rows of `parent` for which a condition holds, as a table of the same name.
    pub(crate) fn selection(parent: &Arc<Relation>, condition: Condition<'_>) -> Answerable<Self> {
        let parts = [parent.fingerprint.bytes(), b"where", condition.text.as_bytes()];
        Ok(Self {
            name: parent.name.clone(),
            fingerprint: Fingerprint::of(parts),
            base: Base::part(parent.clone(), condition)?,
            derived: Vec::new(),
            levels: Vec::new(),
            labels: Vec::new(),
            evaluated: Mutex::default(),
        })
    }

    /// The derivation of a column, where it was derived for this table.
    fn derivation(&self, column: &str) -> Option<&Located<Derive>> {
        self.derived.iter().find(|derive| derive.value.column.column.value == column)
    }

    /// What was said of a column's levels, for this table or one that it comes from.
    pub(crate) fn stated_levels(&self, column: &str) -> Option<(&Relation, &Located<Levels>)> {
        let here = self.levels.iter().find(|levels| levels.value.column.column.value == column);
        match (here, &self.base) {
            (Some(levels), _) => Some((self, levels)),
            (None, Base::Part { parent, .. }) => parent.stated_levels(column),
            (None, Base::File(_)) => None,
        }
    }

    /// The label of a column, for this table or one that it comes from.
    pub(crate) fn label(&self, column: &str) -> Option<&Label> {
        let here = self.labels.iter().find(|label| label.value.column.column.value == column);
        match (here, &self.base) {
            (Some(label), _) => Some(&label.value),
            (None, Base::Part { parent, .. }) => parent.label(column),
            (None, Base::File(_)) => None,
        }
    }

    /// Whether every value of a column that is not missing is a number; none for no such column.
    pub(crate) fn kind(&self, column: &str) -> Option<Kind> {
        if let Some(derive) = self.derivation(column) {
            let location = derive.location;
            return match self.column(column, location) {
                Ok(Vector::Number(_)) => Some(Kind::Number),
                Ok(Vector::Text(_) | Vector::Truth(_)) | Err(_) => Some(Kind::Text),
            };
        }
        match &self.base {
            Base::File(frame) => frame.kind(column),
            Base::Part { parent, .. } => parent.kind(column),
        }
    }

    /// A column as numbers, or why it is none.
    pub(crate) fn numbers(&self, column: &str, location: Location) -> Answerable<Arc<Vec<f64>>> {
        match self.derivation(column) {
            Some(_) => match self.column(column, location)? {
                Vector::Number(values) => Ok(values),
                other @ (Vector::Text(_) | Vector::Truth(_)) => {
                    let message = format!("`{column}` holds {}, not numbers", other.kind());
                    Err(trouble(Diagnostic::error("text-in-numeric-column", location, message)))
                }
            },
            None => match &self.base {
                Base::File(frame) => match frame.numbers(column) {
                    Ok(values) => Ok(Arc::new(values)),
                    Err(refusal) => Err(self.not_a_number(column, location, &refusal)),
                },
                Base::Part { parent, rows, .. } => {
                    let values = parent.numbers(column, location)?;
                    let value = |&row: &usize| values.get(row).copied().unwrap_or(f64::NAN);
                    Ok(Arc::new(rows.iter().map(value).collect()))
                }
            },
        }
    }

    fn not_a_number(
        &self,
        column: &str,
        location: Location,
        refusal: &tussock_data::frame::NotANumber,
    ) -> Box<Diagnostic> {
        if !self.has(column) {
            return self.unknown_column(column, location);
        }
        let found = Diagnostic::error("text-in-numeric-column", location, refusal.to_string());
        trouble(match refusal.help() {
            Some(help) => found.help(help),
            None => found,
        })
    }

    /// What is said of a column that does not exist.
    pub(crate) fn unknown_column(&self, column: &str, location: Location) -> Box<Diagnostic> {
        let names = self.names();
        let message = format!("`{}` has no column `{column}`", self.name);
        let found = Diagnostic::error("unknown-column", location, message);
        trouble(match nearest(column, names.iter().map(String::as_str)) {
            Some(near) => found
                .help(format!("did you mean `{near}`?"))
                .replace_by(format!("Change to `{near}`"), tussock_language::names::quoted(near)),
            None => {
                let shown: Vec<&str> = names.iter().map(String::as_str).take(12).collect();
                let more = if names.len() > shown.len() { ", ..." } else { "" };
                found.help(format!("it has {}{more}", shown.join(", ")))
            }
        })
    }

    fn evaluate(&self, column: &str, location: Location) -> Answerable<Vector> {
        if let Some(derive) = self.derivation(column) {
            let evaluator = Evaluator { source: derive.location.source, columns: self };
            return evaluator.evaluate(&derive.value.expression);
        }
        match self.kind(column) {
            Some(Kind::Number) => Ok(Vector::Number(self.numbers(column, location)?)),
            Some(Kind::Text) => self.texts(column, location),
            None => Err(self.unknown_column(column, location)),
        }
    }

    /// Texts as they stand in the file or were derived, before repairs stated for this table.
    fn raw_texts(&self, column: &str, location: Location) -> Answerable<Vec<Option<String>>> {
        if self.derivation(column).is_some() {
            return match self.column(column, location)? {
                Vector::Text(texts) => Ok(texts.to_vec()),
                Vector::Number(values) => Ok(values.iter().map(|&x| number_text(x)).collect()),
                Vector::Truth(values) => {
                    let word = |value: bool| if value { "yes" } else { "no" };
                    Ok(values.iter().map(|v| v.map(|v| word(v).to_owned())).collect())
                }
            };
        }
        match &self.base {
            Base::File(frame) => {
                frame.texts(column).ok_or_else(|| self.unknown_column(column, location))
            }
            Base::Part { parent, rows, .. } => match parent.texts(column, location)?.select(rows) {
                Vector::Text(texts) => Ok(texts.to_vec()),
                Vector::Number(_) | Vector::Truth(_) => Ok(Vec::new()),
            },
        }
    }
}

impl Columns for Relation {
    fn rows(&self) -> usize {
        match &self.base {
            Base::File(frame) => frame.rows(),
            Base::Part { rows, .. } => rows.len(),
        }
    }

    fn has(&self, name: &str) -> bool {
        self.derivation(name).is_some()
            || match &self.base {
                Base::File(frame) => frame.kind(name).is_some(),
                Base::Part { parent, .. } => parent.has(name),
            }
    }

    fn column(&self, name: &str, location: Location) -> Answerable<Vector> {
        let kept = self.evaluated.lock().unwrap_or_else(PoisonError::into_inner).get(name).cloned();
        if let Some(vector) = kept {
            return Ok(vector);
        }
        let vector = self.evaluate(name, location)?;
        let mut evaluated = self.evaluated.lock().unwrap_or_else(PoisonError::into_inner);
        evaluated.insert(name.to_owned(), vector.clone());
        Ok(vector)
    }

    fn texts(&self, name: &str, location: Location) -> Answerable<Vector> {
        let mut texts = self.raw_texts(name, location)?;
        let stated = self.levels.iter().find(|one| one.value.column.column.value == name);
        for merging in stated.iter().flat_map(|levels| &levels.value.merging) {
            for text in texts.iter_mut().flatten() {
                if merging.spellings.iter().any(|spelling| spelling.value == *text) {
                    text.clone_from(&merging.level.value);
                }
            }
        }
        Ok(Vector::text(texts))
    }

    fn names(&self) -> Vec<String> {
        let mut names = match &self.base {
            Base::File(frame) => frame.names(),
            Base::Part { parent, .. } => parent.names(),
        };
        names.extend(self.derived.iter().map(|derive| derive.value.column.column.value.clone()));
        names
    }
}

fn number_text(value: f64) -> Option<String> {
    (!value.is_nan()).then(|| value.to_string())
}
