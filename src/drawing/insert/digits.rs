//! Numbers in digits, without the general machinery of formatting: nearly all that is written are numbers.

/// A number's digits.
pub(super) struct Digits {
    room: [u8; 24],
    first: usize,
}

impl Digits {
    /// A whole number.
    pub(super) fn whole(value: i32) -> Self {
        let mut digits = Self::none();
        digits.put(value.unsigned_abs().into(), 10, 1);
        digits.sign(value < 0);
        digits
    }

    /// A whole number, upper-case hexadecimal.
    pub(super) fn hexadecimal(value: u64) -> Self {
        let mut digits = Self::none();
        digits.put(value, 16, 1);
        digits
    }

    /// A number that is one of whole millionths, with a decimal at least and as few as say it; `None` for any other. Below
    /// 1e15 millionths no shorter text reads back the same.
    pub(super) fn millionths(value: f64) -> Option<Self> {
        let scaled = (value * 1e6).round();
        #[expect(
            clippy::float_cmp,
            reason = "the text must read back as the very number"
        )]
        let exact = scaled.abs() < 1e15 && scaled / 1e6 == value;
        if !exact {
            return None;
        }
        #[expect(
            clippy::cast_possible_truncation,
            clippy::cast_sign_loss,
            reason = "whole, and below 1e15"
        )]
        let scaled = scaled.abs() as u64;
        let (mut part, mut places) = (scaled % 1_000_000, 6);
        while places > 1 && part % 10 == 0 {
            part /= 10;
            places -= 1;
        }
        let mut digits = Self::none();
        digits.put(part, 10, places);
        digits.push(b'.');
        digits.put(scaled / 1_000_000, 10, 1);
        digits.sign(value < 0.0);
        Some(digits)
    }

    /// The digits as they are written.
    pub(super) fn shown(&self) -> &[u8] {
        self.room.get(self.first..).unwrap_or_default()
    }

    fn none() -> Self {
        Self {
            room: [0; 24],
            first: 24,
        }
    }

    /// A number's digits before those that are there, at least so many.
    fn put(&mut self, mut value: u64, base: u64, at_least: usize) {
        let last = self.first;
        while value > 0 || last - self.first < at_least {
            let digit = u8::try_from(value % base).unwrap_or(0);
            self.push(if digit < 10 {
                b'0' + digit
            } else {
                b'A' + digit - 10
            });
            value /= base;
        }
    }

    fn sign(&mut self, negative: bool) {
        if negative {
            self.push(b'-');
        }
    }

    fn push(&mut self, byte: u8) {
        if let Some(first) = self.first.checked_sub(1)
            && let Some(place) = self.room.get_mut(first)
        {
            *place = byte;
            self.first = first;
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn millionths(value: f64) -> Option<String> {
        let digits = Digits::millionths(value)?;
        Some(String::from_utf8_lossy(digits.shown()).into_owned())
    }

    #[test]
    fn millionths_read_as_the_general_way_writes_them() {
        let steps = (0_i64..2_000).map(|n| n * n * n * 7919 % 900_000_000_000_007 - 400_000_000);
        for step in steps.chain([0, 1, -1, 999_999, 1_000_000, 999_999_999_999_999]) {
            #[expect(clippy::cast_precision_loss, reason = "below 2^53")]
            let value = step as f64 / 1e6;
            let point = if value.fract() == 0.0 { ".0" } else { "" };
            assert_eq!(millionths(value), Some(format!("{value}{point}")));
        }
    }

    #[test]
    fn other_numbers_are_left_to_the_general_way() {
        for value in [1e-7, 1.0 / 3.0, 1e15, f64::MAX, 0.1 + 0.2] {
            assert_eq!(millionths(value), None, "{value}");
        }
    }

    #[test]
    fn whole_numbers_have_their_sign_and_hexadecimal_its_letters() {
        for value in [0, 7, -30, i32::MAX, i32::MIN] {
            assert_eq!(Digits::whole(value).shown(), value.to_string().as_bytes());
        }
        for value in [0, 9, 10, 0xABC, u64::MAX] {
            let text = format!("{value:X}");
            assert_eq!(Digits::hexadecimal(value).shown(), text.as_bytes());
        }
    }
}
