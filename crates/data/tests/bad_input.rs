//! What is said of every kind of bad input: the whole message, what to do, and the clause that mends it.

use std::path::Path;

use tussock_data::frame::Frame;
use tussock_data::read::{ReadError, ReadOptions, read_bytes, read_file};

fn told(error: &ReadError) -> Vec<String> {
    let help = error.help().map(|help| format!("help: {help}"));
    let clause = error.clause().map(|clause| format!("clause: {clause}"));
    [Some(error.to_string()), help, clause].into_iter().flatten().collect()
}

#[track_caller]
fn refused_with(bytes: &[u8], options: &ReadOptions, expected: &[&str]) {
    let error = read_bytes(bytes, ',', options).expect_err("the input is bad");
    assert_eq!(told(&error), expected);
}

#[track_caller]
fn refused(bytes: &[u8], expected: &[&str]) {
    refused_with(bytes, &ReadOptions::default(), expected);
}

fn encoding(label: &str) -> ReadOptions {
    ReadOptions { encoding: Some(label.to_owned()), ..ReadOptions::default() }
}

#[test]
fn a_file_that_does_not_exist() {
    let folder = std::env::temp_dir().join(format!("tussock-bad-input-{}", std::process::id()));
    std::fs::create_dir_all(&folder).unwrap();
    for name in ["crew.csv", "harbours.TSV", "notes.md", ".crw.csv"] {
        std::fs::write(folder.join(name), "a,b\n1,2\n").unwrap();
    }
    let tried = |path: &Path| {
        let error = read_file(path, &ReadOptions::default()).expect_err("no table is there");
        let shown = folder.display().to_string();
        told(&error).into_iter().map(|line| line.replace(&shown, "DATA")).collect::<Vec<_>>()
    };
    assert_eq!(
        tried(&folder.join("crw.csv")),
        ["there is no file `DATA/crw.csv`", "help: did you mean `crew.csv`?"]
    );
    assert_eq!(
        tried(&folder.join("Crew.CSV")),
        ["there is no file `DATA/Crew.CSV`", "help: did you mean `crew.csv`?"]
    );
    assert_eq!(
        tried(&folder.join("passengers.csv")),
        [
            "there is no file `DATA/passengers.csv`",
            "help: in that folder are `crew.csv`, `harbours.TSV`"
        ]
    );
    assert_eq!(
        tried(&folder.join("data").join("crew.csv")),
        [
            "there is no file `DATA/data/crew.csv`, nor the folder for it",
            "help: a path starts at the folder of the document"
        ]
    );
    assert_eq!(tried(&folder), ["`DATA` can't be read: it is a folder"]);
    std::fs::remove_dir_all(&folder).unwrap();
}

#[test]
fn nothing_in_the_file() {
    let expected = ["the file is empty", "help: the first line must name the columns"];
    refused(b"", &expected);
    refused(b"\xef\xbb\xbf", &expected);
    refused(b"\n  \r\n\n", &expected);
}

#[test]
fn bytes_that_are_not_utf8() {
    refused(
        b"name,mood\nIan,61\nZo\xeb,58\n",
        &[
            "line 3 is not UTF-8 text (byte 0xEB)",
            "help: save the file as UTF-8, or write `encoding \"latin1\"` after `read`",
            "clause: encoding \"latin1\"",
        ],
    );
}

#[test]
fn text_of_two_bytes_a_character_without_a_mark() {
    refused(
        b"a\0,\0b\0\n\x001\0,\x002\0\n\0",
        &[
            "the file is not UTF-8 text: every other byte is zero",
            "help: write `encoding \"utf-16le\"` after `read`",
            "clause: encoding \"utf-16le\"",
        ],
    );
}

#[test]
fn an_encoding_that_is_unknown_or_does_not_fit() {
    refused_with(
        b"a,b\n1,2\n",
        &encoding("latn1"),
        &[
            "there is no encoding `latn1`",
            "help: write `encoding \"latin1\"` after `read`",
            "clause: encoding \"latin1\"",
        ],
    );
    refused_with(
        b"a,b\n1,2\n",
        &encoding("western"),
        &[
            "there is no encoding `western`",
            "help: most files that are not in UTF-8 are in `latin1` or `utf-16le`",
        ],
    );
    refused_with(
        b"a,b\n1,\xff\n",
        &encoding("shift_jis"),
        &[
            "line 2 is not text in Shift_JIS",
            "help: declare another encoding, or save the file as UTF-8",
        ],
    );
}

#[test]
fn files_that_are_no_text() {
    refused(
        b"PK\x03\x04\x14\0",
        &[
            "this is a workbook or another zip archive, not a table in text",
            "help: save the sheet as CSV in UTF-8 and read that file",
        ],
    );
    refused(
        b"\x1f\x8b\x08\0",
        &[
            "this is a compressed file, not a table in text",
            "help: unpack it and read the file inside",
        ],
    );
    refused(
        b"PAR1\x15\x04",
        &[
            "this is a Parquet file, not a table in text",
            "help: export it as CSV and read that file",
        ],
    );
    refused(
        b"a,b\n1,\0\0\0\n",
        &["this is a binary file, not a table in text", "help: a table must be a CSV or TSV file"],
    );
}

#[test]
fn another_separator() {
    let semicolon = [
        "the columns are not separated by commas, but seem to be by semicolons",
        "help: write `separator \";\"` after `read`",
        "clause: separator \";\"",
    ];
    refused(b"id;mood;sleep\n1;61;55\n2;58;60\n", &semicolon);
    // Decimal commas cut such a file into cells, but not the header.
    refused(b"id;mood;sleep\n1;61,5;55,0\n2;58;60,5\n", &semicolon);
    // Quotation marks are where they belong only with the right separator.
    refused(b"\"id\";\"mood\"\n\"a,b\";\"61\"\n", &semicolon);
    refused(
        b"id\tmood\tsleep\n1\t61\t55\n",
        &[
            "the columns are not separated by commas, but seem to be by tabs",
            "help: write `separator \"\\t\"` after `read`",
            "clause: separator \"\\t\"",
        ],
    );
    let tab = ReadOptions { separator: Some('\t'), ..ReadOptions::default() };
    refused_with(
        b"id|mood;x|sleep\n1|61|55\n",
        &tab,
        &[
            "the columns are not separated by tabs, but seem to be by bars",
            "help: write `separator \"|\"` after `read`",
            "clause: separator \"|\"",
        ],
    );
}

#[test]
fn signs_that_can_not_serve() {
    for (separator, shown) in [('"', "'\"'"), ('\n', "'\\n'"), ('x', "'x'"), ('\u{a6}', "'\u{a6}'")]
    {
        let options = ReadOptions { separator: Some(separator), ..ReadOptions::default() };
        refused_with(
            b"a,b\n",
            &options,
            &[
                &format!("{shown} can't separate columns"),
                "help: it must be one sign such as `;`, `,`, `|` or a tab, written \"\\t\"",
            ],
        );
    }
    let options = ReadOptions { decimal: Some('\''), ..ReadOptions::default() };
    refused_with(
        b"a,b\n",
        &options,
        &["'\\'' can't be a decimal sign", "help: it must be a point or a comma"],
    );
}

#[test]
fn columns_without_a_name() {
    refused(
        b"id,mood,,sleep\n1,61,,55\n",
        &["column 3 of the header has no name", "help: name every column on the first line"],
    );
    refused(
        b"id,mood, ,\n1,61,,\n",
        &[
            "columns 3 and 4 of the header have no name",
            "help: name every column on the first line, or remove the separators at the ends of lines",
        ],
    );
}

#[test]
fn columns_of_one_name() {
    refused(
        b"id,mood, mood,sleep,\"mood\"\n1,61,60,55,58\n",
        &[
            "columns 2, 3 and 5 of the header have the same name, `mood`",
            "help: rename all but one of them in the file",
        ],
    );
}

#[test]
fn rows_of_another_length() {
    refused(
        b"id,ship,mood\n1,Tern,61\n2,\"Little\nTern\",58\n3,Skua\n",
        &[
            "line 5 has 2 cells, but the header has 3",
            "help: keep the separators of empty cells, and put a cell with a line break in quotation marks",
        ],
    );
    refused(
        b"id,ship,mood\n1,Tern,61\n\n2,Tern, North,58\n",
        &[
            "line 4 has 4 cells, but the header has 3",
            "help: a cell that holds the separator must stand in quotation marks",
        ],
    );
    refused(
        b"ship,mood\n1,Tern,61\n2,Skua,58\n",
        &[
            "line 2 has 3 cells, but the header has 2",
            "help: all rows have one cell more: name that column, which is often the first, in the header",
        ],
    );
    refused(
        b"id,mood\n1,61\ntotal\n",
        &[
            "line 3 has 1 cell, but the header has 2",
            "help: keep the separators of empty cells, and put a cell with a line break in quotation marks",
        ],
    );
}

#[test]
fn quotation_marks_out_of_place() {
    let stray = |line: usize| {
        [
            format!("line {line} has a quotation mark inside a cell"),
            "help: put the whole cell in quotation marks, without blanks around, and double the mark inside"
                .to_owned(),
        ]
    };
    for (text, line) in [
        ("id,pipe\n1,5\" pipe\n", 2),
        ("id,remark\n1,\"late\" again\n", 2),
        ("id,remark\n1, \"late\"\n", 2),
        ("id,\"rem\nark\"\n1,\"a\nb\nc\"d\n", 5),
    ] {
        let expected = stray(line);
        refused(text.as_bytes(), &expected.each_ref().map(String::as_str));
    }
    refused(
        b"id,remark\n1,late\n2,\"early\n3,late\n",
        &[
            "a quotation mark is opened on line 3 and never closed",
            "help: close the cell, or double the mark if it is part of it",
        ],
    );
}

fn numbers_refused(frame: &Frame, column: &str) -> Vec<String> {
    let refusal = frame.numbers(column).expect_err("a cell is not a number");
    let help = refusal.help().map(|help| format!("help: {help}"));
    let clause = refusal.clause().map(|clause| format!("clause: {clause}"));
    [Some(refusal.to_string()), help, clause].into_iter().flatten().collect()
}

/// A table with one more column, so that an empty line would not be a row.
fn column(cells: &[&str]) -> String {
    let rows: Vec<String> =
        cells.iter().enumerate().map(|(row, cell)| format!("{row},\"{cell}\"\n")).collect();
    format!("id,mood\n{}", rows.concat())
}

#[track_caller]
fn not_numbers(cells: &[&str], options: &ReadOptions, expected: &[&str]) {
    let frame =
        read_bytes(column(cells).as_bytes(), ',', options).expect("the table is well formed");
    assert_eq!(numbers_refused(&frame, "mood"), expected);
}

#[test]
fn a_cell_that_is_not_a_number() {
    let plain = ReadOptions::default();
    not_numbers(
        &["61", "58", "5o", "60"],
        &plain,
        &[
            "`mood` has a cell that is not a number: \"5o\" in row 3 (line 4 of the file)",
            "help: correct the cell in the file, or empty it if the value is missing",
        ],
    );
    not_numbers(
        &["61", "high", "58", "low"],
        &plain,
        &[
            "`mood` has 2 cells that are not numbers, first \"high\" in row 2 (line 3 of the file)",
            "help: correct the cell in the file, or empty it if the value is missing",
        ],
    );
    not_numbers(
        &["high", "low"],
        &plain,
        &[
            "`mood` has 2 cells that are not numbers, first \"high\" in row 1 (line 2 of the file)",
            "help: no cell of this column is a number: it can serve as a factor",
        ],
    );
    not_numbers(
        &["61", "inf"],
        &plain,
        &[
            "`mood` has a cell that is not a number: \"inf\" in row 2 (line 3 of the file)",
            "help: an infinite value can't be analysed: correct the cell in the file, or empty it",
        ],
    );
}

#[test]
fn lines_are_counted_in_the_file_and_rows_in_the_table() {
    let text = "\n\nid,remark,mood\r\n1,\"two\r\nlines\",61\r\n\r\n2,\"a\n\nb\",oops\r\n";
    let frame = read_bytes(text.as_bytes(), ',', &ReadOptions::default()).unwrap();
    assert_eq!(
        numbers_refused(&frame, "mood").first().unwrap(),
        "`mood` has a cell that is not a number: \"oops\" in row 2 (line 7 of the file)"
    );
}

#[test]
fn a_column_that_does_not_exist() {
    let frame = read_bytes(b"id,mood\n1,61\n", ',', &ReadOptions::default()).unwrap();
    assert_eq!(numbers_refused(&frame, "moood"), ["there is no column `moood`"]);
}

#[test]
fn a_word_for_a_missing_value() {
    let plain = ReadOptions::default();
    not_numbers(
        &["61", "NA", "58"],
        &plain,
        &[
            "`mood` has a cell that is not a number: \"NA\" in row 2 (line 3 of the file)",
            "help: if it stands for a missing value, write `missing \"NA\"` after `read`",
            "clause: missing \"NA\"",
        ],
    );
    for word in ["N/A", ".", "-", "null", "NaN", "?"] {
        let frame = read_bytes(column(&["61", word]).as_bytes(), ',', &plain).unwrap();
        let clause = frame.numbers("mood").expect_err("a word").clause();
        assert_eq!(clause, Some(format!("missing \"{word}\"")));
    }
    // A word that is not commonly used so, but is the only one and is repeated.
    not_numbers(
        &["61", "refused", "58", "refused"],
        &plain,
        &[
            "`mood` has 2 cells that are not numbers, first \"refused\" in row 2 (line 3 of the file)",
            "help: if it stands for a missing value, write `missing \"refused\"` after `read`",
            "clause: missing \"refused\"",
        ],
    );
    // A clause stands once in a statement: what was declared before is repeated.
    let declared = ReadOptions { missing: vec!["-9".to_owned()], ..ReadOptions::default() };
    not_numbers(
        &["61", "n/a", "-9", "."],
        &declared,
        &[
            "`mood` has 2 cells that are not numbers, first \"n/a\" in row 2 (line 3 of the file)",
            "help: if it stands for a missing value, write `missing \"-9\", \".\", \"n/a\"` after `read`",
            "clause: missing \"-9\", \".\", \"n/a\"",
        ],
    );
}

#[test]
fn the_wrong_decimal_sign() {
    let semicolon = ReadOptions { separator: Some(';'), ..ReadOptions::default() };
    let frame = read_bytes(b"id;mood\n1;61,5\n2;58\n3;1,234\n", ',', &semicolon).unwrap();
    assert_eq!(
        numbers_refused(&frame, "mood"),
        [
            "`mood` has 2 cells that are not numbers, first \"61,5\" in row 1 (line 2 of the file)",
            "help: if the numbers have a decimal comma, write `decimal \",\"` after `read`",
            "clause: decimal \",\"",
        ]
    );
    let comma = ReadOptions { decimal: Some(','), ..ReadOptions::default() };
    not_numbers(
        &["61,5", "58.5"],
        &comma,
        &[
            "`mood` has a cell that is not a number: \"58.5\" in row 2 (line 3 of the file)",
            "help: the numbers have a decimal point: leave out `decimal \",\"`",
        ],
    );
    not_numbers(
        &["950", "1,050", "12,000.5"],
        &ReadOptions::default(),
        &[
            "`mood` has 2 cells that are not numbers, first \"1,050\" in row 2 (line 3 of the file)",
            "help: the commas seem to set off thousands: remove them in the file",
        ],
    );
}

#[test]
fn a_long_cell_is_shown_in_part() {
    let long = "x".repeat(500);
    not_numbers(
        &["61", &long],
        &ReadOptions::default(),
        &[
            &format!(
                "`mood` has a cell that is not a number: \"{}...\" in row 2 (line 3 of the file)",
                "x".repeat(40)
            ),
            "help: correct the cell in the file, or empty it if the value is missing",
        ],
    );
}
