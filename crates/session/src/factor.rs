//! The groups of a comparison: a column's levels in their order, and each row's group.

use std::collections::{BTreeMap, BTreeSet};

use tussock_data::frame::order;
use tussock_language::diagnostic::Diagnostic;
use tussock_language::names::{listed, quoted};
use tussock_language::span::Location;

use crate::evaluate::Columns;
use crate::evaluate::vector::Vector;
use crate::relation::Relation;
use crate::trouble::{Answerable, nearest, trouble};

/// A factor over the rows of a table.
#[derive(Clone, Debug, PartialEq)]
pub(crate) struct Factor {
    /// The levels that occur, the reference first.
    pub(crate) levels: Vec<String>,
    /// Each row's level; none where the factor is missing.
    pub(crate) codes: Vec<Option<usize>>,
}

impl Factor {
    /// The rows that belong to a group, with their groups.
    pub(crate) fn coded(&self) -> Vec<(usize, usize)> {
        let rows = self.codes.iter().enumerate();
        rows.filter_map(|(row, code)| code.map(|code| (row, code))).collect()
    }

    /// How many of some texts are each level.
    pub(crate) fn count<'a>(&self, texts: impl Iterator<Item = Option<&'a str>>) -> Vec<usize> {
        let mut counts = vec![0; self.levels.len()];
        let codes = codes(&self.levels);
        for text in texts.flatten() {
            let code = codes.get(text).copied();
            if let Some(count) = code.and_then(|code| counts.get_mut(code)) {
                *count += 1;
            }
        }
        counts
    }
}

/// The factor of a column: levels in the stated order, else in the order of numbers or text. A level
/// that is stated but stands in no row of the table it was stated for is most likely a slip.
pub(crate) fn factor(table: &Relation, column: &str, location: Location) -> Answerable<Factor> {
    if !table.has(column) {
        return Err(table.unknown_column(column, location));
    }
    let Vector::Text(texts) = table.texts(column, location)? else {
        return Ok(Factor { levels: Vec::new(), codes: Vec::new() });
    };
    let order = levels(table, column, location)?;
    let present: BTreeSet<&str> = texts.iter().flatten().map(String::as_str).collect();
    let levels: Vec<String> =
        order.into_iter().filter(|level| present.contains(level.as_str())).collect();
    if levels.len() < 2 {
        return Err(too_few(column, &levels, texts.len(), location));
    }
    let known = codes(&levels);
    let code = |text: &String| known.get(text.as_str()).copied();
    let codes = texts.iter().map(|text| text.as_ref().and_then(code)).collect();
    Ok(Factor { levels, codes })
}

/// The code of each level: a column taken for a factor by mistake may have one in every row.
fn codes(levels: &[String]) -> BTreeMap<&str, usize> {
    levels.iter().enumerate().map(|(code, level)| (level.as_str(), code)).collect()
}

/// The levels of a column in their order.
pub(crate) fn levels(
    table: &Relation,
    column: &str,
    location: Location,
) -> Answerable<Vec<String>> {
    let Some((stated_for, stated)) = table.stated_levels(column) else {
        return natural_order(table, column, location);
    };
    let present = natural_order(stated_for, column, location)?;
    if stated.value.order.is_empty() {
        return Ok(present);
    }
    let source = stated.location.source;
    for level in &stated.value.order {
        if !present.contains(&level.value) {
            let location = Location { source, span: level.span };
            return Err(absent_level(stated_for, column, &level.value, &present, location));
        }
    }
    let listed = |level: &String| stated.value.order.iter().any(|name| name.value == *level);
    if let Some(unlisted) = present.iter().find(|level| !listed(level)) {
        return Err(unlisted_level(column, unlisted, &stated.value.order, stated.location));
    }
    Ok(stated.value.order.iter().map(|name| name.value.clone()).collect())
}

/// The levels that occur in a table, whatever order was stated for them.
pub(crate) fn present(table: &Relation, column: &str) -> Answerable<Vec<String>> {
    natural_order(table, column, Location::default())
}

fn natural_order(table: &Relation, column: &str, location: Location) -> Answerable<Vec<String>> {
    let Vector::Text(texts) = table.texts(column, location)? else { return Ok(Vec::new()) };
    let levels = order::levels(texts.iter().flatten().map(String::as_str), '.');
    Ok(levels.into_iter().map(str::to_owned).collect())
}

fn too_few(column: &str, levels: &[String], rows: usize, location: Location) -> Box<Diagnostic> {
    let message = match levels {
        [] if rows == 0 => "there are no rows to compare".to_owned(),
        [] => format!("`{column}` is missing in every row, so there are no groups to compare"),
        _ => format!("`{column}` has the same value in every row, so there is nothing to compare"),
    };
    let help = "a comparison needs two groups or more: check the factor, and what `where` and \
                `admit` leave";
    trouble(Diagnostic::error("single-group", location, message).help(help))
}

fn absent_level(
    table: &Relation,
    column: &str,
    level: &str,
    present: &[String],
    location: Location,
) -> Box<Diagnostic> {
    let message = format!("no row of `{}` has `{level}` as its {column}", table.name);
    let found = Diagnostic::error("unknown-level", location, message);
    trouble(match nearest(level, present.iter().map(String::as_str)) {
        Some(near) => found
            .help(format!("did you mean `{near}`?"))
            .replace_by(format!("Change to `{near}`"), quoted(near)),
        None => found.help(format!("it has {}", listed(present.iter().map(String::as_str)))),
    })
}

fn unlisted_level(
    column: &str,
    level: &str,
    order: &[tussock_language::span::Name],
    location: Location,
) -> Box<Diagnostic> {
    let message = format!("`{column}` also has the level `{level}`, which this order leaves out");
    let trimmed = level.trim().to_lowercase();
    let same = order
        .iter()
        .map(|name| name.value.as_str())
        .find(|name| name.trim().to_lowercase() == trimmed || nearest(level, [*name]).is_some());
    let help = match same {
        Some(near) => format!(
            "if it is another spelling of `{near}`, add `merging \"{level}\" into {}`; \
             if it is a group of its own, name it in the order",
            quoted(near)
        ),
        None => "name it in the order, or merge it into another level with `merging`".to_owned(),
    };
    trouble(Diagnostic::error("unlisted-level", location, message).help(help))
}
