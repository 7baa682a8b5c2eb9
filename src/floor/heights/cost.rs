//! What it costs to give a label to one tendon, by itself.

use super::Height;
use crate::floor::aims::AIMED;
use crate::floor::candidates::Lie;
use crate::floor::habits::Habits;
use crate::floor::lines::Line;
use crate::floor::readings::{HeightText, Word};

/// What is known of the floor while a label is judged.
pub(super) struct Known<'h> {
    /// Heights of each tendon.
    pub(super) heights: Vec<Vec<Height>>,
    /// See [`sides`].
    pub(super) sides: Vec<Vec<(usize, f64)>>,
    /// What is usual, once something was learned.
    pub(super) habits: Option<&'h Habits>,
}

/// Cost of a pairing by itself.
pub(super) fn cost(readings: &[HeightText], lie: &Lie, lines: &[Line], known: &Known<'_>) -> f64 {
    let reading = readings[lie.pairing.label];
    let run = lines[lie.pairing.host].run;
    let mut cost = 0.05 * lie.off_h.abs().min(6.0) + at_column(reading, lie);
    if lie.aimed {
        cost -= AIMED;
    }
    match known.habits {
        None => {
            let struck = if lie.gap_h <= 0.0 { 0.2 } else { 0.0 };
            cost += 0.6 * lie.gap_h + struck;
        }
        Some(habits) => {
            cost += 0.4 * lie.gap_h
                + habits.cost(run, lie)
                + resemblance(reading, lie, &known.heights)
                + if lie.aimed {
                    0.0
                } else {
                    side(lie, &known.sides[lie.pairing.host])
                };
        }
    }
    cost
}

/// High points stand over the middle of columns.
fn at_column(reading: HeightText, lie: &Lie) -> f64 {
    match (reading.likely, lie.column_m) {
        (Some(Word::High), Some(off_m)) => 0.6 * (off_m / 0.15).min(1.0),
        (Some(Word::High), None) => 0.3,
        _ => 0.0,
    }
}

/// Offsets of the labels that each tendon holds, with the label; those midway between two tendons tell nothing.
pub(super) fn sides(
    lies: &[Lie],
    lines: usize,
    taken: &[Option<usize>],
    even: &[Option<usize>],
) -> Vec<Vec<(usize, f64)>> {
    let mut sides = vec![Vec::new(); lines];
    for &pairing in taken.iter().flatten() {
        let lie = &lies[pairing];
        if lie.aimed || even[pairing].is_some() {
            continue;
        }
        sides[lie.pairing.host].push((lie.pairing.label, lie.off_h));
    }
    sides
}

/// A tendon's labels mostly stand on one side of it, at one distance.
fn side(lie: &Lie, held: &[(usize, f64)]) -> f64 {
    let mut others: Vec<f64> = held
        .iter()
        .filter(|(label, _)| *label != lie.pairing.label)
        .map(|&(_, off_h)| off_h)
        .collect();
    if others.len() < 2 {
        return 0.3;
    }
    others.sort_by(f64::total_cmp);
    let middle = others.len() / 2;
    let median = f64::midpoint(others[(others.len() - 1) / 2], others[middle]);
    0.6 * (lie.off_h - median).abs().min(1.0)
}

/// Neighbours in a run have like heights at like stations.
fn resemblance(reading: HeightText, lie: &Lie, known: &[Vec<Height>]) -> f64 {
    let mut matches: Vec<f64> = Vec::new();
    for &(line, station_m) in &lie.beside {
        let heights = &known[line];
        let from = heights.partition_point(|h| h.station_m < station_m - 1.0);
        let like = heights[from..]
            .iter()
            .take_while(|h| h.station_m <= station_m + 1.0)
            .filter(|h| h.label != Some(lie.pairing.label))
            .filter(|h| h.at_end == lie.at_end && (lie.at_end || h.reading.word == reading.word))
            .map(|h| {
                let along = 0.8 * ((h.station_m - station_m).abs() / 0.3).min(1.0);
                along + unlike(h.reading.value_m - reading.value_m)
            })
            .min_by(f64::total_cmp);
        matches.extend(like);
    }
    matches.sort_by(f64::total_cmp);
    match (lie.beside.len(), matches.as_slice()) {
        (0, _) => 0.8,
        (_, []) => 2.6,
        (1 | 2, [one]) => *one,
        (_, [one]) => one + 0.4,
        (_, [one, two, ..]) => f64::midpoint(*one, *two),
    }
}

fn unlike(difference_m: f64) -> f64 {
    let millimetres = difference_m.abs() * 1000.0;
    if millimetres < 1.5 {
        0.0
    } else if millimetres <= 11.0 {
        0.3
    } else if millimetres <= 26.0 {
        0.6
    } else {
        1.0
    }
}
