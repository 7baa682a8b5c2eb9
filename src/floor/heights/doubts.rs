//! Labels that fit elsewhere about as well as where they went.

use super::Doubt;
use crate::floor::candidates::Lie;
use crate::floor::readings::HeightText;
use crate::floor::settle::{Settlement, Stakes};

/// Costs that differ by less are told apart by nothing; by less than `DOUBT`, by too little to be silent.
pub(super) const TIE: f64 = 0.02;
const DOUBT: f64 = 0.5;

/// Labels that would fit elsewhere about as well, where it matters.
pub(super) fn doubts<S: Stakes>(
    settlement: &mut Settlement<'_, S>,
    readings: &[HeightText],
    lies: &[Lie],
) -> Vec<Doubt> {
    let mut doubts = Vec::new();
    for label in 0..readings.len() {
        let Some(now) = settlement.taken()[label] else {
            continue;
        };
        if settlement.choices(label).len() < 2 {
            continue;
        }
        let Some((more, changes)) = settlement.second_best(label, DOUBT) else {
            continue;
        };
        let Some(&(_, Some(then))) = changes.iter().find(|(changed, _)| *changed == label) else {
            continue;
        };
        if !matters(settlement.taken(), &changes, readings, lies) {
            continue;
        }
        doubts.push(Doubt {
            label,
            hosts: [lies[now].pairing.host, lies[then].pairing.host],
            stations_m: [lies[now].pairing.station_m, lies[then].pairing.station_m],
            tied: more < TIE,
        });
    }
    doubts
}

/// Whether a change gives some tendon another height somewhere.
pub(super) fn matters(
    taken: &[Option<usize>],
    changes: &[(usize, Option<usize>)],
    readings: &[HeightText],
    lies: &[Lie],
) -> bool {
    let gone = changes.iter().filter_map(|&(label, _)| taken[label]);
    let mut gone: Vec<usize> = gone.collect();
    for come in changes.iter().filter_map(|&(_, pairing)| pairing) {
        let like = gone.iter().position(|&old| {
            let (a, b) = (&lies[old], &lies[come]);
            a.pairing.host == b.pairing.host
                && a.at_end == b.at_end
                && (a.pairing.station_m - b.pairing.station_m).abs() < 0.3
                && readings[a.pairing.label].word == readings[b.pairing.label].word
                && (readings[a.pairing.label].value_m - readings[b.pairing.label].value_m).abs()
                    < 1e-6
        });
        match like {
            Some(at) => {
                gone.swap_remove(at);
            }
            None => return true,
        }
    }
    !gone.is_empty()
}
