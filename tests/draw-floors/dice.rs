//! A stream of repeatable chances (`SplitMix64`, published by Steele, Lea and Flood, OOPSLA 2014).

/// Same seed, same stream, on every machine.
pub(crate) struct Dice(pub(crate) u64);

impl Dice {
    fn next(&mut self) -> u64 {
        self.0 = self.0.wrapping_add(0x9E37_79B9_7F4A_7C15);
        let mut mixed = self.0;
        mixed = (mixed ^ (mixed >> 30)).wrapping_mul(0xBF58_476D_1CE4_E5B9);
        mixed = (mixed ^ (mixed >> 27)).wrapping_mul(0x94D0_49BB_1331_11EB);
        mixed ^ (mixed >> 31)
    }

    /// A whole number from 0 to `sides - 1`.
    pub(crate) fn below(&mut self, sides: u32) -> u32 {
        u32::try_from(self.next() % u64::from(sides.max(1))).unwrap_or(0)
    }

    /// A number from `low` up to `high`, in thousandths of the way.
    pub(crate) fn between(&mut self, low: f64, high: f64) -> f64 {
        low + (high - low) * f64::from(self.below(1000)) / 1000.0
    }

    /// True once in `sides`.
    pub(crate) fn once_in(&mut self, sides: u32) -> bool {
        self.below(sides) == 0
    }

    /// Fisher and Yates' shuffle.
    pub(crate) fn shuffle<T>(&mut self, items: &mut [T]) {
        for last in (1..items.len()).rev() {
            let sides = u32::try_from(last + 1).unwrap_or(u32::MAX);
            items.swap(last, self.below(sides) as usize);
        }
    }
}
