//! How many bytes a binary tag takes, and where its value stands.

use std::ops::Range;

use super::Kind;
use super::ascii::near;

/// A binary code, and how many bytes it takes.
#[inline]
pub(super) fn binary_code(bytes: &[u8], wide: bool) -> Option<(i32, usize)> {
    match (wide, bytes) {
        (true, &[low, high, ..]) => Some((i16::from_le_bytes([low, high]).into(), 2)),
        (false, &[255, low, high, ..]) => Some((i16::from_le_bytes([low, high]).into(), 3)),
        (false, &[code, ..]) if code != 255 => Some((code.into(), 1)),
        _ => None,
    }
}

/// Where a binary value stands behind its code; a text has a byte behind it. `None` where the file ends before it does.
#[inline]
pub(super) fn binary_value(kind: Kind, size: usize, body: &[u8]) -> Option<Range<usize>> {
    let value = match kind {
        Kind::Text => 0..near(0, body)?,
        Kind::Chunk => 1..1 + usize::from(*body.first()?),
        Kind::Float | Kind::Integer => 0..size,
    };
    (value.end <= body.len()).then_some(value)
}

/// What binary DXF holds under a code, and how many bytes where the code alone decides.
pub(super) fn binary_size(code: i32, wide: bool) -> Option<(Kind, usize)> {
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
