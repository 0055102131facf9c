//! Whether the editors' lists of words are the language's: a word that is added to the language
//! is added to them.

use std::path::Path;

use tussock_language::verbs::{Part, VERBS};

/// The words of expressions, which the grammar of the verbs does not list.
const OPERATORS: [&str; 6] = ["and", "or", "not", "if", "then", "else"];

#[test]
fn every_editor_colours_the_words_of_the_language() {
    let verbs: Vec<&str> = VERBS.iter().map(|verb| verb.name()).collect();
    let words = clause_words();
    let lists = [verbs, words, OPERATORS.to_vec()];
    let quoted = |list: &[&str]| format!("(\"{}\")", list.join("\" \""));
    for list in &lists {
        check("vscode/syntaxes/tussock.tmLanguage.json", &format!("({})\\\\b", list.join("|")));
        check("emacs/tussock.el", &quoted(list));
        check("jupyterlab/labextension/static/remoteEntry.js", &quoted(&[&list.join(" ")]));
    }
    let [verbs, words, operators] = lists;
    let vim = "neovim/syntax/tussock.vim";
    check(vim, &format!("/^\\%({}\\)\\>/\n", verbs.join("\\|")));
    check(vim, &format!("syntax keyword tussockWord {}\n", words.join(" ")));
    check(vim, &format!("syntax keyword tussockOperator {}\n", operators.join(" ")));
}

/// The words of clauses and the fixed words, each once, in the order of the language.
fn clause_words() -> Vec<&'static str> {
    let mut words = Vec::new();
    for verb in VERBS {
        fixed_words(verb.head, &mut words);
        for clause in verb.clauses {
            words.extend(clause.words);
            fixed_words(clause.parts, &mut words);
        }
    }
    let mut once: Vec<&str> = Vec::new();
    for word in words {
        if !once.contains(&word) && !VERBS.iter().any(|verb| verb.name() == word) {
            once.push(word);
        }
    }
    once
}

fn fixed_words(parts: &'static [Part], words: &mut Vec<&'static str>) {
    for part in parts {
        match part {
            Part::Word(word) => words.push(word),
            Part::Either(alternatives) => {
                alternatives.iter().for_each(|parts| fixed_words(parts, words));
            }
            Part::Slot(_) | Part::Sign(..) => {}
        }
    }
}

#[track_caller]
fn check(file: &str, list: &str) {
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join("../../editors").join(file);
    let text = std::fs::read_to_string(&path).expect("the editor's file can be read");
    assert!(text.contains(list), "editors/{file} should contain\n{list}");
}
