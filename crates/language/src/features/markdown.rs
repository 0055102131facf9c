//! Pieces of Markdown for hovers.

/// A page with something put below its heading and first paragraph, where a reader looks first.
pub(super) fn with_values(page: &str, values: &str) -> String {
    let after_heading = page.find("\n\n").map_or(page.len(), |at| at + 2);
    let rest = page.get(after_heading..).unwrap_or_default();
    let lead = rest.find("\n\n").map_or(page.len(), |at| after_heading + at);
    let (head, tail) = page.split_at(lead);
    format!("{}\n\n{}{}", head.trim_end(), values.trim_end(), tail)
}

/// Parts one below the other with a line between them; empty ones are left out.
pub(super) fn stacked<'a>(parts: impl IntoIterator<Item = &'a str>) -> String {
    let parts: Vec<&str> =
        parts.into_iter().map(str::trim_end).filter(|part| !part.is_empty()).collect();
    parts.join("\n\n---\n\n")
}

/// Code as a fenced block.
pub(super) fn fenced(code: &str) -> String {
    format!("```tussock\n{}\n```", code.trim_end())
}

/// A table cell: bars and line breaks would end it.
pub(super) fn cell(text: &str) -> String {
    text.replace('|', "\\|").replace(['\r', '\n'], " ")
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn values_stand_below_the_first_paragraph() {
        let page = "# Name\n\nWhat it is.\n\n**How.** So.\n";
        assert_eq!(with_values(page, "1 2 3"), "# Name\n\nWhat it is.\n\n1 2 3\n\n**How.** So.\n");
        assert_eq!(with_values("# Name\n", "1"), "# Name\n\n1");
    }

    #[test]
    fn a_bar_does_not_end_a_cell() {
        assert_eq!(cell("a|b\nc"), "a\\|b c");
    }
}
