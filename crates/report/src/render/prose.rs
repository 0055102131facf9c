//! Prose in Markdown (CommonMark with tables, struck-out text and task lists), for the renderers of
//! documents.
//!
//! Raw HTML in the prose is printed, not obeyed: a document that is handed on must not run what a
//! cell of its source said. The pairs `sup`, `sub`, `em` and `strong`, which styled text becomes
//! where Markdown has no mark for it, and `br` are the exceptions. A link leads to the web, to mail
//! or to a place beside the document; any other loses its target. A picture is shown where it is
//! contained in the document as a `data:` address and is a link otherwise, so that a page never
//! loads anything.

mod text;

use maud::PreEscaped;
use pulldown_cmark::{
    CowStr, Event, LinkType, Options, Parser, Tag, TagEnd, TextMergeStream, html,
};

use super::unbreakable::unbreakable;

pub(super) use text::lines;

/// The tags that may stand in prose, in pairs.
const ALLOWED: [AllowedTag; 4] = [
    AllowedTag { open: "<sup>", close: "</sup>" },
    AllowedTag { open: "<sub>", close: "</sub>" },
    AllowedTag { open: "<em>", close: "</em>" },
    AllowedTag { open: "<strong>", close: "</strong>" },
];

struct AllowedTag {
    open: &'static str,
    close: &'static str,
}

fn options() -> Options {
    Options::ENABLE_TABLES | Options::ENABLE_STRIKETHROUGH | Options::ENABLE_TASKLISTS
}

/// The prose as HTML.
pub(super) fn markup(markdown: &str) -> PreEscaped<String> {
    let mut is_code = false;
    let typeset = TextMergeStream::new(events(markdown).into_iter()).map(|event| {
        if matches!(event, Event::Start(Tag::CodeBlock(_)) | Event::End(TagEnd::CodeBlock)) {
            is_code = !is_code;
        }
        if let Event::Text(text) = &event
            && !is_code
        {
            return Event::Text(unbreakable(text).into());
        }
        event
    });
    let mut out = String::new();
    html::push_html(&mut out, typeset);
    PreEscaped(out)
}

/// The prose with an end to a code block or a comment that it leaves open, so that what follows it
/// in a document is not swallowed.
pub(super) fn closed(markdown: &str) -> String {
    const PROBE: &str = "probe";
    let stands_alone = |text: &str| {
        let probed = format!("{text}\n\n{PROBE}");
        let last: Vec<Event<'_>> = Parser::new_ext(&probed, options()).collect();
        matches!(
            last.as_slice(),
            [.., Event::Start(Tag::Paragraph), Event::Text(text), Event::End(TagEnd::Paragraph)]
                if &**text == PROBE
        )
    };
    let text = markdown.trim_end();
    let longest = |mark: char| text.split(|other| other != mark).map(str::len).max().unwrap_or(0);
    let fence = |mark: char| mark.to_string().repeat(longest(mark).max(3));
    let ends = [String::new(), fence('`'), fence('~'), "-->".to_owned()];
    ends.into_iter()
        .map(|end| format!("{text}\n{end}").trim_end().to_owned())
        .find(|candidate| stands_alone(candidate))
        .unwrap_or_else(|| text.to_owned())
}

/// The parts of the prose, with nothing among them that a page should not do.
fn events(markdown: &str) -> Vec<Event<'_>> {
    let mut cleaner = Cleaner::default();
    for event in Parser::new_ext(markdown, options()) {
        cleaner.take(event);
    }
    cleaner.events
}

#[derive(Default)]
struct Cleaner<'a> {
    events: Vec<Event<'a>>,
    open: Vec<Open>,
}

/// What is open at a place of the prose.
#[derive(Clone, Copy)]
enum Open {
    /// A part of the prose that has no more to it.
    Part,
    /// A link that is kept.
    Link,
    /// A link or picture whose text alone is kept.
    TextOnly,
    /// A tag that is a tag only if its partner comes.
    Tag { close: &'static str, event: usize },
}

impl<'a> Cleaner<'a> {
    fn take(&mut self, event: Event<'a>) {
        match event {
            Event::Start(tag) => self.start(tag),
            Event::End(tag) => self.end(tag),
            Event::Html(html) => self.text_lines(&html),
            Event::InlineHtml(html) => self.inline_html(html),
            Event::Text(_)
            | Event::Code(_)
            | Event::InlineMath(_)
            | Event::DisplayMath(_)
            | Event::FootnoteReference(_)
            | Event::SoftBreak
            | Event::HardBreak
            | Event::Rule
            | Event::TaskListMarker(_) => self.events.push(event),
        }
    }

    #[allow(clippy::wildcard_enum_match_arm, reason = "what is named here is what can do harm")]
    fn start(&mut self, tag: Tag<'a>) {
        let in_link = self.open.iter().any(|open| matches!(open, Open::Link));
        let (open, kept) = match tag {
            Tag::HtmlBlock => (Open::Part, Some(Tag::Paragraph)),
            Tag::Image { ref dest_url, .. } if is_contained_picture(dest_url) => {
                (Open::Part, Some(tag))
            }
            Tag::Link { ref dest_url, .. } | Tag::Image { ref dest_url, .. }
                if in_link || !is_harmless(dest_url) =>
            {
                (Open::TextOnly, None)
            }
            Tag::Image { dest_url, title, id, .. } => {
                (Open::Link, Some(Tag::Link { link_type: LinkType::Inline, dest_url, title, id }))
            }
            Tag::Link { .. } => (Open::Link, Some(tag)),
            other => (Open::Part, Some(other)),
        };
        self.open.push(open);
        self.events.extend(kept.map(Event::Start));
    }

    fn end(&mut self, tag: TagEnd) {
        let mut open = self.open.pop();
        while matches!(open, Some(Open::Tag { .. })) {
            open = self.open.pop();
        }
        let kept = match (open, tag) {
            (Some(Open::TextOnly), _) => None,
            (Some(Open::Link), _) => Some(TagEnd::Link),
            (_, TagEnd::HtmlBlock) => Some(TagEnd::Paragraph),
            (_, other) => Some(other),
        };
        self.events.extend(kept.map(Event::End));
    }

    fn inline_html(&mut self, html: CowStr<'a>) {
        if matches!(&*html, "<br>" | "<br/>" | "<br />") {
            self.events.push(Event::HardBreak);
            return;
        }
        if let Some(tag) = ALLOWED.iter().find(|tag| *tag.open == *html) {
            self.open.push(Open::Tag { close: tag.close, event: self.events.len() });
        } else if let Some(Open::Tag { close, event }) = self.open.last().copied()
            && *close == *html
        {
            self.open.pop();
            if let Some(opening) = self.events.get_mut(event)
                && let Event::Text(text) = opening
            {
                *opening = Event::InlineHtml(std::mem::replace(text, CowStr::Borrowed("")));
            }
            self.events.push(Event::InlineHtml(html));
            return;
        }
        self.events.push(Event::Text(html));
    }

    /// A line of an HTML block, as text.
    fn text_lines(&mut self, html: &str) {
        self.events.push(Event::Text(CowStr::from(html.trim_end_matches(['\n', '\r']).to_owned())));
        self.events.push(Event::SoftBreak);
    }
}

/// Whether a link's target cannot do anything but be opened.
fn is_harmless(target: &str) -> bool {
    let before_path = target.split(['/', '?', '#']).next().unwrap_or_default();
    match before_path.split_once(':') {
        None => true,
        Some((scheme, _)) => {
            ["http", "https", "mailto"].iter().any(|known| scheme.eq_ignore_ascii_case(known))
        }
    }
}

fn is_contained_picture(target: &str) -> bool {
    ["data:image/png", "data:image/jpeg", "data:image/gif", "data:image/webp", "data:image/svg+xml"]
        .iter()
        .any(|known| target.starts_with(known))
}

#[cfg(test)]
mod tests {
    use super::*;

    fn rendered(markdown: &str) -> String {
        markup(markdown).into_string()
    }

    #[test]
    fn raw_html_is_printed_and_not_obeyed() {
        assert_eq!(
            rendered("a <b onclick=\"x\">b</b> <sup>2</sup> <sub>c\n\n<script>alert(1)</script>\n"),
            "<p>a &lt;b onclick=\"x\"&gt;b&lt;/b&gt; <sup>2</sup> &lt;sub&gt;c</p>\n\
             <p>&lt;script&gt;alert(1)&lt;/script&gt;\n</p>\n"
        );
    }

    #[test]
    fn tags_are_kept_only_in_pairs_that_do_not_cross() {
        assert_eq!(
            rendered("<sup>a *b</sup> c* <em>d</sub></em>"),
            "<p>&lt;sup&gt;a <em>b&lt;/sup&gt; c</em> <em>d&lt;/sub&gt;</em></p>\n"
        );
    }

    #[test]
    fn links_keep_only_harmless_targets() {
        for (markdown, expected) in [
            ("[a](javascript:alert(1))", "<p>a</p>\n"),
            ("[a](JaVaScRiPt:x)", "<p>a</p>\n"),
            ("[a](data:text/html,x)", "<p>a</p>\n"),
            (
                "[a](https://example.org/?b:c)",
                "<p><a href=\"https://example.org/?b:c\">a</a></p>\n",
            ),
            ("[a](notes/a:b.md)", "<p><a href=\"notes/a:b.md\">a</a></p>\n"),
        ] {
            assert_eq!(rendered(markdown), expected);
        }
    }

    #[test]
    fn a_picture_that_would_be_loaded_is_a_link() {
        assert_eq!(
            rendered("![a plot](https://example.org/a.png)"),
            "<p><a href=\"https://example.org/a.png\">a plot</a></p>\n"
        );
        assert_eq!(
            rendered("![dot](data:image/png;base64,AAAA)"),
            "<p><img src=\"data:image/png;base64,AAAA\" alt=\"dot\" /></p>\n"
        );
    }

    #[test]
    fn what_is_left_open_is_closed() {
        assert_eq!(closed("text\n"), "text");
        assert_eq!(closed("```\ncode"), "```\ncode\n```");
        assert_eq!(closed("~~~~\n```\ncode"), "~~~~\n```\ncode\n~~~~");
        assert_eq!(closed("<!-- never mind"), "<!-- never mind\n-->");
        assert_eq!(closed("```\ncode\n```"), "```\ncode\n```");
    }
}
