//! Prose as plain text: wrapped paragraphs, underlined heads, lists with their marks.

use pulldown_cmark::{Alignment, Event, HeadingLevel, Tag, TagEnd};
use unicode_width::UnicodeWidthStr;

use crate::render::text::{MEASURE, code_line, table, wrapped};
use crate::rich::{Rich, Style};
use crate::table::{Column, Row, Table};

/// The prose in lines.
pub(in crate::render) fn lines(markdown: &str) -> Vec<String> {
    let mut writer = Writer::default();
    for event in super::events(markdown) {
        writer.take(event);
    }
    writer.finish()
}

#[derive(Default)]
struct Writer {
    out: Vec<String>,
    /// What every line begins with: the marks of quotations, the indents of lists.
    indents: Vec<String>,
    /// The mark of a list's item, for its first line.
    mark: Option<String>,
    /// For each open list the number of its next item, none where it has bullets.
    lists: Vec<Option<u64>>,
    /// For each open link its target.
    targets: Vec<String>,
    /// The text collected so far, a part for each line that the author broke.
    inline: Vec<Rich>,
    style: Style,
    is_code: bool,
    table: Table,
    row: Row,
    heads: Vec<Rich>,
    alignments: Vec<Alignment>,
}

impl Writer {
    fn take(&mut self, event: Event<'_>) {
        match event {
            Event::Start(tag) => self.start(tag),
            Event::End(tag) => self.end(tag),
            Event::Text(text) if self.is_code => self.code(&text),
            Event::Text(text) => self.push(&text),
            Event::Code(code) => self.push(&format!("`{code}`")),
            Event::InlineHtml(tag) => self.tag(&tag),
            Event::SoftBreak => self.push(" "),
            Event::HardBreak => self.inline.push(Rich::default()),
            Event::Rule => self.paragraph_of(&[Rich::plain("* * *")]),
            Event::TaskListMarker(done) => self.push(if done { "[x] " } else { "[ ] " }),
            Event::Html(text)
            | Event::InlineMath(text)
            | Event::DisplayMath(text)
            | Event::FootnoteReference(text) => self.push(&text),
        }
    }

    #[allow(clippy::wildcard_enum_match_arm, reason = "all other parts look like plain text")]
    fn start(&mut self, tag: Tag<'_>) {
        match tag {
            Tag::BlockQuote(_) => {
                self.end_paragraph();
                self.gap();
                self.indents.push("│ ".to_owned());
            }
            Tag::List(first) => {
                self.end_paragraph();
                if self.lists.is_empty() {
                    self.gap();
                }
                self.lists.push(first);
            }
            Tag::Item => self.item(),
            Tag::CodeBlock(_) => {
                self.end_paragraph();
                self.gap();
                self.is_code = true;
            }
            Tag::Link { dest_url, .. } => self.targets.push(dest_url.into_string()),
            Tag::Table(alignments) => self.alignments = alignments,
            _ => {}
        }
    }

    #[allow(clippy::wildcard_enum_match_arm, reason = "all other parts look like plain text")]
    fn end(&mut self, tag: TagEnd) {
        match tag {
            TagEnd::Paragraph => self.end_paragraph(),
            TagEnd::Heading(level) => self.heading(level),
            TagEnd::BlockQuote(_) => {
                self.end_paragraph();
                self.indents.pop();
            }
            TagEnd::CodeBlock => self.is_code = false,
            TagEnd::List(_) => {
                self.lists.pop();
            }
            TagEnd::Item => {
                self.end_paragraph();
                self.mark = None;
                self.indents.pop();
            }
            TagEnd::Link => {
                if let Some(target) = self.targets.pop() {
                    self.link_target(&target);
                }
            }
            TagEnd::TableCell => {
                let cell = std::mem::take(&mut self.inline);
                self.row = std::mem::take(&mut self.row).text(Rich::join(cell, " "));
            }
            TagEnd::TableHead => {
                let heads = std::mem::take(&mut self.row).cells;
                self.heads = heads.iter().map(crate::table::Cell::rich).collect();
            }
            TagEnd::TableRow => self.table.rows.push(std::mem::take(&mut self.row)),
            TagEnd::Table => self.end_table(),
            _ => {}
        }
    }

    fn push(&mut self, text: &str) {
        if self.inline.is_empty() {
            self.inline.push(Rich::default());
        }
        if let Some(line) = self.inline.last_mut() {
            line.push(text, self.style);
        }
    }

    fn tag(&mut self, tag: &str) {
        self.style = match tag {
            "<sup>" => Style::Superscript,
            "<sub>" => Style::Subscript,
            _ => Style::Plain,
        };
    }

    /// A link's target stands after its text, unless it is its text.
    fn link_target(&mut self, target: &str) {
        let ends_with_target = self
            .inline
            .last()
            .is_some_and(|line| line.text().ends_with(target.trim_start_matches("mailto:")));
        if !ends_with_target {
            self.push(&format!(" ({target})"));
        }
    }

    fn item(&mut self) {
        let mark = match self.lists.last_mut() {
            Some(Some(number)) => {
                let mark = format!("{number}. ");
                *number += 1;
                mark
            }
            Some(None) | None => "- ".to_owned(),
        };
        self.indents.push(" ".repeat(mark.width()));
        self.mark = Some(mark);
    }

    fn heading(&mut self, level: HeadingLevel) {
        let text = Rich::join(std::mem::take(&mut self.inline), " ").text();
        let underline = if level == HeadingLevel::H1 { "═" } else { "─" };
        self.gap();
        self.line(&text);
        self.line(&underline.repeat(text.width()));
    }

    fn end_paragraph(&mut self) {
        let inline = std::mem::take(&mut self.inline);
        self.paragraph_of(&inline);
    }

    fn paragraph_of(&mut self, inline: &[Rich]) {
        if inline.is_empty() {
            return;
        }
        // The items of a list follow one another without a gap.
        if self.mark.is_none() {
            self.gap();
        }
        let indent: usize = self.indents.iter().map(|indent| indent.width()).sum();
        for line in inline {
            for wrapped in wrapped(&line.text(), MEASURE.saturating_sub(indent).max(20)) {
                self.line(&wrapped);
            }
        }
    }

    fn code(&mut self, text: &str) {
        for line in text.lines() {
            self.line(&format!("    {}", code_line(line)));
        }
    }

    fn end_table(&mut self) {
        let mut grid = std::mem::take(&mut self.table);
        for (head, alignment) in std::mem::take(&mut self.heads).into_iter().zip(&self.alignments) {
            grid.columns.push(match alignment {
                Alignment::Right => Column::value(head),
                Alignment::None | Alignment::Left | Alignment::Center => Column::words(head),
            });
        }
        self.gap();
        for line in table(&grid).lines() {
            self.line(line);
        }
    }

    /// An empty line, unless there is one or nothing stands above.
    fn gap(&mut self) {
        let empty = self.indents.concat().trim_end().to_owned();
        if self.out.last().is_some_and(|line| !line.is_empty() && *line != empty) {
            self.out.push(empty);
        }
    }

    fn line(&mut self, text: &str) {
        let mut line = String::new();
        match (self.mark.take(), self.indents.split_last()) {
            (Some(mark), Some((_, outer))) => {
                line.extend(outer.iter().map(String::as_str));
                line.push_str(&mark);
            }
            _ => line.extend(self.indents.iter().map(String::as_str)),
        }
        line.push_str(text);
        self.out.push(line.trim_end().to_owned());
    }

    fn finish(mut self) -> Vec<String> {
        self.end_paragraph();
        self.out
    }
}
