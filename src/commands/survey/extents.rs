//! Layers of lines across groups of tendons: beside them stand texts such as `D05-D24 @ 1200`.

use std::collections::{BTreeMap, BTreeSet};

use geo::{Coord, Distance, Euclidean, Intersects, Line, Point};
use rstar::primitives::{GeomWithData, Rectangle};
use rstar::{AABB, RTree};

use super::at_ends::AtEnds;
use super::picked::Picked;
use super::trade_words::{Trade, named};
use crate::drawing::{Drawing, Shape, Text};
use crate::job::Job;
use crate::patterns::pattern_of;

/// Extent lines are at least this long, metres: what is shorter is an arrow of one.
const SHORTEST_M: f64 = 0.5;
/// Sine of the least angle between an extent line and the tendons it crosses.
const SQUARE: f64 = 0.7;

/// Patterns of the layers that `is_free` lets through on which most lines cross a tendon about squarely, and a text of
/// a group stands beside one.
pub(super) fn layers(
    drawing: &Drawing,
    at_ends: &AtEnds,
    tendons: &Picked,
    job: &Job,
    is_free: impl Fn(&str) -> bool,
) -> BTreeSet<String> {
    let texts: Vec<&Text> = drawing
        .texts
        .iter()
        .filter(|text| names_group(text, job))
        .collect();
    if texts.is_empty() {
        return BTreeSet::new();
    }
    let crossed = chords(
        drawing
            .shapes
            .iter()
            .filter(|shape| tendons.picks(drawing, shape)),
    );
    let mut by_layer: BTreeMap<&str, Vec<Line<f64>>> = BTreeMap::new();
    for shape in &drawing.shapes {
        let candidate = !shape.closed && is_free(&shape.layer) && !named(Trade::Grid, &shape.layer);
        if candidate
            && !tendons.picks(drawing, shape)
            && !at_ends.draws(drawing, shape)
            && let (Some(start), Some(end)) = (shape.path.start(), shape.path.end())
            && length_m(start, end) >= SHORTEST_M
        {
            by_layer
                .entry(&shape.layer)
                .or_default()
                .push(Line::new(start, end));
        }
    }
    let fits = |lines: &Vec<Line<f64>>| {
        let crossing: Vec<&Line<f64>> = lines
            .iter()
            .filter(|line| crosses(**line, &crossed))
            .collect();
        let beside = |text: &Text| {
            let reach_m = job.conventions.label_reach * text.height_m;
            crossing.iter().any(|line| gap_m(text, **line) <= reach_m)
        };
        2 * crossing.len() > lines.len() && texts.iter().any(|text| beside(text))
    };
    let layers = by_layer.into_iter().filter(|(_, lines)| fits(lines));
    layers.map(|(layer, _)| pattern_of(layer)).collect()
}

/// Whether a text names the first and the last of a group, or how many at what spacing.
fn names_group(text: &Text, job: &Job) -> bool {
    let group = |name: &str| {
        text.content.lines().any(|line| {
            let patterns = job.conventions.group_patterns.iter();
            let mut found = patterns.filter_map(|pattern| pattern.captures(line));
            found.any(|groups| groups.name(name).is_some())
        })
    };
    group("first") && group("last") || group("number") && group("spacing")
}

type Chords = RTree<GeomWithData<Rectangle<[f64; 2]>, Line<f64>>>;

fn chords<'s>(shapes: impl Iterator<Item = &'s Shape>) -> Chords {
    let lines = shapes.flat_map(|shape| shape.path.segments());
    let lines = lines.map(|segment| Line::new(segment.start(), segment.end()));
    let boxed = lines.map(|line| {
        GeomWithData::new(
            Rectangle::from_corners(corner(line.start), corner(line.end)),
            line,
        )
    });
    let finite = |line: Line<f64>| {
        [line.start, line.end]
            .iter()
            .all(|at| at.x.is_finite() && at.y.is_finite())
    };
    RTree::bulk_load(boxed.filter(|one| finite(one.data)).collect())
}

fn corner(at: Coord<f64>) -> [f64; 2] {
    [at.x, at.y]
}

fn crosses(line: Line<f64>, tendons: &Chords) -> bool {
    let around = AABB::from_corners(corner(line.start), corner(line.end));
    let mut near = tendons.locate_in_envelope_intersecting(&around);
    near.any(|tendon| {
        let (a, b) = (line.delta(), tendon.data.delta());
        let sine = (a.x * b.y - a.y * b.x).abs();
        sine >= SQUARE * a.x.hypot(a.y) * b.x.hypot(b.y) && tendon.data.intersects(&line)
    })
}

fn gap_m(text: &Text, line: Line<f64>) -> f64 {
    let corners = text
        .corners
        .iter()
        .map(|at| Euclidean.distance(&Point::from(*at), &line));
    corners.fold(f64::INFINITY, f64::min)
}

fn length_m(a: Coord<f64>, b: Coord<f64>) -> f64 {
    (a.x - b.x).hypot(a.y - b.y)
}
