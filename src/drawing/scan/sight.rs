//! What is seen to be no drawing before any tag is read.

use super::Refusal;

/// Refuses what is no DXF at first sight.
pub(super) fn refuse_at_sight(bytes: &[u8]) -> Result<(), Refusal> {
    if bytes.iter().all(u8::is_ascii_whitespace) {
        return Err(Refusal::Empty);
    }
    let head = bytes.get(..32).unwrap_or(bytes);
    if head.starts_with(b"AC") && head.contains(&0) {
        let version = String::from_utf8_lossy(head.get(..6).unwrap_or(head)).into_owned();
        return Err(Refusal::Dwg { version });
    }
    let found = if head.starts_with(b"\xFF\xFE") || head.starts_with(b"\xFE\xFF") {
        "UTF-16 text"
    } else if head.contains(&b'\r') && memchr::memchr(b'\n', bytes).is_none() {
        "lines that end in a carriage return alone"
    } else {
        return Ok(());
    };
    Err(Refusal::NotDxf {
        found: found.into(),
    })
}
