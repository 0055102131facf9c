//! Where a question meets data: documents in, answers out, on demand and cached by content.
//!
//! Kernel, server and command line all ask here, so a number in a hover is the number in the
//! notebook and in the document.

pub mod answer;
mod answering;
mod cache;
pub mod cancel;
mod checking;
mod comparison;
mod context;
mod evaluate;
mod factor;
pub mod files;
mod fingerprint;
mod flow;
mod functions;
pub mod knowledge;
pub mod notebook;
pub mod page;
mod policy;
mod refusal;
mod relation;
mod rules;
pub mod session;
mod study;
mod trouble;
mod values;
mod views;
