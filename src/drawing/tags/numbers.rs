//! Numbers in words.

/// A plain decimal number; words such as `nan` and numbers too large for 64 bits do not count.
pub(super) fn decimal(word: &[u8]) -> Option<f64> {
    let plain = word
        .iter()
        .all(|b| matches!(b, b'0'..=b'9' | b'+' | b'-' | b'.' | b'e' | b'E'));
    if !plain {
        return None;
    }
    let number: f64 = std::str::from_utf8(word).ok()?.parse().ok()?;
    number.is_finite().then_some(number)
}

pub(super) fn to_whole(number: f64) -> Option<i64> {
    #[expect(
        clippy::cast_possible_truncation,
        reason = "held to the range of exact whole numbers"
    )]
    (number.fract() == 0.0 && number.abs() < 9e15).then_some(number as i64)
}

/// A whole number of at most 18 digits.
pub(super) fn whole(word: &[u8]) -> Option<i64> {
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

/// Whether a record can have this name, which no number is.
#[inline]
pub(in crate::drawing) fn is_name(name: &[u8]) -> bool {
    match name.first() {
        Some(first) if first.is_ascii_alphabetic() => true,
        Some(_) => decimal(name).is_none(),
        None => false,
    }
}
