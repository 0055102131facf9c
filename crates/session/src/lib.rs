//! Where a question meets data: documents in, answers out, on demand and cached by content.
//!
//! Kernel, server and command line all ask here, so a number in a hover is the number in the
//! notebook and in the document.

pub mod answer;
pub mod cancel;
pub mod knowledge;
pub mod notebook;
pub mod session;
