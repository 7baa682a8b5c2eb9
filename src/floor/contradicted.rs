//! Labels that contradict one that their tendon has: neither counts, however near the one or the other stands.

use super::candidates::Lie;
use super::heights::{SAME_PLACE_M, STEEP, Settled};
use super::marking::Marking;
use super::marks::Marks;
use super::readings::HeightText;

/// Two labels of one tendon that say different things of it.
#[derive(Debug, Clone)]
pub(super) struct Contradiction {
    /// The one that the tendon has, and the other.
    pub(super) labels: [usize; 2],
    pub(super) host: usize,
    pub(super) station_m: f64,
}

/// A label that nobody has may be that of any tendon that costs it no more than this above the cheapest.
const ABOUT_AS_NEAR: f64 = 0.5;

/// The pairings at which a label that nobody has is at home.
fn homes<'l>(label: usize, lies: &'l [Lie], own: &[f64]) -> Vec<&'l Lie> {
    // Lies stand label by label.
    let from = lies.partition_point(|lie| lie.pairing.label < label);
    let mine: Vec<(&Lie, f64)> = lies[from..]
        .iter()
        .zip(own.get(from..).unwrap_or_default())
        .take_while(|(lie, _)| lie.pairing.label == label)
        .map(|(lie, &cost)| (lie, cost))
        .collect();
    let least = mine
        .iter()
        .map(|(_, cost)| *cost)
        .fold(f64::INFINITY, f64::min);
    mine.into_iter()
        .filter(|(_, cost)| *cost <= least + ABOUT_AS_NEAR)
        .map(|(lie, _)| lie)
        .collect()
}

/// Finds heights that contradict one another at one place of a tendon, and lets none of them count.
pub(super) fn heights(settled: &mut Settled, readings: &[HeightText], lies: &[Lie], own: &[f64]) {
    let mut found: Vec<Contradiction> = Vec::new();
    for &label in &settled.unclaimed {
        for lie in homes(label, lies, own) {
            let off = |station_m: f64| (station_m - lie.pairing.station_m).abs();
            let held = settled.of_line.get(lie.pairing.host).into_iter().flatten();
            let nearest = held
                .filter(|held| held.label.is_some() && off(held.station_m) < SAME_PLACE_M)
                .filter(|held| !held.reading.agrees(&readings[label]))
                .min_by(|a, b| off(a.station_m).total_cmp(&off(b.station_m)));
            found.extend(nearest.and_then(|held| {
                Some(Contradiction {
                    labels: [held.label?, label],
                    host: lie.pairing.host,
                    station_m: held.station_m,
                })
            }));
        }
    }
    // Two that a tendon has, nearer to one another than it can rise between them; beside an anchor both may stand.
    for (host, heights) in settled.of_line.iter().enumerate() {
        for pair in heights.windows(2) {
            let [a, b] = pair else { continue };
            let gap_m = b.station_m - a.station_m;
            let rise_m = (b.reading.value_m - a.reading.value_m).abs();
            if let (Some(first), Some(second)) = (a.label, b.label)
                && !(a.at_end || b.at_end)
                && gap_m < SAME_PLACE_M
                && rise_m > STEEP * gap_m
                && !a.reading.agrees(&b.reading)
            {
                found.push(Contradiction {
                    labels: [first, second],
                    host,
                    station_m: a.station_m,
                });
            }
        }
    }
    for contradiction in &found {
        if let Some(heights) = settled.of_line.get_mut(contradiction.host) {
            let either = |label: Option<usize>| {
                label.is_some_and(|label| contradiction.labels.contains(&label))
            };
            for height in heights.iter_mut().filter(|height| either(height.label)) {
                height.reading.torn = true;
            }
        }
    }
    let told = |label: &usize| found.iter().any(|found| found.labels[1] == *label);
    settled.unclaimed.retain(|label| !told(label));
    settled.contradicted = found;
}

/// Finds marks that contradict what their tendon has, and lets nothing count that they say otherwise; `taken` is each
/// label's pairing.
pub(super) fn marks(
    marks: &mut Marks,
    texts: &[Marking],
    lies: &[Lie],
    own: &[f64],
    taken: &[Option<usize>],
) {
    let mut held: Vec<Vec<usize>> = vec![Vec::new(); marks.of_line.len()];
    let mut found: Vec<Contradiction> = Vec::new();
    let against = |label: usize, held: &[usize], lie: &Lie| {
        let other = held
            .iter()
            .find(|&&other| texts[other].differs(&texts[label]));
        other.map(|&other| Contradiction {
            labels: [other, label],
            host: lie.pairing.host,
            station_m: lie.pairing.station_m,
        })
    };
    for (label, pairing) in taken.iter().enumerate() {
        if let Some(lie) = pairing.and_then(|pairing| lies.get(pairing)) {
            let before = &mut held[lie.pairing.host];
            found.extend(against(label, before, lie));
            before.push(label);
        }
    }
    for &label in &marks.unclaimed {
        for lie in homes(label, lies, own) {
            let host = lie.pairing.host;
            if let Some(contradiction) = against(label, &held[host], lie) {
                let whole = &mut marks.of_line[host];
                whole.tear(&texts[label]);
                // Whichever of the two counts is right, the mark may stand in either.
                if !whole.mark.is_said() {
                    whole.mark = texts[label].mark.clone();
                }
                found.push(contradiction);
            }
        }
    }
    let told = |label: &usize| found.iter().any(|found| found.labels[1] == *label);
    marks.unclaimed.retain(|label| !told(label));
    marks.contradicted = found;
}
