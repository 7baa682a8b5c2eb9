//! What is usual on this drawing: how far off and how turned labels stand, learned from those that are beyond doubt.

use super::candidates::{Lie, TURNS};
use super::types::Run;

/// Bins of distance in text heights.
const BINS: usize = 24;
/// Width of a bin, text heights.
const BIN_H: f64 = 0.25;

/// How the labels of one run stand to their tendons.
#[derive(Debug, Clone)]
struct Habit {
    turns: [f64; TURNS],
    offs: [f64; BINS],
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
            offs: [0.25; BINS],
            gaps: [0.25; BINS],
        };
        let mut habits = Self {
            banded: empty.clone(),
            distributed: empty,
        };
        for (run, lie, weight) in taken {
            let habit = match run {
                Run::Banded => &mut habits.banded,
                Run::Distributed => &mut habits.distributed,
            };
            habit.turns[lie.turn] += weight;
            // A neighbour's bin counts half, so that the border between two bins is no cliff.
            spread(&mut habit.offs, bin(lie.off_h.abs()), weight);
            spread(&mut habit.gaps, gap_bin(lie.gap_h), weight);
        }
        habits
    }

    /// Cost of standing otherwise than usual.
    pub(super) fn cost(&self, run: Run, lie: &Lie) -> f64 {
        let habit = match run {
            Run::Banded => &self.banded,
            Run::Distributed => &self.distributed,
        };
        0.7 * rarity(&habit.turns, lie.turn).min(3.0)
            + 0.6 * rarity(&habit.offs, bin(lie.off_h.abs())).min(3.0)
            + 0.4 * rarity(&habit.gaps, gap_bin(lie.gap_h)).min(3.0)
    }
}

/// How much rarer than the most usual, as a logarithm.
fn rarity(counts: &[f64], bin: usize) -> f64 {
    let most = counts.iter().copied().fold(0.0, f64::max);
    let here = counts.get(bin).copied().unwrap_or(most);
    (most / here).ln()
}

fn spread(counts: &mut [f64; BINS], bin: usize, weight: f64) {
    counts[bin] += weight;
    // The first bin of gaps, a struck-through text, has no neighbours; nor need it have them among the distances.
    if bin > 1 {
        counts[bin - 1] += 0.5 * weight;
    }
    if bin > 0 && bin + 1 < BINS {
        counts[bin + 1] += 0.5 * weight;
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
