//! The tags of a DXF file, ASCII or binary: group code and value, with the bytes that each takes up.

use std::ops::Range;

use memchr::{memchr, memchr_iter};

use super::resume::resume;

/// How a file's tags are written.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Form {
    /// Two lines a tag.
    Ascii,
    /// Binary; `wide` codes take two bytes (R13 and later), narrow ones a byte, with 255 before a two-byte code.
    Binary {
        /// Whether every code takes two bytes.
        wide: bool,
    },
}

/// One group code with its value.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Tag<'a> {
    /// Group code.
    pub(super) code: i32,
    /// Value as it stands in the file, without its line end, terminator or length byte.
    pub(super) value: &'a [u8],
    /// Offset of the code's first byte (of its line, in ASCII).
    pub(super) start: usize,
    /// Offset past the value and its line end or terminator.
    pub(super) end: usize,
    value_start: usize,
    kind: Kind,
}

/// What a value's bytes are.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Kind {
    Text,
    Float,
    Integer,
    Chunk,
}

impl<'a> Tag<'a> {
    /// Offsets of the value in the file.
    pub(super) fn value_range(&self) -> Range<usize> {
        self.value_start..self.value_start + self.value.len()
    }

    /// The value without blanks around it; empty for binary numbers.
    pub(super) fn word(&self) -> &'a [u8] {
        match self.kind {
            Kind::Text => self.value.trim_ascii(),
            _ => &[],
        }
    }

    /// The value as a whole number; `3.0` counts as 3.
    pub(super) fn integer(&self) -> Option<i64> {
        match self.kind {
            Kind::Text => {
                let word = self.value.trim_ascii();
                whole(word).or_else(|| decimal(word).and_then(to_whole))
            }
            Kind::Float => self.float().and_then(to_whole),
            Kind::Integer => {
                let mut wide = [0_u8; 8];
                let negative = self.value.len() > 1 && self.value.last().is_some_and(|&b| b > 127);
                if negative {
                    wide = [0xFF; 8];
                }
                wide.get_mut(..self.value.len())?
                    .copy_from_slice(self.value);
                Some(i64::from_le_bytes(wide))
            }
            Kind::Chunk => None,
        }
    }

    /// The value as a finite number.
    pub(super) fn float(&self) -> Option<f64> {
        match self.kind {
            Kind::Text => decimal(self.value.trim_ascii()),
            Kind::Float => {
                let bytes: [u8; 8] = self.value.try_into().ok()?;
                Some(f64::from_le_bytes(bytes)).filter(|number| number.is_finite())
            }
            #[expect(
                clippy::cast_precision_loss,
                reason = "a coordinate beyond 2^53 is no drawing"
            )]
            Kind::Integer => self.integer().map(|number| number as f64),
            Kind::Chunk => None,
        }
    }

    /// Whether the group-0 value is `name`.
    pub(super) fn begins(&self, name: &[u8]) -> bool {
        self.code == 0 && self.word() == name
    }
}

/// A plain decimal number; words such as `nan` and numbers too large for 64 bits do not count.
fn decimal(word: &[u8]) -> Option<f64> {
    let plain = word
        .iter()
        .all(|b| matches!(b, b'0'..=b'9' | b'+' | b'-' | b'.' | b'e' | b'E'));
    if !plain {
        return None;
    }
    let number: f64 = std::str::from_utf8(word).ok()?.parse().ok()?;
    number.is_finite().then_some(number)
}

fn to_whole(number: f64) -> Option<i64> {
    #[expect(
        clippy::cast_possible_truncation,
        reason = "held to the range of exact whole numbers"
    )]
    (number.fract() == 0.0 && number.abs() < 9e15).then_some(number as i64)
}

/// A whole number of at most 18 digits.
fn whole(word: &[u8]) -> Option<i64> {
    let (negative, digits) = match word {
        [b'-', rest @ ..] => (true, rest),
        [b'+', rest @ ..] => (false, rest),
        _ => (false, word),
    };
    if digits.is_empty() || digits.len() > 18 {
        return None;
    }
    let mut number = 0_i64;
    for &digit in digits {
        if !digit.is_ascii_digit() {
            return None;
        }
        number = number * 10 + i64::from(digit - b'0');
    }
    Some(if negative { -number } else { number })
}

/// A place where the tags stop making sense.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) struct BadTag {
    /// Offset of the place.
    pub(super) at: usize,
    /// What is wrong there.
    pub(super) kind: Bad,
    /// What stands there.
    pub(super) found: String,
}

/// What is wrong with a tag.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Bad {
    /// Something else stands where a group code is due.
    Code,
    /// The file ends inside a tag.
    Cut,
    /// A record with a number for its name: codes and values are out of step.
    Name,
    /// A section that begins inside another.
    Unclosed,
}

impl BadTag {
    /// What was found and what was expected.
    pub(super) fn words(&self) -> String {
        let found = &self.found;
        match self.kind {
            Bad::Code => format!("found {found} where a group code was expected"),
            Bad::Name => format!("found {found} where a record's name was expected"),
            Bad::Cut => format!("the file ends inside {found}"),
            Bad::Unclosed => "a new section starts although ENTITIES is not closed".to_owned(),
        }
    }
}

/// The number of the line that holds an offset, counted from 1.
pub(super) fn line_at(bytes: &[u8], at: usize) -> usize {
    let before = bytes.get(..at).unwrap_or(bytes);
    memchr_iter(b'\n', before).count() + 1
}

/// A place in words: `line 12`, or `byte 300` in a binary file.
pub(super) fn place_in_words(bytes: &[u8], form: Form, at: usize) -> String {
    match form {
        Form::Ascii => format!("line {}", line_at(bytes, at)),
        Form::Binary { .. } => format!("byte {at}"),
    }
}

const SIGNATURES: [&[u8]; 2] = [
    b"AutoCAD Binary DXF\r\n\x1a\0",
    b"AutoCAD Binary DXF\n\x1a\0",
];

/// A file's form, and the offset of its first tag.
pub(super) fn form_of(bytes: &[u8]) -> (Form, usize) {
    for signature in SIGNATURES {
        if bytes.starts_with(signature) {
            let first = signature.len();
            let wide = bytes.get(first..first + 2) == Some(&[0, 0]);
            return (Form::Binary { wide }, first);
        }
    }
    let bom = if bytes.starts_with(b"\xEF\xBB\xBF") {
        3
    } else {
        0
    };
    (Form::Ascii, bom)
}

/// The tags of a file or of a part of it, in order; comments (999) are skipped. Ends after `0/EOF`, at the end of the
/// bytes, or after the first error, unless that is passed over.
#[derive(Debug, Clone)]
pub(super) struct Tags<'a> {
    bytes: &'a [u8],
    at: usize,
    form: Form,
    done: bool,
    forgives: bool,
}

impl<'a> Tags<'a> {
    /// All tags of a file.
    pub(super) fn new(bytes: &'a [u8]) -> Self {
        let (form, at) = form_of(bytes);
        Self {
            bytes,
            at,
            form,
            done: false,
            forgives: false,
        }
    }

    /// The same, passing over what makes no sense.
    pub(super) fn forgiving(mut self) -> Self {
        self.forgives = true;
        self
    }

    /// The tags of a part of a file, which must begin and end between tags.
    pub(super) fn within(bytes: &'a [u8], form: Form, part: Range<usize>) -> Self {
        Self {
            bytes: bytes.get(..part.end).unwrap_or(bytes),
            at: part.start,
            form,
            done: false,
            forgives: false,
        }
    }

    /// The line at the cursor without its line end, and the offset past it.
    #[inline]
    fn line(&self, at: usize) -> Option<(&'a [u8], usize)> {
        let rest = self.bytes.get(at..)?;
        if rest.is_empty() {
            return None;
        }
        let (line, end) = match near(b'\n', rest) {
            Some(length) => (&rest[..length], at + length + 1),
            None => (rest, self.bytes.len()),
        };
        Some((line.strip_suffix(b"\r").unwrap_or(line), end))
    }

    /// The tag at the cursor if it is written as nearly all are: a plain code, and whole lines.
    #[inline]
    fn plain(&mut self) -> Option<Tag<'a>> {
        let start = self.at;
        let rest = self.bytes.get(start..)?;
        let (code, head) = plain_code(rest)?;
        let body = rest.get(head..)?;
        let length = near(b'\n', body)?;
        let line = body.get(..length)?;
        let value_start = start + head;
        self.at = value_start + length + 1;
        Some(Tag {
            code,
            value: line.strip_suffix(b"\r").unwrap_or(line),
            start,
            end: self.at,
            value_start,
            kind: Kind::Text,
        })
    }

    fn ascii(&mut self) -> Option<Result<Tag<'a>, BadTag>> {
        let start = self.at;
        let (code_line, value_start) = self.line(start)?;
        let Some(code) = code_of(code_line) else {
            let rest = self.bytes.get(start..).unwrap_or_default();
            if rest.iter().all(|b| b.is_ascii_whitespace() || *b == 0x1A) {
                return None;
            }
            return Some(Err(bad(start, Bad::Code, shown(code_line))));
        };
        let Some((value, end)) = self.line(value_start) else {
            let found = format!("group code {code} without a value");
            return Some(Err(bad(start, Bad::Cut, found)));
        };
        self.at = end;
        Some(Ok(Tag {
            code,
            value,
            start,
            end,
            value_start,
            kind: Kind::Text,
        }))
    }

    fn binary(&mut self, wide: bool) -> Option<Result<Tag<'a>, BadTag>> {
        let start = self.at;
        let rest = self.bytes.get(start..).filter(|rest| !rest.is_empty())?;
        let cut = || Some(Err(bad(start, Bad::Cut, "a tag cut short".to_owned())));
        let Some((code, head)) = binary_code(rest, wide) else {
            return cut();
        };
        let Some((kind, size)) = binary_size(code, wide) else {
            let found = format!("group code {code}, which binary DXF does not know");
            return Some(Err(bad(start, Bad::Code, found)));
        };
        let body = rest.get(head..).unwrap_or_default();
        let Some(value) = binary_value(kind, size, body) else {
            return cut();
        };
        let after = usize::from(kind == Kind::Text);
        let value_start = start + head + value.start;
        self.at = start + head + value.end + after;
        Some(Ok(Tag {
            code,
            value: body.get(value)?,
            start,
            end: self.at,
            value_start,
            kind,
        }))
    }

    /// Passes over tags for as long as they are soundly written and their codes of no use; where the last of them ends, if
    /// there is one.
    #[inline]
    pub(super) fn pass_over(&mut self, useless: impl Fn(i32) -> bool) -> Option<usize> {
        let mut last = None;
        while let Some(end) = self.end_of_useless(&useless).filter(|_| !self.done) {
            self.at = end;
            last = Some(end);
        }
        last
    }

    #[inline]
    fn end_of_useless(&self, useless: impl Fn(i32) -> bool) -> Option<usize> {
        let rest = self.bytes.get(self.at..)?;
        let (code, head) = match self.form {
            Form::Ascii => plain_code(rest)?,
            Form::Binary { wide } => binary_code(rest, wide)?,
        };
        if !useless(code) {
            return None;
        }
        let body = rest.get(head..)?;
        let length = match self.form {
            Form::Ascii => near(b'\n', body)? + 1,
            Form::Binary { wide } => {
                let (kind, size) = binary_size(code, wide)?;
                binary_value(kind, size, body)?.end + usize::from(kind == Kind::Text)
            }
        };
        Some(self.at + head + length)
    }
}

impl<'a> Iterator for Tags<'a> {
    type Item = Result<Tag<'a>, BadTag>;

    #[inline]
    fn next(&mut self) -> Option<Self::Item> {
        loop {
            if self.done {
                return None;
            }
            if self.form == Form::Ascii
                && let Some(tag) = self.plain()
            {
                if tag.code == 999 {
                    continue;
                }
                self.done = tag.begins(b"EOF");
                return Some(Ok(tag));
            }
            let next = match self.form {
                Form::Ascii => self.ascii(),
                Form::Binary { wide } => self.binary(wide),
            };
            match &next {
                Some(Ok(tag)) if tag.code == 999 => continue,
                Some(Ok(tag)) => self.done = tag.code == 0 && tag.begins(b"EOF"),
                Some(Err(bad)) if self.forgives && bad.kind == Bad::Code => {
                    if let Some(found) = resume(self.bytes, self.form, bad.at) {
                        self.at = found.at;
                        continue;
                    }
                    self.done = true;
                }
                Some(Err(_)) | None => self.done = true,
            }
            return next;
        }
    }
}

fn bad(at: usize, kind: Bad, found: String) -> BadTag {
    BadTag { at, kind, found }
}

/// Whether a record can have this name, which no number is.
#[inline]
pub(super) fn is_name(name: &[u8]) -> bool {
    match name.first() {
        Some(first) if first.is_ascii_alphabetic() => true,
        Some(_) => decimal(name).is_none(),
        None => false,
    }
}

/// The number of a code line without sign and without blanks behind it, and the line's length with its end.
#[inline]
fn plain_code(bytes: &[u8]) -> Option<(i32, usize)> {
    three_columns(bytes).or_else(|| few_digits(bytes))
}

/// A code in three columns, as most programs write it: without a branch, a digit is its own value and a blank 16.
#[inline]
fn three_columns(bytes: &[u8]) -> Option<(i32, usize)> {
    let &[hundreds, tens, ones, after, last] = bytes.first_chunk()?;
    let [hundreds, tens, ones] = [hundreds, tens, ones].map(|column| column ^ b'0');
    let blank = |column: u8| column == b' ' ^ b'0';
    let sound = (ones <= 9)
        & ((tens <= 9) | (blank(tens) & blank(hundreds)))
        & ((hundreds <= 9) | blank(hundreds));
    let ends = (after == b'\n') | ((after == b'\r') & (last == b'\n'));
    let worth = |column: u8, worth: i32| i32::from(column & 15) * worth;
    let code = worth(hundreds, 100) + worth(tens, 10) + worth(ones, 1);
    (sound & ends).then_some((code, if after == b'\n' { 4 } else { 5 }))
}

/// A code in any other width.
#[inline(never)]
fn few_digits(bytes: &[u8]) -> Option<(i32, usize)> {
    let blanks = bytes.iter().take_while(|b| **b == b' ').count();
    let mut code = 0;
    let digits = bytes.get(blanks..)?;
    for (index, &byte) in digits.iter().enumerate().take(6) {
        match byte {
            b'0'..=b'9' if index < 5 => code = 10 * code + i32::from(byte - b'0'),
            b'\n' if index > 0 => return Some((code, blanks + index + 1)),
            b'\r' if index > 0 && digits.get(index + 1) == Some(&b'\n') => {
                return Some((code, blanks + index + 2));
            }
            _ => return None,
        }
    }
    None
}

/// Where a byte is first found; it is looked for by eight bytes at a time, since it mostly stands near.
#[inline]
fn near(byte: u8, bytes: &[u8]) -> Option<usize> {
    const ONES: u64 = u64::MAX / 255;
    let wanted = ONES * u64::from(byte);
    let (eights, _) = bytes.as_chunks::<8>();
    for (index, eight) in eights.iter().take(4).enumerate() {
        // The lowest byte that is nought here is the first that is the wanted one.
        let unlike = u64::from_le_bytes(*eight) ^ wanted;
        let found = unlike.wrapping_sub(ONES) & !unlike & (ONES << 7);
        if found != 0 {
            return Some(8 * index + found.trailing_zeros() as usize / 8);
        }
    }
    let passed = 8 * eights.len().min(4);
    memchr(byte, bytes.get(passed..)?).map(|length| passed + length)
}

/// A code line's number; blanks and tabs around it are allowed.
#[inline]
fn code_of(line: &[u8]) -> Option<i32> {
    let word = line.trim_ascii();
    if word.is_empty() || word.len() > 6 {
        return None;
    }
    whole(word).and_then(|code| i32::try_from(code).ok())
}

/// A binary code, and how many bytes it takes.
#[inline]
fn binary_code(bytes: &[u8], wide: bool) -> Option<(i32, usize)> {
    match (wide, bytes) {
        (true, &[low, high, ..]) => Some((i16::from_le_bytes([low, high]).into(), 2)),
        (false, &[255, low, high, ..]) => Some((i16::from_le_bytes([low, high]).into(), 3)),
        (false, &[code, ..]) if code != 255 => Some((code.into(), 1)),
        _ => None,
    }
}

/// Where a binary value stands behind its code; a text has a byte behind it. `None` where the file ends before it does.
#[inline]
fn binary_value(kind: Kind, size: usize, body: &[u8]) -> Option<Range<usize>> {
    let value = match kind {
        Kind::Text => 0..near(0, body)?,
        Kind::Chunk => 1..1 + usize::from(*body.first()?),
        Kind::Float | Kind::Integer => 0..size,
    };
    (value.end <= body.len()).then_some(value)
}

/// What binary DXF holds under a code, and how many bytes where the code alone decides.
fn binary_size(code: i32, wide: bool) -> Option<(Kind, usize)> {
    Some(match code {
        0..=9
        | 100..=109
        | 300..=309
        | 320..=369
        | 390..=399
        | 410..=419
        | 430..=439
        | 470..=481
        | 999..=1003
        | 1005..=1009 => (Kind::Text, 0),
        10..=59 | 110..=149 | 210..=239 | 460..=469 | 1010..=1059 => (Kind::Float, 8),
        60..=79 | 170..=179 | 270..=289 | 370..=389 | 400..=409 | 1060..=1070 => (Kind::Integer, 2),
        90..=99 | 420..=429 | 440..=459 | 1071 => (Kind::Integer, 4),
        160..=169 => (Kind::Integer, 8),
        290..=299 => (Kind::Integer, if wide { 1 } else { 2 }),
        310..=319 | 1004 => (Kind::Chunk, 0),
        _ => return None,
    })
}

/// A strange line as it can be printed: quoted, control characters escaped, at most 40 bytes of it.
pub(super) fn shown(line: &[u8]) -> String {
    if line.trim_ascii().is_empty() {
        return "an empty line".to_owned();
    }
    let short = line.get(..40).unwrap_or(line);
    let mut text = format!("\"{}", short.escape_ascii());
    text.push_str(if short.len() < line.len() {
        "...\""
    } else {
        "\""
    });
    text
}

#[cfg(test)]
mod tests {
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
}
