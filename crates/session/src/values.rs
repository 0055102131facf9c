//! Live values: every number of every view by its path.

use std::collections::BTreeMap;

use tussock_language::ast::Path;
use tussock_language::diagnostic::Diagnostic;
use tussock_language::names::dotted;
use tussock_language::span::Location;
use tussock_report::citation::Citation;
use tussock_report::rich::Rich;
use tussock_report::value::Value;

use crate::context::{Context, view};
use crate::trouble::{Answerable, nearest, trouble};
use crate::views::{self, Shown};

/// What stands at a path.
#[derive(Clone, Debug, PartialEq)]
pub(crate) enum Found {
    /// A number.
    Number(Value),
    /// A whole citation, where the path stops at a test.
    Citation(Citation),
}

impl Found {
    /// As prose prints it, with this many decimals where some were asked for.
    pub(crate) fn rich(&self, decimals: Option<usize>) -> Rich {
        match (self, decimals) {
            (Self::Number(value), Some(decimals)) => {
                Rich::plain(value.text_with(u8::try_from(decimals).unwrap_or(u8::MAX)))
            }
            (Self::Number(value), None) => Rich::plain(value.text()),
            (Self::Citation(citation), _) => citation.rich(),
        }
    }
}

impl Context<'_> {
    /// What stands at a path as it was written; the term of the design may be left out.
    pub(crate) fn find(&self, path: &Path, location: Location) -> Answerable<Found> {
        let segments: Vec<String> =
            path.segments.iter().map(|segment| segment.value.clone()).collect();
        let [comparison, view_name, ..] = segments.as_slice() else {
            return Err(self.incomplete(&segments, location));
        };
        let view = view(view_name, location)?;
        let shown = self.shown(comparison, view, &self.request(), location)?;
        let study = self.study(comparison, location)?;
        let term = view.by_term().then_some(study.comparison.factor.as_str());
        let readings = readings(&shown, &segments, term);
        let found = readings.iter().find_map(|full| lookup(&shown, full));
        let first = readings.first().unwrap_or(&segments);
        found.ok_or_else(|| unknown_path(&shown, &segments, first, location))
    }

    /// Every number of every view of every comparison, by its full path. Views that can't be had
    /// have no values.
    pub(crate) fn values(&self) -> BTreeMap<String, Value> {
        let mut values = BTreeMap::new();
        for (name, statement) in &self.model.comparisons {
            for view in views::all() {
                let Ok(shown) = self.shown(name, *view, &self.request(), statement.location) else {
                    continue;
                };
                values.extend(shown.placed().map(|placed| (dotted(&placed.path), placed.value)));
            }
        }
        values
    }

    fn incomplete(&self, segments: &[String], location: Location) -> Box<Diagnostic> {
        let message = format!("the path `{}` stops before any value", dotted(segments));
        let found = Diagnostic::error("unknown-path", location, message);
        trouble(found.help("a path goes on with a view and its keys: `main.omnibus.pillai.value`"))
    }
}

/// What a path may stand for, with the term of the design in its place whether it was written or left
/// out. There are two readings where the term has the name of a level or a key.
pub(crate) fn readings(shown: &Shown, written: &[String], term: Option<&str>) -> Vec<Vec<String>> {
    let Some(term) = term else { return vec![written.to_vec()] };
    let (head, keys) = written.split_at(written.len().min(2));
    let with_term: Vec<String> =
        head.iter().cloned().chain([term.to_owned()]).chain(keys.iter().cloned()).collect();
    let is_written = written.get(2).is_some_and(|key| key == term);
    if !is_written {
        return vec![with_term];
    }
    let mut readings = vec![written.to_vec()];
    if leads_on(shown, &with_term) {
        readings.push(with_term);
    }
    readings
}

/// Whether a path is, or is the beginning of, one that the view holds.
fn leads_on(shown: &Shown, path: &[String]) -> bool {
    let cited = shown.citations.iter().map(|cited| cited.path.as_slice());
    shown.placed().map(|placed| placed.path.as_slice()).chain(cited).any(|p| p.starts_with(path))
}

fn lookup(shown: &Shown, full: &[String]) -> Option<Found> {
    let number = shown.placed().find(|placed| placed.path == full);
    if let Some(placed) = number {
        return Some(Found::Number(placed.value));
    }
    let cited = shown.citations.iter().find(|cited| cited.path == full);
    cited.map(|cited| Found::Citation(cited.citation.clone()))
}

/// Says how far a path is right and what may follow there.
fn unknown_path(
    shown: &Shown,
    written: &[String],
    full: &[String],
    location: Location,
) -> Box<Diagnostic> {
    let known = (2..=full.len()).rev().find(|&length| {
        let prefix = full.get(..length).unwrap_or_default();
        leads_on(shown, prefix)
    });
    let prefix = known.and_then(|length| full.get(..length)).unwrap_or_default();
    let next = keys_after(shown, prefix);
    let message = match full.get(prefix.len()) {
        Some(wrong) => format!("`{}` has nothing called `{wrong}`", dotted(prefix)),
        None => format!("`{}` stops before any value", dotted(written)),
    };
    let found = Diagnostic::error("unknown-path", location, message);
    let wrong = full.get(prefix.len()).map_or("", String::as_str);
    trouble(match nearest(wrong, next.iter().map(String::as_str)) {
        Some(near) => found.help(format!("did you mean `{near}`?")),
        None => {
            let shown: Vec<&str> = next.iter().map(String::as_str).take(12).collect();
            found.help(format!("there are {}", shown.join(", ")))
        }
    })
}

/// Which keys follow a prefix of full paths, in the order of the view.
pub(crate) fn keys_after(shown: &Shown, prefix: &[String]) -> Vec<String> {
    let mut keys: Vec<String> = Vec::new();
    let paths = shown.placed().map(|placed| placed.path.as_slice());
    let cited = shown.citations.iter().map(|cited| cited.path.as_slice());
    for path in paths.chain(cited) {
        let next = path.get(prefix.len()).filter(|_| path.starts_with(prefix));
        if let Some(key) = next.filter(|key| !keys.contains(key)) {
            keys.push(key.clone());
        }
    }
    keys
}

/// The value or citation at a full path.
pub(crate) fn at(shown: &Shown, full: &[String]) -> Option<Found> {
    lookup(shown, full)
}
