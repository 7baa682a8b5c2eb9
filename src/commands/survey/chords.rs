//! Tendons as straight pieces: what crosses them, what stands beside them.

use geo::{Coord, Distance, Euclidean, Intersects, Line, Point};
use rstar::primitives::{GeomWithData, Rectangle};
use rstar::{AABB, RTree};

use crate::drawing::{Shape, Text};
use crate::geometry::distance_m;

/// Sine of the least angle at which lines cross about squarely.
const SQUARE: f64 = 0.7;

/// Straight pieces of lines.
pub(super) struct Chords(RTree<GeomWithData<Rectangle<[f64; 2]>, Line<f64>>>);

impl Chords {
    /// Those of these shapes.
    pub(super) fn of<'s>(shapes: impl Iterator<Item = &'s Shape>) -> Self {
        let lines = shapes.flat_map(|shape| shape.path.segments());
        let lines = lines.map(|segment| Line::new(segment.start(), segment.end()));
        let finite = |line: &Line<f64>| {
            [line.start, line.end]
                .iter()
                .all(|at| at.x.is_finite() && at.y.is_finite())
        };
        let boxed = lines.filter(finite).map(|line| {
            GeomWithData::new(
                Rectangle::from_corners(corner(line.start), corner(line.end)),
                line,
            )
        });
        Self(RTree::bulk_load(boxed.collect()))
    }

    /// How many pieces a line crosses about squarely.
    pub(super) fn crossed_by(&self, line: Line<f64>) -> usize {
        let around = AABB::from_corners(corner(line.start), corner(line.end));
        let near = self.0.locate_in_envelope_intersecting(&around);
        let square = |other: Line<f64>| {
            let (a, b) = (line.delta(), other.delta());
            let sine = (a.x * b.y - a.y * b.x).abs();
            sine >= SQUARE * a.x.hypot(a.y) * b.x.hypot(b.y)
        };
        near.filter(|one| square(one.data) && one.data.intersects(&line))
            .count()
    }

    /// Whether a text stands within reach of one of them.
    pub(super) fn beside(&self, text: &Text, reach_m: f64) -> bool {
        let xs = text.corners.iter().map(|at| at.x);
        let ys = text.corners.iter().map(|at| at.y);
        let low = [
            xs.clone().fold(f64::INFINITY, f64::min),
            ys.clone().fold(f64::INFINITY, f64::min),
        ];
        let high = [
            xs.fold(f64::NEG_INFINITY, f64::max),
            ys.fold(f64::NEG_INFINITY, f64::max),
        ];
        let around = AABB::from_corners(low.map(|x| x - reach_m), high.map(|x| x + reach_m));
        let mut near = self.0.locate_in_envelope_intersecting(&around);
        near.any(|one| gap_m(text, one.data) <= reach_m)
    }
}

/// How far a text's corners are from a line, metres.
pub(super) fn gap_m(text: &Text, line: Line<f64>) -> f64 {
    let corners = text
        .corners
        .iter()
        .map(|at| Euclidean.distance(&Point::from(*at), &line));
    corners.fold(f64::INFINITY, f64::min)
}

/// A line from end to end, where it is at least this long.
pub(super) fn straight(shape: &Shape, least_m: f64) -> Option<Line<f64>> {
    let (start, end) = (shape.path.start()?, shape.path.end()?);
    (!shape.closed && distance_m(start, end) >= least_m).then(|| Line::new(start, end))
}

fn corner(at: Coord<f64>) -> [f64; 2] {
    [at.x, at.y]
}
