//! Diagnostics as the client shows them: when they are due, what they look like, what was sent.

use std::collections::BTreeMap;
use std::time::Duration;

use tokio::time::Instant;
use tower_lsp::lsp_types::{
    Diagnostic, DiagnosticRelatedInformation, DiagnosticSeverity, NumberOrString,
    PublishDiagnosticsParams, Url,
};
use tussock_language::diagnostic::{self, Severity};
use tussock_language::span::{Location, SourceId};

use crate::outbox::PLEA;
use crate::snapshot::Snapshot;

/// Which documents are to be checked, and when.
#[derive(Debug)]
pub(crate) struct Schedule {
    pause: Duration,
    due: BTreeMap<Url, Instant>,
}

impl Schedule {
    /// Documents are checked `pause` after their last change.
    pub(crate) fn new(pause: Duration) -> Self {
        Self { pause, due: BTreeMap::new() }
    }

    /// Puts a document's check off to one pause from now.
    pub(crate) fn put_off(&mut self, document: &Url) {
        self.due.insert(document.clone(), Instant::now() + self.pause);
    }

    /// Forgets a document.
    pub(crate) fn remove(&mut self, document: &Url) {
        self.due.remove(document);
    }

    /// Sleeps until a document is due and takes it from the schedule; sleeps for good when none is
    /// waiting.
    pub(crate) async fn next(&mut self) -> Url {
        let first = self.due.iter().min_by_key(|(_, at)| **at);
        let Some((document, at)) = first.map(|(document, at)| (document.clone(), *at)) else {
            return std::future::pending().await;
        };
        tokio::time::sleep_until(at).await;
        self.due.remove(&document);
        document
    }
}

/// What the client was last told of each text.
#[derive(Debug, Default)]
pub(crate) struct Published {
    by_text: BTreeMap<Url, Told>,
}

#[derive(Debug, PartialEq)]
struct Told {
    version: i32,
    diagnostics: Vec<Diagnostic>,
}

impl Published {
    /// The messages that bring the client up to date with what was found in a snapshot: one for
    /// each text about which there is news.
    pub(crate) fn update(
        &mut self,
        snapshot: &Snapshot,
        findings: &[diagnostic::Diagnostic],
    ) -> Vec<PublishDiagnosticsParams> {
        let mut messages = Vec::new();
        for (source, place) in snapshot.places() {
            let diagnostics = of_source(snapshot, source, findings);
            let told = Told { version: place.version, diagnostics: diagnostics.clone() };
            if self.by_text.get(&place.uri) == Some(&told) {
                continue;
            }
            self.by_text.insert(place.uri.clone(), told);
            messages.push(PublishDiagnosticsParams::new(
                place.uri.clone(),
                diagnostics,
                Some(place.version),
            ));
        }
        messages
    }

    /// The message that clears a text that was closed.
    pub(crate) fn clear(&mut self, text: &Url) -> PublishDiagnosticsParams {
        self.by_text.remove(text);
        PublishDiagnosticsParams::new(text.clone(), Vec::new(), None)
    }
}

fn of_source(
    snapshot: &Snapshot,
    source: SourceId,
    findings: &[diagnostic::Diagnostic],
) -> Vec<Diagnostic> {
    let of_it = findings.iter().filter(|finding| finding.location.source == source);
    of_it.map(|finding| to_protocol(snapshot, finding)).collect()
}

/// What stands in a document whose check came to a bad end.
pub(crate) fn of_fault(words: &str) -> diagnostic::Diagnostic {
    let message = format!("this document could not be checked: {words}");
    diagnostic::Diagnostic::error("fault", Location::default(), message).help(PLEA)
}

/// A finding as the client shows it.
pub(crate) fn to_protocol(snapshot: &Snapshot, finding: &diagnostic::Diagnostic) -> Diagnostic {
    let message = match &finding.help {
        Some(help) => format!("{}\n{help}", finding.message),
        None => finding.message.clone(),
    };
    Diagnostic {
        range: snapshot.range(finding.location.source, finding.location.span),
        severity: Some(severity(finding.severity)),
        code: Some(NumberOrString::String(finding.rule.to_owned())),
        source: Some("tussock".to_owned()),
        message,
        related_information: related(snapshot, finding),
        ..Diagnostic::default()
    }
}

fn severity(severity: Severity) -> DiagnosticSeverity {
    match severity {
        Severity::Error => DiagnosticSeverity::ERROR,
        Severity::Warning => DiagnosticSeverity::WARNING,
        Severity::Information => DiagnosticSeverity::INFORMATION,
    }
}

fn related(
    snapshot: &Snapshot,
    finding: &diagnostic::Diagnostic,
) -> Option<Vec<DiagnosticRelatedInformation>> {
    let places: Vec<_> = finding
        .related
        .iter()
        .filter_map(|related| {
            let location = snapshot.location(related.location)?;
            Some(DiagnosticRelatedInformation { location, message: related.message.clone() })
        })
        .collect();
    (!places.is_empty()).then_some(places)
}
