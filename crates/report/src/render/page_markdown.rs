//! A document as Markdown.

use super::markdown;
use super::prose;
use crate::page::{Block, Page};
use crate::rich::Rich;

pub(super) fn page(page: &Page) -> String {
    let mut parts: Vec<String> = Vec::new();
    if page.prints_title() {
        parts.push(format!("# {}", Rich::plain(page.title.trim()).markdown()));
    }
    parts.extend(page.blocks.iter().map(block).filter(|block| !block.is_empty()));
    format!("{}\n", parts.join("\n\n"))
}

fn block(block: &Block) -> String {
    match block {
        Block::Prose(text) => prose::closed(text),
        Block::Code { text, language } => fenced(text, language),
        Block::Table(table) => markdown::table(table).trim_end().to_owned(),
        Block::Paragraph(text) => text.markdown(),
        Block::Note(text) => quoted(&text.markdown()),
        Block::Problem { severity, title, lines } => {
            let title = Rich::plain(title).markdown();
            let mut text = format!("**{}:** {title}", severity.word());
            if !lines.is_empty() {
                text = format!("{text}\n\n{}", fenced(&lines.join("\n"), ""));
            }
            quoted(&text)
        }
    }
}

fn quoted(text: &str) -> String {
    let lines = text.lines().map(|line| format!("> {line}").trim_end().to_owned());
    lines.collect::<Vec<_>>().join("\n")
}

/// A code block whose fence is longer than any within it.
fn fenced(text: &str, language: &str) -> String {
    let longest = text.split(|other| other != '`').map(str::len).max().unwrap_or(0);
    let fence = "`".repeat((longest + 1).max(3));
    let language: String = language.chars().filter(|&part| is_tag_part(part)).collect();
    format!("{fence}{language}\n{}\n{fence}", text.trim_end_matches(['\n', '\r']))
}

/// Whether a character may stand in the name of a language after a fence.
fn is_tag_part(character: char) -> bool {
    character.is_ascii_alphanumeric() || matches!(character, '-' | '_' | '+' | '.')
}
