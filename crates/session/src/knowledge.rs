//! The facts that the language asks for, from the real files and the real answers.

use std::fs;
use std::path::Path;

use tussock_data::frame::Kind;
use tussock_data::samples;
use tussock_language::facts::{ColumnFact, ColumnKind, Facts, KeyFact, Page};
use tussock_language::span::Location;
use tussock_report::render;
use tussock_report::table::Table;

use crate::context::Context;
use crate::evaluate::Columns;
use crate::factor::{levels, present};
use crate::functions;
use crate::relation::Relation;
use crate::rules;
use crate::values::{at, keys_after, readings};
use crate::views::{self, Request, Shown, View};

/// Facts about one version of one document.
#[derive(Debug)]
pub struct Knowledge<'a> {
    context: Held<'a>,
    views: Vec<Page>,
    functions: Vec<Page>,
    samples: Vec<Page>,
}

#[derive(Debug)]
enum Held<'a> {
    Owned(Box<Context<'a>>),
    Borrowed(&'a Context<'a>),
}

impl<'a> Knowledge<'a> {
    pub(crate) fn new(context: Context<'a>) -> Self {
        Self::holding(Held::Owned(Box::new(context)))
    }

    pub(crate) fn borrowing(context: &'a Context<'a>) -> Self {
        Self::holding(Held::Borrowed(context))
    }

    fn holding(context: Held<'a>) -> Self {
        let page = |sample: &samples::Sample| Page {
            name: sample.name,
            summary: sample.summary,
            text: sample.page,
        };
        let samples = samples::samples().iter().map(page).collect();
        Self { context, views: views::pages(), functions: functions::pages(), samples }
    }

    fn context(&self) -> &Context<'a> {
        match &self.context {
            Held::Owned(context) => context,
            Held::Borrowed(context) => context,
        }
    }

    /// What a view shows under the document's policy, where it can be had.
    fn shown(&self, comparison: &str, view: &dyn View, kind: Option<&str>) -> Option<Shown> {
        let mut request: Request = self.context().request();
        request.coefficients = kind.map(str::to_owned);
        let shown = self.context().shown(comparison, view, &request, Location::default());
        shown.ok().map(|shown| (*shown).clone())
    }

    /// What a path may stand for, and the view that holds it.
    fn readings(&self, path: &[String]) -> Option<(Shown, Vec<Vec<String>>)> {
        let [comparison, name, ..] = path else { return None };
        let view = views::find(name)?;
        let shown = self.shown(comparison, view, None)?;
        let study = self.context().study(comparison, Location::default()).ok()?;
        let term = view.by_term().then_some(study.comparison.factor.as_str());
        let readings = readings(&shown, path, term);
        Some((shown, readings))
    }
}

impl Facts for Knowledge<'_> {
    fn views(&self) -> &[Page] {
        &self.views
    }

    fn functions(&self) -> &[Page] {
        &self.functions
    }

    fn samples(&self) -> &[Page] {
        &self.samples
    }

    fn rules(&self) -> &[Page] {
        rules::PAGES
    }

    fn columns(&self, table: &str) -> Option<Vec<ColumnFact>> {
        let relation = self.context().relation(table, Location::default()).ok()?;
        Some(relation.names().iter().map(|name| column(&relation, name)).collect())
    }

    fn levels(&self, table: &str, column: &str) -> Option<Vec<String>> {
        let relation = self.context().relation(table, Location::default()).ok()?;
        ordered_levels(&relation, column)
    }

    fn keys(&self, path: &[String]) -> Vec<KeyFact> {
        if let [comparison] = path {
            if !self.context().model.comparisons.contains_key(comparison) {
                return Vec::new();
            }
            let fact = |page: &Page| KeyFact {
                key: page.name.to_owned(),
                detail: page.summary.to_owned(),
            };
            return self.views.iter().map(fact).collect();
        }
        let Some((shown, readings)) = self.readings(path) else { return Vec::new() };
        let mut facts: Vec<KeyFact> = Vec::new();
        for full in &readings {
            for key in keys_after(&shown, full) {
                let mut whole = full.clone();
                whole.push(key.clone());
                let detail = at(&shown, &whole).map(|found| found.rich(None).text());
                if !facts.iter().any(|fact| fact.key == key) {
                    facts.push(KeyFact { key, detail: detail.unwrap_or_default() });
                }
            }
            // The term may be written or left out.
            if let (2, 3, Some(term)) = (path.len(), full.len(), full.last()) {
                let detail = "the term of the design".to_owned();
                facts.push(KeyFact { key: term.clone(), detail });
            }
        }
        facts
    }

    fn value(&self, path: &[String]) -> Option<String> {
        let (shown, readings) = self.readings(path)?;
        let found = readings.iter().find_map(|full| at(&shown, full))?;
        Some(found.rich(None).text())
    }

    fn coefficients(&self, comparison: &str, kind: &str) -> Option<String> {
        let view = views::find("coefficients")?;
        let shown = self.shown(comparison, view, Some(kind))?;
        let table = shown.tables.first()?;
        // The hover's own text says what the notes of the table say.
        Some(render::markdown::table(&Table { notes: Vec::new(), ..table.clone() }))
    }

    fn files(&self, prefix: &str) -> Vec<String> {
        data_files(self.context().session.root(), prefix)
    }
}

fn column(relation: &Relation, name: &str) -> ColumnFact {
    let number = relation.kind(name) == Some(Kind::Number);
    let location = Location::default();
    let mut detail = Vec::new();
    if let Some(label) = relation.label(name) {
        let unit = label.unit.as_ref().map(|unit| format!(", {}", unit.value));
        detail.push(format!("{}{}", label.text.value, unit.unwrap_or_default()));
    }
    if let (true, Ok(values)) = (number, relation.numbers(name, location)) {
        let present: Vec<f64> = values.iter().copied().filter(|x| !x.is_nan()).collect();
        let low = present.iter().copied().fold(f64::INFINITY, f64::min);
        let high = present.iter().copied().fold(f64::NEG_INFINITY, f64::max);
        if low <= high {
            detail.push(format!("{low} to {high}"));
        }
        detail.push(missing(values.len() - present.len()));
    } else if let Some(levels) = ordered_levels(relation, name) {
        let shown: Vec<&str> = levels.iter().map(String::as_str).take(6).collect();
        let more = if levels.len() > shown.len() { ", ..." } else { "" };
        detail.push(format!("{}{more}", shown.join(", ")));
    }
    detail.retain(|part| !part.is_empty());
    let kind = if number { ColumnKind::Number } else { ColumnKind::Text };
    ColumnFact { name: name.to_owned(), kind, detail: detail.join("; ") }
}

/// The levels in their stated order; where that order does not fit, as while it is being written,
/// those that occur.
fn ordered_levels(relation: &Relation, column: &str) -> Option<Vec<String>> {
    let stated = levels(relation, column, Location::default());
    stated.or_else(|_| present(relation, column)).ok()
}

fn missing(count: usize) -> String {
    match count {
        0 => String::new(),
        count => format!("{count} missing"),
    }
}

/// Data files at and below a folder's own level whose path begins with `prefix`.
fn data_files(root: &Path, prefix: &str) -> Vec<String> {
    let folder = prefix.rfind('/').map_or("", |at| prefix.get(..=at).unwrap_or_default());
    let Ok(entries) = fs::read_dir(root.join(folder)) else { return Vec::new() };
    let mut files: Vec<String> = entries
        .flatten()
        .filter_map(|entry| {
            let name = entry.file_name().into_string().ok()?;
            let is_folder = entry.file_type().ok()?.is_dir();
            let ending = Path::new(&name).extension().and_then(|ending| ending.to_str());
            let is_data = matches!(ending, Some("csv" | "tsv" | "tab" | "txt"));
            let path = format!("{folder}{name}{}", if is_folder { "/" } else { "" });
            let hidden = name.starts_with('.');
            ((is_folder || is_data) && !hidden && path.starts_with(prefix)).then_some(path)
        })
        .collect();
    files.sort();
    files
}
