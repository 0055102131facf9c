//! Whether a cell that is typed into a console is whole, by the parser that will read it.

use tussock_language::span::Span;
use tussock_language::syntax::{Expected, Parse, SyntaxError, expected_at, parse};
use tussock_language::verbs::Presence;

use crate::evaluator::Completeness;

/// By how much the lines that continue a statement are indented.
const INDENT: &str = "  ";

/// Whether the code is whole, cut off within its last statement, or wrong however it goes on.
pub(crate) fn completeness(code: &str) -> Completeness {
    let parse = parse(code, Span::new(0, code.len()));
    if parse.errors.is_empty() {
        return Completeness::Complete;
    }
    let cut_off = CutOff::of(code, &parse);
    if parse.errors.iter().all(|error| cut_off.explains(error)) {
        Completeness::Incomplete { indent: indent(code) }
    } else {
        Completeness::Invalid
    }
}

/// What a text lacks if it is cut off.
struct CutOff<'a> {
    code: &'a str,
    /// Where the code ends, before white space.
    end: usize,
    /// Where the last statement starts.
    last_statement: usize,
    /// Whether a further line could bring a clause that the last statement must have.
    lacks_clause: bool,
    /// Whether the last line is blank, by which somebody at a console says that no more will come.
    ended: bool,
}

impl<'a> CutOff<'a> {
    fn of(code: &'a str, parse: &Parse) -> Self {
        let last_statement = parse.root().children().last().map(|node| parse.span(&node).start);
        let continued = format!("{code}\n{INDENT}");
        let next = expected_at(&continued, Span::new(0, continued.len()), continued.len());
        let lacks_clause = next.expected.iter().any(|expected| {
            matches!(expected, Expected::Clause(clause) if clause.presence == Presence::Required)
        });
        Self {
            code,
            end: code.trim_end().len(),
            last_statement: last_statement.unwrap_or(0),
            lacks_clause,
            ended: code.rsplit_once('\n').is_some_and(|(_, line)| line.trim().is_empty()),
        }
    }

    /// Whether the error would go away if more came.
    fn explains(&self, error: &SyntaxError) -> bool {
        if error.rule != "syntax" || error.span.start < self.last_statement {
            return false;
        }
        // Of texts, the long ones alone may hold line breaks, blank lines among them.
        if error.span.of(self.code).starts_with("\"\"\"") && error.span.end >= self.end {
            return true;
        }
        let at_end = error.span.start >= self.end;
        // A clause that is missing is reported at the verb that needs it.
        let at_verb = self.lacks_clause && error.span.start == self.last_statement;
        !self.ended && (at_end || at_verb)
    }
}

/// White space that lines up a further line with the last one.
fn indent(code: &str) -> String {
    let line = code.rsplit('\n').next().unwrap_or_default();
    let own = line.get(..line.len() - line.trim_start().len()).unwrap_or_default();
    if own.is_empty() { INDENT.to_owned() } else { own.to_owned() }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn incomplete(indent: &str) -> Completeness {
        Completeness::Incomplete { indent: indent.to_owned() }
    }

    #[test]
    fn whole_statements_are_complete() {
        for code in [
            "",
            "# a remark",
            "show omnibus of main",
            "show groups of\n  main\n",
            "read sample ferry as crew\nshow groups of main",
            "write \"\"\"two\n\nlines\"\"\"",
            // Wrong, but by what no parser knows.
            "show omnibs of main",
        ] {
            assert_eq!(completeness(code), Completeness::Complete, "{code}");
        }
    }

    #[test]
    fn a_last_statement_that_is_cut_off_is_incomplete() {
        for code in [
            "show",
            "show omnibus of",
            "compare a,",
            "compare a, b",
            "compare a, b across roster in crew",
            "read \"crew.csv\"",
            "derive crew.gain = (post -",
            "show groups of main\nlevels crew.roster fixed,",
            "write \"\"\"two",
            "write \"\"\"two\n\n",
        ] {
            assert_eq!(completeness(code), incomplete("  "), "{code}");
        }
        assert_eq!(completeness("compare a, b\n    across"), incomplete("    "));
    }

    #[test]
    fn what_no_continuation_mends_is_invalid() {
        for code in [
            "frobnicate x",
            "show omnibus of main )",
            "show omnibus of\nshow groups of main",
            "show omnibus of\nshow",
            "write \"open",
            "show `open",
        ] {
            assert_eq!(completeness(code), Completeness::Invalid, "{code}");
        }
    }

    #[test]
    fn a_blank_last_line_ends_the_waiting() {
        assert_eq!(completeness("compare a,\n  "), Completeness::Invalid);
        assert_eq!(completeness("compare a, b\n"), Completeness::Invalid);
    }
}
