//! The slab's edge and zones by what is drawn: tendons end at an edge, and a zone holds a thickness text.

use std::collections::{BTreeMap, BTreeSet};

use geo::{Area, Contains, Coord, Distance, Euclidean, Intersects, LineString, Point, Polygon};

use super::contents::Contents;
use super::picked::Picked;
use super::roles::Guesses;
use super::trade_words::{Trade, named};
use crate::drawing::{Drawing, Shape};
use crate::floor::thickness_of_line;
use crate::job::Job;
use crate::patterns::{Selectors, pattern_of};

/// Tendons end this near to an edge, metres: anchors may lie in pockets, or the line stop short of them.
const AT_EDGE_M: f64 = 0.5;
/// Of the ends within an edge, at least this share lies at it (the rest may end inside, at steps and openings).
const ENDING: f64 = 0.4;
/// An edge holds at least this share of all ends: a sheet may show several slabs.
const HOLDS: f64 = 0.2;
/// An edge is at least this share of the longest closed line around.
const LARGE: f64 = 0.1;
/// Curves are taken as chords within this, metres.
const CHORD_M: f64 = 0.02;

/// Adds edges, where no layer is named for them, and layers of zones whose texts stand on another.
pub(super) fn propose(
    drawing: &Drawing,
    contents: &Contents,
    tendons: &Picked,
    job: &Job,
    is_free: impl Fn(&str) -> bool,
    guesses: &mut Guesses,
) {
    let zone_patterns = guesses.get("slab_zone").cloned().unwrap_or_default();
    let zone = Selectors::new(&zone_patterns).unwrap_or_default();
    let picks = |named: &Selectors, shape: &Shape| {
        named.picks(
            &shape.layer,
            shape.look.colour,
            drawing.linetype(shape.look),
        )
    };
    let rings: Vec<(&Shape, Polygon<f64>)> = drawing
        .shapes
        .iter()
        .enumerate()
        .filter(|(number, shape)| shape.closed && !contents.grids.draw(*number, shape))
        .filter(|(_, shape)| is_free(&shape.layer) || picks(&zone, shape))
        .filter_map(|(_, shape)| Some((shape, area(shape)?)))
        .collect();
    if !guesses.contains_key("slab_edge") {
        let around_m = |(shape, _): &&(&Shape, Polygon<f64>)| shape.path.length_m();
        let longest_m = rings.iter().map(|ring| around_m(&ring)).fold(0.0, f64::max);
        let large = rings
            .iter()
            .filter(|ring| around_m(ring) >= LARGE * longest_m);
        let edges = edges(
            &ends(drawing, contents, tendons),
            &large.collect::<Vec<_>>(),
        );
        let patterns: BTreeSet<String> = edges
            .into_iter()
            .map(|shape| {
                let own = |pattern: &&String| {
                    Selectors::new([pattern]).is_ok_and(|one| picks(&one, shape))
                };
                let pattern = zone_patterns.iter().find(own).cloned();
                pattern.unwrap_or_else(|| pattern_of(&shape.layer))
            })
            .collect();
        if !patterns.is_empty() {
            guesses.insert("slab_edge", patterns);
        }
    }
    if zone_patterns.is_empty() {
        return;
    }
    let edge = Selectors::new(guesses.get("slab_edge").into_iter().flatten()).unwrap_or_default();
    let texts: Vec<Point<f64>> = drawing
        .texts
        .iter()
        .filter(|text| {
            text.content
                .lines()
                .any(|line| thickness_of_line(line, &job.conventions).is_some())
        })
        .map(|text| Point::from(text.place))
        .collect();
    let mut by_layer: BTreeMap<&str, [usize; 2]> = BTreeMap::new();
    for (shape, area) in rings
        .iter()
        .filter(|(shape, _)| !picks(&zone, shape) && !picks(&edge, shape))
    {
        if named(Trade::Column, &shape.layer) || named(Trade::Opening, &shape.layer) {
            continue;
        }
        let [all, told] = by_layer.entry(&shape.layer).or_default();
        *all += 1;
        *told += usize::from(texts.iter().any(|text| area.contains(text)));
    }
    let zones = by_layer
        .into_iter()
        .filter(|(_, [all, told])| 2 * told > *all);
    let zones: Vec<String> = zones.map(|(layer, _)| pattern_of(layer)).collect();
    guesses.entry("slab_zone").or_default().extend(zones);
}

/// Numbers of the lines of tendons that lie outside every edge; none where there is no edge.
pub(super) fn outside_edges(drawing: &Drawing, tendons: &Picked, edge: &Picked) -> BTreeSet<usize> {
    let edges = drawing
        .shapes
        .iter()
        .filter(|shape| shape.closed && edge.picks(drawing, shape));
    let rings: Vec<Polygon<f64>> = edges.filter_map(area).collect();
    let lies_out = |shape: &Shape| {
        let line: LineString<f64> = shape.path.to_line_string(CHORD_M);
        !rings.iter().any(|ring| ring.intersects(&line))
    };
    let lines = drawing
        .shapes
        .iter()
        .enumerate()
        .filter(|(_, shape)| !shape.closed && tendons.picks(drawing, shape));
    let out = lines.filter(|(_, shape)| !rings.is_empty() && lies_out(shape));
    out.map(|(number, _)| number).collect()
}

/// Both ends of every line of tendons.
fn ends(drawing: &Drawing, contents: &Contents, tendons: &Picked) -> Vec<Point<f64>> {
    let lines = drawing.shapes.iter().enumerate().filter(|(number, shape)| {
        !shape.closed && tendons.picks(drawing, shape) && !contents.grids.draw(*number, shape)
    });
    let ends = lines.flat_map(|(_, shape)| [shape.path.start(), shape.path.end()]);
    ends.flatten().filter(finite).map(Point::from).collect()
}

/// Closed lines at which the tendons within end; of one in another the outer one.
fn edges<'s>(ends: &[Point<f64>], rings: &[&(&'s Shape, Polygon<f64>)]) -> Vec<&'s Shape> {
    let is_edge = |area: &Polygon<f64>| {
        let off_m = |end: &Point<f64>| Euclidean.distance(end, area.exterior());
        let inside: Vec<f64> = ends
            .iter()
            .filter(|end| area.contains(*end) || off_m(end) <= AT_EDGE_M)
            .map(off_m)
            .collect();
        let at = inside.iter().filter(|off_m| **off_m <= AT_EDGE_M).count();
        #[expect(clippy::cast_precision_loss, reason = "counts of ends")]
        let enough =
            |part: usize, share: f64, all: usize| part > 1 && part as f64 >= share * all as f64;
        enough(inside.len(), HOLDS, ends.len()) && enough(at, ENDING, inside.len())
    };
    let found: Vec<&(&Shape, Polygon<f64>)> = rings
        .iter()
        .copied()
        .filter(|(_, area)| is_edge(area))
        .collect();
    let outer = |area: &Polygon<f64>| {
        let start = area.exterior().points().next();
        !found.iter().any(|(_, other)| {
            other.unsigned_area() > area.unsigned_area()
                && start.is_some_and(|start| other.contains(&start))
        })
    };
    found
        .iter()
        .filter(|(_, area)| outer(area))
        .map(|(shape, _)| *shape)
        .collect()
}

fn area(shape: &Shape) -> Option<Polygon<f64>> {
    let ring: LineString<f64> = shape.path.to_line_string(CHORD_M);
    (ring.coords().all(finite) && ring.0.len() > 3).then(|| Polygon::new(ring, Vec::new()))
}

fn finite(place: &Coord<f64>) -> bool {
    place.x.is_finite() && place.y.is_finite()
}
