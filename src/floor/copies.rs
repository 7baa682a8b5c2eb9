//! Lines drawn twice, wholly or in part.

use std::collections::{BTreeMap, BTreeSet};

use super::index::Index;
use super::lines::Line;
use super::order::by_handle;
use super::rules::DUPLICATE_LINE;
use crate::drawing::Shape;
use crate::finding::{Finding, Level, Wording};
use crate::geometry::{Path, Segment, distance_m};
use crate::units::LONG;

/// Places at which a line is compared with another.
const PROBES: u32 = 33;

/// Drops pieces that lie on another piece of the layer from end to end.
pub(super) fn without_copies<'a>(
    shapes: &[&'a Shape],
    tolerance_m: f64,
    findings: &mut Vec<Finding>,
) -> Vec<&'a Shape> {
    // Those that are the same to the last bit are told at once, however many lie on one another.
    let mut known: BTreeMap<Vec<u64>, usize> = BTreeMap::new();
    let first: Vec<usize> = shapes
        .iter()
        .enumerate()
        .map(|(at, shape)| *known.entry(bits(&shape.path)).or_insert(at))
        .collect();
    let unlike: Vec<usize> = known
        .into_values()
        .collect::<BTreeSet<_>>()
        .into_iter()
        .collect();
    let index = Index::new(unlike.iter().map(|&at| &shapes[at].path));
    let mut twins: Vec<Option<usize>> = Vec::with_capacity(shapes.len());
    for (at, shape) in shapes.iter().enumerate() {
        let middle = shape.path.place_at(shape.path.length_m() / 2.0);
        let twin = if first[at] == at {
            index
                .within(middle, tolerance_m)
                .into_iter()
                .map(|place| unlike[place])
                .filter(|&other| other < at && twins[other].is_none())
                .find(|&other| same_line(&shape.path, &shapes[other].path, tolerance_m))
        } else {
            twins[first[at]].or(Some(first[at]))
        };
        if let Some(twin) = twin {
            findings.push(copy(
                &shape.handle,
                &shape.layer,
                &shapes[twin].handle,
                &shape.path,
                shape.path.length_m(),
            ));
        }
        twins.push(twin);
    }
    let kept = shapes.iter().zip(twins);
    kept.filter_map(|(shape, twin)| twin.is_none().then_some(*shape))
        .collect()
}

/// A path's numbers, bit by bit.
fn bits(path: &Path) -> Vec<u64> {
    let numbers = path.segments().iter().flat_map(|segment| match *segment {
        Segment::Line { from, to } => [from.x, from.y, to.x, to.y, f64::NAN],
        Segment::Arc {
            centre,
            radius_m,
            start_rad,
            sweep_rad,
        } => [centre.x, centre.y, radius_m, start_rad, sweep_rad],
    });
    numbers.map(f64::to_bits).collect()
}

/// Drops lines that lie on another tendon, whatever its layer, for more than half their length; names lesser overlaps.
pub(super) fn without_overlaps(
    lines: Vec<Line>,
    tolerance_m: f64,
    findings: &mut Vec<Finding>,
) -> Vec<Line> {
    let index = Index::new(lines.iter().map(|line| &line.path));
    let order = longest_first(&lines, tolerance_m);
    let mut rank = vec![0; lines.len()];
    for (place, &line) in order.iter().enumerate() {
        rank[line] = place;
    }
    let mut dropped = vec![false; lines.len()];
    for &at in &order {
        let path = &lines[at].path;
        let mut on: BTreeMap<usize, BTreeSet<u32>> = BTreeMap::new();
        for probe in 0..PROBES {
            let share = (f64::from(probe) + 0.5) / f64::from(PROBES);
            let place = path.place_at(share * path.length_m());
            for other in index.within(place, tolerance_m) {
                if other != at && rank[other] < rank[at] && !dropped[other] {
                    on.entry(other).or_default().insert(probe);
                }
            }
        }
        // One probe may lie on a tendon that crosses; two in a line do not.
        on.retain(|&other, probes| {
            probes.len() > 1 && runs_along(path, &lines[other].path, tolerance_m)
        });
        if on.is_empty() {
            continue;
        }
        // A line may lie on one tendon for a part and on the next for another.
        let covered: BTreeSet<u32> = on.values().flatten().copied().collect();
        let probes = u32::try_from(covered.len()).unwrap_or(PROBES);
        dropped[at] = 2 * probes > PROBES;
        let others: Vec<&str> = on
            .keys()
            .map(|&other| lines[other].handle.as_str())
            .collect();
        findings.push(copy(
            &lines[at].handle,
            &lines[at].layer,
            &others.join(" and "),
            path,
            path.length_m() * f64::from(probes) / f64::from(PROBES),
        ));
    }
    let kept = lines.into_iter().zip(dropped);
    kept.filter_map(|(line, gone)| (!gone).then_some(line))
        .collect()
}

/// The longest first; among those as long within the tolerance, the one drawn first.
fn longest_first(lines: &[Line], tolerance_m: f64) -> Vec<usize> {
    let length_m = |line: usize| lines[line].path.length_m();
    let mut order: Vec<usize> = (0..lines.len()).collect();
    order.sort_by(|&a, &b| length_m(b).total_cmp(&length_m(a)).then(a.cmp(&b)));
    let mut start = 0;
    while start < order.len() {
        // A group counts from its longest: comparing pair by pair within a tolerance would be no order.
        let least_m = length_m(order[start]) - tolerance_m;
        let same = order[start..].partition_point(|&line| length_m(line) >= least_m);
        let group = &mut order[start..start + same.max(1)];
        group.sort_by(|&a, &b| by_handle(&lines[a].handle, &lines[b].handle).then(a.cmp(&b)));
        start += group.len();
    }
    order
}

fn copy(handle: &str, layer: &str, other: &str, path: &Path, overlap_m: f64) -> Finding {
    Finding::new(
        &DUPLICATE_LINE,
        Level::Error,
        Wording::of(|units| {
            let long = units.of(LONG);
            format!(
                "the line of handle {handle} on layer {layer} lies on that of handle {other} for about {} of its {}; expected each tendon once",
                long.said(overlap_m, 2),
                long.said(path.length_m(), 2)
            )
        }),
        "delete one of the two lines, or move it to where its tendon lies",
    )
    .at_place(path.place_at(path.length_m() / 2.0))
}

/// Whether two lines are the same one, in either direction.
fn same_line(a: &Path, b: &Path, tolerance_m: f64) -> bool {
    let (Some(a0), Some(a1), Some(b0), Some(b1)) = (a.start(), a.end(), b.start(), b.end()) else {
        return false;
    };
    let straight = distance_m(a0, b0) <= tolerance_m && distance_m(a1, b1) <= tolerance_m;
    let turned = distance_m(a0, b1) <= tolerance_m && distance_m(a1, b0) <= tolerance_m;
    (straight || turned)
        && (a.length_m() - b.length_m()).abs() <= 4.0 * tolerance_m
        && (1..8).all(|eighth| {
            let place = a.place_at(a.length_m() * f64::from(eighth) / 8.0);
            b.project(place)
                .is_some_and(|found| found.distance_m <= tolerance_m)
        })
}

/// Whether somewhere the two lines lie on one another and go the same way.
fn runs_along(a: &Path, b: &Path, tolerance_m: f64) -> bool {
    (0..PROBES).any(|probe| {
        let station_m = a.length_m() * (f64::from(probe) + 0.5) / f64::from(PROBES);
        b.project(a.place_at(station_m)).is_some_and(|found| {
            let turn = a.heading_at(station_m) - b.heading_at(found.station_m);
            found.distance_m <= tolerance_m && turn.sin().abs() < 0.05
        })
    })
}
