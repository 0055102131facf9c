//! Rows for pairs of groups, on outcomes or on scores: one family of comparisons, one set of columns.

use tussock_analysis::multiplicity::{bonferroni, holm};
use tussock_analysis::pairs::{Pair, Pairs};
use tussock_analysis::test::PValue;
use tussock_language::ast::{Adjustment, Effect};
use tussock_language::diagnostic::Diagnostic;
use tussock_report::citation::Citation;
use tussock_report::rich::Rich;
use tussock_report::table::{Column, Row};
use tussock_report::value::{NumberStyle, Value};

use super::draft::{Draft, with};
use super::wording::{interval_head, pair, percent};
use crate::policy::Policy;
use crate::study::Study;
use crate::trouble::{Answerable, trouble};

/// Beyond this many comparisons a table of pairs serves nobody.
const MOST_COMPARISONS: usize = 10_000;

/// Refuses a table with too many comparisons, of all pairs of groups on `sets` outcomes or functions.
pub(super) fn refuse_too_many(study: &Study, sets: usize) -> Answerable<()> {
    let groups = study.comparison.levels.len();
    let comparisons = groups * groups.saturating_sub(1) / 2 * sets;
    if comparisons <= MOST_COMPARISONS {
        return Ok(());
    }
    let message = format!("{groups} groups make {comparisons} comparisons of pairs");
    let location = study.comparison.factor_location;
    let found = Diagnostic::error("too-many-pairs", location, message);
    Err(trouble(
        found.help("select some groups with `where`, or check that the factor is the right column"),
    ))
}

/// The comparisons of a table taken together, in the order of its rows.
#[derive(Debug)]
pub(super) struct Family {
    p: Vec<PValue>,
    df: f64,
}

/// The p values of one comparison.
#[derive(Clone, Copy, Debug)]
pub(super) struct Adjusted {
    bonferroni: PValue,
    holm: PValue,
}

impl Family {
    /// The family of all pairs of several outcomes or scores.
    pub(super) fn of<'a>(found: impl IntoIterator<Item = &'a Pairs>) -> Self {
        let mut family = Self { p: Vec::new(), df: f64::NAN };
        for pairs in found {
            family.df = pairs.df;
            family.p.extend(pairs.list.iter().map(|pair| pair.p));
        }
        family
    }

    /// The adjusted p values, in the order of the rows.
    pub(super) fn adjusted(&self) -> Vec<Adjusted> {
        let (bonferroni, holm) = (bonferroni(&self.p), holm(&self.p));
        bonferroni
            .into_iter()
            .zip(holm)
            .map(|(bonferroni, holm)| Adjusted { bonferroni, holm })
            .collect()
    }

    /// What the table says of how it was computed.
    pub(super) fn notes(&self, count: usize, of: &str, policy: &Policy) -> Vec<Rich> {
        let size = self.p.len();
        let pairs = size.checked_div(count).unwrap_or_default();
        let slots = [
            ("size", counted(size, "comparison")),
            ("count", counted(count, of)),
            ("pairs", counted(pairs, "pair")),
            ("df", Rich::plain(Value::df(self.df).text())),
            ("effect", effect_symbol(policy.effect)),
            ("level", Rich::plain(percent(policy.interval))),
        ];
        vec![
            Rich::fill(
                "Family of the adjusted *p*: all of the table, {size} ({count} × {pairs}). \
                 Bonferroni; Holm (1979).",
                &slots,
            ),
            Rich::fill(
                "*t* and {effect} use the standard deviation pooled over all groups \
                 (df = {df}). {effect_note}",
                &[&slots[..], &[("effect_note", effect_note(policy.effect))]].concat(),
            ),
            Rich::fill(
                "The {level} intervals are of single comparisons; that of {effect} is for the \
                 population’s standardized difference, by the noncentral *t* distribution.",
                &slots,
            ),
        ]
    }
}

/// `1 pair`, `3 pairs`.
fn counted(count: usize, of: &str) -> Rich {
    Rich::plain(if count == 1 { format!("1 {of}") } else { format!("{count} {of}s") })
}

fn effect_note(effect: Effect) -> Rich {
    Rich::from(match effect {
        Effect::D => "Cohen’s *d* is not corrected for small samples.",
        Effect::G => "Hedges’ *g* corrects *d* for small samples, by the exact factor.",
    })
}

/// `d` or `g`.
pub(super) fn effect_symbol(effect: Effect) -> Rich {
    Rich::from(match effect {
        Effect::D => "*d*",
        Effect::G => "*g*",
    })
}

/// The columns of a pair, from the pair's name on.
pub(super) fn pair_columns(difference: &str, policy: &Policy) -> Vec<Column> {
    vec![
        Column::row_head("Pair"),
        Column::value(difference),
        Column::value(interval_head(policy.interval)),
        Column::value("*t*"),
        Column::value("*p*"),
        Column::value("Bonferroni").under("adjusted *p*"),
        Column::value("Holm").under("adjusted *p*"),
        Column::value(effect_symbol(policy.effect)),
        Column::value(interval_head(policy.interval)),
    ]
}

/// A pair and what its cells need to know.
pub(super) struct PairCells<'a> {
    /// The pair.
    pub(super) pair: &'a Pair,
    /// Its adjusted p values.
    pub(super) adjusted: Adjusted,
    /// The policy in force.
    pub(super) policy: &'a Policy,
    /// The groups.
    pub(super) levels: &'a [String],
    /// How a difference is printed.
    pub(super) measure: &'a dyn Fn(f64) -> Value,
}

impl PairCells<'_> {
    /// The level that is subtracted from.
    pub(super) fn first(&self) -> &str {
        self.levels.get(self.pair.first).map_or("", String::as_str)
    }

    /// The level that is subtracted.
    pub(super) fn second(&self) -> &str {
        self.levels.get(self.pair.second).map_or("", String::as_str)
    }

    /// The p value that the policy asks for.
    pub(super) fn chosen(&self) -> PValue {
        match self.policy.pairs {
            Adjustment::Unadjusted => self.pair.p,
            Adjustment::Bonferroni => self.adjusted.bonferroni,
            Adjustment::Holm => self.adjusted.holm,
        }
    }
}

/// Adds the cells of a pair to a row and keeps its values and its citation.
pub(super) fn place_pair(draft: &mut Draft, row: Row, cells: &PairCells<'_>, keys: &[&str]) -> Row {
    let pair_found = cells.pair;
    let standardized = |number: f64| Value::new(number, NumberStyle::Standardized(2));
    let measure = cells.measure;
    let (effect, other) = match cells.policy.effect {
        Effect::D => (("d", pair_found.d), ("g", pair_found.g)),
        Effect::G => (("g", pair_found.g), ("d", pair_found.d)),
    };
    let (lower, upper) = (pair_found.effect_interval.lower, pair_found.effect_interval.upper);
    draft.keep(Value::df(pair_found.df), &with(keys, "df"));
    draft.keep(standardized(other.1), &with(keys, other.0));
    draft.keep(standardized(lower), &with(keys, &format!("{}_lower", other.0)));
    draft.keep(standardized(upper), &with(keys, &format!("{}_upper", other.0)));
    let chosen = cells.chosen();
    let p_adjusted = draft.place_p(chosen, keys, "p_adjusted");
    draft.keep(p_adjusted.value, &with(keys, "p_adjusted"));
    let symbol = effect_symbol(cells.policy.effect);
    let citation = Citation::new()
        .value("*M*~diff~", measure(pair_found.difference))
        .test("*t*", [Value::df(pair_found.df)], standardized(pair_found.t))
        .value(adjusted_symbol(cells.policy.pairs), Value::p(chosen.p, chosen.ln_p))
        .value(symbol, standardized(effect.1))
        .interval(interval_head(cells.policy.interval), standardized(lower), standardized(upper));
    draft.cite(keys, citation);

    let p = draft.place_p(pair_found.p, keys, "p");
    let bonferroni = draft.place_p(cells.adjusted.bonferroni, keys, "p_bonferroni");
    let holm = draft.place_p(cells.adjusted.holm, keys, "p_holm");
    row.text(pair(cells.first(), cells.second()))
        .number(draft.place(measure(pair_found.difference), &with(keys, "difference")))
        .interval(
            draft.place(measure(pair_found.interval.lower), &with(keys, "lower")),
            draft.place(measure(pair_found.interval.upper), &with(keys, "upper")),
        )
        .number(draft.place(standardized(pair_found.t), &with(keys, "t")))
        .number(p)
        .number(bonferroni)
        .number(holm)
        .number(draft.place(standardized(effect.1), &with(keys, effect.0)))
        .interval(
            draft.place(standardized(lower), &with(keys, &format!("{}_lower", effect.0))),
            draft.place(standardized(upper), &with(keys, &format!("{}_upper", effect.0))),
        )
}

/// The symbol of the p value that the policy asks for.
fn adjusted_symbol(adjustment: Adjustment) -> &'static str {
    match adjustment {
        Adjustment::Unadjusted => "*p*",
        Adjustment::Bonferroni => "*p*~Bonferroni~",
        Adjustment::Holm => "*p*~Holm~",
    }
}
