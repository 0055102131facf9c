//! `show correlations of main`: within groups below the diagonal, over all units above it.

use tussock_analysis::correlations::correlate;
use tussock_language::facts::Page;
use tussock_report::rich::Rich;
use tussock_report::table::{Column, Row, Table};
use tussock_report::value::Value;

use super::draft::Draft;
use super::wording::{measured, size_note};
use super::{Request, Shown, View};
use crate::study::Study;
use crate::trouble::Answerable;

pub(super) struct Correlations;

static PAGE: Page = Page {
    name: "correlations",
    summary: "correlations of the outcomes, pooled within groups and over all units",
    text: include_str!("correlations.md"),
};

impl View for Correlations {
    fn page(&self) -> &'static Page {
        &PAGE
    }

    fn by_term(&self) -> bool {
        false
    }

    fn show(&self, study: &Study, _: &Request) -> Answerable<Shown> {
        let comparison = &study.comparison;
        let found = correlate(&comparison.sample);
        let mut draft = Draft::new(study, PAGE.name);
        let outcomes = &comparison.outcomes;
        let numbered = |index: usize| Rich::plain((index + 1).to_string());
        let mut table = Table::new("Correlations of the outcomes")
            .column(Column::row_head("Outcome"))
            .columns((0..outcomes.len()).map(|index| Column::value(numbered(index))))
            .column(Column::value("within").under("*SD*"))
            .column(Column::value("total").under("*SD*"));
        let mut undefined = false;
        for (i, outcome) in outcomes.iter().enumerate() {
            let head = numbered(i).then(Rich::plain(" ")).then(outcome.label.clone());
            let mut row = Row::headed(head);
            for (j, other) in outcomes.iter().enumerate() {
                let (kind, matrix) =
                    if j < i { ("within", &found.within) } else { ("total", &found.total) };
                let value = matrix.get((i, j)).copied().unwrap_or(f64::NAN);
                undefined |= i != j && value.is_nan();
                row = if i == j {
                    row.empty()
                } else if value.is_nan() {
                    row.undefined()
                } else {
                    row.number(draft.place(
                        Value::bounded(value),
                        &[kind, outcome.name.as_str(), other.name.as_str()],
                    ))
                };
            }
            let sd = |values: &[f64]| values.get(i).copied().unwrap_or(f64::NAN);
            let (within, total) = (sd(&found.within_sd), sd(&found.total_sd));
            let name = outcome.name.as_str();
            table = table.row(
                row.number(draft.place(measured(within, outcome), &["sd", "within", name]))
                    .number(draft.place(measured(total, outcome), &["sd", "total", name])),
            );
        }
        for (kind, matrix) in [("within", &found.within), ("total", &found.total)] {
            for (i, outcome) in outcomes.iter().enumerate() {
                for (j, other) in outcomes.iter().enumerate() {
                    let value = matrix.get((i, j)).copied().unwrap_or(f64::NAN);
                    let printed = if kind == "within" { j < i } else { j > i };
                    if i != j && !printed && !value.is_nan() {
                        let keys = [kind, outcome.name.as_str(), other.name.as_str()];
                        draft.keep(Value::bounded(value), &keys);
                    }
                }
            }
        }
        table = table.note(size_note(comparison)).note(
            "Below the diagonal: pooled within groups, with the differences between groups taken \
             out. Above it: over all units, with those differences left in.",
        );
        if undefined {
            table = table.note("An outcome that does not vary has no correlations.");
        }
        draft.table(table);
        Ok(draft.finish())
    }
}
