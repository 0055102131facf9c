//! One document being answered: names to tables, tables to comparisons, comparisons to views. Each
//! step is kept by the content that it rests on.

use std::collections::BTreeMap;
use std::sync::{Arc, Mutex};

use tussock_data::frame::Frame;
use tussock_data::read::{ReadError, ReadOptions};
use tussock_data::samples;
use tussock_language::ast::{Compare, Read, ReadSource, Settings};
use tussock_language::diagnostic::Diagnostic;
use tussock_language::document::Document;
use tussock_language::model::{Located, Model, TableBase, TableDefinition};
use tussock_language::span::{Location, Span};

use crate::comparison::Comparison;
use crate::fingerprint::Fingerprint;
use crate::policy::Policy;
use crate::relation::{Base, Condition, Relation};
use crate::session::Session;
use crate::study::Study;
use crate::trouble::{Answerable, nearest, trouble};
use crate::views::{self, Request, Shown, View};

/// A document, its model, and the session that keeps what it rests on.
#[derive(Debug)]
pub(crate) struct Context<'a> {
    /// The session.
    pub(crate) session: &'a Session,
    /// The document.
    pub(crate) document: &'a Document,
    /// What its text means.
    pub(crate) model: Model,
    /// Its policy.
    pub(crate) policy: Policy,
    /// Tables that were looked up, so that a file is looked at once in an answer.
    relations: Mutex<BTreeMap<String, Answerable<Arc<Relation>>>>,
}

impl<'a> Context<'a> {
    /// A context for a document.
    pub(crate) fn new(session: &'a Session, document: &'a Document, model: Model) -> Self {
        let default = Settings::default();
        let stated = model.policy.as_ref().map_or(&default, |policy| &policy.value.settings);
        let policy = Policy::default().with(stated);
        Self { session, document, model, policy, relations: Mutex::default() }
    }

    /// The table of a name. `asked` is where the name was used.
    pub(crate) fn relation(&self, name: &str, asked: Location) -> Answerable<Arc<Relation>> {
        let lock = || self.relations.lock().unwrap_or_else(std::sync::PoisonError::into_inner);
        if let Some(known) = lock().get(name) {
            return known.clone();
        }
        let Some(definition) = self.model.tables.get(name) else {
            return Err(self.unknown("table", name, self.model.tables.keys(), asked));
        };
        let found = self.build(name, definition);
        lock().insert(name.to_owned(), found.clone());
        found
    }

    fn build(&self, name: &str, definition: &TableDefinition) -> Answerable<Arc<Relation>> {
        let source = definition.base.location.source;
        let own = self.stated(definition);
        match &definition.base.value {
            TableBase::Read(read) => {
                let (frame, content) = self.frame(read, definition.base.location)?;
                let parts = [name.as_bytes(), content.bytes(), own.as_bytes()];
                let key = Fingerprint::of(parts);
                self.session.relations.get_or_make(key, || {
                    Ok(Arc::new(relation(name, key, Base::File(frame), definition)))
                })
            }
            TableBase::Admit(admit) => {
                let location = Location { source, span: admit.parent.span };
                let parent = self.relation(&admit.parent.value, location)?;
                let text = self.written(definition.base.location);
                let parts =
                    [name.as_bytes(), parent.fingerprint.bytes(), text.as_bytes(), own.as_bytes()];
                let key = Fingerprint::of(parts);
                self.session.relations.get_or_make(key, || {
                    let condition = Condition {
                        expression: &admit.condition,
                        source,
                        text: self.written(Location { source, span: admit.condition.span }),
                        because: &admit.because.value,
                    };
                    let base = Base::part(parent, condition)?;
                    Ok(Arc::new(relation(name, key, base, definition)))
                })
            }
        }
    }

    /// The data that a `read` means, and a hash of it.
    fn frame(&self, read: &Read, location: Location) -> Answerable<(Arc<Frame>, Fingerprint)> {
        let at = |span: Span| Location { source: location.source, span };
        let options = ReadOptions {
            separator: read.separator.as_ref().map(|set| set.value),
            decimal: read.decimal.as_ref().map(|set| set.value),
            missing: read.missing.iter().map(|text| text.value.clone()).collect(),
            encoding: read.encoding.as_ref().map(|set| set.value.clone()),
        };
        match &read.source {
            ReadSource::Sample(name) => {
                let Some(sample) = samples::sample(&name.value) else {
                    let names = samples::samples().iter().map(|sample| sample.name.to_owned());
                    let names: Vec<String> = names.collect();
                    return Err(self.unknown("sample", &name.value, names.iter(), at(name.span)));
                };
                let bytes = sample.text.as_bytes();
                self.session
                    .frame_of_bytes(bytes, &options)
                    .map_err(|error| read_trouble(&error, at(name.span)))
            }
            ReadSource::File(path) => self
                .session
                .frame_of_file(&path.value, &options)
                .map_err(|error| read_trouble(&error, at(path.span))),
        }
    }

    /// The study of a comparison.
    pub(crate) fn study(&self, name: &str, asked: Location) -> Answerable<Arc<Study>> {
        let Some(statement) = self.model.comparisons.get(name) else {
            return Err(self.unknown("comparison", name, self.model.comparisons.keys(), asked));
        };
        let compare = &statement.value;
        let source = statement.location.source;
        let table = Location { source, span: compare.table.span };
        let relation = self.relation(&compare.table.value, table)?;
        let text = self.written(statement.location);
        let place = place_key(statement);
        let parts = [relation.fingerprint.bytes(), text.as_bytes(), place.as_bytes()];
        let key = Fingerprint::of(parts);
        self.session.studies.get_or_make(key, || {
            let condition = compare
                .condition
                .as_ref()
                .map_or("", |condition| self.written(Location { source, span: condition.span }));
            let comparison = Comparison::gather(statement, &relation, condition)?;
            Ok(Arc::new(Study::new(comparison, key)))
        })
    }

    /// What a view shows of a comparison.
    pub(crate) fn shown(
        &self,
        comparison: &str,
        view: &dyn View,
        request: &Request,
        asked: Location,
    ) -> Answerable<Arc<Shown>> {
        let study = self.study(comparison, asked)?;
        let asked_for = format!("{request:?}");
        let parts = [study.fingerprint.bytes(), view.page().name.as_bytes(), asked_for.as_bytes()];
        self.session
            .shown
            .get_or_make(Fingerprint::of(parts), || view.show(&study, request).map(Arc::new))
    }

    /// The request of a statement without settings of its own.
    pub(crate) fn request(&self) -> Request {
        Request { policy: self.policy, coefficients: None }
    }

    /// The text of a place.
    pub(crate) fn written(&self, location: Location) -> &str {
        location.span.of(self.document.text(location.source))
    }

    /// Everything that was stated of a table beside its base.
    fn stated(&self, definition: &TableDefinition) -> String {
        let derived = definition.derived.iter().map(|one| one.location);
        let levels = definition.levels.iter().map(|one| one.location);
        let labels = definition.labels.iter().map(|one| one.location);
        let all = derived.chain(levels).chain(labels);
        // Diagnostics of a cached table point into its statements, so where they stand counts too.
        all.map(|at| format!("{}:{}:{}\n", at.source.0, at.span.start, self.written(at))).collect()
    }

    /// What is said of a name that nothing defines.
    pub(crate) fn unknown<'n>(
        &self,
        kind: &str,
        name: &str,
        known: impl Iterator<Item = &'n String> + Clone,
        location: Location,
    ) -> Box<Diagnostic> {
        let rule = match kind {
            "table" => "unknown-table",
            "comparison" => "unknown-comparison",
            _ => "unknown-sample",
        };
        let found = Diagnostic::error(rule, location, format!("there is no {kind} `{name}`"));
        let names: Vec<&str> = known.map(String::as_str).collect();
        trouble(match (nearest(name, names.iter().copied()), kind) {
            (Some(near), _) => found.help(format!("did you mean `{near}`?")),
            (None, "table") => found.help("define it with `read` or `admit`"),
            (None, "comparison") => found.help("define it with `compare`"),
            (None, _) => found.help(format!("there are {}", names.join(", "))),
        })
    }
}

fn relation(
    name: &str,
    fingerprint: Fingerprint,
    base: Base,
    definition: &TableDefinition,
) -> Relation {
    Relation {
        name: name.to_owned(),
        fingerprint,
        base,
        derived: definition.derived.clone(),
        levels: definition.levels.clone(),
        labels: definition.labels.clone(),
        evaluated: Mutex::default(),
    }
}

/// Where a statement stands: a cached study's diagnostics point there.
fn place_key(statement: &Located<Compare>) -> String {
    format!("{}:{}", statement.location.source.0, statement.location.span.start)
}

fn read_trouble(error: &ReadError, location: Location) -> Box<Diagnostic> {
    let found = Diagnostic::error("unreadable-file", location, error.to_string());
    trouble(match error.help() {
        Some(help) => found.help(help),
        None => found,
    })
}

/// The view of a name, or what is said of a view that does not exist.
pub(crate) fn view(name: &str, location: Location) -> Answerable<&'static dyn View> {
    views::find(name).ok_or_else(|| {
        let names = views::all().iter().map(|view| view.page().name);
        let found =
            Diagnostic::error("unknown-view", location, format!("there is no view `{name}`"));
        trouble(match nearest(name, names.clone()) {
            Some(near) => found
                .help(format!("did you mean `{near}`?"))
                .replace_by(format!("Change to `{near}`"), near),
            None => found.help(format!("there are {}", names.collect::<Vec<_>>().join(", "))),
        })
    })
}
