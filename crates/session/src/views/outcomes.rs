//! `show outcomes of main`: one analysis of variance an outcome.

use tussock_analysis::univariate::{Anova, anova};
use tussock_language::facts::Page;
use tussock_report::citation::Citation;
use tussock_report::rich::Rich;
use tussock_report::table::{Column, Row, Table};
use tussock_report::value::{NumberStyle, Value};

use super::draft::{Draft, cite_test, with};
use super::wording::{refusal_note, size_note};
use super::{Request, Shown, View};
use crate::study::Study;
use crate::trouble::Answerable;

pub(super) struct Outcomes;

static PAGE: Page = Page {
    name: "outcomes",
    summary: "one analysis of variance an outcome, with eta and omega squared",
    text: include_str!("outcomes.md"),
};

impl View for Outcomes {
    fn page(&self) -> &'static Page {
        &PAGE
    }

    fn by_term(&self) -> bool {
        true
    }

    fn show(&self, study: &Study, _: &Request) -> Answerable<Shown> {
        let comparison = &study.comparison;
        let sample = &comparison.sample;
        let mut draft = Draft::of_term(study, PAGE.name);
        let title =
            Rich::from("Differences on each outcome by ").then(comparison.factor_label.clone());
        let mut table = Table::new(title)
            .column(Column::row_head("Outcome"))
            .column(Column::value("*F*"))
            .column(Column::value("df~1~"))
            .column(Column::value("df~2~"))
            .column(Column::value("*p*"))
            .column(Column::value("η^2^"))
            .column(Column::value("ω^2^"));
        for (index, outcome) in comparison.outcomes.iter().enumerate() {
            let row = Row::headed(outcome.label.clone());
            match anova(sample.outcome(index), sample.groups(), sample.group_count()) {
                Ok(found) => {
                    table = table.row(tested(&mut draft, row, &found, &outcome.name));
                }
                Err(error) => {
                    let refused = study.refuse_outcome(&error, index);
                    table = table
                        .row((0..6).fold(row, |row, _| row.undefined()))
                        .note(refusal_note(&refused.message));
                }
            }
        }
        table = table.note(size_note(comparison)).note(Rich::fill(
            "*p* values are not adjusted for there being {count} outcomes, and a significant test \
             of the whole set does not protect them once one outcome differs.",
            &[("count", Rich::plain(comparison.outcomes.len().to_string()))],
        ));
        table = table.note("ω^2^ corrects η^2^ for bias and may fall below 0.");
        draft.table(table);
        Ok(draft.finish())
    }
}

fn tested(draft: &mut Draft, row: Row, found: &Anova, outcome: &str) -> Row {
    let three = |value: f64| Value::new(value, NumberStyle::Bounded(3));
    let keys = [outcome];
    let citation = cite_test(Citation::new(), &found.test);
    draft.cite(&keys, citation.value("η^2^", Value::bounded(found.eta2)));
    draft
        .test_cells(row, &found.test, &keys)
        .number(draft.place(three(found.eta2), &with(&keys, "eta2")))
        .number(draft.place(three(found.omega2), &with(&keys, "omega2")))
}
