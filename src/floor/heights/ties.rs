//! Labels midway between two tendons that may all change places and nothing is the worse for it.

use super::Height;
use super::cost::{Known, cost};
use super::doubts::{TIE, matters};
use crate::floor::candidates::Lie;
use crate::floor::even::{Between, between, exchanged, held};
use crate::floor::lines::Line;
use crate::floor::readings::HeightText;
use crate::floor::settle::Stakes;

/// Height labels, how they lie to which lines, and the heights that these have without them.
pub(super) struct Texts<'a> {
    pub(super) readings: &'a [HeightText],
    pub(super) lies: &'a [Lie],
    pub(super) lines: &'a [Line],
    pub(super) fixed: &'a [Vec<Height>],
}

/// What some tendons hold, each list in order of station.
type Holding = Vec<(usize, Vec<usize>)>;

/// The labels that nothing gives to one tendon rather than to another: pairing taken, and the one with the other.
pub(super) fn tied(
    mut floor: Known<'_>,
    texts: &Texts<'_>,
    taken: &[Option<usize>],
    even: &[Option<usize>],
    stakes: &impl Stakes,
) -> Vec<(usize, usize)> {
    let lies = texts.lies;
    let held = held(taken, lies, texts.lines.len());
    let mut tied = Vec::new();
    for group in between(taken, even, lies) {
        let changes: Vec<(usize, Option<usize>)> = group
            .iter()
            .map(|&(now, other)| (lies[now].pairing.label, Some(other)))
            .collect();
        if matters(taken, &changes, texts.readings, lies)
            && floor.gain(&group, &held, texts, stakes).abs() < TIE
        {
            tied.extend(group);
        }
    }
    tied
}

impl Known<'_> {
    /// By how much more it costs if all labels of a group change places.
    fn gain(
        &mut self,
        group: &Between,
        held: &[Vec<usize>],
        texts: &Texts<'_>,
        stakes: &impl Stakes,
    ) -> f64 {
        let [before, after] = exchanged(group, held, texts.lies);
        let now = self.total(group.iter().map(|&(now, _)| now), &before, texts, stakes);
        self.hold(&after, texts);
        let then = self.total(group.iter().map(|&(_, other)| other), &after, texts, stakes);
        self.hold(&before, texts);
        then - now
    }

    fn total(
        &self,
        group: impl Iterator<Item = usize>,
        holding: &Holding,
        texts: &Texts<'_>,
        stakes: &impl Stakes,
    ) -> f64 {
        let own =
            group.map(|pairing| cost(texts.readings, &texts.lies[pairing], texts.lines, self));
        let shared = holding
            .iter()
            .map(|(host, held)| stakes.shared(*host, held.iter().copied()));
        own.sum::<f64>() + shared.sum::<f64>()
    }

    /// Has tendons hold these labels.
    fn hold(&mut self, holding: &Holding, texts: &Texts<'_>) {
        for (host, held) in holding {
            let mut heights = texts.fixed[*host].clone();
            heights.extend(held.iter().map(|&pairing| {
                let lie = &texts.lies[pairing];
                Height {
                    station_m: lie.pairing.station_m,
                    at_end: lie.at_end,
                    reading: texts.readings[lie.pairing.label],
                    label: Some(lie.pairing.label),
                }
            }));
            heights.sort_by(|a, b| {
                let by_station = a.station_m.total_cmp(&b.station_m);
                by_station.then(a.label.cmp(&b.label))
            });
            self.heights[*host] = heights;
        }
    }
}
