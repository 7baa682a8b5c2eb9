//! Height labels settled on their tendons: what a pairing costs, round after round, as more is known of the floor.

mod cost;
mod doubts;
mod stakes;
mod ties;

use std::collections::BTreeSet;

use self::cost::{Known, cost, sides};
use self::doubts::doubts;
use self::stakes::HeightStakes;
pub(super) use self::stakes::{SAME_PLACE_M, STEEP, SUPPORTS_M};
use self::ties::{Texts, tied};
use super::candidates::Lie;
use super::contradicted::{self, Contradiction};
use super::even::even;
use super::habits::Habits;
use super::lines::Line;
use super::readings::HeightText;
use super::settle::{Pairing, Settlement};

/// A height that a tendon has at a station, from a label or a level line.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Height {
    pub(super) station_m: f64,
    pub(super) at_end: bool,
    pub(super) reading: HeightText,
    /// The label that gives it; `None` for a level line.
    pub(super) label: Option<usize>,
}

/// A label that fits elsewhere about as well.
#[derive(Debug, Clone)]
pub(super) struct Doubt {
    pub(super) label: usize,
    /// Where it went, and where it might have gone.
    pub(super) hosts: [usize; 2],
    pub(super) stations_m: [f64; 2],
    /// Whether nothing at all tells the two apart.
    pub(super) tied: bool,
}

/// Labels settled.
pub(super) struct Settled {
    /// Heights of each tendon, in order of station.
    pub(super) of_line: Vec<Vec<Height>>,
    /// Labels that went to nobody.
    pub(super) unclaimed: Vec<usize>,
    pub(super) doubts: Vec<Doubt>,
    /// Labels that contradict one that their tendon has at the same place.
    pub(super) contradicted: Vec<Contradiction>,
}

/// Rounds of settling and learning.
const ROUNDS: usize = 6;

/// A text without a word whose edge is this near to an end, in text heights, speaks of the anchor; mid-depth from
/// farther in, since it is said of hardly any other point.
const EDGE: f64 = 1.0;
const EDGE_OF_MIDDLE: f64 = 3.0;

/// Counts labels to anchors that are written from within towards an end, wherever their first letter stands. A label with
/// a word speaks of its own place.
pub(super) fn written_to_ends(lies: &mut [Lie], readings: &[HeightText]) {
    for lie in lies {
        let Some(reading) = readings.get(lie.pairing.label) else {
            continue;
        };
        let near = if reading.middle { EDGE_OF_MIDDLE } else { EDGE };
        lie.at_end |= reading.word.is_none() && lie.edge_h <= near;
    }
}

/// Settles labels; `fixed` are heights from level lines, by line.
pub(super) fn settle(
    readings: &[HeightText],
    lies: &[Lie],
    lines: &[Line],
    fixed: &[Vec<Height>],
) -> Settled {
    let pairings: Vec<Pairing> = lies.iter().map(|lie| lie.pairing).collect();
    let mut taken: Vec<Option<usize>> = vec![None; readings.len()];
    let even = even(lies, lines);
    let mut known = None;
    let mut stakes = HeightStakes {
        own: Vec::new(),
        told: lies.iter().map(|lie| told(lie, readings)).collect(),
        fixed: in_order(fixed),
    };
    for _ in 0..ROUNDS {
        let floor = Known {
            heights: by_line(readings, lies, lines.len(), fixed, &taken),
            sides: sides(lies, lines.len(), &taken, &even),
            habits: known.as_ref(),
        };
        let own = lies.iter().map(|lie| cost(readings, lie, lines, &floor));
        stakes.own = own.collect();
        let mut settlement =
            Settlement::new(&pairings, readings.len(), lines.len(), &stakes, &taken);
        let next = settlement.settle();
        let steady = next == taken && known.is_some();
        taken = next;
        known = Some(learn(lies, lines, &taken, &even, readings.len()));
        if steady {
            break;
        }
    }
    let mut settlement = Settlement::new(&pairings, readings.len(), lines.len(), &stakes, &taken);
    let mut doubts = doubts(&mut settlement, readings, lies);
    let floor = Known {
        heights: by_line(readings, lies, lines.len(), fixed, &taken),
        sides: sides(lies, lines.len(), &taken, &even),
        habits: known.as_ref(),
    };
    let texts = Texts {
        readings,
        lies,
        lines,
        fixed,
    };
    let tied = tied(floor, &texts, &taken, &even, &stakes);
    let of_tie: BTreeSet<usize> = tied
        .iter()
        .map(|&(now, _)| lies[now].pairing.label)
        .collect();
    doubts.retain(|doubt| !of_tie.contains(&doubt.label));
    doubts.extend(tied.iter().map(|&(now, other)| Doubt {
        label: lies[now].pairing.label,
        hosts: [now, other].map(|pairing| lies[pairing].pairing.host),
        stations_m: [now, other].map(|pairing| lies[pairing].pairing.station_m),
        tied: true,
    }));
    doubts.sort_by_key(|doubt| doubt.label);
    for doubt in doubts.iter().filter(|doubt| doubt.tied) {
        settlement.release(doubt.label);
    }
    let taken = settlement.taken();
    let mut settled = Settled {
        of_line: by_line(readings, lies, lines.len(), fixed, taken),
        unclaimed: (0..readings.len())
            .filter(|&label| taken[label].is_none())
            .filter(|&label| !doubts.iter().any(|d| d.label == label))
            .collect(),
        doubts,
        contradicted: Vec::new(),
    };
    contradicted::heights(&mut settled, readings, lies, &stakes.own);
    settled
}

/// The height that a label gives if it belongs to this tendon.
fn told(lie: &Lie, readings: &[HeightText]) -> Height {
    Height {
        station_m: lie.pairing.station_m,
        at_end: lie.at_end,
        reading: readings[lie.pairing.label],
        label: Some(lie.pairing.label),
    }
}

/// Heights of each line in order of station.
fn in_order(heights: &[Vec<Height>]) -> Vec<Vec<Height>> {
    let mut ordered = heights.to_vec();
    for heights in &mut ordered {
        heights.sort_by(|a, b| a.station_m.total_cmp(&b.station_m));
    }
    ordered
}

/// Heights by line, in order of station.
fn by_line(
    readings: &[HeightText],
    lies: &[Lie],
    lines: usize,
    fixed: &[Vec<Height>],
    taken: &[Option<usize>],
) -> Vec<Vec<Height>> {
    let mut of_line: Vec<Vec<Height>> = vec![Vec::new(); lines];
    for (heights, fixed) in of_line.iter_mut().zip(fixed) {
        heights.extend(fixed);
    }
    for &pairing in taken.iter().flatten() {
        let lie = &lies[pairing];
        of_line[lie.pairing.host].push(told(lie, readings));
    }
    for heights in &mut of_line {
        heights.sort_by(|a, b| {
            a.station_m
                .total_cmp(&b.station_m)
                .then(a.label.cmp(&b.label))
        });
    }
    of_line
}

fn learn(
    lies: &[Lie],
    lines: &[Line],
    taken: &[Option<usize>],
    even: &[Option<usize>],
    labels: usize,
) -> Habits {
    let mut choices = vec![0_u32; labels];
    for lie in lies {
        choices[lie.pairing.label] += 1;
    }
    let telling = taken
        .iter()
        .flatten()
        .filter(|&&pairing| even[pairing].is_none());
    Habits::learn(telling.map(|&pairing| {
        let lie = &lies[pairing];
        let sure = choices[lie.pairing.label] == 1;
        (
            lines[lie.pairing.host].run,
            lie,
            if sure { 1.0 } else { 0.2 },
        )
    }))
}
