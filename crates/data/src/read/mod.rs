//! Reading a table from a file of separated values (RFC 4180, with other separators allowed).
//!
//! The first line names the columns. A cell may stand in quotation marks, and then hold separators,
//! line breaks and doubled quotation marks. A byte order mark, any kind of line end and blank lines
//! are understood.
//!
//! A cell with nothing or only blanks in it is missing, quoted or not. In a table of one column a
//! blank line between two others is a missing cell; in any other table it is no row.

mod encoding;
mod error;
mod near_file;
mod records;
mod separator;

use std::borrow::Cow;
use std::collections::BTreeMap;
use std::io::Cursor;
use std::path::Path;
use std::sync::Arc;

use polars::prelude::{
    CsvParseOptions, CsvReadOptions, DataFrame, DataType, Field, PolarsResult, Schema, SerReader,
};

pub use error::ReadError;
use records::{Record, Records};

use crate::frame::{Frame, Missing, Notation};

/// What a `read` statement says beside the file.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct ReadOptions {
    /// The character between cells.
    pub separator: Option<char>,
    /// The decimal sign of numbers: a point or a comma.
    pub decimal: Option<char>,
    /// What stands for a missing value, beside a blank cell.
    pub missing: Vec<String>,
    /// How bytes stand for characters, by a label of the WHATWG Encoding Standard.
    pub encoding: Option<String>,
}

/// The separator of a file that is told by its extension: a tab for `.tsv` and `.tab`, else a comma.
#[must_use]
pub fn default_separator(path: &Path) -> char {
    let extension = path.extension().and_then(|extension| extension.to_str()).unwrap_or_default();
    match extension.to_ascii_lowercase().as_str() {
        "tsv" | "tab" => '\t',
        _ => ',',
    }
}

/// Reads a file.
///
/// # Errors
/// When there is no such file, or it can't be read, or as [`read_bytes`].
pub fn read_file(path: &Path, options: &ReadOptions) -> Result<Frame, ReadError> {
    let bytes = std::fs::read(path).map_err(|error| near_file::unreadable(path, &error))?;
    read_bytes(&bytes, default_separator(path), options)
}

/// Reads the content of a file.
///
/// # Errors
/// When the bytes are not text in the encoding, or the text is not a table; the error says on which
/// line, and what to do.
pub fn read_bytes(
    bytes: &[u8],
    default_separator: char,
    options: &ReadOptions,
) -> Result<Frame, ReadError> {
    let separator = options.separator.unwrap_or(default_separator);
    let decimal = options.decimal.unwrap_or('.');
    let separator_byte = check_signs(separator, decimal)?;
    let text = encoding::decode(bytes, options.encoding.as_deref())?;
    let layout = layout(&text, separator_byte).map_err(|error| {
        match separator::likely(&text, separator_byte) {
            Some(likely) => ReadError::WrongSeparator { separator, likely },
            None => error,
        }
    })?;
    if layout.names.len() == 1
        && let Some(likely) = separator::likely(&text, separator_byte)
    {
        return Err(ReadError::WrongSeparator { separator, likely });
    }
    check_names(&layout.names)?;
    let lines = layout.rows.iter().map(|row| u32::try_from(row.line).unwrap_or(u32::MAX)).collect();
    let missing = Missing::new(&options.missing, decimal);
    let notation = Notation { separator, decimal, missing };
    let cells = cells(&text, &layout, separator_byte);
    cells
        .and_then(|cells| Frame::new(cells, lines, notation))
        .map_err(|error| ReadError::Unexpected { reason: error.to_string() })
}

/// The names of the columns, and where the rows stand in the text.
struct Layout {
    names: Vec<String>,
    rows: Vec<Record>,
    /// Whether the rows follow each other with nothing but line feeds between.
    contiguous: bool,
}

fn check_signs(separator: char, decimal: char) -> Result<u8, ReadError> {
    if !matches!(decimal, '.' | ',') {
        return Err(ReadError::BadDecimal { decimal });
    }
    match u8::try_from(separator) {
        Ok(byte)
            if byte.is_ascii() && !b"\"\r\n.".contains(&byte) && !byte.is_ascii_alphanumeric() =>
        {
            Ok(byte)
        }
        _ => Err(ReadError::BadSeparator { separator }),
    }
}

/// Finds header and rows, and makes sure that every row has a cell for every column. The library that
/// parses the cells fills short rows up without a word, so this can't be left to it.
fn layout(text: &str, separator: u8) -> Result<Layout, ReadError> {
    let mut records = Records::new(text, separator);
    let header = loop {
        let record = records.next().ok_or(ReadError::Empty)??;
        if !record.blank {
            break record;
        }
    };
    let names: Vec<String> =
        records::cells(text, &header, separator).map(|name| tidy(&name)).collect();
    let mut rows: Vec<Record> = Vec::new();
    let mut contiguous = true;
    for record in records {
        let record = record?;
        if record.blank && names.len() > 1 {
            contiguous = false;
        } else {
            contiguous &= record.ends_plainly;
            rows.push(record);
        }
    }
    while rows.last().is_some_and(|record| record.blank) {
        rows.pop();
    }
    match rows.iter().find(|record| record.cells != names.len()) {
        None => Ok(Layout { names, rows, contiguous }),
        Some(record) => Err(ReadError::Ragged {
            line: record.line,
            expected: names.len(),
            found: record.cells,
            every_row: rows.len() > 1 && rows.iter().all(|row| row.cells == record.cells),
        }),
    }
}

/// A column's name without blanks around it, on one line.
fn tidy(name: &str) -> String {
    let lines = name.lines().map(str::trim).filter(|line| !line.is_empty());
    lines.collect::<Vec<_>>().join(" ")
}

fn check_names(names: &[String]) -> Result<(), ReadError> {
    let mut positions: BTreeMap<&str, Vec<usize>> = BTreeMap::new();
    for (index, name) in names.iter().enumerate() {
        positions.entry(name).or_default().push(index + 1);
    }
    if let Some(positions) = positions.remove("") {
        return Err(ReadError::EmptyName { positions, width: names.len() });
    }
    let repeated = names.iter().find_map(|name| {
        let positions = positions.get(name.as_str()).filter(|positions| positions.len() > 1)?;
        Some(ReadError::RepeatedName { name: name.clone(), positions: positions.clone() })
    });
    repeated.map_or(Ok(()), Err)
}

fn cells(text: &str, layout: &Layout, separator: u8) -> PolarsResult<DataFrame> {
    let fields = layout.names.iter().map(|name| Field::new(name.into(), DataType::String));
    let schema = Schema::from_iter(fields);
    let (Some(first), Some(last)) = (layout.rows.first(), layout.rows.last()) else {
        return Ok(DataFrame::empty_with_schema(&schema));
    };
    let body = text.get(first.range.start..last.range.end).unwrap_or_default();
    // The parser takes the first two for the start of a compressed file, and drops the third; a line
    // before them, given as a header, prevents it.
    let misleading = ["x^", "x\u{1}", "\u{feff}"].iter().any(|start| body.starts_with(start));
    let body = match layout.contiguous {
        true => Cow::Borrowed(body),
        false => {
            let rows = layout.rows.iter().filter_map(|row| text.get(row.range.clone()));
            rows.collect::<Vec<_>>().join("\n").into()
        }
    };
    let body = if misleading { format!("-\n{body}").into() } else { body };
    let parse = CsvParseOptions::default().with_separator(separator);
    let cells = CsvReadOptions::default()
        .with_has_header(misleading)
        .with_schema(Some(Arc::new(schema)))
        .with_parse_options(parse)
        .with_rechunk(true)
        .into_reader_with_file_handle(Cursor::new(body.as_bytes()))
        .finish()?;
    polars::prelude::polars_ensure!(
        cells.height() == layout.rows.len(),
        ComputeError: "{} rows were parsed of {}", cells.height(), layout.rows.len()
    );
    Ok(cells)
}
