//! What fills a slot: names, lists of names, paths, numbers, texts, words to choose from.

use super::error::SyntaxError;
use super::expected::Expected;
use super::kind::SyntaxKind;
use super::parser::Parser;
use crate::names::listed;
use crate::nearest::nearest;
use crate::verbs::{Choice, Count, Slot, What};

impl Parser<'_> {
    /// Fills a slot; false, and an error, where nothing fits.
    pub(super) fn slot(&mut self, slot: &'static Slot) -> bool {
        self.expect(Expected::Slot(slot));
        if slot.count == Count::Any && (self.at_end() || self.at_clause()) {
            return true;
        }
        let mut filled = self.item(slot);
        if slot.count == Count::One {
            return filled;
        }
        while filled && self.at(SyntaxKind::Comma) {
            self.bump();
            self.expect(Expected::Slot(slot));
            filled = self.item(slot);
        }
        if filled {
            self.expect(Expected::Sign(","));
        }
        filled
    }

    /// Whether the next token could start what fills the slot.
    pub(super) fn slot_starts_here(&self, slot: &Slot) -> bool {
        let Some(kind) = self.kind() else { return false };
        match slot.what {
            What::Table
            | What::NewTable
            | What::Sample
            | What::Comparison
            | What::NewComparison
            | What::View
            | What::Column
            | What::Columns
            | What::ColumnPath
            | What::NewColumnPath
            | What::Level
            | What::Term
            | What::Path
            | What::OneOf(_) => kind.is_name() && !self.at_clause(),
            What::Number => matches!(kind, SyntaxKind::Number | SyntaxKind::Minus),
            What::Text | What::File => kind.is_text(),
            What::TextOrNumber => {
                kind.is_text() || matches!(kind, SyntaxKind::Number | SyntaxKind::Minus)
            }
            What::Expression => true,
        }
    }

    fn item(&mut self, slot: &'static Slot) -> bool {
        if slot.what == What::Expression {
            return self.expression(slot.noun);
        }
        if !self.slot_starts_here(slot) {
            self.misfit(slot);
            return false;
        }
        match slot.what {
            What::Table => self.name(SyntaxKind::TableName),
            What::NewTable => self.name(SyntaxKind::NewTableName),
            What::Sample => self.name(SyntaxKind::SampleName),
            What::Comparison => self.name(SyntaxKind::ComparisonName),
            What::NewComparison => self.name(SyntaxKind::NewComparisonName),
            What::View => self.name(SyntaxKind::ViewName),
            What::Column => {
                self.name(SyntaxKind::ColumnName);
                self.crossing();
            }
            What::Level => self.name(SyntaxKind::LevelName),
            What::Columns => return self.columns(),
            What::ColumnPath | What::NewColumnPath => return self.column_path(),
            What::Term => return self.term(),
            What::Path => return self.path(),
            What::Number => return self.number(),
            What::Text => self.text(SyntaxKind::TextValue),
            What::File => self.text(SyntaxKind::FileName),
            What::TextOrNumber if self.kind().is_some_and(SyntaxKind::is_text) => {
                self.text(SyntaxKind::TextValue);
            }
            What::TextOrNumber => return self.number(),
            What::OneOf(choices) => return self.choice(choices, slot.noun),
            What::Expression => {}
        }
        true
    }

    /// Says what is missing and, where a slip is likely, what to write instead.
    fn misfit(&mut self, slot: &'static Slot) {
        let (word, span) = (self.next_text(), self.here());
        let bare = self.kind().is_some_and(SyntaxKind::is_name) && !self.at_clause();
        if matches!(slot.what, What::Text | What::File | What::TextOrNumber) && bare {
            let message = format!("{} is written in quotes", slot.noun);
            let error = SyntaxError::new(span, message);
            let text = word.trim_matches('`').replace('\\', "\\\\").replace('"', "\\\"");
            self.report(error.fix("Put it in quotes", span, format!("\"{text}\"")));
            return;
        }
        let is_text = self.kind().is_some_and(SyntaxKind::is_text);
        if is_text && slot.what != What::Number {
            let message = format!("{} is written without quotes", slot.noun);
            let help = "a name that is not one plain word goes in back-quotes: `two words`";
            self.report(SyntaxError::new(span, message).help(help));
            return;
        }
        if self.at(SyntaxKind::Number) && slot.what == What::Level {
            let error = SyntaxError::new(span, "a level that is a number goes in back-quotes");
            self.report(error.fix("Put it in back-quotes", span, format!("`{word}`")));
            return;
        }
        self.missing(slot.noun);
    }

    fn name(&mut self, kind: SyntaxKind) {
        self.open(kind);
        self.name_token();
        self.close();
    }

    /// Takes a name, plain or quoted, and checks its quotes.
    pub(super) fn name_token(&mut self) {
        let (word, span) = (self.next_text(), self.here());
        if self.at(SyntaxKind::QuotedName) {
            let inner = word.get(1..).unwrap_or_default();
            if !inner.ends_with('`') {
                let error = SyntaxError::new(span, "the closing back-quote is missing");
                let end = crate::span::Span::new(span.end, span.end);
                self.report(error.fix("Add the back-quote", end, "`"));
            } else if inner.trim_end_matches('`').is_empty() {
                self.report(SyntaxError::new(span, "a name in back-quotes needs a character"));
            }
        }
        self.bump();
    }

    /// Takes a text and checks its quotes.
    pub(super) fn text_token(&mut self) {
        let (text, span) = (self.next_text(), self.here());
        let quotes = if self.at(SyntaxKind::LongString) { "\"\"\"" } else { "\"" };
        if !crate::lower::text::is_closed(text, quotes) {
            let error = SyntaxError::new(span, format!("the closing `{quotes}` is missing"));
            let end = crate::span::Span::new(span.end, span.end);
            self.report(error.fix(format!("Add `{quotes}`"), end, quotes));
        }
        self.bump();
    }

    fn text(&mut self, kind: SyntaxKind) {
        self.open(kind);
        self.text_token();
        self.close();
    }

    fn number(&mut self) -> bool {
        self.open(SyntaxKind::NumberValue);
        if self.at(SyntaxKind::Minus) {
            self.bump();
        }
        let found = self.at(SyntaxKind::Number);
        if found {
            self.bump();
        } else {
            self.missing("a number");
        }
        self.close();
        found
    }

    /// A column, or `q1..q9`.
    fn columns(&mut self) -> bool {
        let mark = self.mark();
        self.name(SyntaxKind::ColumnName);
        if !self.at(SyntaxKind::DotDot) {
            return true;
        }
        self.open_at(mark, SyntaxKind::ColumnRange);
        self.bump();
        let found = self.kind().is_some_and(SyntaxKind::is_name) && !self.at_clause();
        if found {
            self.name(SyntaxKind::ColumnName);
        } else {
            self.missing("the last column of the range");
        }
        self.close();
        found
    }

    /// `table.column`
    fn column_path(&mut self) -> bool {
        self.open(SyntaxKind::ColumnPath);
        self.name(SyntaxKind::TableName);
        let found = self.dot_and_column();
        self.close();
        found
    }

    fn dot_and_column(&mut self) -> bool {
        self.expect(Expected::Sign("."));
        if !self.at(SyntaxKind::Dot) {
            let before = self.end_of_last_token();
            let span = crate::span::Span::new(before, before);
            let message = "a column is written with its table: `crew.mood`";
            self.report(SyntaxError::new(span, message));
            return false;
        }
        self.bump();
        self.expect(Expected::Column);
        if !self.kind().is_some_and(SyntaxKind::is_name) {
            self.missing("a column");
            return false;
        }
        self.name(SyntaxKind::ColumnName);
        true
    }

    /// Passes over `x ship` after a factor, and says that there is one factor at a time.
    fn crossing(&mut self) {
        let crosses = self.word_at(0, "x") || self.at(SyntaxKind::Cross);
        let goes_on = self.peek(1).is_some_and(|token| token.kind.is_name());
        if !crosses || !goes_on {
            return;
        }
        let error = SyntaxError::of("several-factors", self.here(), "factors cannot be crossed");
        self.report(error.help("compare one factor at a time"));
        self.open(SyntaxKind::Error);
        self.bump();
        self.bump();
        self.close();
    }

    /// `roster`, `roster x ship`
    fn term(&mut self) -> bool {
        self.open(SyntaxKind::Term);
        self.name_token();
        let mut found = true;
        while found && (self.word_at(0, "x") || self.at(SyntaxKind::Cross)) {
            let sign =
                if self.at(SyntaxKind::Cross) { SyntaxKind::Cross } else { SyntaxKind::Keyword };
            self.bump_as(sign);
            found = self.kind().is_some_and(SyntaxKind::is_name) && !self.at_clause();
            if found {
                self.name_token();
            } else {
                self.missing("a factor");
            }
        }
        self.close();
        found
    }

    /// `main.omnibus.pillai`: names and whole numbers with dots between them.
    fn path(&mut self) -> bool {
        self.open(SyntaxKind::Path);
        let mut segments = vec![crate::lower::text::bare_name(self.next_text()).to_owned()];
        self.name_token();
        let mut found = true;
        self.expect(Expected::Sign("."));
        while found && self.at(SyntaxKind::Dot) {
            self.bump();
            self.expect(Expected::Key(segments.clone()));
            segments.push(crate::lower::text::bare_name(self.next_text()).to_owned());
            let whole = self.at(SyntaxKind::Number)
                && self.next_text().bytes().all(|byte| byte.is_ascii_digit());
            if whole {
                self.bump();
            } else if self.kind().is_some_and(SyntaxKind::is_name) {
                self.name_token();
            } else {
                self.missing("a key");
                found = false;
            }
        }
        self.close();
        found
    }

    fn choice(&mut self, choices: &'static [Choice], noun: &str) -> bool {
        let (word, span) = (self.next_text(), self.here());
        let words = || choices.iter().map(|choice| choice.word);
        self.open(SyntaxKind::Choice);
        if words().any(|known| known == word) {
            self.bump_as(SyntaxKind::Keyword);
        } else {
            let message = format!("`{word}` is not {noun}");
            let error = SyntaxError::of("unknown-word", span, message);
            let error = match nearest(word, words()) {
                Some(near) => error.help(format!("did you mean `{near}`?")).fix(
                    format!("Write `{near}`"),
                    span,
                    near,
                ),
                None => error.help(format!("what may stand here is {}", listed(words()))),
            };
            self.report(error);
            self.bump();
        }
        self.close();
        true
    }
}
