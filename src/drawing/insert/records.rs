//! Tags out: the way a record is written in the form that the drawing itself has.

use std::io::Write as _;

use super::digits::Digits;
use crate::drawing::tags::Form;

/// The steps between DXF versions at which a record's shape changes.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub(super) enum Edition {
    /// R12 and older, and drawings that name no version.
    R12,
    /// Subclass markers.
    R13,
    /// LWPOLYLINE.
    R14,
    /// Owners, plot styles.
    R2000,
    /// True colour.
    R2004,
    /// UTF-8; materials.
    R2007,
    /// Visual styles of layers.
    R2013,
}

impl Edition {
    /// The edition of a release's number; 0 counts as R12.
    pub(super) fn of(release: u32) -> Self {
        match release {
            ..1012 => Self::R12,
            1012..1014 => Self::R13,
            1014..1015 => Self::R14,
            1015..1018 => Self::R2000,
            1018..1021 => Self::R2004,
            1021..1027 => Self::R2007,
            1027.. => Self::R2013,
        }
    }
}

/// How the drawing writes its tags.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Style {
    /// ASCII or binary.
    pub(super) form: Form,
    /// Line end of ASCII files.
    pub(super) line_end: &'static str,
    /// Width that ASCII group codes are padded to with blanks.
    pub(super) code_width: usize,
    /// Which records and tags there are.
    pub(super) edition: Edition,
}

/// Tags, growing in the drawing's own style.
#[derive(Debug, Clone)]
pub(super) struct Records {
    /// The style.
    pub(super) style: Style,
    bytes: Vec<u8>,
}

impl Records {
    /// No tags yet.
    pub(super) fn new(style: Style) -> Self {
        Self {
            style,
            bytes: Vec::new(),
        }
    }

    /// What was written.
    pub(super) fn into_bytes(self) -> Vec<u8> {
        self.bytes
    }

    /// Whether nothing was written yet.
    pub(super) fn is_empty(&self) -> bool {
        self.bytes.is_empty()
    }

    /// All that was written elsewhere in the same style.
    pub(super) fn append(&mut self, others: &Self) {
        self.bytes.extend_from_slice(&others.bytes);
    }

    /// A tag whose value is text: no line breaks, no control characters.
    pub(super) fn text(&mut self, code: i16, value: &str) {
        self.code(code);
        self.bytes.extend_from_slice(value.as_bytes());
        self.end_text();
    }

    /// A handle or a pointer to one; nothing where there is none.
    pub(super) fn handle(&mut self, code: i16, handle: Option<u64>) {
        if let Some(handle) = handle {
            self.code(code);
            let digits = Digits::before(self.behind()).hexadecimal(handle);
            self.bytes.extend_from_slice(digits.shown());
        }
    }

    /// A short whole number (codes 60-79, 170-179, 370-379).
    pub(super) fn short(&mut self, code: i16, value: i16) {
        self.code(code);
        match self.style.form {
            Form::Ascii => self.whole(value.into(), 6),
            Form::Binary { .. } => self.bytes.extend_from_slice(&value.to_le_bytes()),
        }
    }

    /// A long whole number (codes 90-99, 420-429).
    pub(super) fn long(&mut self, code: i16, value: i32) {
        self.code(code);
        match self.style.form {
            Form::Ascii => self.whole(value, 9),
            Form::Binary { .. } => self.bytes.extend_from_slice(&value.to_le_bytes()),
        }
    }

    /// A whole number as text, padded to a width.
    fn whole(&mut self, value: i32, width: usize) {
        let room = width.min(Digits::WIDEST);
        self.bytes.extend(std::iter::repeat_n(b' ', width - room));
        let digits = Digits::before(self.behind()).whole(value, room);
        self.bytes.extend_from_slice(digits.shown());
    }

    /// A real number (codes 10-59), which the caller has rounded; in ASCII the shortest text that reads back the same.
    pub(super) fn real(&mut self, code: i16, value: f64) {
        // Adding zero turns -0.0 into 0.0.
        let value = value + 0.0;
        self.code(code);
        match self.style.form {
            Form::Ascii => {
                if let Some(digits) = Digits::before(self.behind()).millionths(value) {
                    self.bytes.extend_from_slice(digits.shown());
                    return;
                }
                let point = if value.fract() == 0.0 { ".0" } else { "" };
                // Writing into memory cannot fail.
                let _ = write!(self.bytes, "{value}{point}{}", self.style.line_end);
            }
            Form::Binary { .. } => self.bytes.extend_from_slice(&value.to_le_bytes()),
        }
    }

    fn code(&mut self, code: i16) {
        match self.style.form {
            Form::Ascii => self.whole(code.into(), self.style.code_width),
            Form::Binary { wide: true } => self.bytes.extend_from_slice(&code.to_le_bytes()),
            Form::Binary { wide: false } => match u8::try_from(code) {
                Ok(narrow) if narrow < 255 => self.bytes.push(narrow),
                _ => {
                    self.bytes.push(255);
                    self.bytes.extend_from_slice(&code.to_le_bytes());
                }
            },
        }
    }

    fn end_text(&mut self) {
        let behind = self.behind();
        self.bytes.extend_from_slice(behind.as_bytes());
    }

    /// What stands behind a text.
    fn behind(&self) -> &'static str {
        match self.style.form {
            Form::Ascii => self.style.line_end,
            Form::Binary { .. } => "\0",
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::drawing::release;

    const ASCII: Style = Style {
        form: Form::Ascii,
        line_end: "\r\n",
        code_width: 3,
        edition: Edition::R2000,
    };

    #[test]
    fn every_known_version_has_its_edition() {
        for (version, edition) in [
            ("", Edition::R12),
            ("AC1009", Edition::R12),
            ("AC2.10", Edition::R12),
            ("AC1012", Edition::R13),
            ("AC1014", Edition::R14),
            ("AC1015", Edition::R2000),
            (" AC1018 ", Edition::R2004),
            ("AC1021", Edition::R2007),
            ("AC1024", Edition::R2007),
            ("AC1027", Edition::R2013),
            ("AC1032", Edition::R2013),
            ("AC1099", Edition::R2013),
        ] {
            assert_eq!(Edition::of(release::number(version)), edition, "{version}");
        }
    }

    #[test]
    fn ascii_tags_take_the_drawings_padding_and_line_end() {
        let mut records = Records::new(ASCII);
        records.text(0, "LINE");
        records.handle(5, Some(0x2AF));
        records.handle(330, None);
        records.short(62, -3);
        records.real(10, 0.1);
        records.real(20, 12000.0);
        records.real(30, -0.0);
        let expected = "  0\r\nLINE\r\n  5\r\n2AF\r\n 62\r\n    -3\r\n 10\r\n0.1\r\n 20\r\n12000.0\r\n 30\r\n0.0\r\n";
        assert_eq!(String::from_utf8_lossy(&records.into_bytes()), expected);
    }

    #[test]
    fn small_and_large_numbers_have_no_exponent() {
        let mut records = Records::new(Style {
            code_width: 0,
            line_end: "\n",
            ..ASCII
        });
        records.real(40, 0.000_001);
        records.real(40, 1e20);
        let text = String::from_utf8(records.into_bytes()).expect("text");
        assert_eq!(text, "40\n0.000001\n40\n100000000000000000000.0\n");
    }

    #[test]
    fn binary_codes_take_one_byte_or_two_as_the_drawings_do() {
        for (wide, expected) in [
            (true, &b"\0\0A\0\x3E\0\x07\0\xA4\x01\x01\0\0\0"[..]),
            (false, &b"\0A\0\x3E\x07\0\xFF\xA4\x01\x01\0\0\0"[..]),
        ] {
            let mut records = Records::new(Style {
                form: Form::Binary { wide },
                ..ASCII
            });
            records.text(0, "A");
            records.short(62, 7);
            records.long(420, 1);
            assert_eq!(records.into_bytes(), expected);
        }
    }
}
