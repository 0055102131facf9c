//! What holds for every text whatever: nothing is lost, nothing panics, formatting changes no
//! meaning and is done once.

#![allow(clippy::indexing_slicing, reason = "a helper of a test fails as the test does")]

mod support;

use proptest::prelude::*;
use support::FerryFacts;
use tussock_language::ast::StatementKind;
use tussock_language::document::Document;
use tussock_language::format::{format, format_markdown};
use tussock_language::model::{Model, Redefinition};
use tussock_language::rules::diagnose;
use tussock_language::span::Span;
use tussock_language::syntax::{Parse, SyntaxKind, expected_at, parse};

const PROGRAM: &str = r#"# A whole analysis
policy alpha .05 interval 95% pairs holm scores alpha .001 effect g missing listwise

read sample ferry as crew # invented
read "crew.csv" as `raw crew` missing "NA", -9 separator ";" decimal ","
  encoding "latin1"
levels crew.roster fixed, forward, backward merging "fxd", "Fixed " into fixed
label crew.lapses "Attention lapses \"\\" unit "per 10 min" better low
derive crew.gain = if missing(mood) then 0 else (sleep - mood) / 2 ^ -1
admit crew where watches >= 8 and not (ship not in [Auk, "Storm Petrel", -3]) as served
  # a note
  because "at least eight watches"
compare alertness, q1..q9, `Reaction time (ms)` across roster in served where age > 20 as main

# allow lax-setting: a supplement
show pairs of main for roster pairs bonferroni alpha .01
write """
  The rosters differed, {{main.omnibus.pillai}};
  V was {{main.omnibus.`pillai`.value 3}}.
  """
pin main.functions.1.share at .912 within .001
"#;

/// Pieces of the language and of its surroundings, likely and unlikely neighbours.
const PIECES: &[&str] = &[
    "read",
    "sample",
    "admit",
    "derive",
    "levels",
    "label",
    "policy",
    "compare",
    "show",
    "write",
    "pin",
    "as",
    "in",
    "across",
    "where",
    "because",
    "of",
    "for",
    "merging",
    "into",
    "alpha",
    "scores",
    "pairs",
    "holm",
    "effect",
    "g",
    "at",
    "within",
    "better",
    "low",
    "unit",
    "missing",
    "and",
    "or",
    "not",
    "if",
    "then",
    "else",
    "crew",
    "main",
    "mood",
    "x",
    "q1",
    "`a b`",
    "`open",
    "\"text\"",
    "\"open",
    "\"\"\"long\n text\"\"\"",
    "\"\"\"open",
    "12",
    ".05",
    "95%",
    "1e-3",
    ",",
    ".",
    "..",
    "=",
    "!=",
    "<=",
    "+",
    "-",
    "*",
    "/",
    "^",
    "(",
    ")",
    "[",
    "]",
    "×",
    "==",
    "≥",
    "“",
    "🦭",
    "ö",
    "{{",
    "}}",
    "{{main.omnibus.pillai}}",
    "\\",
    "#",
    "# allow lax-setting: why",
    "\n",
    "\n",
    "\n  ",
    "\r\n",
    "\r",
    "\t",
    " ",
    " ",
    " ",
    "\u{feff}",
    "```tussock\n",
    "```\n",
    "- ",
    "> ",
];

fn soup() -> impl Strategy<Value = String> {
    prop::collection::vec(prop::sample::select(PIECES), 0..60).prop_map(|pieces| pieces.concat())
}

fn spaced_soup() -> impl Strategy<Value = String> {
    prop::collection::vec(prop::sample::select(PIECES), 0..60).prop_map(|pieces| pieces.join(" "))
}

/// The program, cut off somewhere or with a piece of it replaced.
fn damaged() -> impl Strategy<Value = String> {
    (0..PROGRAM.len(), 0..30usize, prop::sample::select(PIECES), any::<bool>()).prop_map(
        |(start, length, piece, truncate)| {
            let characters: Vec<char> = PROGRAM.chars().collect();
            let start = start.min(characters.len());
            let mut text: String = characters[..start].iter().collect();
            text.push_str(piece);
            if !truncate {
                let end = (start + length).min(characters.len());
                text.extend(&characters[end..]);
            }
            text
        },
    )
}

fn any_text() -> impl Strategy<Value = String> {
    prop_oneof![soup(), spaced_soup(), damaged(), ".{0,80}", "(.|[\r\n\"`#. ]){0,60}"]
}

fn whole(text: &str) -> Parse {
    parse(text, Span::new(0, text.len()))
}

/// The tokens that mean something, statement by statement, and the comments.
fn meaning(text: &str) -> Vec<String> {
    let root = whole(text).root();
    let tokens = root.descendants_with_tokens().filter_map(|element| element.into_token());
    let mut meaning: Vec<String> = tokens
        .filter(|token| !matches!(token.kind(), SyntaxKind::Whitespace | SyntaxKind::Newline))
        .map(|token| {
            let first = token
                .parent()
                .filter(|node| node.kind() == SyntaxKind::Statement)
                .is_some_and(|node| node.text_range().start() == token.text_range().start());
            format!(
                "{}{:?} {}",
                if first { "> " } else { "" },
                token.kind(),
                token.text().trim_end()
            )
        })
        .collect();
    meaning.push(format!("{} errors", whole(text).errors.len()));
    meaning
}

proptest! {
    #![proptest_config(ProptestConfig { failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn the_tree_is_the_text(text in any_text()) {
        let parse = whole(&text);
        prop_assert_eq!(parse.root().text().to_string(), text.clone());
        for error in &parse.errors {
            prop_assert!(text.get(error.span.range()).is_some(), "{:?}", error);
            if let Some(fix) = &error.fix {
                prop_assert!(text.get(fix.span.range()).is_some(), "{:?}", fix);
            }
        }
        let nodes = parse.root().children().filter(|node| node.kind() == SyntaxKind::Statement);
        prop_assert_eq!(nodes.count(), parse.statements.len());
        for statement in &parse.statements {
            prop_assert!(text.get(statement.span.range()).is_some());
            let wrong = parse.errors.iter().any(|error| statement.span.touches(error.span.start));
            let broken = matches!(statement.kind, StatementKind::Broken { .. });
            prop_assert_eq!(wrong, broken, "{:?} {:?}", statement, parse.errors);
        }
    }

    #[test]
    fn formatting_keeps_the_meaning_and_is_done_once(text in any_text()) {
        let once = format(&text);
        prop_assert_eq!(meaning(&once), meaning(&text), "{:?} -> {:?}", text, once);
        prop_assert_eq!(format(&once), once.clone(), "{:?}", text);
    }

    #[test]
    fn formatting_markdown_keeps_the_prose_and_is_done_once(text in any_text()) {
        let once = format_markdown(&text);
        prop_assert_eq!(format_markdown(&once), once.clone(), "{:?}", text);
        let prose = |text: &str| -> Vec<String> {
            let document = Document::markdown(text);
            let source = &document.sources[0];
            let prose = source.regions.iter().filter(|region| {
                region.kind == tussock_language::document::RegionKind::Prose
            });
            prose.map(|region| region.span.of(&source.text).to_owned()).collect()
        };
        prop_assert_eq!(prose(&once), prose(&text));
    }

    #[test]
    fn any_document_has_a_model_and_diagnostics(text in any_text()) {
        for document in [Document::script(text.clone()), Document::markdown(text.clone())] {
            let source = &document.sources[0];
            let mut end = 0;
            for region in &source.regions {
                prop_assert!(region.span.start >= end && region.span.end >= region.span.start);
                prop_assert!(source.text.get(region.span.range()).is_some());
                end = region.span.end;
            }
            let model = Model::new(&document, Redefinition::Error);
            for diagnostic in diagnose(&model, &FerryFacts::of(&document)) {
                prop_assert!(text.get(diagnostic.location.span.range()).is_some());
                prop_assert!(!diagnostic.message.is_empty());
            }
        }
    }

    #[test]
    fn any_cursor_has_an_expectation(text in any_text(), offset in 0..200usize) {
        let expectation = expected_at(&text, Span::new(0, text.len()), offset);
        prop_assert!(text.get(expectation.word.range()).is_some());
    }
}
