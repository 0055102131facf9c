//! Which parts of a Markdown text are code of the language.

use pulldown_cmark::{CodeBlockKind, Event, Parser, Tag, TagEnd};

use super::{Region, RegionKind};
use crate::span::Span;

/// The regions of a Markdown text. A fence that stands in a quotation is quoted, not run: it is
/// prose like the rest of the quotation.
pub(super) fn regions(text: &str) -> Vec<Region> {
    let mut regions = Vec::new();
    let mut from = 0;
    for fence in fences(text) {
        push_prose(&mut regions, from, fence.whole.start);
        regions.push(Region { kind: RegionKind::Code, span: fence.content });
        from = fence.whole.end;
    }
    push_prose(&mut regions, from, text.len());
    regions
}

fn push_prose(regions: &mut Vec<Region>, start: usize, end: usize) {
    if start < end {
        regions.push(Region { kind: RegionKind::Prose, span: Span::new(start, end) });
    }
}

/// A fenced block: its content, and the whole with the lines of both fences.
struct Fence {
    content: Span,
    whole: Span,
}

#[expect(
    clippy::wildcard_enum_match_arm,
    reason = "the other events of Markdown do not matter here"
)]
fn fences(text: &str) -> Vec<Fence> {
    let mut fences = Vec::new();
    let mut quotations = 0usize;
    for (event, range) in Parser::new(text).into_offset_iter() {
        match event {
            Event::Start(Tag::BlockQuote(_)) => quotations += 1,
            Event::End(TagEnd::BlockQuote(_)) => quotations = quotations.saturating_sub(1),
            Event::Start(Tag::CodeBlock(CodeBlockKind::Fenced(info)))
                if quotations == 0 && is_ours(&info) =>
            {
                fences.push(fence(text, Span::new(range.start, range.end)));
            }
            _ => {}
        }
    }
    fences
}

/// Whether an info string names the language: `tussock`, `{tussock}`, `{.tussock #id}`,
/// `tussock numbered`.
fn is_ours(info: &str) -> bool {
    let info = info.trim().trim_start_matches('{').trim_start().trim_start_matches('.');
    let end = info
        .find(|character: char| !(character.is_alphanumeric() || character == '-'))
        .unwrap_or(info.len());
    info.get(..end) == Some("tussock")
}

fn fence(text: &str, block: Span) -> Fence {
    let inside = block.of(text);
    let opening = inside.split_inclusive('\n').next().unwrap_or_default();
    let start = block.start + opening.len();
    let body = inside.get(opening.len()..).unwrap_or_default();
    let sign = opening.trim_start().chars().next().unwrap_or('`');
    let length = opening.trim_start().chars().take_while(|found| *found == sign).count();
    let last = body.split_inclusive('\n').next_back().unwrap_or_default();
    let marker = last.trim();
    let closed = marker.chars().all(|found| found == sign) && marker.chars().count() >= length;
    let end = if closed { block.end - last.len() } else { block.end };
    // The line of the closing fence belongs to it up to and with the line break.
    let line_break = match text.get(block.end..) {
        Some(rest) if closed && rest.starts_with("\r\n") => 2,
        Some(rest) if closed && rest.starts_with('\n') => 1,
        _ => 0,
    };
    Fence {
        content: Span::new(start, end.max(start)),
        whole: Span::new(block.start, block.end + line_break),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[track_caller]
    fn check(text: &str, expected: &[(RegionKind, &str)]) {
        let regions = regions(text);
        let found: Vec<_> =
            regions.iter().map(|region| (region.kind, region.span.of(text))).collect();
        assert_eq!(found, expected, "{text:?}");
    }

    use RegionKind::{Code, Prose};

    #[test]
    fn fences_divide_code_from_prose() {
        check(
            "# Crews\n\n```tussock\nshow a of b\n```\nand {{b.a}}\n",
            &[(Prose, "# Crews\n\n"), (Code, "show a of b\n"), (Prose, "and {{b.a}}\n")],
        );
        check("", &[]);
        check("only prose", &[(Prose, "only prose")]);
    }

    #[test]
    fn every_style_of_info_string_counts() {
        for info in ["tussock", "{tussock}", "{.tussock #first}", "tussock quiet", " tussock"] {
            check(&format!("```{info}\na\n```\n"), &[(Code, "a\n")]);
        }
        for info in ["", "python", "tussocks", "{python}", "not tussock"] {
            let text = format!("```{info}\na\n```\n");
            check(&text, &[(Prose, text.as_str())]);
        }
        check("~~~~tussock\na\n~~~\n~~~~\nb", &[(Code, "a\n~~~\n"), (Prose, "b")]);
    }

    #[test]
    fn a_fence_may_be_indented_in_a_list() {
        check(
            "- first\n\n  ```tussock\n  show a of b\n    alpha .01\n  ```\n\n  more\n",
            &[
                (Prose, "- first\n\n  "),
                (Code, "  show a of b\n    alpha .01\n"),
                (Prose, "\n  more\n"),
            ],
        );
        check("1. ```tussock\n   a\n   ```\n", &[(Prose, "1. "), (Code, "   a\n")]);
    }

    #[test]
    fn an_open_or_an_empty_fence_is_code_all_the_same() {
        check("a\n\n```tussock\nshow", &[(Prose, "a\n\n"), (Code, "show")]);
        check("```tussock\n```\n", &[(Code, "")]);
        check("```tussock", &[(Code, "")]);
        check("```tussock\r\nshow\r\n```\r\nb", &[(Code, "show\r\n"), (Prose, "b")]);
    }

    #[test]
    fn a_quoted_fence_is_prose() {
        let text = "> ```tussock\n> show a of b\n> ```\n";
        check(text, &[(Prose, text)]);
    }
}
