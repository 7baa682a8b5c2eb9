//! Numbers in digits, without the general machinery of formatting: nearly all that is written are numbers.

/// A number's digits, with what stands behind them.
pub(super) struct Digits {
    room: [u8; 32],
    first: usize,
}

impl Digits {
    /// Blanks and digits that there is room for.
    pub(super) const WIDEST: usize = 24;

    /// No digits yet, only the few bytes that stand behind them.
    pub(super) fn before(behind: &str) -> Self {
        let mut digits = Self {
            room: [b' '; 32],
            first: 32,
        };
        for byte in behind.bytes().rev() {
            digits.push(byte);
        }
        digits
    }

    /// A whole number, blanks before it up to a width.
    pub(super) fn whole(mut self, value: i32, width: usize) -> Self {
        let last = self.first;
        self.put::<10>(value.unsigned_abs().into(), 1);
        self.sign(value < 0);
        // The room is blank to begin with.
        self.first = self.first.min(last.saturating_sub(width));
        self
    }

    /// A whole number, upper-case hexadecimal.
    pub(super) fn hexadecimal(mut self, value: u64) -> Self {
        self.put::<16>(value, 1);
        self
    }

    /// A number that is one of whole millionths, with a decimal at least and as few as say it; `None` for any other. Below
    /// 1e15 millionths no shorter text reads back the same.
    pub(super) fn millionths(mut self, value: f64) -> Option<Self> {
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
        if part == 0 {
            places = 1;
        }
        while places > 1 && part.is_multiple_of(10) {
            part /= 10;
            places -= 1;
        }
        self.put::<10>(part, places);
        self.push(b'.');
        self.put::<10>(scaled / 1_000_000, 1);
        self.sign(value < 0.0);
        Some(self)
    }

    /// The digits as they are written.
    pub(super) fn shown(&self) -> &[u8] {
        self.room.get(self.first..).unwrap_or_default()
    }

    /// A number's digits before what is there, at least so many.
    fn put<const BASE: u64>(&mut self, mut value: u64, at_least: usize) {
        let last = self.first;
        while value > 0 || last - self.first < at_least {
            let digit = u8::try_from(value % BASE).unwrap_or(0);
            self.push(if digit < 10 {
                b'0' + digit
            } else {
                b'A' + digit - 10
            });
            value /= BASE;
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
        let digits = Digits::before("").millionths(value)?;
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
            assert_eq!(
                Digits::before("").whole(value, 0).shown(),
                value.to_string().as_bytes()
            );
        }
        let padded = Digits::before("\r\n").whole(-3, 6);
        assert_eq!(padded.shown(), b"    -3\r\n");
        for value in [0, 9, 10, 0xABC, u64::MAX] {
            let text = format!("{value:X}");
            assert_eq!(
                Digits::before("").hexadecimal(value).shown(),
                text.as_bytes()
            );
        }
    }
}
