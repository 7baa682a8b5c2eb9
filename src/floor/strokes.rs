//! Plain lines on the layers of labels: drawn from a text to a tendon, or across a bundle.

use std::collections::BTreeMap;

use super::index::{Foot, Index};
use super::layers::{Roles, sound};
use super::order::drawn_before;
use super::pieces::{Joint, chains};
use crate::drawing::{Drawing, Shape};
use crate::geometry::{Path, distance_m};

/// A line ends on a tendon that is this near to its end, metres.
pub(super) const ON_M: f64 = 0.010;
/// Pieces of one line meet within this, metres.
const MEET_M: f64 = 0.005;
/// A leader may turn sharply at its landing, but does not run back on itself, radians.
const TURN_RAD: f64 = 3.0;
/// Tendons of a bundle are no farther apart than this, metres.
const BUNDLE_M: f64 = 0.6;
/// Sine of the angle within which tendons are parallel.
const PARALLEL: f64 = 0.2;
/// A stroke no longer than this, in text heights or metres, that its tendon cuts near the middle is a tick.
const TICK_H: f64 = 2.5;
const TICK_M: f64 = 0.6;
/// Lines leave arcs by no more than this, metres.
const CHORD_M: f64 = 0.002;

/// A line on a layer of labels.
pub(super) struct Stroke {
    pub(super) layer: String,
    pub(super) path: Path,
}

/// Open lines on layers of heights and marks, pieces put together.
pub(super) fn strokes(drawing: &Drawing, roles: &Roles) -> Vec<Stroke> {
    let mut by_layer: BTreeMap<&str, Vec<&Shape>> = BTreeMap::new();
    for shape in &drawing.shapes {
        let role = roles.of(&shape.layer, shape.look);
        let labels = role.label.heights || role.label.marks;
        if labels && !role.label.level_lines && role.run.is_none() && !shape.closed && sound(shape)
        {
            by_layer.entry(&shape.layer).or_default().push(shape);
        }
    }
    let mut strokes = Vec::new();
    for (layer, mut shapes) in by_layer {
        shapes.sort_by(|a, b| drawn_before(a, b));
        let paths: Vec<&Path> = shapes.iter().map(|shape| &shape.path).collect();
        let joint = Joint {
            gap_m: MEET_M,
            turn_rad: TURN_RAD,
        };
        let (chains, _) = chains(&paths, joint, |_| false);
        let open = chains.iter().filter(|chain| !chain.closed);
        strokes.extend(open.map(|chain| Stroke {
            layer: layer.to_owned(),
            path: chain.path(&paths),
        }));
    }
    strokes
}

/// Places where a path crosses tendons, in order along it; `distance_m` of each is the station on the path.
pub(super) fn crossed(path: &Path, index: &Index) -> Vec<Foot> {
    let mut crossed: Vec<Foot> = Vec::new();
    let mut start_m = 0.0;
    for pair in path.to_line_string(CHORD_M).0.windows(2) {
        let (from, to) = (pair[0], pair[1]);
        for chord in index.around(&[from, to], 0.0) {
            if let Some(place) = chord.crossing(from, to) {
                crossed.push(Foot {
                    distance_m: start_m + distance_m(from, place),
                    ..chord.foot(place)
                });
            }
        }
        start_m += distance_m(from, to);
    }
    crossed.sort_by(|a, b| {
        a.distance_m
            .total_cmp(&b.distance_m)
            .then(a.line.cmp(&b.line))
    });
    // A crossing where two chords of one line meet is found twice.
    crossed.dedup_by(|a, b| a.line == b.line && (a.distance_m - b.distance_m).abs() < ON_M);
    crossed
}

/// The bundle that a stroke ends in: tendons it crossed last, parallel and near to one another, and the one at its tip.
pub(super) fn bundle(crossed: &[Foot], at_tip: &[Foot]) -> Vec<Foot> {
    let beyond = at_tip
        .iter()
        .filter(|foot| crossed.iter().all(|other| other.line != foot.line));
    let mut bundle: Vec<Foot> = Vec::new();
    for foot in beyond.chain(crossed.iter().rev()) {
        let goes_on = bundle.last().is_none_or(|last| {
            let parallel = (foot.heading_rad - last.heading_rad).sin().abs() < PARALLEL;
            parallel && across_m(last, foot) <= BUNDLE_M
        });
        if !goes_on {
            break;
        }
        if bundle.iter().all(|other| other.line != foot.line) {
            bundle.push(*foot);
        }
    }
    bundle.sort_by_key(|foot| foot.line);
    bundle
}

/// Distance of two parallel tendons square to them, metres.
fn across_m(a: &Foot, b: &Foot) -> f64 {
    let (sin, cos) = a.heading_rad.sin_cos();
    (cos * (b.place.y - a.place.y) - sin * (b.place.x - a.place.x)).abs()
}

/// Whether a line is a tick: short, and cut near its middle by the one tendon that it crosses.
pub(super) fn is_tick(path: &Path, crossed: &[Foot], text_height_m: f64) -> bool {
    let length_m = path.length_m();
    let [only] = crossed else { return false };
    let share = only.distance_m / length_m;
    length_m <= TICK_M.min(TICK_H * text_height_m) && (0.25..=0.75).contains(&share)
}
