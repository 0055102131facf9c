//! Tables from files, and the tables that are built in.
//!
//! Only this crate knows the file formats and the library that holds the cells. It hands out plain
//! columns: numbers, texts, factors.

mod clause;
pub mod frame;
pub mod read;
pub mod samples;
