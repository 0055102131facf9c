//! What the language needs to know from outside a text: the columns of the real file, the values
//! of the real answers. The session implements it; tests implement it with made-up facts.

/// A page of the manual: what hover, completion, `explain` and the reference all show.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Page {
    /// The word that it explains.
    pub name: &'static str,
    /// One line.
    pub summary: &'static str,
    /// The whole page, in Markdown, headed by the name.
    pub text: &'static str,
}

impl Page {
    /// A page from its Markdown text: a heading, and a first paragraph of one line, which becomes
    /// the summary.
    ///
    /// # Panics
    /// At compile time, where the text has no such paragraph.
    #[must_use]
    pub const fn new(name: &'static str, text: &'static str) -> Self {
        let bytes = text.as_bytes();
        let mut start = 0;
        while !ends_line(bytes, start) {
            start += 1;
        }
        while ends_line(bytes, start) && start < bytes.len() {
            start += 1;
        }
        let mut end = start;
        while !ends_line(bytes, end) {
            end += 1;
        }
        let (head, _) = text.split_at(end);
        let (_, summary) = head.split_at(start);
        assert!(!summary.is_empty(), "a page starts with a heading and a one-line paragraph");
        Self { name, summary, text }
    }
}

#[allow(clippy::indexing_slicing, reason = "the offset is compared with the length first")]
const fn ends_line(bytes: &[u8], offset: usize) -> bool {
    offset >= bytes.len() || bytes[offset] == b'\n'
}

/// What kind of column.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum ColumnKind {
    /// Every value that is not missing is a number.
    Number,
    /// Anything else.
    Text,
}

/// A column as an editor shows it.
#[derive(Clone, Debug, PartialEq)]
pub struct ColumnFact {
    /// Its name in the file, or as derived.
    pub name: String,
    /// Its kind.
    pub kind: ColumnKind,
    /// One line: label, unit, range or levels, missing values.
    pub detail: String,
}

/// A key that may come next in a live-value path.
#[derive(Clone, Debug, PartialEq)]
pub struct KeyFact {
    /// The key, without back-quotes.
    pub key: String,
    /// What stands there: a value or citation as prose would print it, or what the key leads to.
    pub detail: String,
}

/// Facts from outside the text. Every answer is an option: a file may be missing, an analysis
/// impossible, and the text is edited all the same.
pub trait Facts {
    /// Pages of the views.
    fn views(&self) -> &[Page];
    /// Pages of the functions that an expression may call.
    fn functions(&self) -> &[Page];
    /// Pages of the built-in samples.
    fn samples(&self) -> &[Page];
    /// Pages of the rules that need data or results, beside those of this crate.
    fn rules(&self) -> &[Page] {
        &[]
    }
    /// The columns of a table.
    fn columns(&self, table: &str) -> Option<Vec<ColumnFact>>;
    /// The levels that occur in a column after spellings are merged, in their order.
    fn levels(&self, table: &str, column: &str) -> Option<Vec<String>>;
    /// Which keys may follow the first segments of a path (which begin with a comparison); none
    /// where a value stands there already, or where nothing is known.
    fn keys(&self, path: &[String]) -> Vec<KeyFact>;
    /// The value or citation at a path, as prose would print it.
    fn value(&self, path: &[String]) -> Option<String>;
    /// The values of a coefficient kind (`raw`, `standardized`, `structure`, `share`) in a
    /// comparison, as a small Markdown table.
    fn coefficients(&self, comparison: &str, kind: &str) -> Option<String>;
    /// Data files near the document whose path starts with `prefix`.
    fn files(&self, prefix: &str) -> Vec<String>;
}

/// No facts at all, as for a text that belongs to no file.
#[derive(Clone, Copy, Debug, Default)]
pub struct NoFacts;

impl Facts for NoFacts {
    fn views(&self) -> &[Page] {
        &[]
    }
    fn functions(&self) -> &[Page] {
        &[]
    }
    fn samples(&self) -> &[Page] {
        &[]
    }
    fn columns(&self, _: &str) -> Option<Vec<ColumnFact>> {
        None
    }
    fn levels(&self, _: &str, _: &str) -> Option<Vec<String>> {
        None
    }
    fn keys(&self, _: &[String]) -> Vec<KeyFact> {
        Vec::new()
    }
    fn value(&self, _: &[String]) -> Option<String> {
        None
    }
    fn coefficients(&self, _: &str, _: &str) -> Option<String> {
        None
    }
    fn files(&self, _: &str) -> Vec<String> {
        Vec::new()
    }
}
