//! `show pairs of main`: every pair of groups on every outcome.

use tussock_analysis::pairs::{Pairs as Found, pairs};
use tussock_language::ast::Effect;
use tussock_language::facts::Page;
use tussock_report::citation::Citation;
use tussock_report::rich::Rich;
use tussock_report::table::{Column, Row, Table};
use tussock_report::value::Value;

use super::draft::Draft;
use super::paired::{Family, PairCells, effect_symbol, pair_columns, place_pair, refuse_too_many};
use super::wording::{listed, measured, outcome_head};
use super::{Request, Shown, View};
use crate::study::Study;
use crate::trouble::Answerable;

pub(super) struct Pairs;

static PAGE: Page = Page {
    name: "pairs",
    summary: "every pair of groups on every outcome: difference, test, adjusted p, d or g",
    text: include_str!("pairs.md"),
};

impl View for Pairs {
    fn page(&self) -> &'static Page {
        &PAGE
    }

    fn by_term(&self) -> bool {
        true
    }

    fn show(&self, study: &Study, request: &Request) -> Answerable<Shown> {
        let comparison = &study.comparison;
        let sample = &comparison.sample;
        let policy = &request.policy;
        refuse_too_many(study, comparison.outcomes.len())?;
        let found: Vec<Option<Found>> = (0..comparison.outcomes.len())
            .map(|index| {
                let values = sample.outcome(index);
                pairs(values, sample.groups(), sample.group_count(), policy.interval).ok()
            })
            .collect();
        let family = Family::of(found.iter().flatten());
        let mut draft = Draft::of_term(study, PAGE.name);
        let title =
            Rich::from("Pairs of groups on each outcome, ").then(comparison.factor_label.clone());
        let mut table = Table::new(title)
            .column(Column::row_head("Outcome"))
            .columns(pair_columns("*M* difference", policy));
        let mut adjusted = family.adjusted().into_iter();
        let mut undefined = Vec::new();
        for (outcome, found) in comparison.outcomes.iter().zip(&found) {
            let Some(found) = found else {
                undefined.push(outcome.label.clone());
                continue;
            };
            for (index, pair) in found.list.iter().enumerate() {
                let Some(adjusted) = adjusted.next() else { break };
                let head = if index == 0 { outcome_head(outcome) } else { Rich::default() };
                let row = Row::headed(head);
                let row = if index == 0 { row.opening_block() } else { row };
                let cells = PairCells {
                    pair,
                    adjusted,
                    policy,
                    levels: &comparison.levels,
                    measure: &|number| measured(number, outcome),
                };
                let first = cells.first().to_owned();
                let second = cells.second().to_owned();
                let keys = [first.as_str(), second.as_str(), outcome.name.as_str()];
                table = table.row(place_pair(&mut draft, row, &cells, &keys));
            }
        }
        for note in family.notes(comparison.outcomes.len() - undefined.len(), "outcome", policy) {
            table = table.note(note);
        }
        if !undefined.is_empty() {
            table = table.note(listed(&undefined).then(Rich::from(
                ": no differences can be tested, because there is no variation within groups.",
            )));
        }
        draft.table(table);
        let averages = averages(&mut draft, study, &found, request);
        draft.table(averages);
        Ok(draft.finish())
    }
}

/// How large the differences on each outcome are on average, whatever their direction.
fn averages(draft: &mut Draft, study: &Study, found: &[Option<Found>], request: &Request) -> Table {
    let symbol = effect_symbol(request.policy.effect);
    let head = Rich::from("mean |").then(symbol.clone()).then(Rich::from("|"));
    let mut table = Table::new("Average size of the differences on each outcome")
        .column(Column::row_head("Outcome"))
        .column(Column::value(head.clone()));
    for (outcome, found) in study.comparison.outcomes.iter().zip(found) {
        let row = Row::headed(outcome.label.clone());
        table = table.row(match found {
            Some(found) => {
                let value = Value::statistic(match request.policy.effect {
                    Effect::D => found.mean_abs_d,
                    Effect::G => found.mean_abs_g,
                });
                let keys = ["mean_abs_effect", outcome.name.as_str()];
                draft.cite(&keys, Citation::new().value(head.clone(), value));
                row.number(draft.place(value, &keys))
            }
            None => row.undefined(),
        });
    }
    let pairs = study.comparison.levels.len() * (study.comparison.levels.len() - 1) / 2;
    table.note(Rich::fill(
        "The mean of |{effect}| over the {pairs} pairs of groups. It is biased upwards: it \
         exceeds 0 even where no groups differ.",
        &[("effect", symbol), ("pairs", Rich::plain(pairs.to_string()))],
    ))
}
