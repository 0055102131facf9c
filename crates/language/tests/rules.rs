//! Every rule has a page whose examples break it and keep it.

mod support;

use support::FerryFacts;
use tussock_language::diagnostic::{Diagnostic, Severity};
use tussock_language::document::Document;
use tussock_language::model::{Model, Redefinition};
use tussock_language::rules::{RULES, diagnose, examples};
use tussock_language::verbs::VERBS;

fn found(code: &str) -> Vec<Diagnostic> {
    let document = Document::script(code);
    let model = Model::new(&document, Redefinition::Error);
    diagnose(&model, &FerryFacts::of(&document))
}

#[test]
fn each_example_that_breaks_a_rule_is_found_and_nothing_else_is() {
    for rule in RULES {
        let examples = examples(&rule.page);
        assert!(
            examples.iter().any(|one| one.breaks),
            "{} has no breaking example",
            rule.page.name
        );
        assert!(examples.iter().any(|one| !one.breaks), "{} has no good example", rule.page.name);
        for example in examples {
            let found = found(&example.code);
            let names: Vec<&str> = found.iter().map(|one| one.rule).collect();
            let expected: &[&str] = if example.breaks { &[rule.page.name] } else { &[] };
            assert_eq!(names, expected, "{}\n{}\n{found:#?}", rule.page.name, example.code);
        }
    }
}

#[test]
fn each_example_has_the_severity_of_its_rule() {
    for rule in RULES {
        let mut severities = examples(&rule.page)
            .iter()
            .flat_map(|example| found(&example.code))
            .map(|diagnostic| diagnostic.severity)
            .collect::<Vec<_>>();
        severities.sort_unstable();
        assert_eq!(severities.first(), Some(&rule.severity), "{}", rule.page.name);
    }
}

#[test]
fn names_of_rules_are_in_kebab_case_and_unique() {
    let mut names: Vec<&str> = RULES.iter().map(|rule| rule.page.name).collect();
    for (rule, name) in RULES.iter().zip(&names) {
        assert!(name.bytes().all(|byte| byte.is_ascii_lowercase() || byte == b'-'), "{name}");
        assert!(rule.page.text.starts_with(&format!("# {name}\n")), "{name}");
    }
    names.sort_unstable();
    names.dedup();
    assert_eq!(names.len(), RULES.len());
}

#[test]
fn every_mend_leads_to_text_with_fewer_findings() {
    let mut mended = 0;
    for example in RULES.iter().flat_map(|rule| examples(&rule.page)) {
        let before = found(&example.code);
        for diagnostic in &before {
            let Some(fix) = &diagnostic.fix else { continue };
            let mut text = example.code.clone();
            for edit in fix.edits.iter().rev() {
                text.replace_range(edit.location.span.range(), &edit.text);
            }
            assert!(found(&text).len() < before.len(), "{}\n->\n{text}", example.code);
            mended += 1;
        }
    }
    assert!(mended > 10, "the pages show mends");
}

#[test]
fn the_pages_of_verbs_have_examples_without_findings() {
    for verb in VERBS {
        let fences: Vec<&str> = verb.page.text.split("```tussock\n").skip(1).collect();
        assert!(!fences.is_empty(), "{} has no example", verb.name());
        for fence in fences {
            let code = fence.split("```").next().expect("a split has a first part");
            assert_eq!(found(code), [], "{code}");
            assert!(code.lines().any(|line| line.starts_with(verb.name())), "{}", verb.name());
        }
        for clause in verb.clauses {
            let shown = verb.page.text.contains(&format!("`{} ", clause.name()));
            assert!(shown, "the page of {} is silent on {}", verb.name(), clause.name());
        }
    }
}

#[test]
fn errors_cannot_be_allowed() {
    let code = "# allow unknown-comparison: later\nshow groups of main";
    assert_eq!(found(code).len(), 1);
    assert_eq!(found(code)[0].severity, Severity::Error);
}
