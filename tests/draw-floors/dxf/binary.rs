//! The same drawing in binary form, as R13 and later write it: two bytes a code, numbers as the machine holds them.

use super::records::pairs;

/// A drawing's text in binary form; a value that is no number where one is due becomes zero.
pub(crate) fn binary(text: &str) -> Vec<u8> {
    let mut bytes = b"AutoCAD Binary DXF\r\n\x1a\0".to_vec();
    for (code, value) in pairs(text) {
        bytes.extend(code.to_le_bytes());
        put(&mut bytes, code, value);
    }
    bytes
}

/// Kinds of value by code as the DXF reference lists them.
fn put(bytes: &mut Vec<u8>, code: u16, value: &str) {
    let whole = || {
        value
            .trim()
            .parse::<i64>()
            .unwrap_or_default()
            .to_le_bytes()
    };
    match code {
        10..=59 | 110..=149 | 210..=239 | 460..=469 | 1010..=1059 => {
            bytes.extend(
                value
                    .trim()
                    .parse::<f64>()
                    .unwrap_or_default()
                    .to_le_bytes(),
            );
        }
        60..=79 | 170..=179 | 270..=289 | 370..=389 | 400..=409 | 1060..=1070 => {
            bytes.extend(&whole()[..2]);
        }
        90..=99 | 420..=429 | 440..=459 | 1071 => bytes.extend(&whole()[..4]),
        160..=169 => bytes.extend(&whole()[..8]),
        290..=299 => bytes.extend(&whole()[..1]),
        _ => {
            bytes.extend(value.bytes());
            bytes.push(0);
        }
    }
}
