//! Plain text said as the value of a TEXT.

use std::fmt::Write as _;

use super::records::Edition;

/// The value that a reader shows as `content`: ASCII below R2007, where code pages cannot be trusted (others as
/// `\U+XXXX`), UTF-8 from then on. The signs for diameter, degree and plus-minus are written the way every reader knows.
/// A text is one line: breaks and control characters become blanks.
pub(super) fn text_value(content: &str, edition: Edition) -> String {
    let mut value = String::with_capacity(content.len());
    let mut rest = content.chars().peekable();
    let mut after_percent = false;
    while let Some(letter) = rest.next() {
        let percent = letter == '%';
        match letter {
            '%' => {
                // Two in a row begin a code: three stand for one.
                let lone = !after_percent
                    && rest
                        .peek()
                        .is_none_or(|&next| next != '%' && sign(next).is_none());
                value.push_str(if lone { "%" } else { "%%%" });
            }
            // A caret begins the code of a control character; with a blank it is the caret itself.
            '^' => value.push_str("^ "),
            '\\' if matches!(rest.peek(), Some('U' | 'M' | 'u' | 'm')) => {
                value.push_str("\\U+005C");
            }
            control if control.is_control() => value.push(' '),
            letter => match sign(letter) {
                Some(code) => value.push_str(code),
                None if letter.is_ascii() || edition >= Edition::R2007 => value.push(letter),
                None => push_escaped(&mut value, letter),
            },
        }
        after_percent = percent;
    }
    value
}

fn sign(letter: char) -> Option<&'static str> {
    match letter {
        'Ø' | '\u{2300}' | '\u{2205}' => Some("%%c"),
        '°' => Some("%%d"),
        '±' => Some("%%p"),
        _ => None,
    }
}

fn push_escaped(value: &mut String, letter: char) {
    let mut units = [0_u16; 2];
    for unit in letter.encode_utf16(&mut units) {
        // Writing into a string cannot fail.
        let _ = write!(value, "\\U+{unit:04X}");
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn older_editions_get_ascii_newer_ones_utf8() {
        let content = "T1 \u{2300}12.7 at 5° ±2 m² µ 😀";
        assert_eq!(
            text_value(content, Edition::R2004),
            "T1 %%c12.7 at 5%%d %%p2 m\\U+00B2 \\U+00B5 \\U+D83D\\U+DE00"
        );
        assert_eq!(
            text_value(content, Edition::R2007),
            "T1 %%c12.7 at 5%%d %%p2 m² µ 😀"
        );
    }

    #[test]
    fn characters_that_begin_codes_are_said_so_that_they_stand_for_themselves() {
        for (content, value) in [
            ("75% of 1860", "75% of 1860"),
            ("100%%d", "100%%%%%%d"),
            ("5%±", "5%%%%%p"),
            ("m^2", "m^ 2"),
            ("a\\b", "a\\b"),
            ("a\\U+0041", "a\\U+005CU+0041"),
            ("two\nlines\u{7}", "two lines "),
        ] {
            assert_eq!(text_value(content, Edition::R2013), value);
        }
    }
}
