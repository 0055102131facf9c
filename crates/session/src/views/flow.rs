//! `show flow of main`: where the rows went.

use tussock_language::facts::Page;
use tussock_report::rich::Rich;
use tussock_report::table::{Column, Row, Table};
use tussock_report::value::Value;

use super::draft::{Draft, with};
use super::{Request, Shown, View};
use crate::flow::Count;
use crate::study::Study;
use crate::trouble::Answerable;

pub(super) struct Flow;

static PAGE: Page = Page {
    name: "flow",
    summary: "rows from the file to the comparison, with the reason at each step",
    text: include_str!("flow.md"),
};

impl View for Flow {
    fn page(&self) -> &'static Page {
        &PAGE
    }

    fn by_term(&self) -> bool {
        false
    }

    fn show(&self, study: &Study, _: &Request) -> Answerable<Shown> {
        let comparison = &study.comparison;
        let mut draft = Draft::new(study, PAGE.name);
        let title = Rich::fill(
            "Rows on their way into the comparison {name}",
            &[("name", Rich::plain(&comparison.name))],
        );
        let mut table = Table::new(title)
            .column(Column::row_head("Step"))
            .column(Column::value("Left out"))
            .column(Column::value("Rows"))
            .columns(comparison.levels.iter().map(|level| {
                Column::value(Rich::plain(level)).under(comparison.factor_label.clone())
            }));
        for step in &comparison.flow.steps {
            let keys: Vec<&str> = step.keys.iter().map(String::as_str).collect();
            let row = Row::headed(step.label.clone());
            let row = match step.left_out {
                Some(rows) => row.number(draft.place(Value::count(rows), &with(&keys, "left_out"))),
                None => row.empty(),
            };
            table = table.row(count_cells(&draft, row, &step.remaining, &keys, study));
        }
        let missing = comparison.flow.missing.iter().filter(|missing| missing.count.total > 0);
        for (index, missing) in missing.enumerate() {
            let head = Rich::from("Missing: ").then(missing.label.clone());
            let row = Row::headed(head).empty();
            let keys = ["missing", missing.outcome.as_str()];
            let row = count_cells(&draft, row, &missing.count, &keys, study);
            table = table.row(if index == 0 { row.opening_block() } else { row });
        }
        table = table.note(
            "A row is compared when it has a group and a value on every outcome (listwise). \
             A row that misses several outcomes is counted under each of them.",
        );
        draft.table(table);
        Ok(draft.finish())
    }
}

fn count_cells(draft: &Draft, row: Row, count: &Count, keys: &[&str], study: &Study) -> Row {
    let total = draft.place(Value::count(count.total), &with(keys, "rows"));
    let mut row = row.number(total);
    for (index, level) in study.comparison.levels.iter().enumerate() {
        let size = count.groups.as_ref().and_then(|groups| groups.get(index));
        row = match size {
            Some(&size) => {
                row.number(draft.place(Value::count(size), &with(&with(keys, "groups"), level)))
            }
            None => row.empty(),
        };
    }
    row
}
