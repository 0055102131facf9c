//! The grammar of statements, driven by the declarations in [`crate::verbs`].

use super::error::SyntaxError;
use super::expected::Expected;
use super::kind::SyntaxKind;
use super::lexer::meant;
use super::parser::Parser;
use crate::names::listed;
use crate::nearest::nearest;
use crate::span::Span;
use crate::verbs::{self, Clause, Part, Presence, Verb};

impl Parser<'_> {
    /// A whole statement, up to where the next one starts.
    pub(super) fn statement(&mut self) {
        let before = self.verb.take();
        self.clauses.clear();
        self.depth = 0;
        self.open(SyntaxKind::Statement);
        match verbs::find(self.next_text()).filter(|_| self.at(SyntaxKind::Name)) {
            Some(verb) => {
                self.verb = Some(verb);
                self.known_statement(verb);
            }
            None => {
                self.unknown_verb(before);
                self.rest_as_error();
            }
        }
        self.close();
    }

    fn known_statement(&mut self, verb: &'static Verb) {
        let word = self.here();
        let before = self.errors.len();
        self.bump_as(SyntaxKind::Verb);
        let mut complete = self.parts(verb.head);
        while !self.at_end() {
            match self.clause_here(verb) {
                Some(clause) => complete = self.clause(clause),
                None => {
                    // After a part that is missing, what stands in its place has been reported.
                    if complete {
                        self.report_stray(verb);
                    }
                    self.pass_over(verb);
                }
            }
        }
        if complete {
            self.expect_clauses(verb);
        }
        // A clause that seems to be missing may be what an earlier error is about.
        if self.errors.len() == before {
            self.report_missing_clauses(verb, word);
        }
    }

    fn report_missing_clauses(&mut self, verb: &'static Verb, word: Span) {
        let is_missing = |clause: &&Clause| {
            clause.presence == Presence::Required && !self.clauses.contains(&clause.words)
        };
        let missing: Vec<&Clause> = verb.clauses.iter().filter(is_missing).collect();
        let forms: Vec<String> = missing.iter().map(|clause| clause.usage()).collect();
        let needed = listed(forms.iter().map(String::as_str));
        let message = match missing.as_slice() {
            [] => return,
            [only] => format!("`{}` needs {needed}, {}", verb.name(), only.summary),
            _ => format!("`{}` needs {needed}", verb.name()),
        };
        let help = format!("the form is: {}", verb.usage());
        self.report(SyntaxError::new(word, message).help(help));
    }

    /// Notes the clauses that could still follow.
    fn expect_clauses(&mut self, verb: &'static Verb) {
        for clause in verb.clauses {
            if self.may_follow(clause) {
                self.expect(Expected::Clause(clause));
            }
        }
    }

    fn may_follow(&self, clause: &Clause) -> bool {
        clause.presence == Presence::Repeatable || !self.clauses.contains(&clause.words)
    }

    /// The clause that the next words start, if they start one.
    fn clause_here(&self, verb: &'static Verb) -> Option<&'static Clause> {
        self.clause_at(verb, 0)
    }

    fn clause_at(&self, verb: &'static Verb, ahead: usize) -> Option<&'static Clause> {
        let starts = |clause: &&Clause| {
            clause.words.iter().enumerate().all(|(offset, word)| self.word_at(ahead + offset, word))
        };
        verb.clauses.iter().filter(starts).max_by_key(|clause| clause.words.len())
    }

    /// Whether the next word starts a clause although a name could stand here.
    ///
    /// Words are contextual, so a column may be called `across`. A word of the grammar is taken as
    /// a name unless something follows it that its own clause could start with, or is about to be
    /// typed.
    pub(super) fn at_clause(&self) -> bool {
        let Some(verb) = self.verb else { return false };
        let Some(clause) = self.clause_here(verb) else { return false };
        let after = clause.words.len();
        self.may_follow(clause)
            && self.clause_at(verb, after).is_none()
            && match self.peek(after) {
                Some(token) => {
                    token.kind.is_name()
                        || token.kind.is_text()
                        || matches!(token.kind, SyntaxKind::Number | SyntaxKind::OpenParenthesis)
                }
                None => self.is_asked_what_follows(),
            }
    }

    /// A clause; false where something in it is missing.
    fn clause(&mut self, clause: &'static Clause) -> bool {
        let start = self.here().start;
        let repeated = !self.may_follow(clause);
        self.clauses.push(clause.words);
        self.open(SyntaxKind::Clause);
        for _ in clause.words {
            self.bump_as(SyntaxKind::Keyword);
        }
        let words = Span::new(start, self.end_of_last_token());
        let complete = self.parts(clause.parts);
        self.close();
        if repeated {
            let whole = Span::new(start, self.end_of_last_token());
            let message = format!("`{}` stands twice in one statement", clause.name());
            let error = SyntaxError::of("duplicate-clause", words, message);
            let help = if clause.words == ["in"] { LIST_HELP } else { "keep one of the two" };
            self.report(error.help(help).fix(
                format!("Remove the second `{}`", clause.name()),
                whole,
                "",
            ));
        }
        complete
    }

    /// Parts in their order; stops at the first that is missing, and says so.
    fn parts(&mut self, parts: &'static [Part]) -> bool {
        parts.iter().all(|part| match part {
            Part::Slot(slot) => self.slot(slot),
            Part::Word(word) => self.fixed_word(word),
            Part::Sign(kind, sign) => self.fixed_sign(*kind, sign),
            Part::Either(alternatives) => self.either(alternatives),
        })
    }

    /// A fixed word; an error where it is missing.
    pub(super) fn fixed_word(&mut self, word: &'static str) -> bool {
        self.expect(Expected::Word(word));
        if self.word_at(0, word) {
            self.bump_as(SyntaxKind::Keyword);
            return true;
        }
        self.missing(format!("`{word}`"));
        false
    }

    fn fixed_sign(&mut self, kind: SyntaxKind, sign: &'static str) -> bool {
        self.expect(Expected::Sign(sign));
        if self.at(SyntaxKind::Unknown) && meant(self.next_text()) == Some(sign) {
            self.foreign_sign();
            self.bump_as(kind);
            return true;
        }
        if self.at(kind) {
            self.bump();
            return true;
        }
        self.missing(format!("`{sign}`"));
        false
    }

    /// Says that a sign of another notation is written differently here.
    pub(super) fn foreign_sign(&mut self) {
        let (sign, span) = (self.next_text(), self.here());
        if let Some(ours) = meant(sign) {
            let error = SyntaxError::new(span, format!("`{sign}` is written `{ours}` here"));
            self.report(error.fix(format!("Write `{ours}`"), span, ours));
        }
    }

    fn either(&mut self, alternatives: &'static [&'static [Part]]) -> bool {
        for parts in alternatives {
            if let [first, ..] = parts
                && self.part_starts_here(first)
            {
                return self.parts(parts);
            }
        }
        let mut forms = Vec::new();
        for parts in alternatives {
            match parts {
                [Part::Slot(slot), ..] => {
                    self.expect(Expected::Slot(slot));
                    forms.push(slot.noun.to_owned());
                }
                [Part::Word(word), ..] => {
                    self.expect(Expected::Word(word));
                    forms.push(format!("`{word}`"));
                }
                _ => {}
            }
        }
        forms.reverse();
        self.missing(forms.join(" or "));
        false
    }

    fn part_starts_here(&self, part: &Part) -> bool {
        match part {
            Part::Slot(slot) => self.slot_starts_here(slot),
            Part::Word(word) => self.word_at(0, word),
            Part::Sign(kind, _) => self.at(*kind),
            Part::Either(alternatives) => alternatives
                .iter()
                .any(|parts| parts.first().is_some_and(|part| self.part_starts_here(part))),
        }
    }

    /// Says that something is missing before the next token, or at the end.
    pub(super) fn missing(&mut self, what: impl AsRef<str>) {
        let what = what.as_ref();
        let error = match self.peek(0) {
            Some(token) => SyntaxError::new(
                token.span,
                format!("{what} is missing before `{}`", shortened(token.span.of(self.text))),
            ),
            None => SyntaxError::new(self.here(), format!("{what} is missing at the end")),
        };
        let error = match self.verb {
            Some(verb) => error.help(format!("the form is: {}", verb.usage())),
            None => error,
        };
        self.report(error);
    }

    fn unknown_verb(&mut self, before: Option<&'static Verb>) {
        let (word, span) = (self.next_text(), self.here());
        if !self.at(SyntaxKind::Name) {
            let message = format!("a statement starts with a word, not with `{}`", shortened(word));
            let known = listed(verbs::VERBS.iter().map(|verb| verb.name()));
            self.report(SyntaxError::new(span, message).help(format!("the words are {known}")));
            return;
        }
        let message = format!("`{word}` is not a word that a statement starts with");
        let error = SyntaxError::of("unknown-word", span, message);
        let continues = before.filter(|verb| self.clause_here(verb).is_some());
        let error = match (nearest(word, verbs::VERBS.iter().map(|verb| verb.name())), continues) {
            (_, Some(verb)) => error
                .help(format!("indent the line to continue the `{}` above it", verb.name()))
                .fix("Indent the line", Span::new(span.start, span.start), "  "),
            (Some(near), None) => error.help(format!("did you mean `{near}`?")).fix(
                format!("Write `{near}`"),
                span,
                near,
            ),
            (None, None) => {
                let known = listed(verbs::VERBS.iter().map(|verb| verb.name()));
                error.help(format!("the words are {known}"))
            }
        };
        self.report(error);
    }

    /// Says why something between clauses is no clause.
    fn report_stray(&mut self, verb: &'static Verb) {
        let (word, span) = (self.next_text(), self.here());
        let open: Vec<String> = verb
            .clauses
            .iter()
            .filter(|clause| self.may_follow(clause))
            .map(Clause::name)
            .collect();
        let near = nearest(word, open.iter().map(String::as_str));
        let near = near.or_else(|| begun(word, open.iter().map(String::as_str)));
        let error = match (self.kind(), near) {
            (Some(SyntaxKind::Name), Some(near)) => {
                let message = format!("`{}` has no clause `{word}`", verb.name());
                SyntaxError::of("unknown-word", span, message)
                    .help(format!("did you mean `{near}`?"))
                    .fix(format!("Write `{near}`"), span, near)
            }
            (Some(kind), None) if kind.is_name() && self.list_may_go_on(verb) => {
                let end = self.end_of_last_token();
                let error = SyntaxError::new(span, format!("a comma is missing before `{word}`"));
                error.fix("Insert a comma", Span::new(end, end), ",")
            }
            (Some(SyntaxKind::Name), None) if word == "in" => {
                SyntaxError::new(span, "a list is missing after `in`").help(LIST_HELP)
            }
            (Some(SyntaxKind::Name), None) => {
                let message = format!("`{}` has no clause `{word}`", verb.name());
                SyntaxError::of("unknown-word", span, message).help(clause_help(verb, &open))
            }
            _ => {
                let message = format!("`{}` does not belong here", shortened(word));
                SyntaxError::new(span, message).help(clause_help(verb, &open))
            }
        };
        self.report(error);
    }

    /// Takes what stands here as an error, up to the next clause.
    fn pass_over(&mut self, verb: &'static Verb) {
        self.open(SyntaxKind::Error);
        while !self.at_end() {
            self.bump();
            if self.clause_here(verb).is_some() {
                break;
            }
        }
        self.close();
    }

    /// Whether the last thing that was read is an item of a list that could have another item.
    fn list_may_go_on(&self, verb: &'static Verb) -> bool {
        let parts = match self.clauses.last() {
            Some(words) => verb.clause(words).map(|clause| clause.parts),
            None => Some(verb.head),
        };
        let last_is_list = parts.and_then(<[Part]>::last).is_some_and(
            |part| matches!(part, Part::Slot(slot) if slot.count != verbs::Count::One),
        );
        let after = self.peek(1).map(|token| token.kind);
        let goes_on = after.is_none()
            || after == Some(SyntaxKind::Comma)
            || self.clause_at(verb, 1).is_some();
        last_is_list && goes_on
    }

    /// Takes what is left of the statement as an error.
    fn rest_as_error(&mut self) {
        if self.at_end() {
            return;
        }
        self.open(SyntaxKind::Error);
        while !self.at_end() {
            self.bump();
        }
        self.close();
    }
}

/// A bare `in` in a condition is the clause of a table, or nothing.
const LIST_HELP: &str = "a list of levels goes in brackets: `in [north, east]`";

fn clause_help(verb: &Verb, open: &[String]) -> String {
    if open.is_empty() {
        format!("the form is: {}", verb.usage())
    } else {
        format!("what may follow is {}", listed(open.iter().map(String::as_str)))
    }
}

/// The first words of a long token.
fn shortened(text: &str) -> String {
    const LONGEST: usize = 24;
    let line = text.lines().next().unwrap_or_default();
    if line.chars().count() <= LONGEST && line.len() == text.len() {
        return text.to_owned();
    }
    let head: String = line.chars().take(LONGEST).collect();
    format!("{head}…")
}

/// The clause that a half-typed word is the beginning of.
fn begun<'a>(word: &str, mut clauses: impl Iterator<Item = &'a str>) -> Option<&'a str> {
    // Two letters begin too many words.
    if word.chars().count() < 3 { None } else { clauses.find(|clause| clause.starts_with(word)) }
}
