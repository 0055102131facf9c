//! Everything that is wrong with a document, as an editor shows it: each finding once, at its place.

use tussock_language::diagnostic::Diagnostic;

use crate::answering::{answer, guarded};
use crate::cancel::Cancel;
use crate::context::Context;

/// The findings of a document in reading order.
pub(crate) fn check(context: &Context<'_>, cancel: &Cancel) -> Vec<Diagnostic> {
    let answers = answer(context, None, cancel);
    let mut found: Vec<Diagnostic> = answers.problems().cloned().collect();
    for (name, statement) in &context.model.comparisons {
        if cancel.is_cancelled() {
            break;
        }
        // What makes the multivariate tests impossible is told at the comparison, asked for or not.
        let tested = guarded(statement.location, || {
            let study = context.study(name, statement.location)?;
            study.hypothesis().map(drop)
        });
        if let Err(problem) = tested {
            let told = found
                .iter()
                .any(|known| known.location == problem.location && known.rule == problem.rule);
            if !told {
                found.push(*problem);
            }
        }
    }
    found.sort_by_key(|problem| (problem.location, problem.rule));
    found.dedup();
    found
}
