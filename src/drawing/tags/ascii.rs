//! Lines: two of them are a tag.

use memchr::memchr;

use super::numbers::whole;

/// The number of a code line without sign and without blanks behind it, and the line's length with its end.
#[inline]
pub(super) fn plain_code(bytes: &[u8]) -> Option<(i32, usize)> {
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
    let ends = after == b'\n' || (after == b'\r' && last == b'\n');
    let worth = |column: u8, worth: i32| i32::from(column & 15) * worth;
    let code = worth(hundreds, 100) + worth(tens, 10) + worth(ones, 1);
    (sound && ends).then_some((code, if after == b'\n' { 4 } else { 5 }))
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
pub(super) fn near(byte: u8, bytes: &[u8]) -> Option<usize> {
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
pub(in crate::drawing) fn code_of(line: &[u8]) -> Option<i32> {
    let word = line.trim_ascii();
    if word.is_empty() || word.len() > 6 {
        return None;
    }
    whole(word).and_then(|code| i32::try_from(code).ok())
}
