//! What files of separated values may look like, and what is read from them.

use tussock_data::frame::{Factor, Frame, Kind};
use tussock_data::read::{ReadOptions, default_separator, read_bytes};

#[track_caller]
fn read_with(bytes: &[u8], options: &ReadOptions) -> Frame {
    read_bytes(bytes, ',', options).expect("the table is well formed")
}

#[track_caller]
fn read(text: &str) -> Frame {
    read_with(text.as_bytes(), &ReadOptions::default())
}

fn texts(frame: &Frame, name: &str) -> Vec<Option<String>> {
    frame.texts(name).expect("the column exists")
}

fn some(texts: &[&str]) -> Vec<Option<String>> {
    texts.iter().map(|text| Some((*text).to_owned())).collect()
}

#[test]
fn the_extension_tells_the_separator() {
    for (path, separator) in [
        ("crew.csv", ','),
        ("crew.tsv", '\t'),
        ("crew.TAB", '\t'),
        ("crew.txt", ','),
        ("tsv", ','),
        ("crew", ','),
    ] {
        assert_eq!(default_separator(path.as_ref()), separator, "{path}");
    }
}

#[test]
fn every_kind_of_line_end_and_a_byte_order_mark() {
    for end in ["\n", "\r\n", "\r"] {
        for mark in ["", "\u{feff}"] {
            for last in ["", end, "\r\n\n\n"] {
                let text = format!("{mark}id,ship{end}1,Tern{end}2,\"Little, Tern\"{last}");
                let frame = read(&text);
                assert_eq!(frame.names(), ["id", "ship"], "{text:?}");
                assert_eq!(texts(&frame, "id"), some(&["1", "2"]), "{text:?}");
                assert_eq!(texts(&frame, "ship"), some(&["Tern", "Little, Tern"]), "{text:?}");
            }
        }
    }
}

#[test]
fn a_quoted_cell_holds_anything() {
    let frame = read("id,remark\n1,\"a, \"\"b\"\"\r\nand\n\nc\"\n2,\"\"\"\"\n3,\" d \"\n");
    assert_eq!(texts(&frame, "remark"), some(&["a, \"b\"\r\nand\n\nc", "\"", " d "]));
}

#[test]
fn blanks_round_names_are_dropped_and_blanks_round_labels_are_kept() {
    let frame = read(" id ,\" shift\nlength \"\n 1,forward\n2,Forward \n");
    assert_eq!(frame.names(), ["id", "shift length"]);
    assert_eq!(texts(&frame, "id"), some(&[" 1", "2"]));
    assert_eq!(frame.numbers("id").unwrap(), [1.0, 2.0]);
    assert_eq!(frame.levels("shift length").unwrap(), ["Forward ", "forward"]);
}

#[test]
fn empty_and_blank_cells_are_missing() {
    let frame = read("a,b,c\n,\"\",  \n1,\" \",\u{a0}\n,,x\n");
    assert_eq!(texts(&frame, "a"), [None, Some("1".to_owned()), None]);
    assert_eq!(texts(&frame, "b"), [None, None, None]);
    assert_eq!(texts(&frame, "c"), [None, None, Some("x".to_owned())]);
    assert_eq!(frame.kind("b"), Some(Kind::Number));
    assert!(frame.numbers("b").unwrap().iter().all(|number| number.is_nan()));
}

#[test]
fn declared_texts_are_missing_in_every_column() {
    let options =
        ReadOptions { missing: vec!["NA".to_owned(), "-9".to_owned()], ..ReadOptions::default() };
    let frame = read_with(b"ship,mood\nNA,61\nTern,-9.0\nna, NA\nSkua,-99\n", &options);
    assert_eq!(
        texts(&frame, "ship"),
        [None, Some("Tern".to_owned()), Some("na".to_owned()), Some("Skua".to_owned())]
    );
    let mood = frame.numbers("mood").unwrap();
    assert_eq!(
        mood.iter().map(|mood| mood.is_nan()).collect::<Vec<_>>(),
        [false, true, true, false]
    );
}

#[test]
fn a_decimal_comma_that_was_declared() {
    let options =
        ReadOptions { separator: Some(';'), decimal: Some(','), ..ReadOptions::default() };
    let frame = read_with(b"id;mood\n1;61,5\n2;-0,25\n3;7\n", &options);
    assert_eq!(frame.kind("mood"), Some(Kind::Number));
    assert_eq!(frame.numbers("mood").unwrap(), [61.5, -0.25, 7.0]);
}

#[test]
fn blank_lines_are_no_rows_unless_the_table_has_one_column() {
    let frame = read("\n\na,b\n\n1,2\n   \n3,4\n\n");
    assert_eq!(frame.numbers("b").unwrap(), [2.0, 4.0]);
    let frame = read("\na\n1\n\n2\n\n\n");
    assert_eq!(texts(&frame, "a"), [Some("1".to_owned()), None, Some("2".to_owned())]);
    let frame = read("a\n\n1\n\"\"\n");
    assert_eq!(texts(&frame, "a"), [None, Some("1".to_owned()), None]);
}

#[test]
fn a_header_without_rows() {
    let frame = read("a,b");
    assert_eq!((frame.rows(), frame.names()), (0, vec!["a".to_owned(), "b".to_owned()]));
    assert_eq!(frame.texts("a"), Some(Vec::new()));
    assert_eq!(frame.numbers("b"), Ok(Vec::new()));
    assert_eq!(frame.factor("b"), Some(Factor { levels: Vec::new(), codes: Vec::new() }));
}

#[test]
fn one_column_with_a_sign_that_elsewhere_is_a_separator() {
    let frame = read("remark\nfine\nlate; tired\n");
    assert_eq!(texts(&frame, "remark"), some(&["fine", "late; tired"]));
}

#[test]
fn levels_keep_their_spelling_and_codes_point_at_them() {
    let frame = read("dose\n10\n1\n01\n\n9\ncontrol\nControl\n1\n");
    assert_eq!(frame.kind("dose"), Some(Kind::Text));
    let factor = frame.factor("dose").unwrap();
    assert_eq!(factor.levels, ["01", "1", "9", "10", "Control", "control"]);
    assert_eq!(factor.codes, [Some(3), Some(1), Some(0), None, Some(2), Some(5), Some(4), Some(1)]);
    assert_eq!(frame.levels("dose"), Some(factor.levels));
}

#[test]
fn a_column_that_does_not_exist() {
    let frame = read("a,b\n1,2\n");
    assert_eq!(frame.kind("c"), None);
    assert_eq!(frame.texts("c"), None);
    assert_eq!(frame.levels("c"), None);
    assert_eq!(frame.factor("c"), None);
}

#[test]
fn other_encodings() {
    let latin = ReadOptions { encoding: Some("latin1".to_owned()), ..ReadOptions::default() };
    let frame = read_with(b"name,mood\nZo\xeb,61\n", &latin);
    assert_eq!(texts(&frame, "name"), some(&["Zo\u{eb}"]));

    let two_bytes = |text: &str, bytes: fn(u16) -> [u8; 2]| {
        text.encode_utf16().flat_map(bytes).collect::<Vec<u8>>()
    };
    let text = "name,mood\nZo\u{eb},61\n";
    let marked = format!("\u{feff}{text}");
    let little = ReadOptions { encoding: Some("utf-16le".to_owned()), ..ReadOptions::default() };
    for (bytes, options) in [
        (two_bytes(&marked, u16::to_le_bytes), &ReadOptions::default()),
        (two_bytes(&marked, u16::to_be_bytes), &ReadOptions::default()),
        (two_bytes(text, u16::to_le_bytes), &little),
    ] {
        assert_eq!(texts(&read_with(&bytes, options), "name"), some(&["Zo\u{eb}"]));
    }
}

#[test]
fn a_first_cell_that_looks_like_the_start_of_another_format() {
    for start in ["x^2", "x\u{1}y", "\u{feff}mark"] {
        let frame = read(&format!("term,weight\n{start},1\nx,2\n"));
        assert_eq!(texts(&frame, "term"), some(&[start, "x"]));
        let frame = read(&format!("term\n{start}\n\nx\n"));
        assert_eq!(frame.rows(), 3);
    }
}

#[test]
fn names_may_be_any_text() {
    let frame = read("Reaction time (ms),\"a,b\",\u{3b1},\"\"\"\"\n1,2,3,4\n");
    assert_eq!(frame.names(), ["Reaction time (ms)", "a,b", "\u{3b1}", "\""]);
    assert_eq!(frame.numbers("\"").unwrap(), [4.0]);
}
