//! The messages of the protocol and where each goes.
//!
//! A notification posts one event before it first waits; a request names its feature. Nothing else
//! happens here.

use std::path::PathBuf;
use std::sync::{Arc, OnceLock};
use std::time::Duration;

use tokio::sync::{OwnedSemaphorePermit, Semaphore};
use tower_lsp::jsonrpc::Result;
use tower_lsp::lsp_types::*;
use tower_lsp::{Client, LanguageServer};

use crate::client::Abilities;
use crate::documents::{Documents, Event};
use crate::notebooks;
use crate::outbox::Outbox;
use crate::requests::{self, *};

/// How many requests are worked on at a time: more than there are processors on most machines,
/// because some of them wait for a check to end.
const WORKERS: usize = 8;

/// The server's side of one connection.
#[derive(Debug)]
pub struct Backend {
    client: Client,
    documents: Documents,
    outbox: Outbox,
    workers: Arc<Semaphore>,
    abilities: OnceLock<Abilities>,
}

impl Backend {
    /// A server for `client`, within a running runtime. A document is checked `pause` after its
    /// last change.
    #[must_use]
    pub fn new(client: Client, pause: Duration) -> Self {
        let outbox = Outbox::open(client.clone());
        let documents = Documents::open(outbox.clone(), pause);
        let workers = Arc::new(Semaphore::new(WORKERS));
        Self { client, documents, outbox, workers, abilities: OnceLock::new() }
    }

    pub(crate) fn documents(&self) -> &Documents {
        &self.documents
    }

    pub(crate) fn outbox(&self) -> &Outbox {
        &self.outbox
    }

    /// Waits for a free worker.
    pub(crate) async fn turn(&self) -> Option<OwnedSemaphorePermit> {
        // The semaphore is never closed; without a permit the work is done all the same.
        Arc::clone(&self.workers).acquire_owned().await.ok()
    }

    /// `notebookDocument/didOpen`.
    pub(crate) async fn notebook_did_open(&self, message: notebooks::DidOpen) {
        self.documents.post(Event::NotebookOpened(message));
    }

    /// `notebookDocument/didChange`.
    pub(crate) async fn notebook_did_change(&self, message: notebooks::DidChange) {
        self.documents.post(Event::NotebookChanged(message));
    }

    /// `notebookDocument/didSave`.
    pub(crate) async fn notebook_did_save(&self, _: notebooks::DidSave) {
        self.documents.post(Event::FilesChanged);
    }

    /// `notebookDocument/didClose`.
    pub(crate) async fn notebook_did_close(&self, message: notebooks::DidClose) {
        self.documents.post(Event::NotebookClosed(message.uri().clone()));
    }
}

#[tower_lsp::async_trait]
impl LanguageServer for Backend {
    async fn initialize(&self, params: InitializeParams) -> Result<InitializeResult> {
        let abilities = Abilities::of(&params);
        let encoding = abilities.encoding;
        self.documents.post(Event::Introduced(abilities.clone(), workspace(&params)));
        // A second `initialize` never gets here.
        let _first = self.abilities.set(abilities);
        Ok(InitializeResult {
            capabilities: capabilities(encoding.kind()),
            server_info: Some(ServerInfo {
                name: "tussock".to_owned(),
                version: Some(env!("CARGO_PKG_VERSION").to_owned()),
            }),
        })
    }

    async fn initialized(&self, _: InitializedParams) {
        if self.abilities.get().is_some_and(|abilities| abilities.watches_files) {
            // The client's reply is awaited elsewhere: a handler that waits for the client can
            // keep the client's own messages waiting.
            let client = self.client.clone();
            tokio::spawn(async move { client.register_capability(vec![data_files()]).await });
        }
    }

    async fn shutdown(&self) -> Result<()> {
        Ok(())
    }

    async fn did_open(&self, params: DidOpenTextDocumentParams) {
        self.documents.post(Event::TextOpened(params.text_document));
    }

    async fn did_change(&self, params: DidChangeTextDocumentParams) {
        self.documents.post(Event::TextChanged(params));
    }

    async fn did_save(&self, _: DidSaveTextDocumentParams) {
        self.documents.post(Event::FilesChanged);
    }

    async fn did_close(&self, params: DidCloseTextDocumentParams) {
        self.documents.post(Event::TextClosed(params.text_document.uri));
    }

    async fn did_change_watched_files(&self, _: DidChangeWatchedFilesParams) {
        self.documents.post(Event::FilesChanged);
    }

    async fn completion(&self, params: CompletionParams) -> Result<Option<CompletionResponse>> {
        self.ask::<Completion>(params).await
    }

    async fn hover(&self, params: HoverParams) -> Result<Option<Hover>> {
        self.ask::<HoverText>(params).await
    }

    async fn formatting(&self, params: DocumentFormattingParams) -> Result<Option<Vec<TextEdit>>> {
        self.ask::<Formatting>(params).await
    }

    async fn document_symbol(
        &self,
        params: DocumentSymbolParams,
    ) -> Result<Option<DocumentSymbolResponse>> {
        self.ask::<Symbols>(params).await
    }

    async fn code_action(&self, params: CodeActionParams) -> Result<Option<CodeActionResponse>> {
        self.ask::<QuickFixes>(params).await
    }

    async fn goto_definition(
        &self,
        params: GotoDefinitionParams,
    ) -> Result<Option<GotoDefinitionResponse>> {
        self.ask::<Definition>(params).await
    }

    async fn references(&self, params: ReferenceParams) -> Result<Option<Vec<Location>>> {
        self.ask::<References>(params).await
    }

    async fn document_highlight(
        &self,
        params: DocumentHighlightParams,
    ) -> Result<Option<Vec<DocumentHighlight>>> {
        self.ask::<Mentions>(params).await
    }

    async fn prepare_rename(
        &self,
        params: TextDocumentPositionParams,
    ) -> Result<Option<PrepareRenameResponse>> {
        self.ask::<PrepareRename>(params).await
    }

    async fn rename(&self, params: RenameParams) -> Result<Option<WorkspaceEdit>> {
        self.ask::<Rename>(params).await
    }

    async fn semantic_tokens_full(
        &self,
        params: SemanticTokensParams,
    ) -> Result<Option<SemanticTokensResult>> {
        self.ask::<WordKinds>(params).await
    }

    async fn folding_range(&self, params: FoldingRangeParams) -> Result<Option<Vec<FoldingRange>>> {
        self.ask::<Folding>(params).await
    }
}

/// Everything that the server says it can do, but for notebooks, of which the library's type knows
/// nothing.
fn capabilities(encoding: PositionEncodingKind) -> ServerCapabilities {
    let mut capabilities = ServerCapabilities {
        position_encoding: Some(encoding),
        text_document_sync: Some(TextDocumentSyncCapability::Options(TextDocumentSyncOptions {
            open_close: Some(true),
            change: Some(TextDocumentSyncKind::INCREMENTAL),
            save: Some(TextDocumentSyncSaveOptions::Supported(true)),
            ..TextDocumentSyncOptions::default()
        })),
        ..ServerCapabilities::default()
    };
    for announce in requests::ANNOUNCEMENTS {
        announce(&mut capabilities);
    }
    capabilities
}

/// The wish to be told when a data file changes on disk.
fn data_files() -> Registration {
    let watchers = serde_json::json!({ "watchers": [{ "globPattern": "**/*.{csv,tsv}" }] });
    Registration {
        id: "tussock-data-files".to_owned(),
        method: "workspace/didChangeWatchedFiles".to_owned(),
        register_options: Some(watchers),
    }
}

/// The folder that the client works in.
fn workspace(params: &InitializeParams) -> Option<PathBuf> {
    let folders = params.workspace_folders.as_deref().unwrap_or_default();
    let first = folders.first().map(|folder| &folder.uri);
    let root = first.or(params.root_uri.as_ref())?;
    root.to_file_path().ok()
}
