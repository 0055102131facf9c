//! `show omnibus of main`: do the groups differ on the set of outcomes?

use tussock_analysis::criteria::{Criteria, Criterion, Exactness, TraceApproximation, criteria};
use tussock_language::facts::Page;
use tussock_report::citation::Citation;
use tussock_report::rich::Rich;
use tussock_report::table::{Column, Row, Table};
use tussock_report::value::{NumberStyle, Value};

use super::draft::{Draft, cite_test};
use super::wording::{exactness, interval_head, size_note};
use super::{Request, Shown, View};
use crate::study::Study;
use crate::trouble::Answerable;

pub(super) struct Omnibus;

static PAGE: Page = Page {
    name: "omnibus",
    summary: "the four multivariate criteria with F, df, p and effect size",
    text: include_str!("omnibus.md"),
};

/// A criterion with its words.
struct Entry<'a> {
    key: &'static str,
    name: &'static str,
    symbol: &'static str,
    criterion: &'a Criterion,
    value: Value,
}

impl View for Omnibus {
    fn page(&self) -> &'static Page {
        &PAGE
    }

    fn by_term(&self) -> bool {
        true
    }

    fn show(&self, study: &Study, request: &Request) -> Answerable<Shown> {
        let level = request.policy.share_interval();
        let hypothesis = study.hypothesis()?;
        let found = criteria(hypothesis, level);
        let mut draft = Draft::of_term(study, PAGE.name);
        let title = Rich::from("Differences on the set of outcomes by ")
            .then(study.comparison.factor_label.clone());
        let mut table = Table::new(title)
            .column(Column::row_head("Criterion"))
            .column(Column::value("Value"))
            .column(Column::value("*F*"))
            .column(Column::value("df~1~"))
            .column(Column::value("df~2~"))
            .column(Column::value("*p*"))
            .column(Column::words("*F* is"))
            .column(Column::value("η^2^"))
            .column(Column::value(interval_head(level)));
        for entry in entries(&found) {
            table = table.row(entry.row(&mut draft));
            draft.cite(&[entry.key], entry.citation());
        }
        draft.keep(Value::bounded(found.roy_theta), &["roy", "theta"]);
        draft.keep(
            Value::new(found.wilks.ln_value, NumberStyle::Statistic(4)),
            &["wilks", "ln_value"],
        );
        table = table.note(size_note(&study.comparison)).note(
            "η^2^ is each criterion’s own: 1 − Λ^1/s^, *V*/*s*, *U*/(*U* + *s*) and \
             θ = λ~1~/(1 + λ~1~), with *s* the number of functions; all are biased upwards.",
        );
        for note in notes(&found) {
            table = table.note(note);
        }
        draft.table(table);
        Ok(draft.finish())
    }
}

fn entries(found: &Criteria) -> Vec<Entry<'_>> {
    let hotelling = found.hotelling.as_ref().map(|criterion| Entry {
        key: "hotelling",
        name: "Hotelling–Lawley",
        symbol: "*U*",
        criterion,
        value: Value::new(criterion.value, NumberStyle::Statistic(3)),
    });
    let mut list = vec![
        Entry {
            key: "wilks",
            name: "Wilks",
            symbol: "Λ",
            criterion: &found.wilks,
            value: Value {
                number: found.wilks.value,
                style: NumberStyle::Bounded(3),
                ln: Some(found.wilks.ln_value),
            },
        },
        Entry {
            key: "pillai",
            name: "Pillai",
            symbol: "*V*",
            criterion: &found.pillai,
            value: Value::new(found.pillai.value, NumberStyle::Bounded(3)),
        },
    ];
    list.extend(hotelling);
    list.push(Entry {
        key: "roy",
        name: "Roy",
        symbol: "λ~1~",
        criterion: &found.roy,
        value: Value::new(found.roy.value, NumberStyle::Statistic(3)),
    });
    list
}

impl Entry<'_> {
    fn row(&self, draft: &mut Draft) -> Row {
        let head = Rich::plain(format!("{}, ", self.name)).then(self.symbol);
        let row = Row::headed(head).number(draft.place(self.value, &[self.key, "value"]));
        let test = &self.criterion.test;
        let row = if self.is_bound() {
            let p = draft.place_p(test.p, &[self.key], "p_bound");
            draft.keep(p.value, &[self.key, "p_bound"]);
            row.number(draft.place(Value::statistic(test.f), &[self.key, "F"]))
                .number(draft.place(Value::df(test.df1), &[self.key, "df1"]))
                .number(draft.place(Value::df(test.df2), &[self.key, "df2"]))
                .undefined()
        } else {
            draft.test_cells(row, test, &[self.key])
        };
        let eta2 = Value::new(self.criterion.eta2, NumberStyle::Bounded(3));
        let row = row
            .text(exactness(self.criterion.exactness))
            .number(draft.place(eta2, &[self.key, "eta2"]));
        match self.criterion.eta2_interval {
            Some(interval) => row.interval(
                draft.place(Value::bounded(interval.lower), &[self.key, "eta2_lower"]),
                draft.place(Value::bounded(interval.upper), &[self.key, "eta2_upper"]),
            ),
            None => row.undefined(),
        }
    }

    fn is_bound(&self) -> bool {
        self.criterion.exactness == Exactness::Bound
    }

    /// In prose a criterion is printed with two decimals.
    fn citation(&self) -> Citation {
        let style = match self.value.style {
            NumberStyle::Bounded(_) => NumberStyle::Bounded(2),
            NumberStyle::Count
            | NumberStyle::Df
            | NumberStyle::P
            | NumberStyle::Percent(_)
            | NumberStyle::Statistic(_)
            | NumberStyle::Standardized(_) => NumberStyle::Statistic(2),
        };
        let citation = Citation::new().value(self.symbol, Value { style, ..self.value });
        if self.is_bound() { citation } else { cite_test(citation, &self.criterion.test) }
    }
}

/// A lower bound of a p value. Unlike a p value itself it keeps its figures where it is small, since
/// the true p may lie far above it.
fn bound_text(bound: f64) -> String {
    let style = if bound < 0.001 { NumberStyle::Statistic(3) } else { NumberStyle::P };
    Value::new(bound, style).text()
}

fn notes(found: &Criteria) -> Vec<Rich> {
    let mut notes = Vec::new();
    if found.roy.exactness == Exactness::Bound {
        notes.push(Rich::fill(
            "Roy’s *F* is an upper bound, so it gives no *p* value: it only says that *p* is at \
             least {bound}, which with a true null hypothesis falls below .05 far more often than \
             in 5% of samples. η^2^ for Roy has no interval for the same reason.",
            &[("bound", Rich::plain(bound_text(found.roy.test.p.p)))],
        ));
    }
    let approximations = match (found.pillai.exactness, found.hotelling_approximation) {
        (Exactness::Exact | Exactness::Bound, _) => None,
        (Exactness::Approximate, Some(TraceApproximation::McKeon)) => Some(
            "*F* for Wilks after Rao (1951), for Pillai after Pillai (1960), for Hotelling–Lawley \
             after McKeon (1974).",
        ),
        (Exactness::Approximate, Some(TraceApproximation::PillaiSamson)) => Some(
            "*F* for Wilks after Rao (1951), for Pillai after Pillai (1960), for Hotelling–Lawley \
             after Pillai and Samson (1959), because McKeon’s needs more degrees of freedom for \
             error; it rejects somewhat too often.",
        ),
        (Exactness::Approximate, None) => Some(
            "*F* for Wilks after Rao (1951), for Pillai after Pillai (1960). Hotelling–Lawley is \
             left out: with as many outcomes as degrees of freedom for error its *F* does not exist.",
        ),
    };
    notes.extend(approximations.map(Rich::from));
    notes
}
