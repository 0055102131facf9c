//! Checks every line of `numbers.md`.
#![allow(
    clippy::indexing_slicing,
    clippy::panic,
    clippy::unwrap_used,
    clippy::wildcard_enum_match_arm,
    reason = "a test stops where it fails"
)]

use tussock_report::value::{NumberStyle, Value};

const PAGE: &str = include_str!("numbers.md");

struct Rule {
    line: usize,
    value: f64,
    style: String,
    printed: String,
}

fn rules() -> Vec<Rule> {
    let mut rules = Vec::new();
    for (index, line) in PAGE.lines().enumerate() {
        let Some(cells) = line.strip_prefix("| ").and_then(|line| line.strip_suffix(" |")) else {
            continue;
        };
        let cells: Vec<&str> = cells.split(" | ").collect();
        assert_eq!(cells.len(), 3, "line {}", index + 1);
        if let Ok(value) = cells[0].parse() {
            let (style, printed) = (cells[1].to_owned(), cells[2].to_owned());
            rules.push(Rule { line: index + 1, value, style, printed });
        } else {
            assert!(["value", "---"].contains(&cells[0]), "line {}: {line}", index + 1);
        }
    }
    rules
}

fn printed(rule: &Rule) -> String {
    let words: Vec<&str> = rule.style.split(' ').collect();
    let decimals = |at: usize| words[at].parse().unwrap();
    let (style, used) = match words[0] {
        "p" => (NumberStyle::P, 1),
        "df" => (NumberStyle::Df, 1),
        "count" => (NumberStyle::Count, 1),
        "bounded" => (NumberStyle::Bounded(decimals(1)), 2),
        "standardized" => (NumberStyle::Standardized(decimals(1)), 2),
        "statistic" => (NumberStyle::Statistic(decimals(1)), 2),
        "percent" => (NumberStyle::Percent(decimals(1)), 2),
        other => panic!("line {}: no style `{other}`", rule.line),
    };
    let value = Value::new(rule.value, style);
    match &words[used..] {
        [] => value.text(),
        ["cited"] => value.equals(),
        ["limit"] => value.limit_text(),
        ["with", decimals] => value.text_with(decimals.parse().unwrap()),
        other => panic!("line {}: cannot read {other:?}", rule.line),
    }
}

#[test]
fn every_line_of_the_page_of_number_rules_holds() {
    let rules = rules();
    assert!(rules.len() > 80, "the page was read only in part: {} lines", rules.len());
    let wrong: Vec<String> = rules
        .iter()
        .filter(|rule| printed(rule) != rule.printed)
        .map(|rule| {
            let (line, value, style) = (rule.line, rule.value, &rule.style);
            format!("line {line}: {value} as {style} gave {}, not {}", printed(rule), rule.printed)
        })
        .collect();
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}
