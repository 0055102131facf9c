//! The rules that need data or results, one page each. Their findings arise where the data is read
//! and the analysis refuses; the pages say what they mean and what to do.

use tussock_language::facts::Page;

macro_rules! pages {
    ($($name:literal),* $(,)?) => {
        /// The pages, by name.
        pub(crate) static PAGES: &[Page] =
            &[$(Page::new($name, include_str!(concat!($name, ".md")))),*];
    };
}

pages![
    "constant-outcome",
    "constant-within-groups",
    "dependent-outcomes",
    "empty-group",
    "internal-error",
    "moved-pin",
    "single-group",
    "single-row-groups",
    "singular-group",
    "small-group",
    "text-in-numeric-column",
    "too-large-values",
    "too-many-outcomes",
    "too-many-pairs",
    "unlisted-level",
    "unreadable-file",
    "wrong-argument",
    "wrong-kind",
];
