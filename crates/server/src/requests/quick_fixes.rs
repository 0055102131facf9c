//! `textDocument/codeAction`: the mends of what is wrong at a place.

use tower_lsp::jsonrpc::Result;
use tower_lsp::lsp_types::{
    CodeAction, CodeActionKind, CodeActionOptions, CodeActionOrCommand, CodeActionParams,
    CodeActionProviderCapability, CodeActionResponse, ServerCapabilities, Url, request,
};
use tussock_language::diagnostic::{Diagnostic, Fix};

use crate::ask::{Feature, Question};
use crate::diagnostics::to_protocol;
use crate::snapshot::Snapshot;
use crate::workspace_edit::workspace_edit;

/// The mends of what is wrong at a place.
pub(crate) struct QuickFixes;

impl Feature for QuickFixes {
    type Request = request::CodeActionRequest;

    fn announce(capabilities: &mut ServerCapabilities) {
        capabilities.code_action_provider =
            Some(CodeActionProviderCapability::Options(CodeActionOptions {
                code_action_kinds: Some(vec![CodeActionKind::QUICKFIX]),
                ..CodeActionOptions::default()
            }));
    }

    fn text(params: &CodeActionParams) -> &Url {
        &params.text_document.uri
    }

    fn answer(question: &Question, params: CodeActionParams) -> Result<Option<CodeActionResponse>> {
        let Question { snapshot, source, .. } = question;
        let asked = snapshot.span(*source, params.range);
        let wanted = params.context.only.is_none_or(|kinds| kinds.iter().any(includes_quick_fixes));
        if !wanted {
            return Ok(Some(Vec::new()));
        }
        let findings = snapshot.findings();
        let here = findings.iter().filter(|finding| {
            let span = finding.location.span;
            finding.location.source == *source && span.start <= asked.end && asked.start <= span.end
        });
        let actions = here.filter_map(|finding| {
            let fix = finding.fix.as_ref()?;
            Some(CodeActionOrCommand::CodeAction(action(snapshot, finding, fix)))
        });
        Ok(Some(actions.collect()))
    }
}

/// Whether a kind that the client asks for covers quick fixes: kinds form a tree by dots.
fn includes_quick_fixes(kind: &CodeActionKind) -> bool {
    *kind == CodeActionKind::EMPTY || *kind == CodeActionKind::QUICKFIX
}

fn action(snapshot: &Snapshot, finding: &Diagnostic, fix: &Fix) -> CodeAction {
    CodeAction {
        title: fix.title.clone(),
        kind: Some(CodeActionKind::QUICKFIX),
        diagnostics: Some(vec![to_protocol(snapshot, finding)]),
        edit: Some(workspace_edit(snapshot, &fix.edits)),
        is_preferred: Some(true),
        ..CodeAction::default()
    }
}
