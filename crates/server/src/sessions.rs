//! One session a folder: documents name their data files relative to where they lie.

use std::collections::BTreeMap;
use std::path::PathBuf;
use std::sync::Arc;

use tower_lsp::lsp_types::Url;
use tussock_session::session::Session;

/// The sessions of the folders that hold open documents.
#[derive(Debug, Default)]
pub(crate) struct Sessions {
    by_folder: BTreeMap<PathBuf, Arc<Session>>,
    workspace: Option<PathBuf>,
}

impl Sessions {
    /// Sets the folder of documents that lie in none, such as an untitled one.
    pub(crate) fn set_workspace(&mut self, folder: Option<PathBuf>) {
        self.workspace = folder;
    }

    /// The session of a document.
    pub(crate) fn of(&mut self, document: &Url) -> Arc<Session> {
        let folder = self.folder(document);
        let session =
            self.by_folder.entry(folder.clone()).or_insert_with(|| Arc::new(Session::new(folder)));
        Arc::clone(session)
    }

    /// Forgets the sessions that no document uses, and with them what they cached.
    pub(crate) fn release(&mut self) {
        self.by_folder.retain(|_, session| Arc::strong_count(session) > 1);
    }

    fn folder(&self, document: &Url) -> PathBuf {
        let beside = document
            .to_file_path()
            .ok()
            .and_then(|path| path.parent().map(std::path::Path::to_path_buf));
        beside
            .or_else(|| self.workspace.clone())
            .or_else(|| std::env::current_dir().ok())
            .unwrap_or_default()
    }
}
