//! What a reader sees of a drawing's strings: control codes of TEXT, formatting codes of MTEXT, escaped characters.

use super::code_page::multibyte;

/// A layer or block name: escaped characters decoded, all else as written.
pub(super) fn plain_name(raw: &str) -> String {
    let mut out = String::with_capacity(raw.len());
    let mut rest = raw;
    while let Some(next) = rest.chars().next() {
        if let Some((character, length)) = escaped_character(rest) {
            out.push_str(&character);
            rest = rest.get(length..).unwrap_or_default();
        } else if rest.starts_with("^ ") {
            out.push('^');
            rest = rest.get(2..).unwrap_or_default();
        } else {
            out.push(next);
            rest = rest.get(next.len_utf8()..).unwrap_or_default();
        }
    }
    out
}

/// The content of a TEXT or of an attribute.
pub(super) fn text_line(raw: &str) -> String {
    let mut out = String::with_capacity(raw.len());
    let mut rest = raw;
    while let Some(next) = rest.chars().next() {
        let length = match next {
            '\\' => {
                let (character, length) =
                    escaped_character(rest).unwrap_or_else(|| ("\\".to_owned(), 1));
                out.push_str(&character);
                length
            }
            '%' => percent(rest, &mut out),
            '^' => caret(rest, &mut out),
            _ => {
                out.push(next);
                next.len_utf8()
            }
        };
        rest = rest.get(length..).unwrap_or_default();
    }
    out.replace('\n', " ")
}

/// The content of an MTEXT: lines separated by `\n`, formatting dropped, `\S1/4;` as `1/4`.
pub(super) fn text_lines(raw: &str) -> String {
    let mut out = String::with_capacity(raw.len());
    let mut rest = raw;
    // Bytes from the last semicolon on: behind it, none is looked for.
    let tail = raw.rfind(';').map_or(usize::MAX, |at| raw.len() - at);
    while let Some(next) = rest.chars().next() {
        let length = match next {
            '\\' => backslash(rest, tail, &mut out),
            '{' | '}' => 1,
            '%' => percent(rest, &mut out),
            '^' => caret(rest, &mut out),
            _ => {
                out.push(next);
                next.len_utf8()
            }
        };
        rest = rest.get(length..).unwrap_or_default();
    }
    out
}

/// Decodes one code of MTEXT at the start of `rest`, of which the last `tail` bytes begin with the last semicolon;
/// returns its length in bytes.
fn backslash(rest: &str, tail: usize, out: &mut String) -> usize {
    if let Some((character, length)) = escaped_character(rest) {
        out.push_str(&character);
        return length;
    }
    let after = rest.get(1..).unwrap_or_default();
    let Some(letter) = after.chars().next() else {
        out.push('\\');
        return 1;
    };
    let argument = after.get(letter.len_utf8()..).unwrap_or_default();
    match letter {
        'P' | 'N' | 'X' => out.push('\n'),
        '~' => out.push(' '),
        '\\' | '{' | '}' => out.push(letter),
        'L' | 'l' | 'O' | 'o' | 'K' | 'k' => {}
        'H' | 'W' | 'Q' | 'T' | 'C' | 'c' | 'A' => {
            let number = argument
                .find(|c: char| !(c.is_ascii_digit() || matches!(c, '.' | '+' | '-' | 'x')))
                .unwrap_or(argument.len());
            let semicolon = argument
                .get(number..)
                .is_some_and(|after| after.starts_with(';'));
            return 2 + number + usize::from(semicolon);
        }
        'f' | 'F' | 'p' if argument.len() < tail => return 2,
        'f' | 'F' | 'p' => return 2 + argument.find(';').map_or(0, |at| at + 1),
        'S' => {
            let length = stack_length(argument);
            stack(argument.get(..length).unwrap_or_default(), out);
            let semicolon = argument.len() > length;
            return 2 + length + usize::from(semicolon);
        }
        _ => {
            out.push('\\');
            return 1;
        }
    }
    1 + letter.len_utf8()
}

/// Bytes before the semicolon that ends a stack.
fn stack_length(argument: &str) -> usize {
    let mut escaped = false;
    for (at, byte) in argument.bytes().enumerate() {
        match byte {
            _ if escaped => escaped = false,
            b'\\' => escaped = true,
            b';' => return at,
            _ => {}
        }
    }
    argument.len()
}

/// A stack as upper part, stroke, lower part; away from a digit before it, so that `1\S1/4;` is one and a quarter.
fn stack(argument: &str, out: &mut String) {
    let mut parts = [String::new(), String::new()];
    let mut part = 0;
    let mut characters = argument.chars().peekable();
    while let Some(next) = characters.next() {
        match next {
            '\\' => {
                if let (Some(literal), Some(text)) = (characters.next(), parts.get_mut(part)) {
                    text.push(literal);
                }
            }
            '/' | '#' | '^' if part == 0 => {
                part = 1;
                if next == '^' && characters.peek() == Some(&' ') {
                    characters.next();
                }
            }
            _ => {
                if let Some(text) = parts.get_mut(part) {
                    text.push(next);
                }
            }
        }
    }
    let [upper, lower] = parts.map(|text| text.trim().to_owned());
    if upper.is_empty() && lower.is_empty() {
        return;
    }
    if out.ends_with(|c: char| c.is_ascii_digit()) {
        out.push(' ');
    }
    out.push_str(&upper);
    if !upper.is_empty() && !lower.is_empty() {
        out.push('/');
    }
    out.push_str(&lower);
}

/// `\U+XXXX` or `\M+nXXXX` at the start of a text: its character and its length in bytes.
fn escaped_character(rest: &str) -> Option<(String, usize)> {
    let rest = rest.strip_prefix('\\')?;
    let head = rest.get(..2)?;
    if head.eq_ignore_ascii_case("U+") {
        let number = hexadecimal(rest.get(2..6)?)?;
        if let Some(character) = char::from_u32(number) {
            return Some((character.to_string(), 7));
        }
        // A character beyond the first 65536 is two codes.
        let second = rest.get(6..)?.strip_prefix('\\')?;
        let second = second
            .get(..2)
            .filter(|head| head.eq_ignore_ascii_case("U+"))?
            .len()
            + 7;
        let pair = [number, hexadecimal(rest.get(second..second + 4)?)?];
        let units = pair.map(|unit| u16::try_from(unit).unwrap_or(0));
        return Some((String::from_utf16(&units).ok()?, 14));
    }
    if head.eq_ignore_ascii_case("M+") {
        let page = rest.get(2..3)?.parse().ok()?;
        let number = hexadecimal(rest.get(3..7)?)?;
        let [.., high, low] = number.to_be_bytes();
        let pair = [high, low];
        let bytes = if high == 0 { &pair[1..] } else { &pair };
        let (text, failed) = multibyte(page)?.decode_without_bom_handling(bytes);
        return (!failed).then(|| (text.into_owned(), 8));
    }
    None
}

fn hexadecimal(digits: &str) -> Option<u32> {
    let plain = digits.bytes().all(|b| b.is_ascii_hexdigit());
    plain
        .then(|| u32::from_str_radix(digits, 16).ok())
        .flatten()
}

/// Decodes `%%d`, `%%p`, `%%c`, `%%nnn`, drops `%%u`, `%%o`, `%%k`; returns the code's length in bytes.
fn percent(rest: &str, out: &mut String) -> usize {
    let Some(after) = rest.strip_prefix("%%") else {
        out.push('%');
        return 1;
    };
    let digits = after
        .get(..3)
        .filter(|d| d.bytes().all(|b| b.is_ascii_digit()));
    if let Some(digits) = digits {
        let character = digits.parse().ok().and_then(char::from_u32);
        out.extend(character.filter(|c| !c.is_control()));
        return 5;
    }
    match after.chars().next().map(|c| c.to_ascii_lowercase()) {
        Some('d') => out.push('°'),
        Some('p') => out.push('±'),
        Some('c') => out.push('Ø'),
        Some('%') => out.push('%'),
        Some('u' | 'o' | 'k') => {}
        _ => {
            out.push_str("%%");
            return 2;
        }
    }
    3
}

/// Decodes `^J`, `^I`, `^ ` and drops other control characters; a caret before anything else is a caret.
fn caret(rest: &str, out: &mut String) -> usize {
    match rest.as_bytes().get(1) {
        Some(b'J') => out.push('\n'),
        Some(b'I') => out.push(' '),
        Some(b' ') => out.push('^'),
        Some(b'@'..=b'_') => {}
        _ => {
            out.push('^');
            return 1;
        }
    }
    2
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn control_codes_of_text() {
        for (raw, shown) in [
            ("12%%d %%P3 %%c12.7 100%%%", "12° ±3 Ø12.7 100%"),
            ("%%uH165%%U", "H165"),
            ("%%065%%128 50% %%x", "A 50% %%x"),
            (r"T\U+00E9l \u+2205", "Tél ∅"),
            (r"\M+5D6D0\M+5CEC4", "中文"),
            (r"a\U+D83D\U+DE00b", "a😀b"),
            (r"\U+D83D \U+DE00\U+D83D", r"\U+D83D \U+DE00\U+D83D"),
            ("m^2 a^ b^Ic^", "m^2 a^b c^"),
            (r"12\P34 C:\", r"12\P34 C:\"),
        ] {
            assert_eq!(text_line(raw), shown, "{raw}");
        }
    }

    #[test]
    fn formatting_codes_of_mtext() {
        for (raw, shown) in [
            (r"H165\PL30", "H165\nL30"),
            (r"{\fArial|b0|i0|c0|p34;\H2.5x;T350}", "T350"),
            (r"\A1;\C1;5\S1/4;", "5 1/4"),
            (r"\S1#4;\~in", "1/4 in"),
            (r"m\S2^ ; \S+5^-3;", "m2 +5/-3"),
            (r"a\\b \{c\} \Lu\l \pxqc;d", r"a\b {c} u d"),
            (r"12\P34\", "12\n34\\"),
            (r"\U+00D812%%d^Jx", "Ø12°\nx"),
            (r"\\U+00D8", r"\U+00D8"),
            (r"\H3", ""),
            (r"\S1/4", "1/4"),
            (r"\fArial", "Arial"),
            (r"a;\fArial\pb;c\fd", "a;cd"),
        ] {
            assert_eq!(text_lines(raw), shown, "{raw}");
        }
    }

    #[test]
    fn codes_without_their_end_cost_no_more_than_others() {
        let begun = std::time::Instant::now();
        for code in [r"\f", r"\p", r"\S", r"\H", "%%", "^", r"\U+D83D"] {
            let raw = code.repeat(200_000);
            assert!(text_lines(&raw).len() <= raw.len());
            assert!(text_line(&raw).len() <= raw.len());
        }
        assert!(begun.elapsed().as_secs() < 20, "{:?}", begun.elapsed());
    }

    #[test]
    fn names_keep_what_is_no_escape() {
        assert_eq!(plain_name(r"a\b^ ^c\U+00DC"), r"a\b^^cÜ");
    }
}
