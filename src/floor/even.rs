//! Labels midway between two tendons, which nothing about the label itself tells apart: such a label teaches no habits,
//! and where the tendons' other labels tell nothing either, all that stand so between the two go to nobody.

use std::collections::BTreeMap;

use super::candidates::Lie;
use super::lines::Line;

/// Distances that differ by less are alike, text heights.
const ALIKE_H: f64 = 0.05;

/// By pairing: the pairing of the same label with the one tendon of the same run to which it lies just so.
pub(super) fn even(lies: &[Lie], lines: &[Line]) -> Vec<Option<usize>> {
    let mut by_label: BTreeMap<usize, Vec<usize>> = BTreeMap::new();
    for (at, lie) in lies.iter().enumerate() {
        by_label.entry(lie.pairing.label).or_default().push(at);
    }
    let run = |lie: &Lie| lines.get(lie.pairing.host).map(|line| line.run);
    let alike = |a: &Lie, b: &Lie| {
        run(a) == run(b)
            && !a.aimed
            && !b.aimed
            && a.turn == b.turn
            && a.at_end == b.at_end
            && (a.gap_h - b.gap_h).abs() < ALIKE_H
            && (a.off_h.abs() - b.off_h.abs()).abs() < ALIKE_H
    };
    let mut even = vec![None; lies.len()];
    for of_label in by_label.values() {
        for &at in of_label {
            let mut others = of_label
                .iter()
                .filter(|&&other| other != at && alike(&lies[at], &lies[other]));
            if let (Some(&other), None) = (others.next(), others.next()) {
                even[at] = Some(other);
            }
        }
    }
    even
}

/// Labels that stand midway between two tendons and are held by one of them: pairing taken, and the one with the other.
pub(super) type Between = Vec<(usize, usize)>;

/// By pair of tendons, in order: the labels between them.
pub(super) fn between(
    taken: &[Option<usize>],
    even: &[Option<usize>],
    lies: &[Lie],
) -> Vec<Between> {
    let mut pairs: BTreeMap<[usize; 2], Between> = BTreeMap::new();
    for &now in taken.iter().flatten() {
        if let Some(Some(other)) = even.get(now).copied() {
            let mut hosts = [now, other].map(|pairing| lies[pairing].pairing.host);
            hosts.sort_unstable();
            pairs.entry(hosts).or_default().push((now, other));
        }
    }
    pairs.into_values().collect()
}

/// What each tendon holds, in order of station.
pub(super) fn held(taken: &[Option<usize>], lies: &[Lie], hosts: usize) -> Vec<Vec<usize>> {
    let mut held = vec![Vec::new(); hosts];
    for &pairing in taken.iter().flatten() {
        held[lies[pairing].pairing.host].push(pairing);
    }
    for own in &mut held {
        in_order(own, lies);
    }
    held
}

/// What the two tendons of a group hold, now and if its labels change places.
pub(super) fn exchanged(
    group: &Between,
    held: &[Vec<usize>],
    lies: &[Lie],
) -> [Vec<(usize, Vec<usize>)>; 2] {
    let Some(&(now, other)) = group.first() else {
        return [Vec::new(), Vec::new()];
    };
    let hosts = [now, other].map(|pairing| lies[pairing].pairing.host);
    let moved = |pairing: &usize| {
        let to = group.iter().find(|(now, _)| now == pairing);
        to.map_or(*pairing, |&(_, other)| other)
    };
    let all: Vec<usize> = hosts
        .iter()
        .flat_map(|&host| &held[host])
        .map(moved)
        .collect();
    let before = hosts.map(|host| (host, held[host].clone()));
    let after = hosts.map(|host| {
        let mut own: Vec<usize> = all
            .iter()
            .copied()
            .filter(|&pairing| lies[pairing].pairing.host == host)
            .collect();
        in_order(&mut own, lies);
        (host, own)
    });
    [before.to_vec(), after.to_vec()]
}

fn in_order(held: &mut [usize], lies: &[Lie]) {
    let station_m = |pairing: &usize| lies[*pairing].pairing.station_m;
    held.sort_by(|a, b| station_m(a).total_cmp(&station_m(b)).then(a.cmp(b)));
}
