//! Answers in the forms that front ends show.
//!
//! A notebook that was opened but not run is shown without style sheets and scripts; so whatever
//! an output needs to look right is said inline.

use maud::{Markup, html};
use pulldown_cmark::{Options, Parser};
use serde_json::{Value, json};
use tussock_language::diagnostic::{Diagnostic, Severity};
use tussock_language::present::{present, severity_word};
use tussock_language::span::Location;
use tussock_report::render;
use tussock_report::rich::Rich;
use tussock_report::table::Table;
use tussock_session::answer::{Answers, Output};
use tussock_session::notebook::Reply;

use crate::failure::Failure;

/// What a cell shows.
pub(crate) struct Shown {
    /// In reading order.
    pub(crate) pieces: Vec<Piece>,
    /// What comes last, where the cell failed.
    pub(crate) failure: Option<Failure>,
}

/// One output.
pub(crate) struct Piece {
    /// The forms of it, by media type.
    pub(crate) data: Value,
    /// Whether it is what the cell as a whole gave: the table with which it ends.
    pub(crate) is_result: bool,
}

impl Shown {
    /// Nothing but a failure.
    pub(crate) fn failed(failure: Failure) -> Self {
        Self { pieces: Vec::new(), failure: Some(failure) }
    }

    /// The result as plain text.
    pub(crate) fn result_text(&self) -> Option<String> {
        let result = self.pieces.iter().find(|piece| piece.is_result)?;
        result.data.get("text/plain")?.as_str().map(str::to_owned)
    }
}

/// What a cell shows. `place` names a place for the reader.
pub(crate) fn of(reply: &Reply, place: &dyn Fn(Location) -> String) -> Shown {
    let failure = failure(reply, place);
    let result = if failure.is_none() { result_of(&reply.answers) } else { None };
    let mut pieces = Vec::new();
    for (number, answer) in reply.answers.list.iter().enumerate() {
        let data = match &answer.output {
            Output::Table(shown) => table(shown),
            Output::Paragraph(text) | Output::Value(text) => paragraph(text),
            Output::Note(text) => note(text),
            Output::Problem(problem) if problem.severity == Severity::Error => continue,
            Output::Problem(problem) => remark(problem, reply, place),
        };
        pieces.push(Piece { data, is_result: result == Some(number) });
    }
    Shown { pieces, failure }
}

/// Which of the answers is the cell's result: the last, where that is a table.
fn result_of(answers: &Answers) -> Option<usize> {
    let is_output = |output: &Output| !matches!(output, Output::Problem(_));
    let last = answers.list.iter().rposition(|answer| is_output(&answer.output))?;
    let output = &answers.list.get(last)?.output;
    matches!(output, Output::Table(_)).then_some(last)
}

fn table(table: &Table) -> Value {
    json!({
        "text/html": render::html::table(table),
        "text/markdown": render::markdown::table(table),
        "text/plain": render::text::table(table),
    })
}

fn paragraph(text: &Rich) -> Value {
    json!({
        "text/html": format!("<p>{}</p>", text.html()),
        "text/markdown": text.markdown(),
        "text/plain": text.text(),
    })
}

/// What a definition defined: there for who looks for it, quiet for who doesn't.
fn note(text: &Rich) -> Value {
    let quiet = html! { div style="font-size:.9em;opacity:.75" { (text) } };
    json!({ "text/html": quiet.into_string(), "text/plain": text.text() })
}

/// A warning, or something worth knowing.
fn remark(problem: &Diagnostic, reply: &Reply, place: &dyn Fn(Location) -> String) -> Value {
    // Colours that can be told apart on a light page and on a dark one; the text keeps its own.
    let colour = match problem.severity {
        Severity::Error | Severity::Warning => "#c77700",
        Severity::Information => "#3b82c4",
    };
    let frame = format!("border-left:4px solid {colour};padding:.2em .8em;margin:.4em 0");
    let callout = html! {
        div style=(frame) {
            div {
                strong { (capitalized(severity_word(problem.severity))) }
                " "
                span style="opacity:.75" { (problem.rule) ", " (place(problem.location)) }
            }
            div { (with_code(&problem.message)) }
            @for related in &problem.related {
                div { (with_code(&related.message)) " (" (place(related.location)) ")" }
            }
            @if let Some(help) = &problem.help {
                div style="opacity:.85" { "What to do: " (with_code(help)) }
            }
        }
    };
    let plain = present(problem, &reply.document, place);
    json!({ "text/html": callout.into_string(), "text/plain": plain.trim_end() })
}

/// A sentence whose words in back-quotes are set as code.
fn with_code(sentence: &str) -> Markup {
    let parts: Vec<&str> = sentence.split('`').collect();
    // Quotes that don't come in pairs are text.
    if parts.len().is_multiple_of(2) {
        return html! { (sentence) };
    }
    html! {
        @for (number, part) in parts.into_iter().enumerate() {
            @if number % 2 == 1 { code { (part) } } @else { (part) }
        }
    }
}

fn capitalized(word: &str) -> String {
    let mut letters = word.chars();
    letters.next().map(|first| first.to_uppercase().chain(letters).collect()).unwrap_or_default()
}

/// All errors of a cell in one failure, which bears the name of the first.
fn failure(reply: &Reply, place: &dyn Fn(Location) -> String) -> Option<Failure> {
    let errors: Vec<&Diagnostic> =
        reply.answers.problems().filter(|problem| problem.severity == Severity::Error).collect();
    let mut traceback: Vec<String> =
        errors.iter().map(|error| coloured(&present(error, &reply.document, place))).collect();
    if reply.answers.interrupted {
        let mut stopped = Failure::plain(
            "interrupted",
            "the cell was stopped before its end; what earlier cells defined still stands",
        );
        stopped.traceback.extend(traceback);
        return Some(stopped);
    }
    let first = errors.first()?;
    // Front ends put the entries one below the other; a blank line divides them.
    let last = traceback.len().saturating_sub(1);
    traceback.iter_mut().take(last).for_each(|text| text.push('\n'));
    Some(Failure { name: first.rule.to_owned(), message: first.message.clone(), traceback })
}

const RED: &str = "\u{1b}[31m";
const BOLD: &str = "\u{1b}[1m";
const NORMAL: &str = "\u{1b}[0m";

/// The same text with its heading in bold and its carets in red, by the escapes that every front end
/// reads. Bold red is hard to read on the dark red on which some front ends show errors.
fn coloured(presented: &str) -> String {
    let mut lines: Vec<String> = presented.lines().map(coloured_line).collect();
    if let Some(heading) = lines.first_mut()
        && let Some(bracket) = heading.find("]:")
    {
        let (name, rest) = heading.split_at(bracket + 1);
        *heading = format!("{BOLD}{name}{NORMAL}{rest}");
    }
    lines.join("\n")
}

fn coloured_line(line: &str) -> String {
    let carets = line.find('^').filter(|&at| {
        let (before, after) = line.split_at(at);
        before.trim() == "|" && after.trim_end_matches('^').is_empty()
    });
    match carets.map(|at| line.split_at(at)) {
        Some((before, carets)) => format!("{before}{RED}{carets}{NORMAL}"),
        None => line.to_owned(),
    }
}

/// A page in Markdown, in the forms that front ends show.
pub(crate) fn markdown(page: &str) -> Value {
    let mut html = String::new();
    pulldown_cmark::html::push_html(&mut html, Parser::new_ext(page, Options::ENABLE_TABLES));
    json!({ "text/html": html, "text/markdown": page, "text/plain": page })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn words_in_back_quotes_are_set_as_code_and_everything_is_escaped() {
        assert_eq!(
            with_code("there is no `<b>`, only `a`").into_string(),
            "there is no <code>&lt;b&gt;</code>, only <code>a</code>"
        );
        assert_eq!(with_code("a ` alone").into_string(), "a ` alone");
    }

    #[test]
    fn the_heading_is_bold_and_carets_alone_are_red() {
        let text = "error [syntax]: a ^ does not belong [here]: no\n  cell [1], line 2\n  2 | x ^ 2\n    |   ^\n";
        assert_eq!(
            coloured(text),
            "\u{1b}[1merror [syntax]\u{1b}[0m: a ^ does not belong [here]: no\n  cell [1], line 2\n  \
             2 | x ^ 2\n    |   \u{1b}[31m^\u{1b}[0m"
        );
    }
}
