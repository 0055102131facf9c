//! The renderers. Each format is one file here, with a second one for whole documents, and one line
//! in [`FORMATS`].

pub mod html;
pub mod json;
pub mod markdown;
pub mod text;

mod page_html;
mod page_json;
mod page_markdown;
mod page_text;
mod prose;
mod unbreakable;

use crate::page::Page;
use crate::table::Table;

/// A format that tables and documents can be rendered to.
#[derive(Clone, Copy, Debug)]
pub struct Format {
    /// Its name, as a command line takes it.
    pub name: &'static str,
    /// What it is called on the web and in notebooks.
    pub media_type: &'static str,
    /// How the names of its files end, without the point.
    pub extension: &'static str,
    /// Renders one table.
    pub table: fn(&Table) -> String,
    /// Renders a whole document.
    pub page: fn(&Page) -> String,
}

/// Every format.
pub const FORMATS: [Format; 4] = [html::FORMAT, markdown::FORMAT, text::FORMAT, json::FORMAT];

/// The format of this name.
#[must_use]
pub fn format(name: &str) -> Option<Format> {
    FORMATS.into_iter().find(|format| format.name == name)
}
