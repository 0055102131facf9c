//! One version of one document, which never changes: what every request and every check works on.

use std::sync::{Arc, Mutex, PoisonError};

use tower_lsp::lsp_types::{Location, Position, Range, Url};
use tussock_language::diagnostic::Diagnostic;
use tussock_language::document::{Document, RegionKind};
use tussock_language::span::{self, SourceId, Span};
use tussock_session::cancel::Cancel;
use tussock_session::knowledge::Knowledge;
use tussock_session::session::Session;

use crate::client::Abilities;
use crate::convert::Lines;
use crate::notebooks::Notebook;
use crate::texts::Text;

/// One version of a document and all that is needed to answer for it.
#[derive(Debug)]
pub struct Snapshot {
    document: Document,
    places: Vec<Place>,
    abilities: Arc<Abilities>,
    session: Arc<Session>,
    superseded: Cancel,
    outdated: Cancel,
    findings: Mutex<Option<Arc<Vec<Diagnostic>>>>,
}

/// Where a source of the document is in the client.
#[derive(Clone, Debug)]
pub(crate) struct Place {
    /// The client's name for the text.
    pub(crate) uri: Url,
    /// The client's number for the state of it.
    pub(crate) version: i32,
    lines: Lines,
}

impl Place {
    fn new(uri: &Url, text: &Text) -> Self {
        Self { uri: uri.clone(), version: text.version, lines: Lines::of(&text.content) }
    }
}

impl Snapshot {
    /// A text that is a document of its own; none for a language that is not known here.
    pub(crate) fn of_text(
        uri: &Url,
        text: &Text,
        abilities: Arc<Abilities>,
        session: Arc<Session>,
    ) -> Option<Self> {
        Some(Self::new(text.document()?, vec![Place::new(uri, text)], abilities, session))
    }

    /// A notebook.
    pub(crate) fn of_notebook(
        notebook: &Notebook,
        abilities: Arc<Abilities>,
        session: Arc<Session>,
    ) -> Self {
        let sources = notebook.cells().map(|(_, text)| text.cell()).collect();
        let places = notebook.cells().map(|(uri, text)| Place::new(uri, text)).collect();
        Self::new(Document::notebook_cells(sources), places, abilities, session)
    }

    fn new(
        document: Document,
        places: Vec<Place>,
        abilities: Arc<Abilities>,
        session: Arc<Session>,
    ) -> Self {
        Self {
            document,
            places,
            abilities,
            session,
            superseded: Cancel::new(),
            outdated: Cancel::new(),
            findings: Mutex::default(),
        }
    }

    /// The same text with nothing found yet, for when a file that it reads has changed.
    pub(crate) fn renewed(&self) -> Self {
        self.outdated.cancel();
        Self {
            superseded: self.superseded.clone(),
            ..Self::new(
                self.document.clone(),
                self.places.clone(),
                Arc::clone(&self.abilities),
                Arc::clone(&self.session),
            )
        }
    }

    /// Marks the text as no longer the document's.
    pub(crate) fn supersede(&self) {
        self.superseded.cancel();
        self.outdated.cancel();
    }

    /// The document.
    #[must_use]
    pub fn document(&self) -> &Document {
        &self.document
    }

    /// What the client can do.
    pub(crate) fn abilities(&self) -> &Abilities {
        &self.abilities
    }

    /// What is known of the world outside the text.
    pub(crate) fn knowledge(&self) -> Knowledge<'_> {
        self.session.knowledge(&self.document)
    }

    /// Whether the document's text is no longer this one.
    #[must_use]
    pub fn is_superseded(&self) -> bool {
        self.superseded.is_cancelled()
    }

    /// Whether what can be found now is no longer of use.
    pub(crate) fn is_outdated(&self) -> bool {
        self.outdated.is_cancelled()
    }

    /// Everything that is wrong with the document or worth knowing; found out once, by whoever
    /// asks first. Nothing where the snapshot was outdated before the search ended.
    pub(crate) fn findings(&self) -> Arc<Vec<Diagnostic>> {
        // Holding the lock while searching is meant: a second asker waits for the first one's find.
        let mut known = self.findings.lock().unwrap_or_else(PoisonError::into_inner);
        if let Some(found) = &*known {
            return Arc::clone(found);
        }
        if !self.has_code() {
            return Arc::default();
        }
        let found = Arc::new(self.session.check(&self.document, &self.outdated));
        if self.is_outdated() {
            return Arc::default();
        }
        *known = Some(Arc::clone(&found));
        found
    }

    /// Whether there is any code. Braces in a Markdown file or notebook without it belong to
    /// something else.
    fn has_code(&self) -> bool {
        let mut regions = self.document.sources.iter().flat_map(|source| &source.regions);
        regions.any(|region| region.kind == RegionKind::Code)
    }

    /// The sources and their places, in reading order.
    pub(crate) fn places(&self) -> impl Iterator<Item = (SourceId, &Place)> {
        self.places.iter().enumerate().map(|(index, place)| (SourceId(index), place))
    }

    /// Which source a text of the client is.
    #[must_use]
    pub fn source(&self, uri: &Url) -> Option<SourceId> {
        self.places().find(|(_, place)| place.uri == *uri).map(|(source, _)| source)
    }

    /// The place of a source.
    pub(crate) fn place(&self, source: SourceId) -> Option<&Place> {
        self.places.get(source.0)
    }

    /// The byte at a position.
    #[must_use]
    pub fn offset(&self, source: SourceId, position: Position) -> usize {
        let text = self.document.text(source);
        self.place(source)
            .map_or(0, |place| place.lines.offset(text, position, self.abilities.encoding))
    }

    /// The span of a range.
    pub(crate) fn span(&self, source: SourceId, range: Range) -> Span {
        let text = self.document.text(source);
        self.place(source).map_or_else(Span::default, |place| {
            place.lines.span(text, range, self.abilities.encoding)
        })
    }

    /// The range of a span.
    #[must_use]
    pub fn range(&self, source: SourceId, span: Span) -> Range {
        let text = self.document.text(source);
        self.place(source).map_or_else(Range::default, |place| {
            place.lines.range(text, span, self.abilities.encoding)
        })
    }

    /// A location as the client names it.
    pub(crate) fn location(&self, location: span::Location) -> Option<Location> {
        let place = self.place(location.source)?;
        let range = self.range(location.source, location.span);
        Some(Location { uri: place.uri.clone(), range })
    }
}
