//! A comparison with its data: the rows that can be compared, their groups, and where the rest went.

use std::sync::Arc;

use tussock_analysis::sample::Sample;
use tussock_language::ast::{Better, ColumnSelection, Compare};
use tussock_language::diagnostic::Diagnostic;
use tussock_language::model::Located;
use tussock_language::names::{NumberRange, quoted};
use tussock_language::span::{Location, Name, Span};
use tussock_report::rich::Rich;

use crate::evaluate::Columns;
use crate::evaluate::vector::Vector;
use crate::factor::{Factor, factor};
use crate::flow::{Count, Flow, Missing, Step};
use crate::relation::{Base, Condition, Relation};
use crate::trouble::{Answerable, trouble};

/// A comparison ready to be analysed.
#[derive(Debug)]
pub(crate) struct Comparison {
    /// Its name.
    pub(crate) name: String,
    /// The factor's column, which is also the name of the only term of the design.
    pub(crate) factor: String,
    /// What tables print for the factor.
    pub(crate) factor_label: Rich,
    /// Where the factor stands in the statement.
    pub(crate) factor_location: Location,
    /// The outcomes.
    pub(crate) outcomes: Vec<Outcome>,
    /// The groups, the reference first.
    pub(crate) levels: Vec<String>,
    /// The complete rows: outcomes and group codes.
    pub(crate) sample: Sample,
    /// Where the other rows went.
    pub(crate) flow: Flow,
}

/// An outcome.
#[derive(Clone, Debug, PartialEq)]
pub(crate) struct Outcome {
    /// Its column.
    pub(crate) name: String,
    /// What tables print for it.
    pub(crate) label: Rich,
    /// Its unit.
    pub(crate) unit: Option<String>,
    /// Which end is good.
    pub(crate) better: Option<Better>,
    /// How many decimals the raw values have.
    pub(crate) decimals: u8,
    /// Where it stands in the statement.
    pub(crate) location: Location,
}

impl Comparison {
    /// Gathers the data of a comparison from its table. `condition` is its `where` as written.
    pub(crate) fn gather(
        statement: &Located<Compare>,
        table: &Arc<Relation>,
        condition: &str,
    ) -> Answerable<Self> {
        let source = statement.location.source;
        let compare = &statement.value;
        let selected = select(statement, table, condition)?;
        let mut flow = Flow::of(&selected);
        let outcomes = outcomes(statement, &selected)?;
        let columns = outcomes
            .iter()
            .map(|outcome| selected.numbers(&outcome.name, outcome.location))
            .collect::<Answerable<Vec<_>>>()?;
        let factor_name = single_factor(compare, statement.location)?;
        let factor_location = Location { source, span: factor_name.span };
        let groups = factor(&selected, &factor_name.value, factor_location)?;
        flow.add_groups(&ancestors(&selected), &groups, &factor_name.value, factor_location);

        let complete = |row: usize| columns.iter().all(|c| c.get(row).is_some_and(|x| !x.is_nan()));
        let grouped: Vec<(usize, usize)> = groups.coded();
        flow.missing = missing(&outcomes, &columns, &grouped, &groups);
        let kept: Vec<(usize, usize)> =
            grouped.iter().copied().filter(|(row, _)| complete(*row)).collect();
        flow.analysed(&grouped, &kept, groups.levels.len());
        refuse_empty_groups(&groups, &kept, &factor_name.value, factor_location)?;
        let outcomes: Vec<Outcome> = outcomes
            .into_iter()
            .zip(&columns)
            .map(|(outcome, column)| Outcome { decimals: decimals(column), ..outcome })
            .collect();
        let sample = sample(&columns, &kept, &groups, &outcomes, factor_location)?;
        Ok(Self {
            name: compare.name.value.clone(),
            factor_label: label(&selected, &factor_name.value),
            factor: factor_name.value.clone(),
            factor_location,
            outcomes,
            levels: groups.levels,
            sample,
            flow,
        })
    }
}

/// The factor, of which there is one.
fn single_factor(compare: &Compare, location: Location) -> Answerable<&Name> {
    compare.factors.first().ok_or_else(|| {
        let message = "the comparison names no factor";
        trouble(Diagnostic::error("syntax", location, message).help("write `across` and a column"))
    })
}

/// The rows that the comparison's own condition selects.
fn select(
    statement: &Located<Compare>,
    table: &Arc<Relation>,
    condition: &str,
) -> Answerable<Arc<Relation>> {
    let Some(expression) = &statement.value.condition else { return Ok(table.clone()) };
    let source = statement.location.source;
    let because = "selected for this comparison";
    let condition = Condition { expression, source, text: condition, because };
    Ok(Arc::new(Relation::selection(table, condition)?))
}

/// The outcomes that the statement names, ranges written out.
fn outcomes(statement: &Located<Compare>, table: &Relation) -> Answerable<Vec<Outcome>> {
    let source = statement.location.source;
    let mut list = Vec::new();
    for selection in &statement.value.outcomes {
        match selection {
            ColumnSelection::One(name) => {
                let location = Location { source, span: name.span };
                if !table.has(&name.value) {
                    return Err(table.unknown_column(&name.value, location));
                }
                list.push(outcome(table, &name.value, location));
            }
            ColumnSelection::Range { first, last } => {
                let span = Span::new(first.span.start, last.span.end);
                let location = Location { source, span };
                for name in range(table, &first.value, &last.value, location)? {
                    list.push(outcome(table, &name, location));
                }
            }
        }
    }
    Ok(list)
}

fn outcome(table: &Relation, name: &str, location: Location) -> Outcome {
    let stated = table.label(name);
    Outcome {
        name: name.to_owned(),
        label: label(table, name),
        unit: stated.and_then(|label| label.unit.as_ref()).map(|unit| unit.value.clone()),
        better: stated.and_then(|label| label.better.as_ref()).map(|better| better.value),
        decimals: 0,
        location,
    }
}

/// What tables print for a column: its label, or its name.
fn label(table: &Relation, column: &str) -> Rich {
    Rich::plain(table.label(column).map_or(column, |label| label.text.value.as_str()))
}

/// Every column in a range such as `q1..q9`.
fn range(table: &Relation, first: &str, last: &str, location: Location) -> Answerable<Vec<String>> {
    let range = NumberRange::new(first, last);
    let within = |name: &String| range.as_ref().is_some_and(|range| range.contains(name));
    let names: Vec<String> = table.names().into_iter().filter(within).collect();
    if names.is_empty() {
        let message = format!("`{}` has no columns {first} to {last}", table.name);
        let help = "a range needs one stem and two numbers, as in `q1..q9`";
        return Err(trouble(Diagnostic::error("unknown-column", location, message).help(help)));
    }
    Ok(names)
}

/// The table and those that it comes from, the file's first.
fn ancestors(table: &Arc<Relation>) -> Vec<Arc<Relation>> {
    let mut chain = vec![table.clone()];
    while let Some(Base::Part { parent, .. }) = chain.last().map(|last| &last.base) {
        let parent = parent.clone();
        chain.push(parent);
    }
    chain.reverse();
    chain
}

fn missing(
    outcomes: &[Outcome],
    columns: &[Arc<Vec<f64>>],
    grouped: &[(usize, usize)],
    groups: &Factor,
) -> Vec<Missing> {
    let count = |column: &Vec<f64>| {
        let absent = |row: usize| column.get(row).is_none_or(|value| value.is_nan());
        let rows: Vec<(usize, usize)> =
            grouped.iter().copied().filter(|(row, _)| absent(*row)).collect();
        Count::of(&rows, groups.levels.len())
    };
    outcomes
        .iter()
        .zip(columns)
        .map(|(outcome, column)| Missing {
            outcome: outcome.name.clone(),
            label: outcome.label.clone(),
            count: count(column),
        })
        .collect()
}

fn refuse_empty_groups(
    groups: &Factor,
    kept: &[(usize, usize)],
    factor: &str,
    location: Location,
) -> Answerable<()> {
    let sizes = Count::of(kept, groups.levels.len()).by_group();
    for (level, size) in groups.levels.iter().zip(sizes) {
        if size == 0 {
            let message = format!("no row of `{level}` has a value on every outcome");
            let help = format!(
                "leave the group out with `where {} != {}`, or compare on other outcomes",
                quoted(factor),
                quoted(level)
            );
            return Err(trouble(Diagnostic::error("empty-group", location, message).help(help)));
        }
    }
    Ok(())
}

fn sample(
    columns: &[Arc<Vec<f64>>],
    kept: &[(usize, usize)],
    groups: &Factor,
    outcomes: &[Outcome],
    location: Location,
) -> Answerable<Sample> {
    let value = |row: usize, column: usize| {
        let row = kept.get(row).map_or(0, |(row, _)| *row);
        columns.get(column).and_then(|values| values.get(row)).copied().unwrap_or(f64::NAN)
    };
    let outcomes_matrix = nalgebra::DMatrix::from_fn(kept.len(), columns.len(), value);
    let codes = kept.iter().map(|(_, group)| *group).collect();
    Sample::new(outcomes_matrix, codes, groups.levels.len()).map_err(|error| {
        crate::refusal::refusal(
            &error,
            &crate::refusal::Names { outcomes, levels: &groups.levels, factor: location },
        )
    })
}

/// How many decimals the values of a column were written with, at most four.
fn decimals(column: &[f64]) -> u8 {
    let shows = |decimals: i32| {
        let unit = 10f64.powi(decimals);
        column.iter().filter(|x| !x.is_nan()).all(|x| {
            let scaled = x * unit;
            (scaled - scaled.round()).abs() <= 1e-6 * scaled.abs().clamp(1.0, 1e3)
        })
    };
    (0u8..4).find(|&decimals| shows(i32::from(decimals))).unwrap_or(4)
}

impl Flow {
    /// The steps from the file to a table.
    fn of(table: &Arc<Relation>) -> Self {
        let mut steps = Vec::new();
        for relation in ancestors(table) {
            let selected = matches!(&relation.base, Base::Part { parent, .. }
                if parent.name == relation.name);
            let keys = if selected {
                vec!["selected".to_owned()]
            } else {
                vec!["admitted".to_owned(), relation.name.clone()]
            };
            steps.push(match &relation.base {
                Base::File(frame) => Step {
                    keys: vec!["read".to_owned()],
                    label: Rich::plain(format!("Read: {}", relation.name)),
                    remaining: Count { total: frame.rows(), groups: None },
                    left_out: None,
                },
                Base::Part { rows, admission, .. } => Step {
                    keys,
                    label: Rich::plain(admission.to_string()),
                    remaining: Count { total: rows.len(), groups: None },
                    left_out: Some(admission.excluded + admission.undecided),
                },
            });
        }
        Self { steps, missing: Vec::new() }
    }

    /// Fills in the counts by group of the steps so far, as far as the factor is known there, and
    /// adds the step from all rows to those that belong to a group.
    fn add_groups(
        &mut self,
        ancestors: &[Arc<Relation>],
        groups: &Factor,
        factor: &str,
        location: Location,
    ) {
        for (step, relation) in self.steps.iter_mut().zip(ancestors) {
            let Ok(Vector::Text(texts)) = relation.texts(factor, location) else { continue };
            step.remaining.groups = Some(groups.count(texts.iter().map(Option::as_deref)));
        }
        let all = groups.codes.len();
        let grouped = groups.coded();
        if let Some(last) = self.steps.last_mut() {
            last.remaining.groups = Some(Count::of(&grouped, groups.levels.len()).by_group());
        }
        if grouped.len() < all {
            self.steps.push(Step {
                keys: vec!["grouped".to_owned()],
                label: Rich::plain(format!("With a value of {factor}")),
                remaining: Count::of(&grouped, groups.levels.len()),
                left_out: Some(all - grouped.len()),
            });
        }
    }

    /// Adds the last step: the rows that are complete.
    fn analysed(&mut self, before: &[(usize, usize)], kept: &[(usize, usize)], groups: usize) {
        self.steps.push(Step {
            keys: vec!["analysed".to_owned()],
            label: Rich::from("Compared: a value on every outcome"),
            remaining: Count::of(kept, groups),
            left_out: Some(before.len() - kept.len()),
        });
    }
}

impl Count {
    fn of(rows: &[(usize, usize)], groups: usize) -> Self {
        let mut sizes = vec![0; groups];
        for (_, code) in rows {
            if let Some(size) = sizes.get_mut(*code) {
                *size += 1;
            }
        }
        Self { total: rows.len(), groups: Some(sizes) }
    }

    fn by_group(self) -> Vec<usize> {
        self.groups.unwrap_or_default()
    }
}
