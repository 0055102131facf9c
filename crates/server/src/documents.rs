//! The one owner of the open documents.
//!
//! Every notification and every question is an event in one queue, and a handler puts it there
//! before it first waits. So edits are applied in the order in which they came, and a question is
//! about the text as it was when the question came.

use std::collections::BTreeMap;
use std::panic::{AssertUnwindSafe, catch_unwind};
use std::path::PathBuf;
use std::sync::Arc;
use std::time::Duration;

use tokio::sync::mpsc::{
    UnboundedReceiver, UnboundedSender, WeakUnboundedSender, unbounded_channel,
};
use tokio::sync::{Semaphore, oneshot};
use tower_lsp::lsp_types::{DidChangeTextDocumentParams, TextDocumentItem, Url};
use tussock_language::diagnostic::Diagnostic;
use tussock_language::span::SourceId;

use crate::client::Abilities;
use crate::diagnostics::{Published, Schedule, of_fault};
use crate::fault;
use crate::notebooks::{self, Notebook};
use crate::outbox::Outbox;
use crate::sessions::Sessions;
use crate::snapshot::Snapshot;
use crate::texts::Text;

/// What the owner is told or asked.
#[derive(Debug)]
pub(crate) enum Event {
    /// The client said what it can do and which folder it works in.
    Introduced(Abilities, Option<PathBuf>),
    /// A text was opened.
    TextOpened(TextDocumentItem),
    /// A text was edited.
    TextChanged(DidChangeTextDocumentParams),
    /// A text was closed.
    TextClosed(Url),
    /// A notebook was opened.
    NotebookOpened(notebooks::DidOpen),
    /// A notebook's cells were moved or edited.
    NotebookChanged(notebooks::DidChange),
    /// A notebook was closed.
    NotebookClosed(Url),
    /// Something on disk may have changed.
    FilesChanged,
    /// What is the document now that holds this text?
    Asked(Url, oneshot::Sender<View>),
    /// A check has ended; the error is the words of a panic.
    Checked(Url, Arc<Snapshot>, Result<Arc<Vec<Diagnostic>>, String>),
}

/// A document and the source in it that is meant.
#[derive(Debug)]
pub(crate) struct View {
    /// The document.
    pub(crate) snapshot: Arc<Snapshot>,
    /// The source.
    pub(crate) source: SourceId,
}

/// Where events are posted.
#[derive(Debug)]
pub(crate) struct Documents {
    events: UnboundedSender<Event>,
}

impl Documents {
    /// Starts the owner. A document is checked `pause` after its last change.
    pub(crate) fn open(outbox: Outbox, pause: Duration) -> Self {
        let (events, receiver) = unbounded_channel();
        let owner = Owner {
            abilities: Arc::default(),
            sessions: Sessions::default(),
            open: BTreeMap::new(),
            schedule: Schedule::new(pause),
            published: Published::default(),
            checking: Arc::new(Semaphore::new(1)),
            events: events.downgrade(),
            outbox,
        };
        tokio::spawn(owner.run(receiver));
        Self { events }
    }

    /// Posts an event; never waits.
    pub(crate) fn post(&self, event: Event) {
        // The owner is gone only when the server is ending.
        let _ending = self.events.send(event);
    }

    /// Asks for the document that holds a text. The question is in the queue when this returns;
    /// the answer is none for a text that is not open.
    pub(crate) fn ask(&self, text: &Url) -> oneshot::Receiver<View> {
        let (reply, answer) = oneshot::channel();
        self.post(Event::Asked(text.clone(), reply));
        answer
    }
}

struct Owner {
    abilities: Arc<Abilities>,
    sessions: Sessions,
    open: BTreeMap<Url, Open>,
    schedule: Schedule,
    published: Published,
    /// One check at a time, so that checks never take all threads from the requests.
    checking: Arc<Semaphore>,
    events: WeakUnboundedSender<Event>,
    outbox: Outbox,
}

/// An open document. Its snapshot is made when first asked for and kept until the next change.
struct Open {
    shape: Shape,
    snapshot: Option<Arc<Snapshot>>,
}

enum Shape {
    Text(Text),
    Notebook(Notebook),
}

impl Owner {
    async fn run(mut self, mut events: UnboundedReceiver<Event>) {
        loop {
            tokio::select! {
                biased;
                event = events.recv() => match event {
                    Some(event) => self.guarded(|owner| owner.handle(event)),
                    None => return,
                },
                document = self.schedule.next() => {
                    self.guarded(|owner| owner.start_check(document));
                }
            }
        }
    }

    /// Keeps the owner alive whatever one event does.
    fn guarded(&mut self, work: impl FnOnce(&mut Self)) {
        if let Err(panic) = catch_unwind(AssertUnwindSafe(|| work(self))) {
            let words = fault::words(panic.as_ref());
            self.outbox.report_fault(&format!("keeping the documents failed: {words}"));
        }
    }

    fn handle(&mut self, event: Event) {
        match event {
            Event::Introduced(abilities, workspace) => {
                self.abilities = Arc::new(abilities);
                self.sessions.set_workspace(workspace);
            }
            Event::TextOpened(item) => {
                let uri = item.uri.clone();
                self.insert(uri, Shape::Text(Text::opened(item)));
            }
            Event::TextChanged(params) => self.change_text(params),
            Event::NotebookOpened(message) => {
                let (uri, notebook) = Notebook::opened(message);
                self.insert(uri, Shape::Notebook(notebook));
            }
            Event::NotebookChanged(message) => self.change_notebook(message),
            Event::TextClosed(uri) | Event::NotebookClosed(uri) => self.close(&uri),
            Event::FilesChanged => self.renew_all(),
            Event::Asked(text, reply) => self.answer(&text, reply),
            Event::Checked(document, snapshot, findings) => {
                self.publish(&document, &snapshot, findings);
            }
        }
    }

    fn insert(&mut self, uri: Url, shape: Shape) {
        self.schedule.put_off(&uri);
        let replaced = self.open.insert(uri, Open { shape, snapshot: None });
        if let Some(snapshot) = replaced.and_then(|open| open.snapshot) {
            snapshot.supersede();
        }
    }

    fn change_text(&mut self, params: DidChangeTextDocumentParams) {
        let text = params.text_document;
        let Some(document) = self.document_of(&text.uri) else { return };
        let encoding = self.abilities.encoding;
        let Some(open) = self.open.get_mut(&document) else { return };
        match &mut open.shape {
            Shape::Text(it) => it.edit(text.version, params.content_changes, encoding),
            // A client that synchronizes a cell like a file is understood as well.
            Shape::Notebook(it) => {
                it.edit(&text.uri, text.version, params.content_changes, encoding);
            }
        }
        self.changed(&document);
    }

    fn change_notebook(&mut self, message: notebooks::DidChange) {
        let document = message.uri().clone();
        let encoding = self.abilities.encoding;
        let Some(Open { shape: Shape::Notebook(notebook), .. }) = self.open.get_mut(&document)
        else {
            return;
        };
        let before: Vec<Url> = notebook.cells().map(|(uri, _)| uri.clone()).collect();
        notebook.change(message, encoding);
        let gone = before.iter().filter(|cell| !notebook.shows(cell));
        for cell in gone {
            self.outbox.publish(self.published.clear(cell));
        }
        self.changed(&document);
    }

    /// What follows from any change of a text.
    fn changed(&mut self, document: &Url) {
        let stale = self.open.get_mut(document).and_then(|open| open.snapshot.take());
        if let Some(snapshot) = stale {
            snapshot.supersede();
        }
        self.schedule.put_off(document);
    }

    fn close(&mut self, document: &Url) {
        let Some(open) = self.open.remove(document) else { return };
        self.schedule.remove(document);
        let texts: Vec<Url> = match &open.shape {
            Shape::Text(_) => vec![document.clone()],
            Shape::Notebook(notebook) => notebook.cells().map(|(uri, _)| uri.clone()).collect(),
        };
        if let Some(snapshot) = open.snapshot {
            snapshot.supersede();
        }
        for text in texts {
            self.outbox.publish(self.published.clear(&text));
        }
        self.sessions.release();
    }

    /// Checks every document anew, because a file that one of them reads may have changed.
    fn renew_all(&mut self) {
        for (uri, open) in &mut self.open {
            open.snapshot = open.snapshot.take().map(|old| Arc::new(old.renewed()));
            self.schedule.put_off(uri);
        }
    }

    fn answer(&mut self, text: &Url, reply: oneshot::Sender<View>) {
        let Some(document) = self.document_of(text) else { return };
        let Some(snapshot) = self.snapshot(&document) else { return };
        let Some(source) = snapshot.source(text) else { return };
        // The asker is gone when the client cancelled.
        let _cancelled = reply.send(View { snapshot, source });
    }

    /// The document that a text belongs to: itself, or the notebook whose cell it is.
    fn document_of(&self, text: &Url) -> Option<Url> {
        if self.open.contains_key(text) {
            return Some(text.clone());
        }
        let holder = self.open.iter().find(|(_, open)| match &open.shape {
            Shape::Text(_) => false,
            Shape::Notebook(notebook) => notebook.holds(text),
        });
        holder.map(|(document, _)| document.clone())
    }

    fn snapshot(&mut self, document: &Url) -> Option<Arc<Snapshot>> {
        let open = self.open.get_mut(document)?;
        if open.snapshot.is_none() {
            let abilities = Arc::clone(&self.abilities);
            let session = self.sessions.of(document);
            open.snapshot = match &open.shape {
                Shape::Text(text) => Snapshot::of_text(document, text, abilities, session),
                Shape::Notebook(notebook) => {
                    Some(Snapshot::of_notebook(notebook, abilities, session))
                }
            }
            .map(Arc::new);
        }
        open.snapshot.clone()
    }

    fn start_check(&mut self, document: Url) {
        let Some(snapshot) = self.snapshot(&document) else { return };
        let Some(events) = self.events.upgrade() else { return };
        let turn = Arc::clone(&self.checking);
        tokio::spawn(async move {
            let Ok(permit) = turn.acquire_owned().await else { return };
            if snapshot.is_outdated() {
                return;
            }
            let checked = Arc::clone(&snapshot);
            let check = tokio::task::spawn_blocking(move || {
                let _until_done = permit;
                checked.findings()
            });
            let findings = match check.await {
                Ok(findings) => Ok(findings),
                Err(failure) => match failure.try_into_panic() {
                    Ok(panic) => Err(fault::words(panic.as_ref()).to_owned()),
                    Err(_) => return,
                },
            };
            let _ending = events.send(Event::Checked(document, snapshot, findings));
        });
    }

    /// Tells the client what a check found, unless there is newer text or newer data by now.
    fn publish(
        &mut self,
        document: &Url,
        snapshot: &Arc<Snapshot>,
        findings: Result<Arc<Vec<Diagnostic>>, String>,
    ) {
        let current = self.open.get(document).and_then(|open| open.snapshot.as_ref());
        if !current.is_some_and(|current| Arc::ptr_eq(current, snapshot)) {
            return;
        }
        let findings = findings.unwrap_or_else(|words| {
            self.outbox.report_fault(&format!("checking {document} failed: {words}"));
            Arc::new(vec![of_fault(&words)])
        });
        for message in self.published.update(snapshot, &findings) {
            self.outbox.publish(message);
        }
    }
}
