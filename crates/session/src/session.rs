//! The one place where a question meets data.

use std::collections::BTreeMap;
use std::fs;
use std::path::{Path, PathBuf};
use std::sync::{Arc, Mutex, PoisonError};
use std::time::SystemTime;

use tussock_data::frame::Frame;
use tussock_data::read::{ReadError, ReadOptions, read_bytes, read_file};
use tussock_language::diagnostic::Diagnostic;
use tussock_language::document::Document;
use tussock_language::model::{Model, Redefinition};
use tussock_language::span::SourceId;
use tussock_report::value::Value;

use crate::answer::Answers;
use crate::answering;
use crate::cache::Cache;
use crate::cancel::Cancel;
use crate::checking;
use crate::context::Context;
use crate::fingerprint::Fingerprint;
use crate::knowledge::Knowledge;
use crate::relation::Relation;
use crate::study::Study;
use crate::views::Shown;

/// How many files, tables, studies and views are kept at most, of each.
const KEPT: usize = 64;

/// Answers documents that live in one folder. Shared by reference among threads; everything that it
/// keeps is a cache by content.
#[derive(Debug)]
pub struct Session {
    root: PathBuf,
    seen: Mutex<BTreeMap<PathBuf, Seen>>,
    frames: Cache<Arc<Frame>>,
    pub(crate) relations: Cache<Arc<Relation>>,
    pub(crate) studies: Cache<Arc<Study>>,
    pub(crate) shown: Cache<Arc<Shown>>,
}

/// A file's content as it was last hashed; it is hashed again when its size or time has changed.
#[derive(Clone, Copy, Debug)]
struct Seen {
    size: u64,
    modified: Option<SystemTime>,
    content: Fingerprint,
}

impl Session {
    /// A session whose documents name their files relative to `root`.
    pub fn new(root: impl Into<PathBuf>) -> Self {
        Self {
            root: root.into(),
            seen: Mutex::default(),
            frames: Cache::new(KEPT),
            relations: Cache::new(KEPT),
            studies: Cache::new(KEPT),
            shown: Cache::new(KEPT),
        }
    }

    /// The folder that paths are relative to.
    #[must_use]
    pub fn root(&self) -> &Path {
        &self.root
    }

    /// Everything that is wrong with a document or worth knowing, in reading order: from its text,
    /// from its data, from its results.
    #[must_use]
    pub fn check(&self, document: &Document, cancel: &Cancel) -> Vec<Diagnostic> {
        let context = Context::new(self, document, Model::new(document, Redefinition::Error));
        checking::check(&context, cancel)
    }

    /// Answers every question of a document.
    #[must_use]
    pub fn answer(&self, document: &Document, cancel: &Cancel) -> Answers {
        let context = Context::new(self, document, Model::new(document, Redefinition::Error));
        answering::answer(&context, None, cancel)
    }

    /// Answers the questions of one source alone, each name standing for its newest definition
    /// among all sources: what a kernel does when a cell is run.
    #[must_use]
    pub fn answer_cell(&self, document: &Document, source: SourceId, cancel: &Cancel) -> Answers {
        let model = Model::new(document, Redefinition::NewestWins);
        let context = Context::new(self, document, model);
        answering::answer(&context, Some(source), cancel)
    }

    /// Every live value of every comparison of a document, by its full path.
    #[must_use]
    pub fn values(&self, document: &Document) -> BTreeMap<String, Value> {
        Context::new(self, document, Model::new(document, Redefinition::Error)).values()
    }

    /// What completion, hover and diagnostics need to know of the world outside the text.
    #[must_use]
    pub fn knowledge<'a>(&'a self, document: &'a Document) -> Knowledge<'a> {
        let model = Model::new(document, Redefinition::NewestWins);
        Knowledge::new(Context::new(self, document, model))
    }

    /// The table in a file, and a hash of its content and of how it is read.
    pub(crate) fn frame_of_file(
        &self,
        path: &str,
        options: &ReadOptions,
    ) -> Result<(Arc<Frame>, Fingerprint), ReadError> {
        // A file beside the document is told of as it was written, without a leading `./`.
        let here = self.root == Path::new(".");
        let full = if here { PathBuf::from(path) } else { self.root.join(path) };
        let Some(content) = self.content(&full) else {
            // The reader finds the words for a file that can't be read.
            let frame = read_file(&full, options)?;
            return Ok((Arc::new(frame), Fingerprint::of([path.as_bytes()])));
        };
        let key = frame_key(content, path.as_bytes(), options);
        let frame = self.frames.get_or_make(key, || read_file(&full, options).map(Arc::new))?;
        Ok((frame, key))
    }

    /// The table in a text, and a hash of it and of how it is read.
    pub(crate) fn frame_of_bytes(
        &self,
        bytes: &[u8],
        options: &ReadOptions,
    ) -> Result<(Arc<Frame>, Fingerprint), ReadError> {
        let key = frame_key(Fingerprint::of([bytes]), b"", options);
        let frame =
            self.frames.get_or_make(key, || read_bytes(bytes, ',', options).map(Arc::new))?;
        Ok((frame, key))
    }

    fn content(&self, path: &Path) -> Option<Fingerprint> {
        let about = fs::metadata(path).ok().filter(fs::Metadata::is_file)?;
        let (size, modified) = (about.len(), about.modified().ok());
        let lock = || self.seen.lock().unwrap_or_else(PoisonError::into_inner);
        let known = lock().get(path).copied();
        if let Some(known) = known.filter(|k| k.size == size && k.modified == modified) {
            return Some(known.content);
        }
        let content = Fingerprint::of([fs::read(path).ok()?.as_slice()]);
        lock().insert(path.to_owned(), Seen { size, modified, content });
        Some(content)
    }
}

fn frame_key(content: Fingerprint, path: &[u8], options: &ReadOptions) -> Fingerprint {
    Fingerprint::of([content.bytes(), path, format!("{options:?}").as_bytes()])
}
