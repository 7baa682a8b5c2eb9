//! Tags to bytes and back, in every form that DXF has; written for the tests, apart from the program's own.

/// A group code and its value.
pub(crate) type Tag = (i16, Value);

/// A value, as its group code types it.
#[derive(Debug, Clone, PartialEq)]
pub(crate) enum Value {
    /// Text or handle.
    Text(String),
    /// Two bytes.
    Short(i16),
    /// Four bytes.
    Long(i32),
    /// A real number.
    Real(f64),
}

/// A form of DXF.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum Coding {
    /// Two lines a tag.
    Ascii {
        /// Line end.
        line_end: &'static str,
        /// Width of the code's line.
        code_width: usize,
        /// Whether the last line of the file has its line end.
        last_line_end: bool,
    },
    /// Binary, with codes of two bytes or one.
    Binary {
        /// Two bytes.
        wide: bool,
    },
}

impl Coding {
    /// ASCII with all line ends.
    pub(crate) fn ascii(line_end: &'static str, code_width: usize) -> Self {
        Self::Ascii {
            line_end,
            code_width,
            last_line_end: true,
        }
    }
}

const SIGNATURE: &[u8] = b"AutoCAD Binary DXF\r\n\x1a\0";

/// The bytes of a file with these tags.
pub(crate) fn encode(tags: &[Tag], coding: Coding) -> Vec<u8> {
    let mut bytes = Vec::new();
    match coding {
        Coding::Ascii {
            line_end,
            code_width,
            last_line_end,
        } => {
            for (code, value) in tags {
                let value = match value {
                    Value::Text(text) => text.clone(),
                    Value::Short(number) => number.to_string(),
                    Value::Long(number) => number.to_string(),
                    Value::Real(number) => format!("{number:?}"),
                };
                let tag = format!("{code:>code_width$}{line_end}{value}{line_end}");
                bytes.extend(tag.as_bytes());
            }
            if !last_line_end {
                bytes.truncate(bytes.len() - line_end.len());
            }
        }
        Coding::Binary { wide } => {
            bytes.extend(SIGNATURE);
            for (code, value) in tags {
                match (wide, u8::try_from(*code)) {
                    (false, Ok(narrow)) => bytes.push(narrow),
                    (false, Err(_)) => {
                        bytes.push(255);
                        bytes.extend(code.to_le_bytes());
                    }
                    (true, _) => bytes.extend(code.to_le_bytes()),
                }
                match value {
                    Value::Text(text) => {
                        bytes.extend(text.as_bytes());
                        bytes.push(0);
                    }
                    Value::Short(number) => bytes.extend(number.to_le_bytes()),
                    Value::Long(number) => bytes.extend(number.to_le_bytes()),
                    Value::Real(number) => bytes.extend(number.to_le_bytes()),
                }
            }
        }
    }
    bytes
}

/// What a group code's value is.
fn kind(code: i16) -> Value {
    match code {
        10..=59 => Value::Real(0.0),
        60..=79 | 370..=379 => Value::Short(0),
        90..=99 | 420..=429 => Value::Long(0),
        _ => Value::Text(String::new()),
    }
}

/// The tags of a file; panics if it is not in this form throughout.
pub(crate) fn decode(bytes: &[u8], coding: Coding) -> Vec<Tag> {
    match coding {
        Coding::Ascii {
            line_end,
            code_width,
            ..
        } => decode_ascii(bytes, line_end, code_width),
        Coding::Binary { wide } => decode_binary(bytes, wide),
    }
}

fn decode_ascii(bytes: &[u8], line_end: &str, code_width: usize) -> Vec<Tag> {
    let text = std::str::from_utf8(bytes).expect("text");
    let ends = text.matches('\n').count();
    assert_eq!(text.matches(line_end).count(), ends, "mixed line ends");
    let mut lines = text.strip_suffix(line_end).unwrap_or(text).split(line_end);
    let mut tags = Vec::new();
    while let Some(code_line) = lines.next() {
        let code: i16 = code_line.trim().parse().expect("a group code");
        assert_eq!(code_line, format!("{code:>code_width$}"), "other padding");
        let value = lines.next().expect("a value");
        let value = match kind(code) {
            Value::Text(_) => Value::Text(value.to_owned()),
            Value::Short(_) => Value::Short(value.trim().parse().expect("a short number")),
            Value::Long(_) => Value::Long(value.trim().parse().expect("a long number")),
            Value::Real(_) => Value::Real(value.trim().parse().expect("a real number")),
        };
        tags.push((code, value));
    }
    tags
}

fn decode_binary(bytes: &[u8], wide: bool) -> Vec<Tag> {
    let mut rest = bytes.strip_prefix(SIGNATURE).expect("a signature");
    let mut take = |count: usize| {
        let (taken, left) = rest.split_at_checked(count)?;
        rest = left;
        Some(taken)
    };
    let mut tags = Vec::new();
    while let Some(first) = take(1) {
        let code = match (wide, first[0]) {
            (true, low) => i16::from_le_bytes([low, take(1).expect("a code")[0]]),
            (false, 255) => {
                i16::from_le_bytes(take(2).expect("a code").try_into().expect("two bytes"))
            }
            (false, narrow) => i16::from(narrow),
        };
        let value = match kind(code) {
            Value::Text(_) => {
                let mut text = Vec::new();
                loop {
                    match take(1).expect("a terminator")[0] {
                        0 => break,
                        letter => text.push(letter),
                    }
                }
                Value::Text(String::from_utf8(text).expect("text"))
            }
            Value::Short(_) => Value::Short(i16::from_le_bytes(
                take(2).expect("a value").try_into().expect("two bytes"),
            )),
            Value::Long(_) => Value::Long(i32::from_le_bytes(
                take(4).expect("a value").try_into().expect("four bytes"),
            )),
            Value::Real(_) => Value::Real(f64::from_le_bytes(
                take(8).expect("a value").try_into().expect("eight bytes"),
            )),
        };
        tags.push((code, value));
    }
    tags
}
