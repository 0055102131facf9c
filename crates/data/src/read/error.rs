//! Why a file could not be read as a table.

use crate::clause::clause;

/// Why a file could not be read as a table. Lines and columns are counted from 1; the header is on
/// line 1 where nothing stands before it.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
pub enum ReadError {
    /// There is no such file.
    #[error("there is no file `{path}`")]
    NotFound {
        /// The path that was tried.
        path: String,
        /// The name in the same folder that is nearest to the one asked for.
        near: Option<String>,
        /// The files in the same folder that look like tables.
        tables: Vec<String>,
    },
    /// There is not even the folder.
    #[error("there is no file `{path}`, nor the folder for it")]
    NoSuchFolder {
        /// The path that was tried.
        path: String,
    },
    /// The file can't be read.
    #[error("`{path}` can't be read: {reason}")]
    Unreadable {
        /// The path that was tried.
        path: String,
        /// Why.
        reason: String,
    },
    /// Nothing is in the file.
    #[error("the file is empty")]
    Empty,
    /// The file holds something else than text.
    #[error("this is {kind}, not a table in text")]
    NotText {
        /// What it seems to be.
        kind: &'static str,
        /// What to do.
        help: &'static str,
    },
    /// Every character takes two bytes, and no mark says so.
    #[error("the file is not UTF-8 text: every other byte is zero")]
    TwoByteText {
        /// The encoding that it seems to have.
        label: &'static str,
    },
    /// The bytes are no UTF-8, and no other encoding was declared.
    #[error("line {line} is not UTF-8 text (byte {byte:#04X})")]
    NotUtf8 {
        /// The line.
        line: usize,
        /// The first byte that does not fit.
        byte: u8,
    },
    /// There is no encoding of this name.
    #[error("there is no encoding `{label}`")]
    UnknownEncoding {
        /// What was declared.
        label: String,
        /// The known name that is nearest to it.
        near: Option<&'static str>,
    },
    /// The bytes don't fit the encoding that was declared.
    #[error("line {line} is not text in {encoding}")]
    Misencoded {
        /// The encoding that was declared.
        encoding: &'static str,
        /// The line.
        line: usize,
    },
    /// The separator can't be one.
    #[error("{separator:?} can't separate columns")]
    BadSeparator {
        /// What was declared.
        separator: char,
    },
    /// The decimal sign can't be one.
    #[error("{decimal:?} can't be a decimal sign")]
    BadDecimal {
        /// What was declared.
        decimal: char,
    },
    /// The file seems to have another separator.
    #[error("the columns are not separated by {}, but seem to be by {}", sign(*.separator), sign(*.likely))]
    WrongSeparator {
        /// The separator that was tried.
        separator: char,
        /// The separator that splits header and rows alike.
        likely: char,
    },
    /// Columns without a name.
    #[error("{} of the header {} no name", columns(.positions), match .positions.len() { 1 => "has", _ => "have" })]
    EmptyName {
        /// Where, counted from 1.
        positions: Vec<usize>,
        /// How many columns there are.
        width: usize,
    },
    /// Columns of the same name.
    #[error("{} of the header have the same name, `{name}`", columns(.positions))]
    RepeatedName {
        /// The name.
        name: String,
        /// Where, counted from 1.
        positions: Vec<usize>,
    },
    /// A row has more or fewer cells than the header.
    #[error("line {line} has {}, but the header has {expected}", cells(*.found))]
    Ragged {
        /// The line on which the first such row starts.
        line: usize,
        /// How many columns the header names.
        expected: usize,
        /// How many cells the row has.
        found: usize,
        /// Whether all rows have as many cells as this one.
        every_row: bool,
    },
    /// A quotation mark that neither opens nor closes a cell.
    #[error("line {line} has a quotation mark inside a cell")]
    StrayQuote {
        /// The line.
        line: usize,
    },
    /// A quoted cell that does not end.
    #[error("a quotation mark is opened on line {line} and never closed")]
    UnclosedQuote {
        /// The line on which the cell starts.
        line: usize,
    },
    /// The parser refused a text in which nothing wrong was found.
    #[error("the table could not be parsed: {reason}")]
    Unexpected {
        /// What the parser said.
        reason: String,
    },
}

impl ReadError {
    /// What to do, for the line below the message.
    #[must_use]
    pub fn help(&self) -> Option<String> {
        let clause = self.clause();
        let help = match (self, clause) {
            (Self::NotUtf8 { .. }, Some(clause)) => {
                format!("save the file as UTF-8, or write `{clause}` after `read`")
            }
            (_, Some(clause)) => format!("write `{clause}` after `read`"),
            (error, None) => return error.help_beyond_clauses(),
        };
        Some(help)
    }

    /// What to do where no clause mends it.
    fn help_beyond_clauses(&self) -> Option<String> {
        let help = match self {
            Self::NotFound { near: Some(near), .. } => format!("did you mean `{near}`?"),
            Self::NotFound { tables, .. } => match tables.as_slice() {
                [] => "no table is in that folder; a path starts at the folder of the document".into(),
                _ => format!("in that folder are {}", some(tables)),
            },
            Self::NoSuchFolder { .. } => "a path starts at the folder of the document".into(),
            Self::Empty => "the first line must name the columns".into(),
            Self::NotText { help, .. } => (*help).to_owned(),
            Self::UnknownEncoding { .. } => {
                "most files that are not in UTF-8 are in `latin1` or `utf-16le`".into()
            }
            Self::Misencoded { .. } => "declare another encoding, or save the file as UTF-8".into(),
            Self::BadSeparator { .. } => {
                "it must be one sign such as `;`, `,`, `|` or a tab, written \"\\t\"".into()
            }
            Self::BadDecimal { .. } => "it must be a point or a comma".into(),
            Self::EmptyName { positions, width } if positions.last() == Some(width) => {
                "name every column on the first line, or remove the separators at the ends of lines".into()
            }
            Self::EmptyName { .. } => "name every column on the first line".into(),
            Self::RepeatedName { .. } => "rename all but one of them in the file".into(),
            Self::Ragged { expected, found, every_row: true, .. } if *found == expected + 1 => {
                "all rows have one cell more: name that column, which is often the first, in the header"
                    .into()
            }
            Self::Ragged { expected, found, .. } if found > expected => {
                "a cell that holds the separator must stand in quotation marks".into()
            }
            Self::Ragged { .. } => {
                "keep the separators of empty cells, and put a cell with a line break in quotation marks"
                    .into()
            }
            Self::StrayQuote { .. } => {
                "put the whole cell in quotation marks, without blanks around, and double the mark inside"
                    .into()
            }
            Self::UnclosedQuote { .. } => "close the cell, or double the mark if it is part of it".into(),
            Self::Unexpected { .. } => "please report this, with the file if you can".into(),
            Self::Unreadable { .. }
            | Self::TwoByteText { .. }
            | Self::NotUtf8 { .. }
            | Self::WrongSeparator { .. } => return None,
        };
        Some(help)
    }

    /// The clause of the `read` statement that mends it, where one does.
    #[must_use]
    #[expect(clippy::wildcard_enum_match_arm, reason = "most errors are mended outside the text")]
    pub fn clause(&self) -> Option<String> {
        match self {
            Self::NotUtf8 { .. } => Some(clause("encoding", ["latin1"])),
            Self::TwoByteText { label } => Some(clause("encoding", [*label])),
            Self::UnknownEncoding { near: Some(near), .. } => Some(clause("encoding", [*near])),
            Self::WrongSeparator { likely, .. } => {
                Some(clause("separator", [likely.to_string().as_str()]))
            }
            _ => None,
        }
    }
}

fn sign(sign: char) -> String {
    match sign {
        '\t' => "tabs".into(),
        ' ' => "blanks".into(),
        ',' => "commas".into(),
        ';' => "semicolons".into(),
        '|' => "bars".into(),
        _ => format!("{sign:?}"),
    }
}

fn columns(positions: &[usize]) -> String {
    let shown: Vec<String> = positions.iter().map(usize::to_string).collect();
    match shown.split_last() {
        Some((last, [])) => format!("column {last}"),
        Some((last, rest)) => format!("columns {} and {last}", rest.join(", ")),
        None => "columns".into(),
    }
}

fn cells(count: usize) -> String {
    match count {
        1 => "1 cell".into(),
        _ => format!("{count} cells"),
    }
}

/// Some names as a list.
fn some(names: &[String]) -> String {
    let shown: Vec<String> = names.iter().take(5).map(|name| format!("`{name}`")).collect();
    let more = if names.len() > shown.len() { ", ..." } else { "" };
    format!("{}{more}", shown.join(", "))
}
