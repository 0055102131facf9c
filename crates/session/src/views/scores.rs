//! `show scores of main`: the groups on the discriminant scores, judged with the caution that scores
//! derived from the same data call for.

use tussock_analysis::pairs::{Pairs, pairs};
use tussock_analysis::univariate::anova;
use tussock_language::ast::Adjustment;
use tussock_language::facts::Page;
use tussock_report::citation::Citation;
use tussock_report::rich::Rich;
use tussock_report::table::{Column, Row, Table};
use tussock_report::value::{NumberStyle, Value};

use super::draft::{Draft, cite_test, with};
use super::paired::{Family, PairCells, pair_columns, place_pair, refuse_too_many};
use super::{Request, Shown, View};
use crate::policy::Policy;
use crate::study::Study;
use crate::trouble::Answerable;

pub(super) struct Scores;

static PAGE: Page = Page {
    name: "scores",
    summary: "the groups on the discriminant scores, at a conservative level",
    text: include_str!("scores.md"),
};

impl View for Scores {
    fn page(&self) -> &'static Page {
        &PAGE
    }

    fn by_term(&self) -> bool {
        true
    }

    fn show(&self, study: &Study, request: &Request) -> Answerable<Shown> {
        refuse_too_many(study, study.hypothesis()?.dimensions())?;
        let mut draft = Draft::of_term(study, PAGE.name);
        let tests = tests(&mut draft, study, &request.policy)?;
        draft.table(tests);
        let pairs = pair_table(&mut draft, study, &request.policy)?;
        draft.table(pairs);
        Ok(draft.finish())
    }
}

fn tests(draft: &mut Draft, study: &Study, policy: &Policy) -> Answerable<Table> {
    let sample = &study.comparison.sample;
    let scores = &study.discriminant()?.scores;
    let title = Rich::from("Discriminant scores by ").then(study.comparison.factor_label.clone());
    let alpha = threshold(policy.scores_alpha);
    let mut table = Table::new(title)
        .column(Column::row_head("Function"))
        .column(Column::value("*F*"))
        .column(Column::value("df~1~"))
        .column(Column::value("df~2~"))
        .column(Column::value("*p*"))
        .column(Column::words(Rich::from("*p* < ").then(Rich::plain(&alpha))))
        .column(Column::value("η^2^"));
    for (index, column) in scores.column_iter().enumerate() {
        let number = (index + 1).to_string();
        let values: Vec<f64> = column.iter().copied().collect();
        let found = anova(&values, sample.groups(), sample.group_count())
            .map_err(|error| study.refuse(&error))?;
        let keys = [number.as_str()];
        let row = draft.test_cells(Row::headed(Rich::plain(&number)), &found.test, &keys);
        let below = found.test.p.ln_p < policy.scores_alpha.ln();
        let eta2 = Value::new(found.eta2, NumberStyle::Bounded(3));
        let row = row
            .text(if below { "yes" } else { "no" })
            .number(draft.place(eta2, &with(&keys, "eta2")));
        draft.cite(&keys, cite_test(Citation::new(), &found.test));
        table = table.row(row);
    }
    Ok(table.note(caution(&alpha)))
}

fn pair_table(draft: &mut Draft, study: &Study, policy: &Policy) -> Answerable<Table> {
    let sample = &study.comparison.sample;
    let scores = &study.discriminant()?.scores;
    let found: Vec<Pairs> = scores
        .column_iter()
        .map(|column| {
            let values: Vec<f64> = column.iter().copied().collect();
            pairs(&values, sample.groups(), sample.group_count(), policy.interval)
                .map_err(|error| study.refuse(&error))
        })
        .collect::<Answerable<_>>()?;
    let family = Family::of(&found);
    let alpha = threshold(policy.scores_alpha);
    let title = Rich::from("Pairs of groups on the discriminant scores, ")
        .then(study.comparison.factor_label.clone());
    let below = Rich::from(match policy.pairs {
        Adjustment::Unadjusted => "*p* < ",
        Adjustment::Bonferroni => "Bonferroni < ",
        Adjustment::Holm => "Holm < ",
    });
    let mut table = Table::new(title)
        .column(Column::row_head("Function"))
        .columns(pair_columns("Difference", policy))
        .column(Column::words(below.then(Rich::plain(&alpha))));
    let mut adjusted = family.adjusted().into_iter();
    for (index, pairs) in found.iter().enumerate() {
        let number = (index + 1).to_string();
        for (position, pair) in pairs.list.iter().enumerate() {
            let Some(adjusted) = adjusted.next() else { break };
            let cells = PairCells {
                pair,
                adjusted,
                policy,
                levels: &study.comparison.levels,
                measure: &|number| Value::new(number, NumberStyle::Standardized(2)),
            };
            let first = cells.first().to_owned();
            let second = cells.second().to_owned();
            let keys = [number.as_str(), first.as_str(), second.as_str()];
            let head = if position == 0 { Rich::plain(&number) } else { Rich::default() };
            let row = Row::headed(head);
            let row = if position == 0 { row.opening_block() } else { row };
            let below = cells.chosen().ln_p < policy.scores_alpha.ln();
            let row = place_pair(draft, row, &cells, &keys);
            table = table.row(row.text(if below { "yes" } else { "no" }));
        }
    }
    for note in family.notes(found.len(), "function", policy) {
        table = table.note(note);
    }
    Ok(table.note(Rich::fill(
        "As with the tests of the functions, the level is α = {alpha} because the scores are derived \
         from these data.",
        &[("alpha", Rich::plain(alpha))],
    )))
}

/// Why the level is as low as it is.
fn caution(alpha: &str) -> Rich {
    Rich::fill(
        "The functions were chosen, from these very data, to set the groups apart, so ordinary \
         tests on their scores reject a true null hypothesis far too often (Bird and Hadzi-Pavlovic \
         1983). They are judged at α = {alpha} instead of the usual level; that level is common \
         practice, not a proof, and *d* and *g* on scores are too large for the same reason.",
        &[("alpha", Rich::plain(alpha))],
    )
}

/// A level as it is printed: `.001`.
fn threshold(alpha: f64) -> String {
    alpha.to_string().trim_start_matches('0').to_owned()
}
