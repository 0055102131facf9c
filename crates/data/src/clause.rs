//! Clauses of a `read` statement, as an error offers them.

/// A clause that takes texts, such as `missing "NA", "."`.
pub(crate) fn clause<'a>(word: &str, texts: impl IntoIterator<Item = &'a str>) -> String {
    let texts: Vec<String> = texts.into_iter().map(quoted).collect();
    format!("{word} {}", texts.join(", "))
}

fn quoted(text: &str) -> String {
    let escaped = text.replace('\\', "\\\\").replace('"', "\\\"");
    format!("\"{}\"", escaped.replace('\t', "\\t").replace('\n', "\\n"))
}
