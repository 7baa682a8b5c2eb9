//! What is usual on this drawing: how far off and how turned labels stand, learned from those that are beyond doubt.

use super::candidates::{Lie, TURNS};
use super::types::Run;

/// Bins of distance in text heights, to one side.
const BINS: usize = 24;
/// Bins of distance to both sides.
const SIDES: usize = 2 * BINS;
/// Width of a bin, text heights.
const BIN_H: f64 = 0.25;

/// Most that habit may cost.
const MOST: f64 = 3.2;

/// How the labels of one run stand to their tendons.
#[derive(Debug, Clone)]
struct Habit {
    turns: [f64; TURNS],
    offs: [f64; SIDES],
    gaps: [f64; BINS],
}

/// Habits of both runs.
#[derive(Debug, Clone)]
pub(super) struct Habits {
    banded: Habit,
    distributed: Habit,
}

impl Habits {
    /// Learns from lies that were taken, each with its weight.
    pub(super) fn learn<'a>(taken: impl Iterator<Item = (Run, &'a Lie, f64)>) -> Self {
        let empty = Habit {
            turns: [0.5; TURNS],
            offs: [0.25; SIDES],
            gaps: [0.25; BINS],
        };
        let mut habits = Self {
            banded: empty.clone(),
            distributed: empty,
        };
        // A label that points may stand anywhere.
        for (run, lie, weight) in taken.filter(|(_, lie, _)| !lie.aimed) {
            let habit = match run {
                Run::Banded => &mut habits.banded,
                Run::Distributed => &mut habits.distributed,
            };
            habit.turns[lie.turn] += weight;
            // A neighbour's bin counts half, so that the border between two bins is no cliff.
            spread(&mut habit.offs, side_bin(lie.side_h), weight);
            spread(&mut habit.gaps, gap_bin(lie.gap_h), weight);
        }
        habits
    }

    /// Cost of standing otherwise than usual.
    pub(super) fn cost(&self, run: Run, lie: &Lie) -> f64 {
        if lie.aimed {
            return 0.0;
        }
        let habit = match run {
            Run::Banded => &self.banded,
            Run::Distributed => &self.distributed,
        };
        let strange = 0.7 * rarity(&habit.turns, lie.turn).min(3.0)
            + 0.6 * rarity(&habit.offs, side_bin(lie.side_h)).min(3.0)
            + 0.4 * rarity(&habit.gaps, gap_bin(lie.gap_h)).min(3.0);
        // However strangely a label stands, it belongs to the one tendon that lacks it rather than to nobody.
        strange.min(MOST)
    }
}

/// How much rarer than the most usual, as a logarithm.
fn rarity(counts: &[f64], bin: usize) -> f64 {
    let most = counts.iter().copied().fold(0.0, f64::max);
    let here = counts.get(bin).copied().unwrap_or(most);
    (most / here).ln()
}

fn spread(counts: &mut [f64], bin: usize, weight: f64) {
    counts[bin] += weight;
    // The first bin of gaps, a struck-through text, has no neighbours; nor need it have them among the distances.
    if bin > 1 {
        counts[bin - 1] += 0.5 * weight;
    }
    if bin > 0 && bin + 1 < counts.len() {
        counts[bin + 1] += 0.5 * weight;
    }
}

/// Bins from the right of the axis to the left.
fn side_bin(side_h: f64) -> usize {
    let away = bin(side_h.abs());
    if side_h < 0.0 {
        BINS - 1 - away
    } else {
        BINS + away
    }
}

fn bin(distance_h: f64) -> usize {
    #[expect(
        clippy::cast_possible_truncation,
        clippy::cast_sign_loss,
        reason = "clamped to the bins"
    )]
    let bin = (distance_h / BIN_H).clamp(0.0, 23.0) as usize;
    bin.min(BINS - 1)
}

/// A text that its line strikes through is a case of its own.
fn gap_bin(gap_h: f64) -> usize {
    if gap_h <= 0.0 {
        0
    } else {
        (bin(gap_h) + 1).min(BINS - 1)
    }
}
