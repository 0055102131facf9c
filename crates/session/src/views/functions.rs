//! `show functions of main`: along how many dimensions do the groups differ?

use tussock_analysis::functions::{DiscriminantFunction, functions};
use tussock_language::facts::Page;
use tussock_report::citation::Citation;
use tussock_report::rich::Rich;
use tussock_report::table::{Column, Row, Table};
use tussock_report::value::{NumberStyle, Value};

use super::draft::{Draft, cite_test};
use super::wording::exactness;
use super::{Request, Shown, View};
use crate::study::Study;
use crate::trouble::Answerable;

pub(super) struct Functions;

static PAGE: Page = Page {
    name: "functions",
    summary: "the discriminant functions: eigenvalue, share, canonical correlation, test",
    text: include_str!("functions.md"),
};

impl View for Functions {
    fn page(&self) -> &'static Page {
        &PAGE
    }

    fn by_term(&self) -> bool {
        true
    }

    fn show(&self, study: &Study, _: &Request) -> Answerable<Shown> {
        let found = functions(study.hypothesis()?);
        let mut draft = Draft::of_term(study, PAGE.name);
        let title =
            Rich::from("Discriminant functions for ").then(study.comparison.factor_label.clone());
        let test = || Rich::from("Test of this function and all later ones");
        let mut table = Table::new(title)
            .column(Column::row_head("Function"))
            .column(Column::value("λ"))
            .column(Column::value("%"))
            .column(Column::value("*R*~c~"))
            .column(Column::words("Functions").under(test()))
            .column(Column::value("Λ").under(test()))
            .column(Column::value("*F*").under(test()))
            .column(Column::value("df~1~").under(test()))
            .column(Column::value("df~2~").under(test()))
            .column(Column::value("*p*").under(test()))
            .column(Column::words("*F* is").under(test()));
        for (index, function) in found.iter().enumerate() {
            table = table.row(row(&mut draft, function, index + 1, found.len()));
        }
        table = table.note(
            "λ: eigenvalue, the ratio of variation between to variation within groups along the \
             function. %: its share of the sum of all λ. *R*~c~: canonical correlation. Λ: \
             Wilks’s lambda of this and all later functions together, tested by Rao’s *F*.",
        );
        table = table.note(
            "Read from the top and stop at the first test that does not reject: a test is of \
             several functions together, never of one alone.",
        );
        draft.table(table);
        Ok(draft.finish())
    }
}

fn row(draft: &mut Draft, function: &DiscriminantFunction, number: usize, of: usize) -> Row {
    let key = number.to_string();
    let three = |value: f64| Value::new(value, NumberStyle::Bounded(3));
    let tested = if number == of { key.clone() } else { format!("{number}–{of}") };
    let row = Row::headed(Rich::plain(&key))
        .number(draft.place(
            Value::new(function.eigenvalue, NumberStyle::Statistic(3)),
            &[&key, "eigenvalue"],
        ))
        .number(draft.place(Value::new(function.share, NumberStyle::Percent(1)), &[&key, "share"]))
        .number(draft.place(three(function.canonical), &[&key, "canonical"]))
        .text(Rich::plain(tested))
        .number(draft.place(three(function.wilks), &[&key, "wilks"]));
    let citation = Citation::new().value("Λ", Value::bounded(function.wilks));
    draft.cite(&[&key], cite_test(citation, &function.test));
    draft.test_cells(row, &function.test, &[&key]).text(exactness(function.exactness))
}
