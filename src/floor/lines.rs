//! Tendon lines: shapes on tendon layers, joined, each drawn line once.

use std::collections::{BTreeMap, BTreeSet};

use geo::Coord;

use super::bridges::{Reach, bridged};
use super::index::Index;
use super::layers::{Roles, sound};
use super::pieces::{Joint, chains, returns};
use super::rules::{DUPLICATE_LINE, PIECES_MEET, TENDON_CLOSED, TENDON_STUB, TENDONS_MISSING};
use super::types::Run;
use crate::drawing::{Drawing, Shape};
use crate::finding::{Finding, Level};
use crate::geometry::{Path, distance_m};
use crate::job::Job;

/// A tendon line before anything is known of it but its way.
#[derive(Debug, Clone)]
pub(super) struct Line {
    pub(super) handle: String,
    pub(super) layer: String,
    pub(super) run: Run,
    pub(super) path: Path,
}

/// A line goes on into the next piece unless it turns by more than a right angle: tendons do not double back.
const SHARPEST_RAD: f64 = 1.6;
/// An end symbol this near to a joint says that two tendons end there.
const STOP_M: f64 = 0.05;
/// Pieces of one tendon that do not meet lie on one line within this, metres.
const ASIDE_M: f64 = 0.020;
/// Places at which a line is compared with another.
const PROBES: u32 = 33;

/// Tendon lines in an order that their places decide.
pub(super) fn lines(
    drawing: &Drawing,
    job: &Job,
    roles: &Roles,
    ends: &[Coord<f64>],
    symbols: &BTreeSet<&str>,
) -> (Vec<Line>, Vec<Finding>) {
    let mut findings = Vec::new();
    let mut by_layer: BTreeMap<(&str, Run), Vec<&Shape>> = BTreeMap::new();
    for shape in &drawing.shapes {
        let Some(run) = roles.of(&shape.layer).run else {
            continue;
        };
        if !sound(shape) || symbols.contains(shape.handle.as_str()) {
            continue;
        }
        let gap_m = job.conventions.join_gap_m;
        if !shape.closed && shape.path.length_m() <= gap_m {
            findings.push(stub(shape, gap_m));
        } else if shape.closed || returns(&shape.path, gap_m) {
            findings.push(closed_shape(&shape.handle, &shape.layer, &shape.path));
        } else {
            by_layer.entry((&shape.layer, run)).or_default().push(shape);
        }
    }
    let tolerance_m = job.conventions.join_gap_m.max(0.005);
    let mut lines = Vec::new();
    for ((_, run), mut shapes) in by_layer {
        shapes.sort_by(|a, b| drawn_before(a, b));
        let shapes = without_copies(&shapes, tolerance_m, &mut findings);
        lines.extend(joined(&shapes, run, job, ends, &mut findings));
    }
    lines.sort_by(|a, b| by_place(&a.path, &b.path).then_with(|| by_handle(&a.handle, &b.handle)));
    let lines = without_overlaps(lines, tolerance_m, &mut findings);
    if lines.is_empty() {
        findings.push(Finding::new(
            &TENDONS_MISSING,
            Level::Error,
            format!(
                "no line lies on a tendon layer; expected layers like {}",
                [
                    job.conventions.layers.banded.as_slice(),
                    job.conventions.layers.distributed.as_slice()
                ]
                .concat()
                .join(", ")
            ),
            "name the tendon layers in the job file; `tautplan survey` lists the drawing's layers",
        ));
    }
    (lines, findings)
}

fn closed_shape(handle: &str, layer: &str, path: &Path) -> Finding {
    let finding = Finding::new(
        &TENDON_CLOSED,
        Level::Warning,
        format!("shape {handle} on layer {layer} is closed; expected an open line with two ends"),
        "open the line where the tendon ends, or move the shape to another layer",
    );
    match path.start() {
        Some(place) => finding.at_place(place),
        None => finding,
    }
}

fn stub(shape: &Shape, gap_m: f64) -> Finding {
    let finding = Finding::new(
        &TENDON_STUB,
        Level::Warning,
        format!(
            "line {} on layer {} is {:.1} mm long; expected more than the joining gap of {:.1} mm",
            shape.handle,
            shape.layer,
            shape.path.length_m() * 1000.0,
            gap_m * 1000.0
        ),
        "delete the stub, or give a smaller `join_gap_mm` in the job file's [drawing] table",
    );
    match shape.path.start() {
        Some(place) => finding.at_place(place),
        None => finding,
    }
}

/// Shapes of one layer as lines, each from the first vertex of the piece that was drawn first.
fn joined(
    shapes: &[&Shape],
    run: Run,
    job: &Job,
    ends: &[Coord<f64>],
    findings: &mut Vec<Finding>,
) -> Vec<Line> {
    let paths: Vec<&Path> = shapes.iter().map(|shape| &shape.path).collect();
    let joint = Joint {
        gap_m: job.conventions.join_gap_m,
        turn_rad: SHARPEST_RAD,
    };
    let stops = rstar::RTree::bulk_load(ends.iter().map(|end| [end.x, end.y]).collect());
    let is_stop = |place: Coord<f64>| {
        stops
            .locate_within_distance([place.x, place.y], STOP_M * STOP_M)
            .next()
            .is_some()
    };
    let (chains, meetings) = chains(&paths, joint, is_stop);
    let layer = shapes.first().map_or("", |shape| shape.layer.as_str());
    findings.extend(meetings.iter().map(|meeting| {
        Finding::new(
            &PIECES_MEET,
            Level::Warning,
            format!(
                "{} line ends meet on layer {layer} and {} of them go on smoothly into none: these were left as ends",
                meeting.ends, meeting.left
            ),
            "draw each tendon as one polyline, or move its end off the others by more than the joining gap",
        )
        .at_place(meeting.place)
    }));
    let mut lines = Vec::new();
    for chain in chains {
        // Shapes stand in drawn order, so the lowest index is the piece drawn first.
        let Some(&(first, backwards)) = chain.pieces.iter().min_by_key(|(piece, _)| *piece) else {
            continue;
        };
        let path = chain.path(&paths);
        let Some(shape) = shapes.get(first) else {
            continue;
        };
        if chain.closed {
            findings.push(closed_shape(&shape.handle, &shape.layer, &path));
            continue;
        }
        lines.push(Line {
            handle: shape.handle.clone(),
            layer: shape.layer.clone(),
            run,
            path: if backwards { path.reversed() } else { path },
        });
    }
    let reach = Reach {
        gap_m: job.conventions.bridge_gap_m,
        aside_m: job.conventions.join_gap_m.max(ASIDE_M),
    };
    bridged(lines, reach, is_stop, findings)
}

/// Drops pieces that lie on another piece of the layer from end to end.
fn without_copies<'a>(
    shapes: &[&'a Shape],
    tolerance_m: f64,
    findings: &mut Vec<Finding>,
) -> Vec<&'a Shape> {
    let index = Index::new(shapes.iter().map(|shape| &shape.path));
    let mut dropped = vec![false; shapes.len()];
    for (at, shape) in shapes.iter().enumerate() {
        let middle = shape.path.place_at(shape.path.length_m() / 2.0);
        let twin = index
            .within(middle, tolerance_m)
            .into_iter()
            .filter(|&other| other < at && !dropped[other])
            .find(|&other| same_line(&shape.path, &shapes[other].path, tolerance_m));
        if let Some(twin) = twin {
            dropped[at] = true;
            findings.push(copy(
                &shape.handle,
                &shape.layer,
                &shapes[twin].handle,
                &shape.path,
                shape.path.length_m(),
            ));
        }
    }
    let kept = shapes.iter().zip(dropped);
    kept.filter_map(|(shape, gone)| (!gone).then_some(*shape))
        .collect()
}

/// Drops lines that lie on another tendon, whatever its layer, for more than half their length; names lesser overlaps.
fn without_overlaps(lines: Vec<Line>, tolerance_m: f64, findings: &mut Vec<Finding>) -> Vec<Line> {
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
        format!(
            "line {handle} on layer {layer} lies on line {other} for about {overlap_m:.2} m of its {:.2} m; expected each tendon once",
            path.length_m()
        ),
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

/// Drawn order: by handle; shapes of one insert, or of a drawing without handles, by place.
fn drawn_before(a: &Shape, b: &Shape) -> std::cmp::Ordering {
    by_handle(&a.handle, &b.handle).then_with(|| by_place(&a.path, &b.path))
}

/// By handle as a number; entity numbers of drawings without handles say nothing, so they count as equal.
pub(super) fn by_handle(a: &str, b: &str) -> std::cmp::Ordering {
    let value = |handle: &str| u64::from_str_radix(handle, 16).unwrap_or(u64::MAX);
    value(a).cmp(&value(b))
}

/// By place on the plan; of two that lie in one place, and only then, by the way in which they are drawn.
pub(super) fn by_place(a: &Path, b: &Path) -> std::cmp::Ordering {
    by_numbers(&corners(a), &corners(b)).then_with(|| by_numbers(&passed(a), &passed(b)))
}

fn by_numbers(a: &[f64], b: &[f64]) -> std::cmp::Ordering {
    let pairs = a.iter().zip(b);
    pairs
        .map(|(a, b)| a.total_cmp(b))
        .find(|order| order.is_ne())
        .unwrap_or(std::cmp::Ordering::Equal)
}

/// Places that a line passes on its way, from its first vertex.
fn passed(path: &Path) -> [f64; 16] {
    let eighth_m = path.length_m() / 8.0;
    let mut passed = [0.0; 16];
    for (place, pair) in (0_u8..).zip(passed.chunks_mut(2)) {
        let place = path.place_at(f64::from(place) * eighth_m);
        pair.copy_from_slice(&[place.x, place.y]);
    }
    passed
}

fn corners(path: &Path) -> [f64; 5] {
    let start = path.start().unwrap_or_default();
    let end = path.end().unwrap_or_default();
    let swap = (end.x, end.y) < (start.x, start.y);
    let (first, last) = if swap { (end, start) } else { (start, end) };
    [first.x, first.y, last.x, last.y, path.length_m()]
}

/// The direction in which a run goes, from −45° up to 135°.
pub(super) fn axis_rad<'a>(lines: impl Iterator<Item = &'a Line>) -> f64 {
    let (mut sum_sin, mut sum_cos) = (0.0, 0.0);
    for line in lines {
        let (Some(start), Some(end)) = (line.path.start(), line.path.end()) else {
            continue;
        };
        let (dx, dy) = (end.x - start.x, end.y - start.y);
        let length_m = dx.hypot(dy);
        let double_rad = 2.0 * dy.atan2(dx);
        sum_sin += length_m * double_rad.sin();
        sum_cos += length_m * double_rad.cos();
    }
    let axis_rad = sum_sin.atan2(sum_cos) / 2.0;
    // An axis a hair off −45° is the same as one at 135°.
    if axis_rad < -std::f64::consts::FRAC_PI_4 - 1e-6 {
        axis_rad + std::f64::consts::PI
    } else {
        axis_rad
    }
}
