//! Places where the tags stop making sense, and how they are spoken of.

use memchr::memchr_iter;

use super::Form;

/// A place where the tags stop making sense.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(in crate::drawing) struct BadTag {
    /// Offset of the place.
    pub(in crate::drawing) at: usize,
    /// What is wrong there.
    pub(in crate::drawing) kind: Bad,
    /// What stands there.
    pub(in crate::drawing) found: String,
}

/// What is wrong with a tag.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(in crate::drawing) enum Bad {
    /// Something else stands where a group code is due.
    Code,
    /// The file ends inside a tag.
    Cut,
    /// A record with a number for its name: codes and values are out of step.
    Name,
    /// A section that begins inside another.
    Unclosed,
    /// More names than there is room for.
    Names,
}

impl BadTag {
    /// What was found and what was expected.
    pub(in crate::drawing) fn words(&self) -> String {
        let found = &self.found;
        match self.kind {
            Bad::Code => format!("found {found} where a group code was expected"),
            Bad::Name => format!("found {found} where a record's name was expected"),
            Bad::Cut => format!("the file ends inside {found}"),
            Bad::Names => {
                format!("{found} names of layers and types are more than there is room for")
            }
            Bad::Unclosed => "a new section starts although ENTITIES is not closed".to_owned(),
        }
    }
}

/// The number of the line that holds an offset, counted from 1.
fn line_at(bytes: &[u8], at: usize) -> usize {
    let before = bytes.get(..at).unwrap_or(bytes);
    memchr_iter(b'\n', before).count() + 1
}

/// A place in words: `line 12`, or `byte 300` in a binary file.
pub(in crate::drawing) fn place_in_words(bytes: &[u8], form: Form, at: usize) -> String {
    match form {
        Form::Ascii => format!("line {}", line_at(bytes, at)),
        Form::Binary { .. } => format!("byte {at}"),
    }
}

/// A strange line as it can be printed: quoted, control characters escaped, at most 40 bytes of it.
pub(in crate::drawing) fn shown(line: &[u8]) -> String {
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
