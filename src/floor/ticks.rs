//! Ticks and dots on tendons, which say where the height beside them belongs; each goes with one label.

use std::collections::HashSet;

use geo::Coord;
use rstar::RTree;
use rstar::primitives::GeomWithData;

use super::aims::Aim;
use super::arrows::aim;
use super::index::{Index, to_box_m};
use super::layers::{Roles, names, sound};
use super::settle::{Pairing, Settlement, Stakes};
use super::strokes;
use crate::drawing::{Drawing, Look, Shape, Text};
use crate::geometry::{Path, distance_m};
use crate::job::Conventions;

/// Dots are no wider than this, metres.
const DOT_M: f64 = 0.3;
/// A dot or point stands on a tendon within this, metres.
const ON_M: f64 = 0.02;
/// Short strokes are no longer than this, metres.
const STROKE_M: f64 = 0.6;
/// Ticks nearer to one another than this are one, metres.
const SAME_M: f64 = 0.005;
/// A label that fits another tick about as well is left to its place alone.
const DOUBT: f64 = 0.3;

/// A tick: the tendon that it stands on, or those that cross there.
struct Tick {
    place: Coord<f64>,
    aim: Aim,
}

/// Gives height labels without an aim the ticks beside them, one each, all matched together.
pub(super) fn aim_by_ticks(
    drawing: &Drawing,
    conventions: &Conventions,
    roles: &Roles,
    index: &Index,
    texts: &[&Text],
    aims: &mut [Option<Aim>],
) {
    let ticks = ticks(drawing, conventions, roles, index);
    if ticks.is_empty() {
        return;
    }
    let tree = RTree::bulk_load(
        ticks
            .iter()
            .enumerate()
            .map(|(at, tick)| GeomWithData::new([tick.place.x, tick.place.y], at))
            .collect(),
    );
    let mut pairings = Vec::new();
    let mut costs = Vec::new();
    for (label, text) in texts.iter().enumerate() {
        if aims.get(label).is_none_or(Option::is_some) {
            continue;
        }
        let reach_m = conventions.label_reach * text.height_m;
        let spans = text.corners.iter().map(|&c| distance_m(c, text.place));
        let span_m = reach_m + spans.fold(0.0, f64::max);
        let place = [text.place.x, text.place.y];
        let mut near: Vec<usize> = tree
            .locate_within_distance(place, span_m * span_m)
            .map(|entry| entry.data)
            .collect();
        near.sort_unstable();
        for host in near {
            let gap_m = to_box_m(ticks[host].place, &text.corners);
            if gap_m <= reach_m {
                pairings.push(Pairing {
                    label,
                    host,
                    station_m: 0.0,
                });
                let off_m = distance_m(ticks[host].place, text.place);
                costs.push((gap_m + 0.1 * off_m) / text.height_m);
            }
        }
    }
    let stakes = OneEach { costs };
    let before = vec![None; texts.len()];
    let mut settlement = Settlement::new(&pairings, texts.len(), ticks.len(), &stakes, &before);
    let taken = settlement.settle();
    for (label, pairing) in taken.into_iter().enumerate() {
        let Some(tick) = pairing.and_then(|pairing| ticks.get(pairings[pairing].host)) else {
            continue;
        };
        let doubtful =
            settlement.choices(label).len() > 1 && settlement.second_best(label, DOUBT).is_some();
        if !doubtful && let Some(aim) = aims.get_mut(label) {
            *aim = Some(tick.aim.clone());
        }
    }
}

/// One tick has one label.
struct OneEach {
    costs: Vec<f64>,
}

impl Stakes for OneEach {
    fn own(&self, pairing: usize) -> f64 {
        self.costs.get(pairing).copied().unwrap_or(f64::INFINITY)
    }

    fn shared(&self, _: usize, pairings: impl Iterator<Item = usize> + Clone) -> f64 {
        let more = u32::try_from(pairings.count().saturating_sub(1)).unwrap_or(u32::MAX);
        12.0 * f64::from(more)
    }

    fn apart_m(&self) -> f64 {
        f64::INFINITY
    }
}

/// Ticks on layers of heights, in an order that their places decide.
fn ticks(drawing: &Drawing, conventions: &Conventions, roles: &Roles, index: &Index) -> Vec<Tick> {
    let heights = |layer: &str, look: Look| {
        let role = roles.of(layer, look);
        role.label.heights && !role.label.level_lines && role.run.is_none()
    };
    let mut places: Vec<(Coord<f64>, f64)> = Vec::new();
    let shapes = drawing.shapes.iter();
    for shape in shapes.filter(|shape| heights(&shape.layer, shape.look) && sound(shape)) {
        places.extend(dot(shape).map(|(middle, radius_m)| (middle, radius_m.max(ON_M))));
        places.extend(stroke(shape, index).map(|place| (place, ON_M)));
    }
    let dots = drawing
        .dots
        .iter()
        .filter(|dot| heights(&dot.layer, dot.look));
    places.extend(dots.map(|dot| (dot.place, ON_M)));
    let blocks = names(&conventions.tick_blocks);
    let inserts = drawing.inserts.iter();
    let inserts = inserts.filter(|i| heights(&i.layer, i.look) && blocks.has(&i.block));
    places.extend(inserts.map(|insert| (insert.place, conventions.arrow_reach_m)));

    let mut ticks: Vec<Tick> = places
        .into_iter()
        .filter(|(place, _)| place.x.is_finite() && place.y.is_finite())
        .map(|(place, reach_m)| Tick {
            place,
            aim: aim(place, index, reach_m),
        })
        .filter(|tick| !tick.aim.is_empty())
        .collect();
    ticks.sort_by(|a, b| {
        let (a, b) = (a.place, b.place);
        a.x.total_cmp(&b.x).then(a.y.total_cmp(&b.y))
    });
    without_copies(ticks)
}

/// Of ticks at one place (a block's circle and the block itself) the first.
fn without_copies(ticks: Vec<Tick>) -> Vec<Tick> {
    let tree = RTree::bulk_load(
        ticks
            .iter()
            .enumerate()
            .map(|(at, tick)| GeomWithData::new([tick.place.x, tick.place.y], at))
            .collect(),
    );
    let mut gone: HashSet<usize> = HashSet::new();
    for (at, tick) in ticks.iter().enumerate() {
        if gone.contains(&at) {
            continue;
        }
        let place = [tick.place.x, tick.place.y];
        let copies = tree.locate_within_distance(place, SAME_M * SAME_M);
        gone.extend(copies.map(|entry| entry.data).filter(|&copy| copy > at));
    }
    let kept = ticks.into_iter().enumerate();
    kept.filter(|(at, _)| !gone.contains(at))
        .map(|(_, tick)| tick)
        .collect()
}

/// Middle and radius of a small round or closed shape.
fn dot(shape: &Shape) -> Option<(Coord<f64>, f64)> {
    if !shape.closed || shape.path.length_m() > 4.0 * DOT_M {
        return None;
    }
    let (mut low, mut high) = ([f64::INFINITY; 2], [f64::NEG_INFINITY; 2]);
    for place in shape.path.to_line_string(0.001).0 {
        low = [low[0].min(place.x), low[1].min(place.y)];
        high = [high[0].max(place.x), high[1].max(place.y)];
    }
    let wide_m = (high[0] - low[0]).max(high[1] - low[1]);
    let middle = Coord {
        x: f64::midpoint(low[0], high[0]),
        y: f64::midpoint(low[1], high[1]),
    };
    (wide_m <= DOT_M).then_some((middle, wide_m / 2.0))
}

/// Where a short stroke is cut, near its middle, by a tendon that it crosses.
fn stroke(shape: &Shape, index: &Index) -> Option<Coord<f64>> {
    let path: &Path = &shape.path;
    if shape.closed || path.segments().len() != 1 || path.length_m() > STROKE_M {
        return None;
    }
    let crossed = strokes::crossed(path, index);
    let middle_m = path.length_m() / 2.0;
    let nearest = crossed.iter().min_by(|a, b| {
        let off = |station_m: f64| (station_m - middle_m).abs();
        off(a.distance_m)
            .total_cmp(&off(b.distance_m))
            .then(a.line.cmp(&b.line))
    })?;
    let near_middle = (nearest.distance_m - middle_m).abs() <= path.length_m() / 4.0;
    let other = crossed
        .iter()
        .any(|foot| (foot.distance_m - nearest.distance_m).abs() > ON_M);
    (near_middle && !other).then_some(nearest.place)
}
