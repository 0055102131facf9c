//! `complete_request`: what may stand at the cursor.

use serde::Deserialize;
use serde_json::{Value, json};

use super::{Answer, Exchange, Handled};
use crate::evaluator::{Evaluator, Suggestion};
use crate::position::{byte_offset, code_points};
use crate::worker::Worker;

#[derive(Deserialize)]
struct Asked {
    code: String,
    cursor_pos: usize,
}

pub(crate) fn answer<E: Evaluator>(worker: &mut Worker<E>, exchange: &Exchange<'_>) -> Handled {
    let asked: Asked = exchange.request.content()?;
    let offset = byte_offset(&asked.code, asked.cursor_pos);
    let suggestions = worker.evaluator.complete(&asked.code, offset);
    Ok(Answer::ok(reply(&asked.code, offset, &suggestions)))
}

/// The protocol has one range for all suggestions. Where theirs differ, each is widened to the
/// range that covers all by the text which stands there.
fn reply(code: &str, offset: usize, suggestions: &[Suggestion]) -> Value {
    let start = suggestions.iter().map(|one| one.start).min().unwrap_or(offset);
    let end = suggestions.iter().map(|one| one.end).max().unwrap_or(offset);
    let first = code_points(code, start);
    let last = code_points(code, end);
    let matches: Vec<String> = suggestions
        .iter()
        .map(|one| {
            let before = code.get(start..one.start).unwrap_or_default();
            let after = code.get(one.end..end).unwrap_or_default();
            format!("{before}{}{after}", one.text)
        })
        .collect();
    let types: Vec<Value> = suggestions
        .iter()
        .zip(&matches)
        .map(|(one, text)| {
            json!({
                "text": text,
                "type": one.kind,
                "signature": one.detail,
                "start": first,
                "end": last,
            })
        })
        .collect();
    json!({
        "matches": matches,
        "cursor_start": first,
        "cursor_end": last,
        "metadata": { "_jupyter_types_experimental": types },
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    fn suggestion(text: &str, start: usize, end: usize) -> Suggestion {
        Suggestion { text: text.to_owned(), kind: "view", detail: String::new(), start, end }
    }

    #[test]
    fn the_range_is_counted_in_code_points() {
        let code = "label 🌾é om";
        let offset = code.len();
        let content = reply(code, offset, &[suggestion("omnibus", offset - 2, offset)]);
        assert_eq!(content["cursor_start"], 9);
        assert_eq!(content["cursor_end"], 11);
        assert_eq!(content["matches"], json!(["omnibus"]));
        assert_eq!(content["metadata"]["_jupyter_types_experimental"][0]["type"], "view");
    }

    #[test]
    fn suggestions_with_other_ranges_are_widened_to_one() {
        let content = reply("a.bc", 4, &[suggestion("bcd", 2, 4), suggestion("a.bx", 0, 4)]);
        assert_eq!(content["matches"], json!(["a.bcd", "a.bx"]));
        assert_eq!(content["cursor_start"], 0);
        assert_eq!(content["cursor_end"], 4);
    }

    #[test]
    fn where_nothing_fits_the_range_is_the_cursor() {
        let content = reply("é🌾", 2, &[]);
        assert_eq!(content["matches"], json!([]));
        assert_eq!(content["cursor_start"], 1);
        assert_eq!(content["cursor_end"], 1);
    }
}
