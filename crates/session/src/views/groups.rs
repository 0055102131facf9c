//! `show groups of main`: each group on each outcome.

use tussock_analysis::descriptives::{Descriptive, describe};
use tussock_language::facts::Page;
use tussock_report::citation::Citation;
use tussock_report::rich::Rich;
use tussock_report::table::{Column, Row, Table};
use tussock_report::value::Value;

use super::draft::{Draft, with};
use super::wording::{interval_head, measured, outcome_head, percent, size_note};
use super::{Request, Shown, View};
use crate::comparison::Outcome;
use crate::study::Study;
use crate::trouble::Answerable;

pub(super) struct Groups;

static PAGE: Page = Page {
    name: "groups",
    summary: "size, mean, standard deviation and interval of each group on each outcome",
    text: include_str!("groups.md"),
};

impl View for Groups {
    fn page(&self) -> &'static Page {
        &PAGE
    }

    fn by_term(&self) -> bool {
        false
    }

    fn show(&self, study: &Study, request: &Request) -> Answerable<Shown> {
        let comparison = &study.comparison;
        let level = request.policy.interval;
        let described = describe(&comparison.sample, level);
        let mut draft = Draft::new(study, PAGE.name);
        let title = Rich::from("Outcomes by ").then(comparison.factor_label.clone());
        let mut table = Table::new(title)
            .column(Column::row_head("Outcome"))
            .column(Column::row_head(comparison.factor_label.clone()))
            .column(Column::value("*n*"))
            .column(Column::value("*M*"))
            .column(Column::value("*SD*"))
            .column(Column::value("*SE*"))
            .column(Column::value(interval_head(level)));
        for (index, outcome) in comparison.outcomes.iter().enumerate() {
            for (group, name) in comparison.levels.iter().enumerate() {
                let Some(cell) = described.get(group).and_then(|row| row.get(index)) else {
                    continue;
                };
                let head = if group == 0 { outcome_head(outcome) } else { Rich::default() };
                let row = Row::headed(head).text(Rich::plain(name));
                let row = described_cells(&mut draft, row, cell, outcome, name);
                table = table.row(if group == 0 { row.opening_block() } else { row });
                cite(&mut draft, cell, outcome, name);
            }
        }
        for (name, size) in comparison.levels.iter().zip(comparison.sample.group_sizes()) {
            draft.cite(&[name], Citation::new().value("*n*", Value::count(*size)));
        }
        table = table.note(size_note(comparison));
        table = table.note(
            format!(
                "*SE* = standard error; CI = confidence interval ({}) of the group's mean, from \
             its own *SD*. Intervals of single means do not tell whether means differ: see pairs.",
                percent(level)
            )
            .as_str(),
        );
        if comparison.sample.group_sizes().contains(&1) {
            table = table.note("A group of one has no standard deviation.");
        }
        draft.table(table);
        Ok(draft.finish())
    }
}

fn described_cells(
    draft: &mut Draft,
    row: Row,
    cell: &Descriptive,
    outcome: &Outcome,
    level: &str,
) -> Row {
    let keys = [level, outcome.name.as_str()];
    let value =
        |number: f64, key: &'static str| draft.place(measured(number, outcome), &with(&keys, key));
    let row = row
        .number(draft.place(Value::count(cell.n), &[level, "n"]))
        .number(value(cell.mean, "mean"));
    let row = match cell.sd {
        Some(sd) => row.number(value(sd, "sd")),
        None => row.undefined(),
    };
    let row = match cell.se {
        Some(se) => row.number(value(se, "se")),
        None => row.undefined(),
    };
    match cell.interval {
        Some(interval) => {
            row.interval(value(interval.lower, "lower"), value(interval.upper, "upper"))
        }
        None => row.undefined(),
    }
}

fn cite(draft: &mut Draft, cell: &Descriptive, outcome: &Outcome, level: &str) {
    let mut citation = Citation::new().value("*M*", measured(cell.mean, outcome));
    if let Some(sd) = cell.sd {
        citation = citation.value("*SD*", measured(sd, outcome));
    }
    draft.cite(&[level, &outcome.name], citation);
}
