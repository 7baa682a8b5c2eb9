//! Closed lines on the slab's layers.

use std::collections::BTreeSet;

use geo::{Area, BoundingRect, Polygon};

use super::layers::{Ground, Roles, sound};
use super::order::by_place;
use super::pieces::{Joint, chains};
use super::rules::OUTLINE_OPEN;
use crate::drawing::{Drawing, Shape, ShapeKind};
use crate::finding::{Finding, Level, Wording};
use crate::geometry::{Path, Segment, distance_m};
use crate::job::Job;
use crate::units::LONG;

/// Outlines leave the drawn line by no more than this, metres.
const CHORD_M: f64 = 0.001;
/// An outline no larger than this is a symbol's, not the slab's, metres.
const SYMBOL_M: f64 = 0.4;
/// Outlines nearer than this all along are one, metres.
const COPY_M: f64 = 0.005;

/// Closed lines on layers of one purpose, in an order that their places decide.
pub(super) fn outlines(
    drawing: &Drawing,
    job: &Job,
    roles: &Roles,
    symbols: &BTreeSet<usize>,
    ground: Ground,
    findings: &mut Vec<Finding>,
) -> Vec<Polygon<f64>> {
    let gap_m = job.conventions.join_gap_m.max(0.010);
    let shapes: Vec<&Shape> = drawing
        .shapes
        .iter()
        .enumerate()
        .filter(|(at, shape)| {
            let of = roles.of(&shape.layer, shape.look).ground;
            of == ground && sound(shape) && !symbols.contains(at)
        })
        .map(|(_, shape)| shape)
        // A filled triangle or quadrangle is a column's body; elsewhere it is an arrow's head or a legend's sample.
        .filter(|shape| shape.kind != ShapeKind::Solid || ground == Ground::Column)
        .collect();
    let whole = |shape: &&&Shape| shape.closed || super::pieces::returns(&shape.path, gap_m);
    let mut rings: Vec<Polygon<f64>> = shapes
        .iter()
        .filter(whole)
        .map(|shape| ring(&shape.path))
        .collect();
    let mut open: Vec<&Path> = shapes
        .iter()
        .filter(|shape| !whole(shape))
        .map(|shape| &shape.path)
        .collect();
    open.sort_by(|a, b| by_place(a, b));
    let joint = Joint {
        gap_m,
        turn_rad: std::f64::consts::PI,
    };
    let (chains, _) = chains(&open, joint, |_| false);
    for chain in chains {
        let path = chain.path(&open);
        if chain.closed {
            rings.push(ring(&path));
        } else if ground != Ground::Column && path.length_m() > gap_m.max(SYMBOL_M) {
            findings.push(open_outline(ground, &path));
        }
    }
    // A hole may be as small as a pipe; an edge or a zone of the size of a symbol is one.
    let least_m2 = match ground {
        Ground::Edge | Ground::Zone | Ground::Slab => SYMBOL_M * SYMBOL_M,
        _ => 1e-6,
    };
    rings.retain(|ring| ring.unsigned_area() > least_m2);
    rings.sort_by(|a, b| {
        let key = |ring: &Polygon<f64>| ring.bounding_rect().map(|r| (r.min(), r.max()));
        let (a, b) = (key(a), key(b));
        a.zip(b).map_or(std::cmp::Ordering::Equal, |(a, b)| {
            let by_x = a.0.x.total_cmp(&b.0.x).then(a.0.y.total_cmp(&b.0.y));
            by_x.then(a.1.x.total_cmp(&b.1.x))
                .then(a.1.y.total_cmp(&b.1.y))
        })
    });
    without_copies(rings)
}

/// Outlines, sorted by place, without those that lie on one before them: drawn twice, it is one.
fn without_copies(rings: Vec<Polygon<f64>>) -> Vec<Polygon<f64>> {
    let mut kept: Vec<Polygon<f64>> = Vec::new();
    for ring in rings {
        let left_m = |ring: &Polygon<f64>| ring.bounding_rect().map_or(0.0, |rect| rect.min().x);
        let within = |a: &Polygon<f64>, b: &Polygon<f64>| {
            let line = b.exterior().lines();
            let sides: Vec<Segment> = line
                .map(|l| Segment::Line {
                    from: l.start,
                    to: l.end,
                })
                .collect();
            a.exterior().coords().all(|&corner| {
                let gap_m = |side: &Segment| {
                    distance_m(side.place_at(side.nearest_along_m(corner)), corner)
                };
                sides.iter().any(|side| gap_m(side) <= COPY_M)
            })
        };
        let copy = kept
            .iter()
            .rev()
            .take_while(|held| left_m(&ring) - left_m(held) <= COPY_M)
            .any(|held| {
                (held.unsigned_area() - ring.unsigned_area()).abs() <= 0.01 * ring.unsigned_area()
                    && within(held, &ring)
                    && within(&ring, held)
            });
        if !copy {
            kept.push(ring);
        }
    }
    kept
}

fn open_outline(ground: Ground, path: &Path) -> Finding {
    let what = match ground {
        Ground::Opening => "an opening",
        Ground::Zone => "a zone",
        _ => "the slab edge",
    };
    let (start, end) = (
        path.start().unwrap_or_default(),
        path.end().unwrap_or_default(),
    );
    Finding::new(
        &OUTLINE_OPEN,
        Level::Warning,
        Wording::of(|units| {
            let long = units.of(LONG);
            format!(
                "{what} does not close: {} of line, its ends {} apart; it was left out",
                long.said(path.length_m(), 2),
                long.said(distance_m(start, end), 3)
            )
        }),
        "close the outline, or move the line to another layer if it is none",
    )
    .at_place(start)
}

fn ring(path: &Path) -> Polygon<f64> {
    Polygon::new(path.to_line_string(CHORD_M), Vec::new())
}
