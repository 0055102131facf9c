//! The Tussock language: from text to tree to model, and what an editor needs of it.
//!
//! No I/O, no protocol: byte offsets and strings. The parser never fails; half-typed text is
//! normal input.

pub mod ast;
pub mod diagnostic;
pub mod document;
pub mod facts;
pub mod features;
pub mod format;
mod lower;
pub mod model;
pub mod names;
pub mod nearest;
pub mod present;
pub mod prose;
pub mod rules;
pub mod span;
pub mod syntax;
pub mod terms;
pub mod verbs;
