//! Jupyter counts positions in Unicode code points; everything inside counts bytes.

/// The byte at which the code point of that number begins; the end of the text where it has fewer.
pub(crate) fn byte_offset(text: &str, code_points: usize) -> usize {
    text.char_indices().nth(code_points).map_or(text.len(), |(at, _)| at)
}

/// How many code points begin before the byte; an offset within a code point counts as its start.
pub(crate) fn code_points(text: &str, byte_offset: usize) -> usize {
    text.char_indices().take_while(|(at, c)| at + c.len_utf8() <= byte_offset).count()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn both_directions_agree_in_texts_that_tempt_to_count_otherwise() {
        let emoji = "a🌾b";
        let combining = "e\u{301}x";
        let line_breaks = "ab\r\ncd\r\n";
        let byte_order_mark = "\u{feff}show";
        for (text, points, bytes) in [
            (emoji, 1, 1),
            (emoji, 2, 5),
            (emoji, 3, 6),
            (combining, 1, 1),
            (combining, 2, 3),
            (combining, 3, 4),
            (line_breaks, 4, 4),
            (line_breaks, 8, 8),
            (byte_order_mark, 1, 3),
            (byte_order_mark, 5, 7),
            ("", 0, 0),
        ] {
            assert_eq!(byte_offset(text, points), bytes, "{text:?} {points}");
            assert_eq!(code_points(text, bytes), points, "{text:?} {bytes}");
        }
    }

    #[test]
    fn positions_beyond_the_text_or_within_a_code_point_are_brought_back() {
        assert_eq!(byte_offset("é", 9), 2);
        assert_eq!(code_points("é", 9), 1);
        assert_eq!(code_points("é", 1), 0);
    }
}
