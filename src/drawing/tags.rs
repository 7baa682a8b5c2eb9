//! The tags of a DXF file, ASCII or binary: group code and value, with the bytes that each takes up.

mod ascii;
mod bad;
mod binary;
mod numbers;
mod sequence;
#[cfg(test)]
mod tests;

use std::ops::Range;

use numbers::{decimal, to_whole, whole};

pub(super) use ascii::code_of;
pub(super) use bad::{Bad, BadTag, place_in_words, shown};
pub(super) use numbers::is_name;
pub(super) use sequence::Tags;

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

const SIGNATURES: [&[u8]; 2] = [
    b"AutoCAD Binary DXF\r\n\x1a\0",
    b"AutoCAD Binary DXF\n\x1a\0",
];

/// A file's form, and the offset of its first tag.
pub(super) fn form_of(bytes: &[u8]) -> (Form, usize) {
    for signature in SIGNATURES {
        if bytes.starts_with(signature) {
            let first = signature.len();
            // The first group is 0, or a comment's 999, of which narrow codes make three bytes.
            let code = bytes.get(first..first + 2);
            let wide = matches!(code, Some([0, 0] | [0xE7, 0x03]));
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
