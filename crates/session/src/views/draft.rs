//! Building what a view shows: cells whose values know their paths.

use tussock_analysis::test::{FTest, PValue};
use tussock_report::citation::Citation;
use tussock_report::table::{Placed, Row, Table};
use tussock_report::value::{NumberStyle, Value};

use super::{Cited, Shown};
use crate::study::Study;

/// What a view shows, in the making. Every key is given from the view (and term) on.
#[derive(Debug)]
pub(super) struct Draft {
    prefix: Vec<String>,
    shown: Shown,
}

impl Draft {
    /// Nothing yet; paths begin with the comparison and the view.
    pub(super) fn new(study: &Study, view: &str) -> Self {
        let prefix = vec![study.comparison.name.clone(), view.to_owned()];
        Self { prefix, shown: Shown::default() }
    }

    /// Nothing yet; paths begin with the comparison, the view and the term.
    pub(super) fn of_term(study: &Study, view: &str) -> Self {
        let mut draft = Self::new(study, view);
        draft.prefix.push(study.comparison.factor.clone());
        draft
    }

    /// A value with its path.
    pub(super) fn place(&self, value: Value, keys: &[&str]) -> Placed {
        Placed { value, path: self.path(keys) }
    }

    /// A p value with its path; its logarithm is kept beside it, for where it underflows.
    pub(super) fn place_p(&mut self, p: PValue, keys: &[&str], key: &str) -> Placed {
        let ln = Value::new(p.ln_p, NumberStyle::Statistic(2));
        self.keep(ln, &with(keys, &format!("ln_{key}")));
        self.place(Value::p(p.p, p.ln_p), &with(keys, key))
    }

    /// Adds the cells F, df1, df2 and p of a test to a row.
    pub(super) fn test_cells(&mut self, row: Row, test: &FTest, keys: &[&str]) -> Row {
        let p = self.place_p(test.p, keys, "p");
        row.number(self.place(Value::statistic(test.f), &with(keys, "F")))
            .number(self.place(Value::df(test.df1), &with(keys, "df1")))
            .number(self.place(Value::df(test.df2), &with(keys, "df2")))
            .number(p)
    }

    /// Keeps a value that no cell prints.
    pub(super) fn keep(&mut self, value: Value, keys: &[&str]) {
        let placed = self.place(value, keys);
        self.shown.values.push(placed);
    }

    /// Keeps a citation.
    pub(super) fn cite(&mut self, keys: &[&str], citation: Citation) {
        let path = self.path(keys);
        self.shown.citations.push(Cited { path, citation });
    }

    /// Adds a finished table.
    pub(super) fn table(&mut self, table: Table) {
        self.shown.tables.push(table);
    }

    /// What was built.
    pub(super) fn finish(self) -> Shown {
        self.shown
    }

    fn path(&self, keys: &[&str]) -> Vec<String> {
        let keys = keys.iter().map(|key| (*key).to_owned());
        self.prefix.iter().cloned().chain(keys).collect()
    }
}

/// Keys with one more.
pub(super) fn with<'a>(keys: &[&'a str], key: &'a str) -> Vec<&'a str> {
    keys.iter().copied().chain([key]).collect()
}

/// `F(df1, df2) = ..., p ...` after whatever a citation begins with.
pub(super) fn cite_test(citation: Citation, test: &FTest) -> Citation {
    citation
        .test("*F*", [Value::df(test.df1), Value::df(test.df2)], Value::statistic(test.f))
        .value("*p*", Value::p(test.p.p, test.p.ln_p))
}
