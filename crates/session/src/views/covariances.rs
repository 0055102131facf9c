//! `show covariances of main`: do the groups spread alike?

use tussock_analysis::covariances::{BoxTest, Centre, box_test, levene, log_determinants};
use tussock_language::facts::Page;
use tussock_report::citation::Citation;
use tussock_report::rich::Rich;
use tussock_report::table::{Column, Row, Table};
use tussock_report::value::Value;

use super::draft::{Draft, cite_test};
use super::wording::refusal_note;
use super::{Request, Shown, View};
use crate::study::Study;
use crate::trouble::Answerable;

pub(super) struct Covariances;

static PAGE: Page = Page {
    name: "covariances",
    summary: "equality of covariance matrices and variances across the groups",
    text: include_str!("covariances.md"),
};

impl View for Covariances {
    fn page(&self) -> &'static Page {
        &PAGE
    }

    fn by_term(&self) -> bool {
        false
    }

    fn show(&self, study: &Study, _: &Request) -> Answerable<Shown> {
        let mut draft = Draft::new(study, PAGE.name);
        let title = Rich::from("Spread of the outcomes across the groups of ")
            .then(study.comparison.factor_label.clone());
        let mut table = Table::new(title)
            .column(Column::row_head("Check"))
            .column(Column::row_head("Of"))
            .column(Column::value("Value"))
            .column(Column::value("*F*"))
            .column(Column::value("df~1~"))
            .column(Column::value("df~2~"))
            .column(Column::value("*p*"));
        match box_test(&study.comparison.sample) {
            Ok(found) => table = table.rows(box_rows(&mut draft, &found)),
            Err(error) => {
                let refused = study.refuse(&error);
                let blank = Row::headed("Box’s *M*").text("covariance matrices");
                table = table
                    .row((0..5).fold(blank, |row, _| row.undefined()))
                    .note(Rich::from("No Box’s *M*: ").then(refusal_note(&refused.message)));
            }
        }
        let centres = [
            ("levene", "Levene", Centre::Mean),
            ("brown_forsythe", "Brown–Forsythe", Centre::Median),
        ];
        for (key, name, centre) in centres {
            table = spread_rows(&mut draft, table, study, (key, name), centre);
        }
        table = determinant_rows(&mut draft, table, study);
        table = table.note(
            "Box’s *M* by *F* and by χ^2^. Levene: distances from the group’s mean; \
             Brown–Forsythe: from its median. ln |*S*|: logarithm of the determinant of a \
             covariance matrix.",
        );
        table = table.note(
            "Box’s *M* answers to non-normality as much as to unequal covariances, so it is no \
             gate that an analysis has to pass: read it with the group sizes in view.",
        );
        draft.table(table);
        Ok(draft.finish())
    }
}

fn box_rows(draft: &mut Draft, found: &BoxTest) -> Vec<Row> {
    let row = Row::headed("Box’s *M*")
        .text("covariance matrices")
        .number(draft.place(Value::statistic(found.m), &["box", "M"]));
    let by_f = draft.test_cells(row, &found.f, &["box"]);
    let chi_square = draft.place(Value::statistic(found.chi_square), &["box", "chi2"]);
    let df = draft.place(Value::df(found.df), &["box", "df"]);
    let p = draft.place_p(found.chi_square_p, &["box"], "chi2_p");
    let by_chi_square = Row::headed("by χ^2^")
        .text("covariance matrices")
        .number(chi_square)
        .empty()
        .number(df)
        .empty()
        .number(p);
    let citation = Citation::new().value("*M*", Value::statistic(found.m));
    draft.cite(&["box"], cite_test(citation, &found.f));
    vec![by_f, by_chi_square]
}

fn spread_rows(
    draft: &mut Draft,
    mut table: Table,
    study: &Study,
    (key, name): (&str, &str),
    centre: Centre,
) -> Table {
    for (index, outcome) in study.comparison.outcomes.iter().enumerate() {
        let head = if index == 0 { Rich::plain(name) } else { Rich::default() };
        let row = Row::headed(head).text(outcome.label.clone());
        let row = if index == 0 { row.opening_block() } else { row };
        match levene(&study.comparison.sample, index, centre) {
            Ok(test) => {
                let keys = [key, outcome.name.as_str()];
                table = table.row(draft.test_cells(row.empty(), &test, &keys));
                draft.cite(&keys, cite_test(Citation::new(), &test));
            }
            Err(_) => {
                table = table.row((0..5).fold(row, |row, _| row.undefined())).note(
                    Rich::plain(format!("{name}: the distances of "))
                        .then(outcome.label.clone())
                        .then(Rich::plain(
                            " from the centre do not vary within groups, so they can’t be compared.",
                        )),
                );
            }
        }
    }
    table
}

fn determinant_rows(draft: &mut Draft, mut table: Table, study: &Study) -> Table {
    let found = log_determinants(&study.comparison.sample);
    let mut singular = false;
    for (index, level) in study.comparison.levels.iter().enumerate() {
        let head = if index == 0 { Rich::from("ln |*S*|") } else { Rich::default() };
        let row = Row::headed(head).text(Rich::plain(level));
        let row = if index == 0 { row.opening_block() } else { row };
        let row = match found.get(index).copied().flatten() {
            Some(value) => row.number(draft.place(Value::statistic(value), &["logdet", level])),
            None => {
                singular = true;
                row.undefined()
            }
        };
        table = table.row(row.empty().empty().empty().empty());
    }
    if let Ok(found) = box_test(&study.comparison.sample) {
        let value = Value::statistic(found.pooled_log_determinant);
        let placed = draft.place(value, &["logdet_pooled"]);
        let row = Row::headed(Rich::default()).text("pooled").number(placed);
        table = table.row(row.empty().empty().empty().empty());
    }
    if singular {
        table = table.note(
            "A group whose size does not exceed the number of outcomes, or whose outcomes depend \
             on each other, has a singular covariance matrix.",
        );
    }
    table
}
