//! What a name means here, in Markdown: the text of hovers, and of the panel beside a completion.

use super::markdown::{cell, fenced, stacked, with_values};
use super::scope::{Defines, Scope};
use crate::ast::{ColumnSelection, Compare};
use crate::facts::{ColumnFact, ColumnKind, Facts};
use crate::names::{NumberRange, dotted, is_plain, quoted};
use crate::terms::{self, Term};
use crate::verbs::{Choice, Clause, Part, Presence, Verb, What};

/// How many columns or keys a hover lists.
const MOST: usize = 24;

/// The names of a document and the facts about them.
pub(super) struct Describe<'a> {
    pub(super) scope: Scope<'a>,
    pub(super) facts: &'a dyn Facts,
}

impl Describe<'_> {
    /// A table: how it is defined, and its columns.
    pub(super) fn table(&self, name: &str) -> Option<String> {
        let definition = self.scope.definition(Defines::Table, name);
        let columns = self.facts.columns(name).map(|columns| columns_table(&columns));
        if definition.is_none() && columns.is_none() {
            return None;
        }
        let heading = format!("**`{}`**, a table", quoted(name));
        let code = definition.map(fenced).unwrap_or_default();
        Some(
            format!("{heading}\n\n{code}\n\n{}", columns.unwrap_or_default()).trim_end().to_owned(),
        )
    }

    /// A comparison: how it is defined, its groups and outcomes, and what came out.
    pub(super) fn comparison(&self, name: &str) -> Option<String> {
        let mut text = self.comparison_as_defined(name)?;
        let path = [name, "omnibus", "pillai"].map(str::to_owned);
        if let Some(value) = self.facts.value(&path) {
            text.push_str(&format!("\n\nTaken together: **{value}**"));
        }
        Some(text)
    }

    /// A comparison without its results, which may take a moment to compute.
    pub(super) fn comparison_as_defined(&self, name: &str) -> Option<String> {
        let definition = self.scope.definition(Defines::Comparison, name)?;
        let mut text = format!("**`{}`**, a comparison\n\n{}", quoted(name), fenced(definition));
        if let Some(compare) = self.scope.comparison(name) {
            text.push_str(&format!("\n\nOutcomes: {}", listed(&self.outcomes(compare))));
            for factor in &compare.factors {
                text.push_str(&format!("\n\nGroups: by {}", quoted(&factor.value)));
                if let Some(levels) = self.facts.levels(&compare.table.value, &factor.value) {
                    text.push_str(&format!(" ({})", levels.join(", ")));
                }
            }
            text.push_str(&format!("\n\nTable: {}", quoted(&compare.table.value)));
        }
        Some(text)
    }

    /// A column of a table.
    pub(super) fn column(&self, table: &str, column: &str) -> Option<String> {
        let facts = self.facts.columns(table).unwrap_or_default();
        let fact = facts.iter().find(|fact| fact.name == column);
        if fact.is_none() && self.derivation(table, column).is_none() {
            return None;
        }
        Some(self.column_with(table, column, fact))
    }

    /// A column of a table, of which this much is known.
    pub(super) fn column_with(
        &self,
        table: &str,
        column: &str,
        fact: Option<&ColumnFact>,
    ) -> String {
        let kind = fact.map_or("derived", |fact| kind_word(fact.kind));
        let mut text = format!("**`{}`**, a {kind} column of `{}`", quoted(column), quoted(table));
        if let Some(fact) = fact.filter(|fact| !fact.detail.is_empty()) {
            text.push_str(&format!("\n\n{}", fact.detail));
        }
        if let Some(derived) = self.derivation(table, column) {
            text.push_str(&format!("\n\n{}", fenced(derived)));
        }
        text
    }

    /// A level of a factor, and its place among the others.
    pub(super) fn level(&self, table: &str, column: &str, level: &str) -> Option<String> {
        level_among(column, level, &self.facts.levels(table, column)?)
    }

    /// The value at a path, and what its last segment means. `is_whole` says whether that segment
    /// is the last one that is written.
    pub(super) fn path(&self, segments: &[String], is_whole: bool) -> Option<String> {
        let meaning = self.segment(segments, is_whole);
        if let [_] = segments {
            return meaning;
        }
        let value = match self.facts.value(segments) {
            Some(value) => format!("`{}`: **{value}**", dotted(segments)),
            None => self.keys_below(segments),
        };
        // A key without a page of its own is explained by the page of its view.
        let view = || self.segment(segments.get(..2)?, false);
        let meaning = meaning.or_else(|| if value.is_empty() { None } else { view() });
        let text = stacked([value.as_str(), meaning.as_deref().unwrap_or_default()]);
        (!text.is_empty()).then_some(text)
    }

    /// What the last segment of a path means, without its value.
    pub(super) fn meaning(&self, segments: &[String]) -> Option<String> {
        self.segment(segments, true)
    }

    /// The first line of the statement that defines a name.
    pub(super) fn first_line(&self, defines: Defines, name: &str) -> String {
        let definition = self.scope.definition(defines, name).unwrap_or_default();
        definition.lines().next().unwrap_or_default().trim_end().to_owned()
    }

    fn keys_below(&self, segments: &[String]) -> String {
        let keys = self.facts.keys(segments);
        if keys.is_empty() {
            return String::new();
        }
        let mut text = format!("`{}` holds\n", dotted(segments));
        for key in keys.iter().take(MOST) {
            text.push_str(&format!("\n- `{}`: {}", quoted(&key.key), key.detail));
        }
        if keys.len() > MOST {
            text.push_str(&format!("\n- and {} more", keys.len() - MOST));
        }
        text
    }

    fn segment(&self, segments: &[String], is_whole: bool) -> Option<String> {
        match segments {
            [] => None,
            [comparison] => self.comparison(comparison),
            [_, view] => {
                let page = self.facts.views().iter().find(|page| page.name == view)?;
                Some(page.text.to_owned())
            }
            [comparison, view, above @ .., key] => {
                let name = || self.design_name(comparison, key);
                let term = || self.key(comparison, view, key);
                let meaning = if is_whole { term().or_else(name) } else { name().or_else(term) };
                // `.value` is the value of what stands before it.
                let parent = segments.get(..segments.len() - 1)?;
                meaning.or_else(|| {
                    (key == "value" && !above.is_empty()).then(|| self.segment(parent, is_whole))?
                })
            }
        }
    }

    /// A factor, an outcome or a level of a comparison.
    fn design_name(&self, comparison: &str, name: &str) -> Option<String> {
        let compare = self.scope.comparison(comparison)?;
        let table = &compare.table.value;
        let factor = |factor: &&crate::span::Name| factor.value == name;
        if compare.factors.iter().any(|known| factor(&known)) {
            return self.term(comparison, name);
        }
        if self.outcomes(compare).iter().any(|outcome| outcome == name) {
            return self.column(table, name);
        }
        compare.factors.iter().find_map(|factor| self.level(table, &factor.value, name))
    }

    fn key(&self, comparison: &str, view: &str, key: &str) -> Option<String> {
        if !key.is_empty() && key.chars().all(|digit| digit.is_ascii_digit()) {
            return terms::of_word("discriminant-function").map(|term| term.page.text.to_owned());
        }
        let term = terms::of_key(view, key)?;
        Some(self.trade_term(term, Some(comparison).filter(|_| view == "coefficients")))
    }

    /// The page of a term; for a kind of coefficient with its values in a comparison.
    pub(super) fn trade_term(&self, term: &Term, comparison: Option<&str>) -> String {
        let values = term.coefficient_word().zip(comparison).and_then(|(kind, comparison)| {
            let values = self.facts.coefficients(comparison, kind)?;
            Some(format!("**In `{}`**\n\n{values}", quoted(comparison)))
        });
        match values {
            Some(values) => with_values(term.page.text, &values),
            None => term.page.text.to_owned(),
        }
    }

    /// A term of a comparison's design.
    pub(super) fn term(&self, comparison: &str, factor: &str) -> Option<String> {
        let compare = self.scope.comparison(comparison)?;
        compare.factors.iter().find(|known| known.value == factor)?;
        let mut text = format!(
            "**`{}`**, a term of `{}`: the differences among its levels",
            quoted(factor),
            quoted(comparison)
        );
        if let Some(levels) = self.facts.levels(&compare.table.value, factor) {
            text.push_str(&format!("\n\n{}", levels.join(", ")));
        }
        Some(text)
    }

    /// The outcomes of a comparison; a range is written out where the columns are known.
    pub(super) fn outcomes(&self, compare: &Compare) -> Vec<String> {
        let mut outcomes = Vec::new();
        for selection in &compare.outcomes {
            match selection {
                ColumnSelection::One(name) => outcomes.push(name.value.clone()),
                ColumnSelection::Range { first, last } => {
                    let range = NumberRange::new(&first.value, &last.value);
                    let columns = self.facts.columns(&compare.table.value).unwrap_or_default();
                    let within = columns
                        .into_iter()
                        .map(|column| column.name)
                        .filter(|name| range.as_ref().is_some_and(|range| range.contains(name)));
                    outcomes.extend(within);
                }
            }
        }
        outcomes
    }

    /// The statement that derives a column.
    fn derivation(&self, table: &str, column: &str) -> Option<&str> {
        let derived = self.scope.derived(table);
        let one = derived.iter().rfind(|derive| derive.value.column.column.value == column)?;
        Some(self.scope.text(one))
    }
}

/// A level of a factor, and its place among all of them.
pub(super) fn level_among(column: &str, level: &str, levels: &[String]) -> Option<String> {
    let place = levels.iter().position(|known| known == level)?;
    let reference = if place == 0 { ", the reference" } else { "" };
    let list: Vec<String> = levels
        .iter()
        .take(MOST)
        .map(|known| if known == level { format!("**{known}**") } else { known.clone() })
        .collect();
    let more = if levels.len() > MOST { ", ..." } else { "" };
    Some(format!(
        "**`{}`**, level {} of {} of `{}`{reference}\n\n{}{more}",
        quoted(level),
        place + 1,
        levels.len(),
        quoted(column),
        list.join(", ")
    ))
}

/// A clause: its form, what it says, its choices.
pub(super) fn clause(verb: &Verb, clause: &Clause) -> String {
    let need = match clause.presence {
        Presence::Required => "required",
        Presence::Optional => "may be left out",
        Presence::Repeatable => "may be repeated",
    };
    let heading = format!("**`{}`**: {}", clause.usage(), clause.summary);
    let of = format!("A clause of `{}`; {need}.", verb.name());
    let page = terms::of_word(&clause.name());
    let page = page.map(|term| term.page.text).unwrap_or_default();
    stacked([format!("{heading}\n\n{of}{}", choices(clause)).as_str(), page])
}

fn choices(clause: &Clause) -> String {
    let slots = clause.parts.iter().filter_map(|part| match part {
        Part::Slot(slot) => Some(slot),
        Part::Word(_) | Part::Sign(..) | Part::Either(_) => None,
    });
    let mut text = String::new();
    for slot in slots {
        if let What::OneOf(choices) = slot.what {
            text.push('\n');
            for choice in choices {
                text.push_str(&format!("\n- `{}`: {}", choice.word, choice.summary));
            }
        }
    }
    text
}

/// One of a few words that has no page of its own.
pub(super) fn choice(choice: &Choice) -> String {
    format!("**`{}`**: {}", choice.word, choice.summary)
}

/// The words of expressions and what they do.
pub(super) static EXPRESSION_WORDS: &[Choice] = &[
    Choice { word: "and", summary: "both sides hold" },
    Choice { word: "or", summary: "at least one side holds" },
    Choice { word: "not", summary: "what follows does not hold" },
    Choice { word: "in", summary: "is one of: `site in [north, east]`" },
    Choice { word: "if", summary: "a choice: `if age > 40 then 1 else 0`" },
    Choice { word: "then", summary: "the value where the condition holds" },
    Choice { word: "else", summary: "the value where the condition does not hold" },
];

/// A name as it must be written in an expression, whose own words need back-quotes as names.
pub(super) fn written(name: &str) -> String {
    let is_word = EXPRESSION_WORDS.iter().any(|known| known.word == name);
    if is_plain(name) && !is_word { name.to_owned() } else { format!("`{name}`") }
}

/// The word for a kind of column.
pub(super) fn kind_word(kind: ColumnKind) -> &'static str {
    match kind {
        ColumnKind::Number => "number",
        ColumnKind::Text => "text",
    }
}

fn columns_table(columns: &[ColumnFact]) -> String {
    let mut text = "| column | kind | |\n| --- | --- | --- |".to_owned();
    for column in columns.iter().take(MOST) {
        text.push_str(&format!(
            "\n| {} | {} | {} |",
            cell(&column.name),
            kind_word(column.kind),
            cell(&column.detail)
        ));
    }
    if columns.len() > MOST {
        text.push_str(&format!("\n\nand {} more columns", columns.len() - MOST));
    }
    text
}

fn listed(names: &[String]) -> String {
    names.iter().map(|name| quoted(name)).collect::<Vec<_>>().join(", ")
}
