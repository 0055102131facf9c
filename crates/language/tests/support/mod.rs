//! Made-up facts: the columns, levels and results that the ferry sample would have.

#![allow(dead_code, reason = "each test program uses a part of it")]

use tussock_language::ast::ReadSource;
use tussock_language::document::Document;
use tussock_language::facts::{ColumnFact, ColumnKind, Facts, KeyFact, Page};
use tussock_language::model::{Model, Redefinition, TableBase};

/// Facts about a document whose every table has the rows of the ferry sample, except files that
/// are not there: `crew.csv` is, others are not.
pub(crate) struct FerryFacts {
    model: Model,
}

impl FerryFacts {
    pub(crate) fn of(document: &Document) -> Self {
        Self { model: Model::new(document, Redefinition::Error) }
    }

    /// The derived columns of a table and of those that it is taken from; none where the rows
    /// cannot be read.
    fn derived(&self, table: &str) -> Option<Vec<String>> {
        let mut derived = Vec::new();
        let mut name = table;
        // A chain longer than the number of tables is a cycle.
        for _ in 0..=self.model.tables.len() {
            let table = self.model.tables.get(name)?;
            let columns = table.derived.iter().map(|derive| &derive.value.column.column.value);
            derived.extend(columns.cloned());
            match &table.base.value {
                TableBase::Read(read) => {
                    let readable = match &read.source {
                        ReadSource::File(file) => file.value == "crew.csv",
                        ReadSource::Sample(sample) => sample.value == "ferry",
                    };
                    return readable.then_some(derived);
                }
                TableBase::Admit(admit) => name = &admit.parent.value,
            }
        }
        None
    }
}

const fn page(name: &'static str) -> Page {
    Page { name, summary: "a page", text: "# A page" }
}

const NUMBERS: [&str; 7] = ["alertness", "mood", "lapses", "sleep", "age", "watches", "over"];
const TEXTS: [&str; 2] = ["roster", "ship"];

impl Facts for FerryFacts {
    fn views(&self) -> &[Page] {
        const { &[page("flow"), page("groups"), page("omnibus"), page("coefficients"), page("pairs")] }
    }
    fn functions(&self) -> &[Page] {
        const { &[page("log"), page("round"), page("missing"), page("max")] }
    }
    fn samples(&self) -> &[Page] {
        const { &[page("ferry"), page("basil")] }
    }
    fn columns(&self, table: &str) -> Option<Vec<ColumnFact>> {
        let fact =
            |name: &str, kind| ColumnFact { name: name.to_owned(), kind, detail: String::new() };
        let mut columns = Vec::new();
        let derived = self.derived(table)?;
        columns.extend(NUMBERS.map(|name| fact(name, ColumnKind::Number)));
        columns.extend(TEXTS.map(|name| fact(name, ColumnKind::Text)));
        columns.extend(derived.iter().map(|name| fact(name, ColumnKind::Number)));
        Some(columns)
    }
    fn levels(&self, table: &str, column: &str) -> Option<Vec<String>> {
        self.derived(table)?;
        let levels: &[&str] = match column {
            "roster" => &["fixed", "forward", "backward"],
            "ship" => &["Auk", "Tern", "Storm Petrel", "Skua"],
            _ => return None,
        };
        Some(levels.iter().map(|level| (*level).to_owned()).collect())
    }
    fn keys(&self, path: &[String]) -> Vec<KeyFact> {
        let path: Vec<&str> = path.iter().map(String::as_str).collect();
        let keys: &[&str] = match path.as_slice() {
            [_] => &["groups", "omnibus", "coefficients"],
            [_, "omnibus"] => &["roster", "wilks", "pillai"],
            [_, "omnibus", "roster"] => &["wilks", "pillai"],
            [_, "omnibus", "pillai" | "wilks"] | [_, "omnibus", "roster", _] => {
                &["value", "F", "df1", "df2", "p"]
            }
            [_, "groups"] => &["fixed", "forward", "backward"],
            [_, "groups", _] => &["n", "mood"],
            [_, "groups", _, "mood"] => &["mean", "sd"],
            [_, "coefficients"] => &["raw"],
            [_, "coefficients", "raw"] => &["mood"],
            [_, "coefficients", "raw", "mood"] => &["1", "2"],
            _ => &[],
        };
        let fact = |key: &&str| KeyFact { key: (*key).to_owned(), detail: String::new() };
        keys.iter().map(fact).collect()
    }
    fn value(&self, path: &[String]) -> Option<String> {
        let path: Vec<&str> = path.iter().map(String::as_str).collect();
        match path.as_slice() {
            [_, "omnibus", .., "pillai" | "wilks"] => Some("V = .38, p < .001".to_owned()),
            [_, _, .., "value" | "F" | "df1" | "df2" | "p" | "n" | "mean" | "sd" | "1" | "2"] => {
                Some(".38".to_owned())
            }
            _ => None,
        }
    }
    fn coefficients(&self, _: &str, _: &str) -> Option<String> {
        None
    }
    fn files(&self, _: &str) -> Vec<String> {
        Vec::new()
    }
}
