//! Typed tables and paragraphs, and their renderers. No statistics, no protocols; numbers keep full
//! precision until they are rendered.

pub mod citation;
pub mod number;
pub mod page;
pub mod render;
pub mod rich;
pub mod table;
pub mod value;
