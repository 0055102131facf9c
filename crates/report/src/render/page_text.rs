//! A document as plain text.

use unicode_width::UnicodeWidthStr;

use super::prose;
use super::text::{MEASURE, code_line, table, wrapped};
use crate::page::{Block, Page};
use crate::rich::Rich;

/// What the lines of a block that stands back from the text begin with.
const INDENT: &str = "    ";

pub(super) fn page(page: &Page) -> String {
    let mut parts: Vec<Vec<String>> = Vec::new();
    if page.prints_title() {
        let title = Rich::plain(page.title.trim()).text();
        let underline = "═".repeat(title.width());
        parts.push(vec![title, underline]);
    }
    parts.extend(page.blocks.iter().map(block).filter(|lines| !lines.is_empty()));
    let parts: Vec<String> = parts.iter().map(|lines| lines.join("\n")).collect();
    format!("{}\n", parts.join("\n\n"))
}

fn block(block: &Block) -> Vec<String> {
    match block {
        Block::Prose(markdown) => prose::lines(markdown),
        Block::Code { text, .. } => indented(text),
        Block::Table(grid) => table(grid).lines().map(str::to_owned).collect(),
        Block::Paragraph(text) => wrapped(&text.text(), MEASURE),
        Block::Note(text) => wrapped(&text.text(), MEASURE - INDENT.len())
            .into_iter()
            .map(|line| format!("{INDENT}{line}"))
            .collect(),
        Block::Problem { severity, title, lines } => {
            let title = Rich::plain(format!("{}: {title}", severity.word()));
            let mut out = wrapped(&title.text(), MEASURE);
            out.extend(lines.iter().flat_map(|line| indented(line)));
            out
        }
    }
}

fn indented(text: &str) -> Vec<String> {
    text.lines().map(|line| format!("{INDENT}{}", code_line(line)).trim_end().to_owned()).collect()
}
