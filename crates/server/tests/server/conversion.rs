//! Positions and bytes, by table.

use proptest::prelude::*;
use tower_lsp::lsp_types::{Position, PositionEncodingKind, Range, TextDocumentContentChangeEvent};
use tussock_language::span::Span;
use tussock_server::{Encoding, Lines, apply};

/// Line 0: `a🚢é` and a combining accent `e\u{301}`, ended by CRLF. Line 1: empty, ended by LF.
/// Line 2: `日本`, ended by a lone CR. Line 3: `z`, with no end.
const TEXT: &str = "a🚢ée\u{301}\r\n\n日本\rz";

/// Byte, line, and the column in UTF-8, UTF-16 and UTF-32.
const TABLE: &[(usize, u32, [u32; 3])] = &[
    (0, 0, [0, 0, 0]),
    (1, 0, [1, 1, 1]),
    (5, 0, [5, 3, 2]),
    (7, 0, [7, 4, 3]),
    (8, 0, [8, 5, 4]),
    (10, 0, [10, 6, 5]),
    (12, 1, [0, 0, 0]),
    (13, 2, [0, 0, 0]),
    (16, 2, [3, 1, 1]),
    (19, 2, [6, 2, 2]),
    (20, 3, [0, 0, 0]),
    (21, 3, [1, 1, 1]),
];

const ENCODINGS: [Encoding; 3] = [Encoding::Utf8, Encoding::Utf16, Encoding::Utf32];

#[test]
fn bytes_and_positions_agree_both_ways() {
    let lines = Lines::of(TEXT);
    for &(offset, line, columns) in TABLE {
        for (encoding, character) in ENCODINGS.into_iter().zip(columns) {
            let position = Position { line, character };
            assert_eq!(lines.position(TEXT, offset, encoding), position, "{offset} {encoding:?}");
            assert_eq!(lines.offset(TEXT, position, encoding), offset, "{position:?} {encoding:?}");
        }
    }
}

#[test]
fn every_character_boundary_survives_the_round_trip() {
    let lines = Lines::of(TEXT);
    // The one byte between CR and LF is not a place where a cursor can stand.
    let boundaries = (0..=TEXT.len()).filter(|&at| TEXT.is_char_boundary(at) && at != 11);
    for offset in boundaries {
        for encoding in ENCODINGS {
            let position = lines.position(TEXT, offset, encoding);
            assert_eq!(lines.offset(TEXT, position, encoding), offset, "{offset} {encoding:?}");
        }
    }
}

#[test]
fn a_position_outside_the_text_is_moved_to_the_nearest_place_inside() {
    let lines = Lines::of(TEXT);
    let offset =
        |line, character| lines.offset(TEXT, Position { line, character }, Encoding::Utf16);
    assert_eq!(offset(0, 99), 10, "the end of the line, before its break");
    assert_eq!(offset(1, 1), 12, "an empty line");
    assert_eq!(offset(3, 99), 21, "the end of the text");
    assert_eq!(offset(99, 0), 21, "a line beyond the last");
    assert_eq!(offset(0, 2), 1, "between the halves of a surrogate pair");
}

#[test]
fn a_byte_outside_the_text_is_moved_to_the_nearest_place_inside() {
    let lines = Lines::of(TEXT);
    let position = |offset| lines.position(TEXT, offset, Encoding::Utf16);
    assert_eq!(position(3), Position { line: 0, character: 1 }, "inside a character");
    assert_eq!(position(11), Position { line: 0, character: 6 }, "inside a line break");
    assert_eq!(position(99), Position { line: 3, character: 1 }, "beyond the end");
}

#[test]
fn an_empty_text_has_one_line() {
    let lines = Lines::of("");
    let start = Position { line: 0, character: 0 };
    assert_eq!(lines.position("", 0, Encoding::Utf16), start);
    assert_eq!(lines.offset("", start, Encoding::Utf16), 0);
    assert_eq!(lines.offset("", Position { line: 5, character: 5 }, Encoding::Utf16), 0);
}

#[test]
fn a_line_break_at_the_end_opens_another_line() {
    let lines = Lines::of("a\n");
    let end = Position { line: 1, character: 0 };
    assert_eq!(lines.position("a\n", 2, Encoding::Utf16), end);
    assert_eq!(lines.offset("a\n", end, Encoding::Utf16), 2);
}

#[test]
fn ranges_and_spans_agree_and_an_inverted_range_is_empty() {
    let lines = Lines::of(TEXT);
    let range = Range {
        start: Position { line: 0, character: 1 },
        end: Position { line: 2, character: 1 },
    };
    let span = Span::new(1, 16);
    assert_eq!(lines.span(TEXT, range, Encoding::Utf16), span);
    assert_eq!(lines.range(TEXT, span, Encoding::Utf16), range);
    let inverted = Range { start: range.end, end: range.start };
    assert_eq!(lines.span(TEXT, inverted, Encoding::Utf16), Span::new(16, 16));
}

#[test]
fn the_first_known_encoding_of_the_client_is_taken() {
    let kind = |name: &'static str| PositionEncodingKind::new(name);
    let cases = [
        (None, Encoding::Utf16),
        (Some(vec![]), Encoding::Utf16),
        (Some(vec![kind("utf-8"), kind("utf-16")]), Encoding::Utf8),
        (Some(vec![kind("utf-16"), kind("utf-8")]), Encoding::Utf16),
        (Some(vec![kind("utf-7"), kind("utf-32")]), Encoding::Utf32),
    ];
    for (offered, taken) in cases {
        assert_eq!(Encoding::negotiate(offered.as_deref()), taken, "{offered:?}");
    }
}

proptest! {
    /// What a client writes in its own units is what happens to the bytes.
    #[test]
    fn edits_by_position_do_what_edits_by_byte_do(
        text in "[a-c🚢é\r\n]{0,30}",
        edits in prop::collection::vec((0..100_usize, 0..100_usize, "[x🚢\r\n]{0,3}"), 1..6),
        encoding in prop::sample::select(ENCODINGS.to_vec()),
    ) {
        let mut expected = text.clone();
        let mut changes = Vec::new();
        for (one, other, insertion) in edits {
            let places = places(&expected);
            let one = places[one % places.len()];
            let other = places[other % places.len()];
            let span = Span::new(one.min(other), one.max(other));
            changes.push(TextDocumentContentChangeEvent {
                range: Some(Lines::of(&expected).range(&expected, span, encoding)),
                range_length: None,
                text: insertion.clone(),
            });
            expected.replace_range(span.range(), &insertion);
        }
        let mut edited = text;
        apply(&mut edited, changes, encoding);
        prop_assert_eq!(edited, expected);
    }
}

/// The bytes at which a cursor can stand: between characters, not within a line break.
fn places(text: &str) -> Vec<usize> {
    let within_break = |at: usize| {
        text.get(..at).is_some_and(|head| head.ends_with('\r'))
            && text.get(at..).is_some_and(|tail| tail.starts_with('\n'))
    };
    (0..=text.len()).filter(|&at| text.is_char_boundary(at) && !within_break(at)).collect()
}
