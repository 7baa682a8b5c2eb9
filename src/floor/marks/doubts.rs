//! Marks that fit another line about as well as the one they went to.

use std::collections::BTreeSet;

use crate::floor::candidates::Lie;
use crate::floor::even::between;
use crate::floor::marking::Marking;
use crate::floor::settle::{Settlement, Stakes};

/// A mark that fits two lines about equally well.
#[derive(Debug, Clone, Copy)]
pub(in crate::floor) struct MarkDoubt {
    pub(in crate::floor) label: usize,
    /// The line that it went to, and the one that it might have gone to.
    pub(in crate::floor) lines: [usize; 2],
    /// Whether nothing tells the two apart: then it went to neither.
    pub(in crate::floor) tied: bool,
}

/// Costs that differ by less are too near to be silent about.
const DOUBT: f64 = 0.4;
/// Costs that differ by less are told apart by nothing.
const TIE: f64 = 0.02;

/// What is in doubt, in order of the labels.
pub(super) fn doubts<S: Stakes>(
    settlement: &mut Settlement<'_, S>,
    taken: &[Option<usize>],
    even: &[Option<usize>],
    texts: &[Marking],
    lies: &[Lie],
) -> Vec<MarkDoubt> {
    let mut doubts: Vec<MarkDoubt> = Vec::new();
    for label in 0..texts.len() {
        let Some(now) = taken[label].filter(|_| settlement.choices(label).len() > 1) else {
            continue;
        };
        if let Some((more, changes)) = settlement.second_best(label, DOUBT)
            && let Some(&(_, Some(then))) = changes.iter().find(|(changed, _)| *changed == label)
            && matters(taken, &changes, texts, lies)
        {
            doubts.push(MarkDoubt {
                label,
                lines: [now, then].map(|pairing| lies[pairing].pairing.host),
                tied: more.abs() < TIE,
            });
        }
    }
    // Mark and strands in texts of their own stand between two lines together.
    let mut tied: Vec<(usize, usize)> = Vec::new();
    for group in between(taken, even, lies) {
        let changes: Vec<(usize, Option<usize>)> = group
            .iter()
            .map(|&(now, other)| (lies[now].pairing.label, Some(other)))
            .collect();
        let more = settlement.cost_of_changes(&changes);
        if more.abs() < TIE && matters(taken, &changes, texts, lies) {
            tied.extend(group);
        }
    }
    let of_tie: BTreeSet<usize> = tied
        .iter()
        .map(|&(now, _)| lies[now].pairing.label)
        .collect();
    doubts.retain(|doubt| !of_tie.contains(&doubt.label));
    doubts.extend(tied.iter().map(|&(now, other)| MarkDoubt {
        label: lies[now].pairing.label,
        lines: [now, other].map(|pairing| lies[pairing].pairing.host),
        tied: true,
    }));
    doubts.sort_by_key(|doubt| doubt.label);
    doubts
}

/// Whether a change gives some line another mark or other strands.
fn matters(
    taken: &[Option<usize>],
    changes: &[(usize, Option<usize>)],
    texts: &[Marking],
    lies: &[Lie],
) -> bool {
    let said = |pairing: usize| {
        let lie = &lies[pairing];
        (lie.pairing.host, &texts[lie.pairing.label])
    };
    let gone = changes.iter().filter_map(|&(label, _)| taken[label]);
    let mut gone: Vec<(usize, &Marking)> = gone.map(said).collect();
    for come in changes.iter().filter_map(|&(_, pairing)| pairing).map(said) {
        match gone.iter().position(|old| *old == come) {
            Some(at) => {
                gone.swap_remove(at);
            }
            None => return true,
        }
    }
    !gone.is_empty()
}
