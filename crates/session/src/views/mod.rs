//! The views of a comparison, one file and one page each.

mod centroids;
mod coefficients;
mod correlations;
mod covariances;
mod draft;
mod flow;
mod functions;
mod groups;
mod omnibus;
mod outcomes;
mod paired;
mod pairs;
mod scores;
mod wording;

use std::collections::BTreeMap;

use tussock_language::facts::Page;
use tussock_report::citation::Citation;
use tussock_report::table::{Cell, Placed, Table};

use crate::policy::Policy;
use crate::study::Study;
use crate::trouble::Answerable;

/// A way to look at a comparison.
pub(crate) trait View: Sync {
    /// Its page, headed by its name.
    fn page(&self) -> &'static Page;
    /// Whether its values belong to a term of the design, so that the term is part of their paths.
    fn by_term(&self) -> bool;
    /// What it shows.
    fn show(&self, study: &Study, request: &Request) -> Answerable<Shown>;
}

/// What was asked beside the view's name.
#[derive(Clone, Debug, Default, PartialEq)]
pub(crate) struct Request {
    /// The policy in force.
    pub(crate) policy: Policy,
    /// One kind of coefficient.
    pub(crate) coefficients: Option<String>,
}

/// What a view shows.
#[derive(Clone, Debug, Default, PartialEq)]
pub(crate) struct Shown {
    /// Its tables.
    pub(crate) tables: Vec<Table>,
    /// Values that no cell prints.
    pub(crate) values: Vec<Placed>,
    /// Whole citations, where a path stops at a test.
    pub(crate) citations: Vec<Cited>,
}

/// A citation and its path.
#[derive(Clone, Debug, PartialEq)]
pub(crate) struct Cited {
    /// The segments from the comparison's name on.
    pub(crate) path: Vec<String>,
    /// What prose prints.
    pub(crate) citation: Citation,
}

impl Shown {
    /// Every value that has a path: those that a cell prints and those that none does.
    pub(crate) fn placed(&self) -> impl Iterator<Item = &Placed> {
        let printed = self.tables.iter().flat_map(Table::placed);
        printed.chain(&self.values).filter(|placed| !placed.path.is_empty())
    }

    /// The tables; a number that differs from the one in `live` has no path there. So a path stands
    /// for one number in the whole document, whatever settings a statement has of its own.
    pub(crate) fn tables_beside(&self, live: &Self) -> Vec<Table> {
        let known: BTreeMap<&[String], f64> =
            live.placed().map(|placed| (placed.path.as_slice(), placed.value.number)).collect();
        let mut tables = self.tables.clone();
        let rows = tables.iter_mut().flat_map(|table| &mut table.rows);
        for cell in rows.flat_map(|row| &mut row.cells) {
            let placed = match cell {
                Cell::Empty | Cell::Text(_) | Cell::Undefined => [None, None],
                Cell::Number(number) => [Some(number), None],
                Cell::Interval { lower, upper } => [Some(lower), Some(upper)],
            };
            for placed in placed.into_iter().flatten() {
                let number = placed.value.number;
                let is_live = known
                    .get(placed.path.as_slice())
                    .is_some_and(|live| live.total_cmp(&number).is_eq());
                if !is_live {
                    placed.path.clear();
                }
            }
        }
        tables
    }
}

static VIEWS: &[&dyn View] = &[
    &flow::Flow,
    &groups::Groups,
    &correlations::Correlations,
    &covariances::Covariances,
    &omnibus::Omnibus,
    &functions::Functions,
    &coefficients::Coefficients,
    &centroids::Centroids,
    &scores::Scores,
    &outcomes::Outcomes,
    &pairs::Pairs,
];

/// All views, in the order in which an analysis reads.
pub(crate) fn all() -> &'static [&'static dyn View] {
    VIEWS
}

/// The view of a name.
pub(crate) fn find(name: &str) -> Option<&'static dyn View> {
    VIEWS.iter().copied().find(|view| view.page().name == name)
}

/// The pages of all views.
pub(crate) fn pages() -> Vec<Page> {
    VIEWS.iter().map(|view| *view.page()).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_view_has_a_page_with_an_example_paths_and_sources() {
        for view in VIEWS {
            let Page { name, summary, text } = view.page();
            assert!(text.starts_with(&format!("# {name}\n")), "{name}");
            assert!(text.contains(&format!("show {name} of main")), "{name} has no example");
            assert!(text.contains("## Live values"), "{name} names no live values");
            assert!(text.contains("## Sources") || *name == "flow", "{name} has no sources");
            assert!(!summary.is_empty() && !summary.ends_with('.'), "{name}");
        }
    }
}
