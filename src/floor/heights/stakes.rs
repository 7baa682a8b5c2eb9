//! What a tendon's heights cost together.

use super::Height;
use crate::floor::settle::Stakes;

/// Two heights nearer than this are at one place, metres and text heights.
pub(in crate::floor) const SAME_PLACE_M: f64 = 0.5;
/// Supports stand nearer to one another than this, metres (common practice: 0.8 to 1.2 m).
pub(in crate::floor) const SUPPORTS_M: f64 = 2.5;
/// Steeper than this no strand runs between two heights, metre per metre.
pub(in crate::floor) const STEEP: f64 = 0.08;

/// Costs of height labels.
pub(super) struct HeightStakes {
    pub(super) own: Vec<f64>,
    /// By pairing, the height that it stands for.
    pub(super) told: Vec<Height>,
    /// Heights from level lines, by line, in order of station.
    pub(super) fixed: Vec<Vec<Height>>,
}

impl Stakes for HeightStakes {
    fn own(&self, pairing: usize) -> f64 {
        self.own[pairing]
    }

    fn shared(&self, host: usize, pairings: impl Iterator<Item = usize> + Clone) -> f64 {
        let fixed = &self.fixed[host];
        let told = pairings.map(|pairing| &self.told[pairing]);
        if !fixed.is_empty() {
            return sequence(Merged {
                told: told.peekable(),
                fixed,
            });
        }
        if told.clone().next().is_none() {
            return 1.0;
        }
        sequence(told)
    }

    fn apart_m(&self) -> f64 {
        SUPPORTS_M
    }
}

/// Heights of labels and of level lines in order of station; of two at one station, the label's goes first.
#[derive(Clone)]
struct Merged<'a, I: Iterator<Item = &'a Height>> {
    told: std::iter::Peekable<I>,
    fixed: &'a [Height],
}

impl<'a, I: Iterator<Item = &'a Height>> Iterator for Merged<'a, I> {
    type Item = &'a Height;

    fn next(&mut self) -> Option<&'a Height> {
        let Some((fixed, rest)) = self.fixed.split_first() else {
            return self.told.next();
        };
        let not_behind = |told: &&Height| told.station_m.total_cmp(&fixed.station_m).is_le();
        self.told.next_if(not_behind).or_else(|| {
            self.fixed = rest;
            Some(fixed)
        })
    }
}

/// Cost of a tendon's heights together, given in order of station.
fn sequence<'a>(heights: impl Iterator<Item = &'a Height> + Clone) -> f64 {
    let mut cost = 0.0;
    let mut before: Option<&Height> = None;
    for height in heights.clone() {
        if let Some(before) = before {
            cost += neighbours(before, height) + bare(before, height);
        }
        before = Some(height);
    }
    // Two of a kind in a row; numbers without a word between them may be the missing other kind.
    let mut last: Option<&Height> = None;
    let mut between: Option<f64> = None;
    for height in heights {
        let Some(word) = height.reading.word.filter(|_| !height.at_end) else {
            if !height.at_end {
                between = Some(height.reading.value_m);
            }
            continue;
        };
        // A label beside a level line speaks of the line's place: one point told twice, not two in a row.
        let retold = |before: &Height| {
            let one_label = before.label.is_some() != height.label.is_some();
            one_label && height.station_m - before.station_m < SAME_PLACE_M
        };
        if let Some(before) =
            last.filter(|before| before.reading.word == Some(word) && !retold(before))
        {
            let gap_m = height.station_m - before.station_m;
            let (low_m, high_m) = (
                before.reading.value_m.min(height.reading.value_m),
                before.reading.value_m.max(height.reading.value_m),
            );
            let relieved = between.is_some_and(|value_m| value_m < low_m || value_m > high_m);
            cost += if relieved {
                0.3
            } else {
                2.0 + 3.0 * (-gap_m / 2.5).exp()
            };
        }
        last = Some(height);
        between = None;
    }
    cost
}

/// Cost of two bare numbers that follow one another on the same side of mid-depth, farther apart than supports stand:
/// a tendon that spans has its other kind between them.
fn bare(a: &Height, b: &Height) -> f64 {
    let bare = |height: &Height| height.reading.word.is_none() && !height.at_end;
    let alike = a.reading.likely.is_some() && a.reading.likely == b.reading.likely;
    if bare(a) && bare(b) && alike && b.station_m - a.station_m > SUPPORTS_M {
        2.0
    } else {
        0.0
    }
}

/// Cost of two heights that follow one another.
fn neighbours(a: &Height, b: &Height) -> f64 {
    let gap_m = b.station_m - a.station_m;
    let rise_m = (b.reading.value_m - a.reading.value_m).abs();
    if gap_m < SAME_PLACE_M {
        return match (a.label, b.label) {
            (None, None) => 0.0,
            (Some(_), Some(_)) => 8.0 - 4.0 * (gap_m / SAME_PLACE_M),
            _ if rise_m < 0.0005 => 0.5,
            _ => 3.0,
        };
    }
    (30.0 * (rise_m / gap_m - STEEP)).clamp(0.0, 4.0)
}
