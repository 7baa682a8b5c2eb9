//! Tags of both forms, sound and not.

use super::ascii::{code_of, plain_code};
use super::*;

fn codes(bytes: &[u8]) -> Vec<(i32, Vec<u8>)> {
    Tags::new(bytes)
        .map_while(Result::ok)
        .map(|tag| (tag.code, tag.value.to_vec()))
        .collect()
}

fn error(bytes: &[u8]) -> Option<BadTag> {
    Tags::new(bytes).find_map(Result::err)
}

#[test]
fn line_ends_padding_and_comments_do_not_matter() {
    let expected = vec![(0, b"SECTION".to_vec()), (2, b" A ".to_vec())];
    for text in [
        "0\nSECTION\n2\n A \n",
        "  0\r\nSECTION\r\n  2\r\n A ",
        "\t0\nSECTION\r\n999\nhello\n 2 \r\n A \n",
        "\u{FEFF}0\nSECTION\n2\n A \n\n\n\u{1A}",
    ] {
        assert_eq!(codes(text.as_bytes()), expected, "{text:?}");
    }
}

#[test]
fn tags_cover_the_file_without_gaps() {
    let text = b"  0\r\nSECTION\r\n999\r\nnote\r\n 10\r\n 1.5 \r\n  0\r\nEOF\r\nrest";
    let tags: Vec<_> = Tags::new(text).map_while(Result::ok).collect();
    assert_eq!(&text[tags[0].start..tags[0].end], b"  0\r\nSECTION\r\n");
    assert_eq!(&text[tags[1].value_range()], b" 1.5 ");
    assert_eq!(tags[1].float(), Some(1.5));
    assert_eq!(tags.len(), 3);
    assert_eq!(&text[tags[2].end..], b"rest");
}

#[test]
fn a_strange_code_line_is_named_with_its_line() {
    let bad = error(b"0\nSECTION\nhello\n2\n").expect("refused");
    assert_eq!((bad.at, bad.kind), (10, Bad::Code));
    assert_eq!(bad.found, "\"hello\"");
    assert!(error(b"0\nSECTION\n  0\n").is_some_and(|bad| bad.kind == Bad::Cut));
}

#[test]
fn numbers_must_be_plain_and_finite() {
    let number = |text: &str| {
        let bytes = format!("10\n{text}\n").into_bytes();
        Tags::new(&bytes)
            .next()
            .and_then(Result::ok)
            .and_then(|tag| tag.float())
    };
    assert_eq!(number(" +1.5e3 "), Some(1500.0));
    for text in ["nan", "inf", "1e400", "1,5", "1.5D3", "", "1.#INF"] {
        assert_eq!(number(text), None, "{text}");
    }
}

#[test]
fn a_comment_may_come_first_in_binary() {
    let mut wide = SIGNATURES[0].to_vec();
    let mut narrow = wide.clone();
    wide.extend(b"\xE7\x03hello\0\0\0LINE\0");
    narrow.extend(b"\xFF\xE7\x03hello\0\0LINE\0");
    for bytes in [wide, narrow] {
        assert_eq!(codes(&bytes), [(0, b"LINE".to_vec())]);
    }
}

#[test]
fn binary_codes_of_both_widths_read_alike() {
    let mut wide = SIGNATURES[0].to_vec();
    let mut narrow = wide.clone();
    wide.extend(b"\0\0LINE\0\x0A\0");
    narrow.extend(b"\0LINE\0\x0A");
    for bytes in [&mut wide, &mut narrow] {
        bytes.extend(2.5_f64.to_le_bytes());
    }
    wide.extend(b"\x3E\0\xFF\xFF\xEC\x03\x02ab\x22\x01\x01");
    narrow.extend(b"\x3E\xFF\xFF\xFF\xEC\x03\x02ab\xFF\x22\x01\x01\0");
    for bytes in [wide, narrow] {
        let tags: Vec<_> = Tags::new(&bytes).map_while(Result::ok).collect();
        assert_eq!(tags.len(), 5);
        assert!(tags[0].begins(b"LINE"));
        assert_eq!(tags[1].float(), Some(2.5));
        assert_eq!(tags[2].integer(), Some(-1));
        assert_eq!((tags[3].code, tags[3].value), (1004, &b"ab"[..]));
        assert_eq!((tags[4].code, tags[4].integer()), (290, Some(1)));
        assert_eq!(tags[4].end, bytes.len());
    }
}

#[test]
fn a_code_read_at_a_stroke_is_the_one_that_is_read_with_care() {
    let mut plain = 0;
    for line in [
        "  0", "0", " 10", "100", "999", "1000", "1071", "   8", "99999", "-5", "+7", "0 ", "\t8",
        " 1 0", "1 0", "1x0", " x0", "   ", "", "1", "12", "123456", "12345678",
    ] {
        for end in ["\n", "\r\n"] {
            let bytes = format!("{line}{end}");
            if let Some((code, length)) = plain_code(bytes.as_bytes()) {
                assert_eq!(Some(code), code_of(line.as_bytes()), "{line:?}");
                assert_eq!(length, bytes.len(), "{line:?}");
                plain += 1;
            }
        }
    }
    assert_eq!(plain, 2 * 11);
}

#[test]
fn what_is_passed_over_is_what_would_have_come() {
    let mut binary = SIGNATURES[0].to_vec();
    binary.extend(b"\0\0LINE\0\x0A\0");
    binary.extend(2.5_f64.to_le_bytes());
    binary.extend(b"\x01\0text\0\x36\x01\x02ab\x08\x00A\0\x0A\0\0\0");
    let ascii = b"  0\nLINE\n 10\n2.5\n  1\ntext\n310\nab\n  8\nA\n 10\n".to_vec();
    for bytes in [binary, ascii] {
        let mut tags = Tags::new(&bytes);
        let line = tags.next().and_then(Result::ok).expect("a line");
        assert!(line.begins(b"LINE"));
        let passed = tags.pass_over(|code| code != 8);
        let layer = tags.next().and_then(Result::ok).expect("a layer");
        assert_eq!((layer.code, layer.value), (8, &b"A"[..]));
        assert_eq!(passed, Some(layer.start));
        // A tag that is cut short is not passed over: it is told.
        assert_eq!(tags.pass_over(|_| true), None);
        assert!(tags.next().is_some_and(|tag| tag.is_err()));
    }
}
