//! `show centroids of main`: where the groups lie on the functions.

use tussock_analysis::centroids::centroids;
use tussock_language::facts::Page;
use tussock_report::citation::Citation;
use tussock_report::rich::Rich;
use tussock_report::table::{Column, Row, Table};
use tussock_report::value::{NumberStyle, Value};

use super::draft::{Draft, with};
use super::wording::size_note;
use super::{Request, Shown, View};
use crate::study::Study;
use crate::trouble::Answerable;

pub(super) struct Centroids;

static PAGE: Page = Page {
    name: "centroids",
    summary: "mean and standard deviation of each group's discriminant scores",
    text: include_str!("centroids.md"),
};

impl View for Centroids {
    fn page(&self) -> &'static Page {
        &PAGE
    }

    fn by_term(&self) -> bool {
        true
    }

    fn show(&self, study: &Study, _: &Request) -> Answerable<Shown> {
        let comparison = &study.comparison;
        let scores = &study.discriminant()?.scores;
        let found = centroids(&comparison.sample, scores);
        let mut draft = Draft::of_term(study, PAGE.name);
        let mut table = Table::new("Group centroids on the discriminant functions")
            .column(Column::row_head(comparison.factor_label.clone()))
            .column(Column::value("*n*"));
        for function in 1..=scores.ncols() {
            let spanner = || Rich::plain(format!("Function {function}"));
            table = table
                .column(Column::value("*M*").under(spanner()))
                .column(Column::value("*SD*").under(spanner()));
        }
        for (level, places) in comparison.levels.iter().zip(&found) {
            let n = places.first().map_or(0, |place| place.n);
            let mut row = Row::headed(Rich::plain(level)).number(Value::count(n));
            for (index, place) in places.iter().enumerate() {
                let number = (index + 1).to_string();
                let keys = [level.as_str(), number.as_str()];
                let mean = Value::new(place.mean, NumberStyle::Standardized(2));
                let mut citation = Citation::new().value("*M*", mean);
                row = row.number(draft.place(mean, &with(&keys, "mean")));
                row = match place.sd {
                    Some(sd) => {
                        citation = citation.value("*SD*", Value::statistic(sd));
                        row.number(draft.place(Value::statistic(sd), &with(&keys, "sd")))
                    }
                    None => row.undefined(),
                };
                draft.cite(&keys, citation);
            }
            table = table.row(row);
        }
        table = table.note(size_note(comparison)).note(
            "Scores have mean 0 over all units and a pooled standard deviation of 1 within \
             groups, so distances read in within-group standard deviations.",
        );
        if comparison.sample.group_sizes().contains(&1) {
            table = table.note("A group of one has no standard deviation.");
        }
        draft.table(table);
        Ok(draft.finish())
    }
}
