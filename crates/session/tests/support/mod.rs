//! A folder with data files, and documents answered in it.

#![allow(unreachable_pub, reason = "a module of tests is public to its file alone")]
#![allow(dead_code, reason = "each test file uses its own part of this")]

use std::fs;
use std::path::PathBuf;
use std::sync::atomic::{AtomicUsize, Ordering};

use tussock_language::document::Document;
use tussock_language::present::present;
use tussock_session::answer::{Answers, Output};
use tussock_session::cancel::Cancel;
use tussock_session::session::Session;

static FOLDERS: AtomicUsize = AtomicUsize::new(0);

/// A folder that goes away with the test.
pub struct Folder {
    pub path: PathBuf,
    pub session: Session,
}

impl Folder {
    pub fn with(files: &[(&str, &str)]) -> Self {
        let number = FOLDERS.fetch_add(1, Ordering::Relaxed);
        let name = format!("tussock-session-{}-{number}", std::process::id());
        let path = std::env::temp_dir().join(name);
        fs::create_dir_all(&path).unwrap();
        let folder = Self { session: Session::new(&path), path };
        for (name, text) in files {
            folder.write(name, text);
        }
        folder
    }

    pub fn write(&self, name: &str, text: &str) {
        fs::write(self.path.join(name), text).unwrap();
    }

    pub fn answer(&self, code: &str) -> Answers {
        self.session.answer(&Document::script(code), &Cancel::new())
    }

    /// Everything that a script answers but its tables, one line each.
    pub fn words(&self, code: &str) -> Vec<String> {
        let answers = self.answer(code).list.into_iter();
        answers
            .filter_map(|answer| match answer.output {
                Output::Paragraph(text) | Output::Note(text) | Output::Value(text) => {
                    Some(text.text())
                }
                Output::Problem(problem) => Some(format!("{}: {}", problem.rule, problem.message)),
                Output::Table(_) => None,
            })
            .collect()
    }

    /// What a script is told is wrong, as a terminal shows it.
    pub fn problems(&self, code: &str) -> String {
        let document = Document::script(code);
        let answers = self.session.answer(&document, &Cancel::new());
        answers.problems().map(|one| present(one, &document, &|_| "here".to_owned())).collect()
    }

    /// How many tables a script shows.
    pub fn tables(&self, code: &str) -> usize {
        let answers = self.answer(code);
        answers.list.iter().filter(|one| matches!(one.output, Output::Table(_))).count()
    }

    pub fn value(&self, code: &str, path: &str) -> f64 {
        let values = self.session.values(&Document::script(code));
        values.get(path).unwrap_or_else(|| panic!("no value at {path}")).number
    }
}

impl Drop for Folder {
    fn drop(&mut self) {
        let _gone = fs::remove_dir_all(&self.path);
    }
}

/// Three groups of five with two outcomes, in no way special.
pub const PLAIN: &str = "g,x,y
a,9.8,19.1
a,7.8,22.9
a,11.8,15.0
a,10.4,20.2
a,9.1,21.0
b,10.1,25.9
b,8.0,17.1
b,12.5,20.0
b,10.4,23.4
b,8.1,19.1
c,12.6,20.8
c,11.1,18.8
c,7.9,21.0
c,11.4,26.5
c,10.9,20.0
";
