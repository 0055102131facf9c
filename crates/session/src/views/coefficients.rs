//! `show coefficients of main`: how each outcome takes part in the functions.

use nalgebra::DMatrix;
use tussock_analysis::coefficients;
use tussock_language::facts::Page;
use tussock_report::rich::Rich;
use tussock_report::table::{Column, Row, Table};
use tussock_report::value::{NumberStyle, Value};

use super::draft::Draft;
use super::wording::listed;
use super::{Request, Shown, View};
use crate::study::Study;
use crate::trouble::Answerable;

pub(super) struct Coefficients;

static PAGE: Page = Page {
    name: "coefficients",
    summary: "raw, standardized and structure coefficients, and each outcome's share",
    text: include_str!("coefficients.md"),
};

/// A kind of coefficient.
struct Kind {
    name: &'static str,
    style: NumberStyle,
    pick: fn(&coefficients::Coefficients) -> &DMatrix<f64>,
}

const KINDS: [Kind; 4] = [
    Kind { name: "raw", style: NumberStyle::Statistic(3), pick: |found| &found.raw },
    Kind {
        name: "standardized",
        style: NumberStyle::Standardized(2),
        pick: |found| &found.standardized,
    },
    Kind { name: "structure", style: NumberStyle::Bounded(2), pick: |found| &found.structure },
    Kind { name: "share", style: NumberStyle::Standardized(2), pick: |found| &found.share },
];

impl View for Coefficients {
    fn page(&self) -> &'static Page {
        &PAGE
    }

    fn by_term(&self) -> bool {
        true
    }

    fn show(&self, study: &Study, request: &Request) -> Answerable<Shown> {
        let comparison = &study.comparison;
        let found = &study.discriminant()?.coefficients;
        let count = found.raw.ncols();
        let wanted =
            |kind: &Kind| request.coefficients.as_ref().is_none_or(|wanted| wanted == kind.name);
        let mut draft = Draft::of_term(study, PAGE.name);
        let mut table = Table::new("Coefficients of the discriminant functions")
            .column(Column::row_head("Outcome"));
        for function in 0..count {
            for kind in KINDS.iter().filter(|kind| wanted(kind)) {
                let spanner = Rich::plain(format!("Function {}", function + 1));
                table = table.column(Column::value(kind.name).under(spanner));
            }
        }
        for (index, outcome) in comparison.outcomes.iter().enumerate() {
            let mut row = Row::headed(outcome.label.clone());
            for function in 0..count {
                let number = (function + 1).to_string();
                for kind in &KINDS {
                    let value = (kind.pick)(found).get((index, function)).copied();
                    let value = Value::new(value.unwrap_or(f64::NAN), kind.style);
                    let keys = [kind.name, outcome.name.as_str(), number.as_str()];
                    if wanted(kind) {
                        row = row.number(draft.place(value, &keys));
                    } else {
                        draft.keep(value, &keys);
                    }
                }
            }
            table = table.row(row);
        }
        table = table.note(
            "Raw: weights for values in their own units, scores having unit variance within \
             groups. Standardized: for values in pooled within-group standard deviations. \
             Structure: pooled within-group correlation of outcome and score. Share: standardized \
             × structure; the shares of a function sum to 1.",
        );
        table = table.note(
            "The sign of a function is arbitrary; here its largest standardized coefficient is \
             positive.",
        );
        for (function, root) in study.hypothesis()?.roots().iter().enumerate() {
            if *root == 0.0 {
                table = table.note(Rich::fill(
                    "Function {function} separates nothing (λ = 0), so its direction is arbitrary.",
                    &[("function", Rich::plain((function + 1).to_string()))],
                ));
            } else if let Some(note) = opposite_signs(study, found, function) {
                table = table.note(note);
            }
        }
        draft.table(table);
        Ok(draft.finish())
    }
}

/// Names the outcomes whose two signs disagree; where one of the two is next to nothing, its sign
/// says nothing.
fn opposite_signs(
    study: &Study,
    found: &coefficients::Coefficients,
    function: usize,
) -> Option<Rich> {
    let outcomes = study.comparison.outcomes.iter().enumerate();
    let names: Vec<Rich> = outcomes
        .filter(|(index, _)| {
            let at = (*index, function);
            let standardized = found.standardized.get(at).copied().unwrap_or_default();
            let structure = found.structure.get(at).copied().unwrap_or_default();
            standardized * structure < 0.0 && standardized.abs().min(structure.abs()) >= 0.05
        })
        .map(|(_, outcome)| outcome.label.clone())
        .collect();
    if names.is_empty() {
        return None;
    }
    Some(Rich::fill(
        "On function {function} the standardized and the structure coefficient of {names} differ \
         in sign: given the other outcomes it sharpens the separation, and it is not read as a \
         difference of its own.",
        &[("function", Rich::plain((function + 1).to_string())), ("names", listed(&names))],
    ))
}
