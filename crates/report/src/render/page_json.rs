//! A document as JSON: one object a block, each with its `kind`.

use serde_json::{Value as Json, json};

use super::json;
use crate::page::{Block, Page};

pub(super) fn page(page: &Page) -> String {
    format!("{:#}\n", value(page))
}

pub(super) fn value(page: &Page) -> Json {
    let blocks: Vec<Json> = page.blocks.iter().map(block).collect();
    json!({ "title": page.title, "language": page.language, "blocks": blocks })
}

fn block(block: &Block) -> Json {
    match block {
        Block::Prose(markdown) => json!({ "kind": "prose", "markdown": markdown }),
        Block::Code { text, language } => {
            json!({ "kind": "code", "language": language, "text": text })
        }
        Block::Table(table) => json!({ "kind": "table", "table": json::value(table) }),
        Block::Paragraph(text) => json!({ "kind": "paragraph", "text": text.text() }),
        Block::Note(text) => json!({ "kind": "note", "text": text.text() }),
        Block::Problem { severity, title, lines } => json!({
            "kind": "problem",
            "severity": severity.word().to_lowercase(),
            "title": title,
            "lines": lines,
        }),
    }
}
