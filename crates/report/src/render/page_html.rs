//! A document as a web page that stands alone: one file, no script, nothing loaded from elsewhere.

use maud::{DOCTYPE, Markup, PreEscaped, html};

use super::html::fragment;
use super::prose;
use super::unbreakable::unbreakable;
use crate::page::{Block, Page, Severity};
use crate::rich::{Rich, Run};

/// The look of the page, on a light screen, a dark one and on paper.
const STYLE: &str = include_str!("page.css");

/// Even a mistake in what is written here must not make the page load anything.
const POLICY: &str = "default-src 'none'; style-src 'unsafe-inline'; img-src data:";

pub(super) fn page(page: &Page) -> String {
    let title = page.title.trim();
    let markup = html! {
        (DOCTYPE)
        html lang=(page.language) {
            head {
                meta charset="utf-8";
                meta name="viewport" content="width=device-width, initial-scale=1";
                meta http-equiv="Content-Security-Policy" content=(POLICY);
                title { (if title.is_empty() { "Results" } else { title }) }
                style { (PreEscaped("\n")) (PreEscaped(STYLE)) }
            }
            body {
                main {
                    @if page.prints_title() { h1 { (title) } }
                    @for part in &page.blocks { (PreEscaped("\n")) (block(part)) }
                }
            }
        }
    };
    let mut out = markup.into_string();
    out.push('\n');
    out
}

fn block(block: &Block) -> Markup {
    html! {
        @match block {
            Block::Prose(markdown) => { div class="prose" { (prose::markup(markdown)) } }
            Block::Code { text, language } => {
                pre { code class=[language_class(language)] { (text.trim_end()) } }
            }
            Block::Table(table) => { figure class="table" { (fragment(table)) } }
            Block::Paragraph(text) => { p { (typeset(text)) } }
            Block::Note(text) => { p class="note" { (typeset(text)) } }
            Block::Problem { severity, title, lines } => {
                aside class=(problem_class(*severity)) {
                    p { strong { (severity.word()) ":" } " " (with_code(title)) }
                    @if !lines.is_empty() { pre { (lines.join("\n")) } }
                }
            }
        }
    }
}

/// What stands between back-quotes is program text.
fn with_code(title: &str) -> Markup {
    let is_paired = title.matches('`').count().is_multiple_of(2);
    html! {
        @for (index, part) in title.split('`').enumerate() {
            @if !is_paired { @if index > 0 { "`" } (part) }
            @else if index % 2 == 1 { code { (part) } }
            @else { (part) }
        }
    }
}

/// The text with no statistic broken between two lines.
fn typeset(text: &Rich) -> Rich {
    let run = |run: &Run| Run { text: unbreakable(&run.text), style: run.style };
    Rich { runs: text.runs.iter().map(run).collect() }
}

fn language_class(language: &str) -> Option<String> {
    (!language.is_empty()).then(|| format!("language-{language}"))
}

fn problem_class(severity: Severity) -> &'static str {
    match severity {
        Severity::Error => "problem error",
        Severity::Warning => "problem warning",
        Severity::Information => "problem",
    }
}
