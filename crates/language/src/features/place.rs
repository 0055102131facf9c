//! Where in a document a cursor is.

use crate::document::{Document, Region, RegionKind};
use crate::lower::text::bare_name;
use crate::span::SourceId;
use crate::syntax::{Parse, SyntaxKind, SyntaxNode, SyntaxToken, parse};

/// The region that a cursor stands in. Between two regions the one that starts there is meant, and
/// at the end of a text the last one.
pub(super) fn region_at(document: &Document, source: SourceId, offset: usize) -> Option<Region> {
    let regions = &document.sources.get(source.0)?.regions;
    let holds = |region: &&Region| region.span.start <= offset && offset < region.span.end;
    let touches = |region: &&Region| region.span.touches(offset);
    let touching = || regions.iter().filter(touches);
    let empty_code = touching()
        .find(|region| region.kind == RegionKind::Code && region.span.start == region.span.end);
    empty_code.or_else(|| touching().find(holds)).or_else(|| touching().next_back()).copied()
}

/// The tree of a code region and the token under a cursor.
pub(super) struct CodeCursor {
    /// The region's tree.
    pub(super) parse: Parse,
    /// The token; between two, the one that says more.
    pub(super) token: SyntaxToken,
}

/// The token that a cursor in code points at, if it points at one that means something.
pub(super) fn token_at(text: &str, region: Region, offset: usize) -> Option<CodeCursor> {
    let parse = parse(text, region.span);
    let relative = offset.checked_sub(region.span.start)?;
    let relative = rowan::TextSize::try_from(relative).ok()?;
    let root = parse.root();
    if relative > root.text_range().end() {
        return None;
    }
    let token = root.token_at_offset(relative).max_by_key(|token| weight(token.kind()))?;
    (weight(token.kind()) > 0).then_some(CodeCursor { parse, token })
}

/// The last statement that starts at or before a cursor.
pub(super) fn statement_at(parse: &Parse, offset: usize) -> Option<SyntaxNode> {
    parse
        .root()
        .children()
        .filter(|node| node.kind() == SyntaxKind::Statement)
        .take_while(|node| parse.span(node).start <= offset)
        .last()
}

/// The first name of a kind in a node, without its back-quotes.
pub(super) fn name_in(node: &SyntaxNode, kind: SyntaxKind) -> Option<String> {
    let name = node.descendants().find(|node| node.kind() == kind)?;
    Some(bare_name(&name.text().to_string()).to_owned())
}

/// How much a token says: words before signs, and blanks not at all.
fn weight(kind: SyntaxKind) -> u8 {
    if kind.is_name() || matches!(kind, SyntaxKind::Verb | SyntaxKind::Keyword | SyntaxKind::Number)
    {
        3
    } else if kind.is_text() || kind == SyntaxKind::Comment {
        2
    } else if kind.is_trivia() {
        0
    } else {
        1
    }
}

/// In `# allow RULE: reason`, where the rule's name starts in the comment. The cursor must stand
/// behind `allow` and before the colon.
pub(super) fn allowed_rule_start(comment: &str, cursor: usize) -> Option<usize> {
    let after_sign = comment.trim_start_matches('#').trim_start();
    let after_word = after_sign.strip_prefix("allow")?;
    let name = after_word.trim_start();
    if name.len() == after_word.len() {
        return None;
    }
    let start = comment.len() - name.len();
    let end = name.find(':').map_or(comment.len(), |colon| start + colon);
    (start <= cursor && cursor <= end).then_some(start)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::document::{Form, Source};
    use crate::span::Span;

    #[test]
    fn between_two_regions_the_one_that_starts_is_meant() {
        let region = |kind, start, end| Region { kind, span: Span::new(start, end) };
        let regions = vec![region(RegionKind::Prose, 0, 4), region(RegionKind::Code, 4, 8)];
        let source = Source { text: "abcdefgh".to_owned(), regions };
        let document = Document { form: Form::Markdown, sources: vec![source] };
        let kind = |offset| region_at(&document, SourceId(0), offset).map(|region| region.kind);
        assert_eq!(kind(3), Some(RegionKind::Prose));
        assert_eq!(kind(4), Some(RegionKind::Code));
        assert_eq!(kind(8), Some(RegionKind::Code));
        assert_eq!(kind(9), None);
    }

    #[test]
    fn a_rule_is_named_between_allow_and_the_colon() {
        let comment = "# allow small-groups: pilot";
        assert_eq!(allowed_rule_start(comment, 8), Some(8));
        assert_eq!(allowed_rule_start(comment, 20), Some(8));
        assert_eq!(allowed_rule_start(comment, 21), None);
        assert_eq!(allowed_rule_start(comment, 5), None);
        assert_eq!(allowed_rule_start("# allowed", 9), None);
        assert_eq!(allowed_rule_start("# allow ", 8), Some(8));
    }
}
