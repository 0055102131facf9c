//! A table of any texts, written with any separator and line end, reads back as it was.

use proptest::prelude::*;
use proptest::sample::select;
use tussock_data::read::{ReadOptions, read_bytes};

/// A table and how it is written.
#[derive(Clone, Debug)]
struct Written {
    names: Vec<String>,
    rows: Vec<Vec<String>>,
    separator: char,
    line_end: &'static str,
    last_line_end: bool,
    quote_all: bool,
}

impl Written {
    fn cell(&self, cell: &str) -> String {
        let special = [';', '\t', ',', '|', '"', '\n', '\r'];
        let alone = self.names.len() == 1 && cell.trim().is_empty();
        match self.quote_all || alone || cell.contains(special) {
            true => format!("\"{}\"", cell.replace('"', "\"\"")),
            false => cell.to_owned(),
        }
    }

    fn text(&self) -> String {
        let records = std::iter::once(&self.names).chain(&self.rows).map(|cells| {
            let cells: Vec<String> = cells.iter().map(|cell| self.cell(cell)).collect();
            cells.join(&self.separator.to_string())
        });
        let text = records.collect::<Vec<_>>().join(self.line_end);
        text + if self.last_line_end { self.line_end } else { "" }
    }
}

fn cell() -> impl Strategy<Value = String> {
    let piece = select(vec![
        "a",
        "b",
        "x^",
        "0",
        "1.5",
        ",",
        ";",
        "\t",
        "|",
        "\"",
        "\n",
        "\r\n",
        "\r",
        " ",
        "\u{a0}",
        "\u{e9}",
        "\u{1f33f}",
        "\\",
        "'",
        "#",
        "\u{feff}",
    ]);
    prop::collection::vec(piece, 0..5).prop_map(|pieces| pieces.concat())
}

fn written(rows: std::ops::Range<usize>) -> impl Strategy<Value = Written> {
    (1..6_usize, rows).prop_flat_map(|(columns, rows)| {
        let names = prop::collection::vec(cell(), columns);
        let cells = prop::collection::vec(prop::collection::vec(cell(), columns), rows);
        let signs = (select(vec![',', ';', '\t', '|', ' ']), select(vec!["\n", "\r\n", "\r"]));
        (names, cells, signs, any::<bool>(), any::<bool>()).prop_map(
            |(names, rows, (separator, line_end), last_line_end, quote_all)| Written {
                names: names
                    .into_iter()
                    .enumerate()
                    .map(|(index, name)| format!("n{index}{}e", name.replace(['\n', '\r'], "")))
                    .collect(),
                rows,
                separator,
                line_end,
                last_line_end,
                // A blank that separates must not be taken for a part of a cell.
                quote_all: quote_all || separator == ' ',
            },
        )
    })
}

fn reads_back(written: &Written) -> Result<(), TestCaseError> {
    let options = ReadOptions { separator: Some(written.separator), ..ReadOptions::default() };
    let frame = read_bytes(written.text().as_bytes(), ',', &options)
        .map_err(|error| TestCaseError::fail(error.to_string()))?;
    prop_assert_eq!(frame.names(), written.names.clone());
    prop_assert_eq!(frame.rows(), written.rows.len());
    for (index, name) in written.names.iter().enumerate() {
        let expected: Vec<Option<String>> = written
            .rows
            .iter()
            .map(|row| row.get(index).filter(|cell| !cell.trim().is_empty()).cloned())
            .collect();
        prop_assert_eq!(frame.texts(name), Some(expected));
    }
    Ok(())
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 600, failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn a_small_table_reads_back(written in written(0..8)) {
        reads_back(&written)?;
    }

    #[test]
    fn any_bytes_are_read_or_refused(bytes in prop::collection::vec(any::<u8>(), 0..200)) {
        let _ = read_bytes(&bytes, ',', &ReadOptions::default());
    }

    #[test]
    fn any_text_is_read_or_refused_and_every_row_has_a_cell_for_every_column(
        text in "[ab,;\"\n\r \u{e9}]{0,60}",
    ) {
        if let Ok(frame) = read_bytes(text.as_bytes(), ',', &ReadOptions::default()) {
            for name in frame.names() {
                prop_assert_eq!(frame.texts(&name).map(|texts| texts.len()), Some(frame.rows()));
                let factor = frame.factor(&name).expect("the column exists");
                for (text, code) in frame.texts(&name).into_iter().flatten().zip(factor.codes) {
                    prop_assert_eq!(text, code.and_then(|code| factor.levels.get(code).cloned()));
                }
            }
        }
    }
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 12, failure_persistence: None, ..ProptestConfig::default() })]

    // Large enough for the parser to split it among threads.
    #[test]
    fn a_large_table_reads_back(written in written(5_000..9_000)) {
        reads_back(&written)?;
    }
}
