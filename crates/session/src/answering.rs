//! Answers the questions of a document in reading order.

use std::panic::{AssertUnwindSafe, catch_unwind};

use tussock_language::ast::{Pin, ProsePart, Show, Write};
use tussock_language::diagnostic::{Diagnostic, Severity};
use tussock_language::model::{QuestionKind, TableBase, TableDefinition};
use tussock_language::names::{dotted, quoted};
use tussock_language::rules::diagnose;
use tussock_language::span::{Location, SourceId};
use tussock_report::rich::Rich;

use crate::answer::{Answer, Answers, Output};
use crate::cancel::Cancel;
use crate::context::{Context, view};
use crate::evaluate::Columns;
use crate::factor::levels;
use crate::knowledge::Knowledge;
use crate::relation::Relation;
use crate::trouble::{Answerable, trouble};
use crate::values::Found;
use crate::views::Request;

/// The answers of a whole document, or of one source of it.
pub(crate) fn answer(context: &Context<'_>, only: Option<SourceId>, cancel: &Cancel) -> Answers {
    let here = |location: Location| only.is_none_or(|source| location.source == source);
    let mut answers = Answers::default();
    let mut put = |location: Location, output: Output| {
        answers.list.push(Answer { location, output });
    };
    let statics: Vec<Diagnostic> = diagnose(&context.model, &Knowledge::borrowing(context))
        .into_iter()
        .filter(|problem| here(problem.location))
        .map(|problem| if only.is_some() { with_hint_at_cells(problem) } else { problem })
        .collect();
    for note in definitions(context, &here) {
        put(note.location, note.output);
    }
    for question in context.model.questions.iter().filter(|question| here(question.location)) {
        if cancel.is_cancelled() {
            answers.interrupted = true;
            break;
        }
        let broken = statics.iter().any(|problem| {
            problem.severity == Severity::Error && lies_in(problem.location, question.location)
        });
        if broken {
            continue;
        }
        match guarded(question.location, || ask(context, question)) {
            Ok(outputs) => {
                for output in outputs {
                    answers.list.push(Answer { location: question.location, output });
                }
            }
            Err(problem) => answers
                .list
                .push(Answer { location: question.location, output: Output::Problem(*problem) }),
        }
    }
    let problems = statics.iter().map(|problem| Answer {
        location: problem.location,
        output: Output::Problem(problem.clone()),
    });
    answers.list.extend(problems);
    answers.list.retain(|answer| !is_allowed(context, answer));
    answers.list.sort_by_key(|answer| (answer.location.source, answer.location.span.start));
    without_repeats(&mut answers, &statics);
    answers
}

/// Where cells are run one by one, a name may be unknown because its cell has not been run yet, or
/// not since the kernel was started again.
fn with_hint_at_cells(problem: Diagnostic) -> Diagnostic {
    if !matches!(problem.rule, "unknown-table" | "unknown-comparison") {
        return problem;
    }
    let hint = "if a cell defines it, run the cell that does: nothing is kept over a restart";
    let help = match &problem.help {
        Some(help) => format!("{help}; {hint}"),
        None => hint.to_owned(),
    };
    problem.help(help)
}

/// Whether the text silences a problem at its place.
fn is_allowed(context: &Context<'_>, answer: &Answer) -> bool {
    match &answer.output {
        Output::Problem(problem) => context.model.without_allowed(vec![problem.clone()]).is_empty(),
        Output::Table(_) | Output::Paragraph(_) | Output::Note(_) | Output::Value(_) => false,
    }
}

/// A problem is told once, where it first comes up; and what the text alone shows to be wrong is not
/// told again by what depends on it.
fn without_repeats(answers: &mut Answers, statics: &[Diagnostic]) {
    let mut told: Vec<Diagnostic> = Vec::new();
    answers.list.retain(|answer| {
        let Output::Problem(problem) = &answer.output else { return true };
        let same_place = |known: &Diagnostic| {
            known.location == problem.location && known.rule == problem.rule && known != problem
        };
        let is_new = !told.contains(problem) && !statics.iter().any(same_place);
        if is_new {
            told.push(problem.clone());
        }
        is_new
    });
}

fn lies_in(inner: Location, outer: Location) -> bool {
    inner.source == outer.source
        && outer.span.start <= inner.span.start
        && inner.span.start <= outer.span.end
}

/// Nothing that a question does may take the session down.
pub(crate) fn guarded<T>(
    location: Location,
    work: impl FnOnce() -> Answerable<T>,
) -> Answerable<T> {
    catch_unwind(AssertUnwindSafe(work)).unwrap_or_else(|_| {
        let message = "Tussock failed here, through no fault of the document";
        let found = Diagnostic::error("internal-error", location, message);
        Err(trouble(found.help("please report this with the document that shows it")))
    })
}

/// A word on every definition, or what is wrong with it.
fn definitions(context: &Context<'_>, here: &dyn Fn(Location) -> bool) -> Vec<Answer> {
    let mut list = Vec::new();
    for (name, definition) in &context.model.tables {
        let location = definition.base.location;
        if here(location) {
            let word = guarded(location, || table_word(context, name, location));
            list.push(word_or_problem(location, word));
        }
        list.extend(refinements(context, name, definition, here));
    }
    for (name, statement) in &context.model.comparisons {
        if here(statement.location) {
            let word =
                guarded(statement.location, || comparison_word(context, name, statement.location));
            list.push(word_or_problem(statement.location, word));
        }
    }
    list
}

/// What is wrong with what is stated of a table beside its base: a column that can't be derived, an
/// order that does not fit the levels. It is told where it is stated, asked for or not.
fn refinements(
    context: &Context<'_>,
    name: &str,
    definition: &TableDefinition,
    here: &dyn Fn(Location) -> bool,
) -> Vec<Answer> {
    let mut list = Vec::new();
    let mut try_at = |location: Location, attempt: &dyn Fn(&Relation) -> Answerable<()>| {
        if !here(location) {
            return;
        }
        // A table that can't be had is told at its base.
        let Ok(table) = context.relation(name, location) else { return };
        if let Err(problem) = guarded(location, || attempt(&table)) {
            list.push(Answer { location, output: Output::Problem(*problem) });
        }
    };
    for derive in &definition.derived {
        let column = &derive.value.column.column.value;
        try_at(derive.location, &|table| table.column(column, derive.location).map(drop));
    }
    for stated in &definition.levels {
        let column = &stated.value.column.column;
        let location = Location { source: stated.location.source, span: column.span };
        try_at(stated.location, &|table| levels(table, &column.value, location).map(drop));
    }
    list
}

fn word_or_problem(location: Location, word: Answerable<Rich>) -> Answer {
    let output = match word {
        Ok(word) => Output::Note(word),
        Err(problem) => Output::Problem(*problem),
    };
    Answer { location, output }
}

fn table_word(context: &Context<'_>, name: &str, location: Location) -> Answerable<Rich> {
    let table = context.relation(name, location)?;
    let rows = table.rows();
    let admitted = context.model.tables.get(name).map(|definition| &definition.base.value);
    let text = match admitted {
        Some(TableBase::Admit(admit)) => {
            let parent = context.relation(&admit.parent.value, location)?.rows();
            format!("{name}: {rows} of {parent} rows admitted")
        }
        Some(TableBase::Read(_)) | None => {
            format!("{name}: {rows} rows, {} columns", table.names().len())
        }
    };
    Ok(Rich::plain(text))
}

fn comparison_word(context: &Context<'_>, name: &str, location: Location) -> Answerable<Rich> {
    let study = context.study(name, location)?;
    let comparison = &study.comparison;
    let sizes = comparison.levels.iter().zip(comparison.sample.group_sizes());
    let groups: Vec<String> = sizes.map(|(level, size)| format!("{level} {size}")).collect();
    Ok(Rich::plain(format!(
        "{name}: {} outcomes by {}, {} rows ({})",
        comparison.outcomes.len(),
        comparison.factor,
        comparison.sample.units(),
        groups.join(", ")
    )))
}

fn ask(
    context: &Context<'_>,
    question: &tussock_language::model::Question,
) -> Answerable<Vec<Output>> {
    match &question.kind {
        QuestionKind::Show(show) => self::show(context, show, question.location),
        QuestionKind::Write(write) => paragraph(context, write, question.location),
        QuestionKind::Pin(pin) => self::pin(context, pin, question.location),
        QuestionKind::ProseValue(value) => {
            let found = context.find(&value.path, question.location)?;
            Ok(vec![Output::Value(found.rich(value.decimals))])
        }
    }
}

fn show(context: &Context<'_>, show: &Show, location: Location) -> Answerable<Vec<Output>> {
    let at = |span| Location { source: location.source, span };
    let view = view(&show.view.value, at(show.view.span))?;
    let comparison = &show.comparison;
    if let Some(term) = &show.term {
        let study = context.study(&comparison.value, at(comparison.span))?;
        if term.value != study.comparison.factor {
            let message = format!("`{}` has no term `{}`", comparison.value, term.value);
            let found = Diagnostic::error("unknown-term", at(term.span), message);
            let factor = quoted(&study.comparison.factor);
            return Err(trouble(found.help(format!("its only term is {factor}"))));
        }
    }
    let request = Request {
        policy: context.policy.with(&show.settings),
        coefficients: show.coefficients.as_ref().map(|kind| kind.value.clone()),
    };
    let place = at(comparison.span);
    let shown = context.shown(&comparison.value, view, &request, place)?;
    let tables = if request.policy == context.policy {
        shown.tables.clone()
    } else {
        let live = context.shown(&comparison.value, view, &context.request(), place)?;
        shown.tables_beside(&live)
    };
    Ok(tables.into_iter().map(Output::Table).collect())
}

fn paragraph(context: &Context<'_>, write: &Write, location: Location) -> Answerable<Vec<Output>> {
    let mut paragraph = Rich::default();
    for part in &write.parts {
        paragraph.append(match part {
            ProsePart::Text(text) => Rich::plain(text),
            ProsePart::Value(value) => {
                let place = Location { source: location.source, span: value.span };
                context.find(&value.path, place)?.rich(value.decimals)
            }
        });
    }
    Ok(vec![Output::Paragraph(paragraph)])
}

fn pin(context: &Context<'_>, pin: &Pin, location: Location) -> Answerable<Vec<Output>> {
    let path = Location { source: location.source, span: pin.path.span };
    let segments: Vec<String> = pin.path.segments.iter().map(|name| name.value.clone()).collect();
    let written = dotted(&segments);
    let value = match context.find(&pin.path, path)? {
        Found::Number(value) => value,
        Found::Citation(_) => {
            let message = format!("`{written}` is a whole citation, and a pin holds one number");
            let found = Diagnostic::error("unknown-path", path, message);
            return Err(trouble(found.help(format!("go on with a key, as in `{written}.p`"))));
        }
    };
    let within = pin.within.as_ref().map_or(pin.rounding, |within| within.value);
    let off = (value.number - pin.value.value).abs();
    // A value on the very edge of its rounding interval still rounds to what was written.
    if off <= within * (1.0 + 1e-9) {
        let text = format!("{written} holds at {}", pin.value.value);
        return Ok(vec![Output::Note(Rich::plain(text))]);
    }
    let place = Location { source: location.source, span: pin.value.span };
    let message = format!(
        "`{written}` is {} now, {off:.3e} off the pinned {}",
        value.number, pin.value.value
    );
    let found = Diagnostic::error("moved-pin", place, message);
    Err(trouble(found.help("find out what changed; if the change is meant, pin the new value")))
}
