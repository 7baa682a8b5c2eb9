//! Tendons that are drawn broken at their labels or where another crosses: how long a gap is to be bridged.

use geo::{BoundingRect, Coord, Intersects, Line};
use rstar::primitives::{GeomWithData, Rectangle};
use rstar::{AABB, PointDistance, RTree};
use serde_json::json;

use super::at_ends::AtEnds;
use super::picked::Picked;
use crate::drawing::{Drawing, Text};
use crate::geometry::{Path, turn_rad};
use crate::job::{Job, Proposal};

/// A longer gap is no break for a label, metres.
const LONGEST_M: f64 = 3.0;
/// Ends face one another within this angle, radians, and this far to the side, metres.
const FACING_RAD: f64 = 0.05;
const ASIDE_M: f64 = 0.02;
/// A closed line no longer than this around may be a column, metres.
const COLUMN_M: f64 = 8.0;
/// So many gaps with something in them are a habit; one at a column is one.
const HABIT: usize = 3;
/// Gaps of one habit: none is longer than this many times their middle one.
const ALIKE: f64 = 2.0;
/// Values are rounded up to this, metres.
const STEP_M: f64 = 0.05;

/// An end of a piece of a tendon, and where the piece would go on from it.
struct Tip<'d> {
    layer: &'d str,
    piece: usize,
    place: Coord<f64>,
    out_rad: f64,
}

/// A gap between two ends that face one another, and whether something that it was left for stands in it.
struct Gap {
    length_m: f64,
    explained: bool,
    at_column: bool,
}

/// How long a gap to bridge, in millimetres; `None` where no gap, or too few, have a text or another tendon in them.
pub(super) fn proposal(
    drawing: &Drawing,
    at_ends: &AtEnds,
    tendons: &Picked,
    job: &Job,
) -> Option<Proposal> {
    if job.conventions.bridge_gap_m > 0.0 {
        return None;
    }
    let gaps = gaps(drawing, at_ends, tendons, job);
    let mut explained_m: Vec<f64> = gaps
        .iter()
        .filter(|g| g.explained)
        .map(|g| g.length_m)
        .collect();
    explained_m.sort_by(f64::total_cmp);
    let middle_m = *explained_m.get(explained_m.len() / 2)?;
    explained_m.retain(|length_m| *length_m <= ALIKE * middle_m);
    // A little more than the longest: a gap is as long as it was drawn, give or take rounding.
    let most_m = ((explained_m.last()? / STEP_M + 1e-6).floor() + 1.0) * STEP_M;
    let bridged = gaps.iter().filter(|gap| gap.length_m <= most_m).count();
    // What else would be bridged must be the exception.
    let at_column = gaps
        .iter()
        .all(|gap| gap.at_column || gap.length_m > most_m);
    ((explained_m.len() >= HABIT || at_column) && 5 * explained_m.len() >= 4 * bridged).then(|| Proposal {
        value: json!((most_m * 1000.0).round()),
        why: format!(
            "{} gaps between pieces in line, without a symbol at them, have a label, a column or a crossing tendon in them. Check it.",
            explained_m.len()
        ),
    })
}

fn gaps(drawing: &Drawing, at_ends: &AtEnds, tendons: &Picked, job: &Job) -> Vec<Gap> {
    let tips = tips(drawing, at_ends, tendons, job);
    let tree = RTree::bulk_load(
        (0..)
            .zip(&tips)
            .map(|(at, tip): (usize, _)| GeomWithData::new([tip.place.x, tip.place.y], at))
            .collect(),
    );
    let facing = |at: usize| -> Option<(usize, f64)> {
        let tip = tips.get(at)?;
        tree.locate_within_distance([tip.place.x, tip.place.y], LONGEST_M * LONGEST_M)
            .filter_map(|found| {
                let ahead_m = ahead_m(tip, tips.get(found.data)?)?;
                (ahead_m > job.conventions.join_gap_m).then_some((found.data, ahead_m))
            })
            .min_by(|a, b| a.1.total_cmp(&b.1).then(a.0.cmp(&b.0)))
    };
    let reasons = Reasons::of(drawing, tendons);
    let mut gaps = Vec::new();
    for (at, tip) in tips.iter().enumerate() {
        if let Some((other, length_m)) = facing(at)
            && at < other
            && facing(other).is_some_and(|(back, _)| back == at)
            && let Some(over) = tips.get(other)
        {
            let gap = Line::new(tip.place, over.place);
            let at_column = reasons.column_in(gap);
            gaps.push(Gap {
                length_m,
                explained: at_column || reasons.stand_in(gap),
                at_column,
            });
        }
    }
    gaps
}

/// Ends at which nothing stands that ends a tendon.
fn tips<'d>(drawing: &'d Drawing, at_ends: &AtEnds, tendons: &Picked, job: &Job) -> Vec<Tip<'d>> {
    let stops = RTree::bulk_load(at_ends.stops.iter().map(|at| [at.x, at.y]).collect());
    let reach_m = job.conventions.end_reach_m;
    let stopped = |at: Coord<f64>| {
        stops
            .locate_within_distance([at.x, at.y], reach_m * reach_m)
            .next()
            .is_some()
    };
    let mut tips = Vec::new();
    for (piece, shape) in drawing.shapes.iter().enumerate() {
        if shape.closed || !tendons.picks(drawing, shape) || at_ends.draws(drawing, shape) {
            continue;
        }
        for (place, out_rad) in ends(&shape.path) {
            if place.x.is_finite() && place.y.is_finite() && !stopped(place) {
                tips.push(Tip {
                    layer: &shape.layer,
                    piece,
                    place,
                    out_rad,
                });
            }
        }
    }
    tips
}

/// Both ends of a line, with the heading in which it would go on.
fn ends(path: &Path) -> Vec<(Coord<f64>, f64)> {
    let start = path
        .start()
        .map(|at| (at, path.heading_at(0.0) + std::f64::consts::PI));
    let last = path
        .segments()
        .last()
        .map(|last| last.heading_at(last.length_m()));
    start.into_iter().chain(path.end().zip(last)).collect()
}

fn ahead_m(tip: &Tip<'_>, other: &Tip<'_>) -> Option<f64> {
    let facing = turn_rad(tip.out_rad - other.out_rad - std::f64::consts::PI).abs() <= FACING_RAD;
    let (sin, cos) = tip.out_rad.sin_cos();
    let (dx, dy) = (other.place.x - tip.place.x, other.place.y - tip.place.y);
    let (ahead_m, aside_m) = (cos * dx + sin * dy, (cos * dy - sin * dx).abs());
    let one_line = tip.layer == other.layer && tip.piece != other.piece;
    (one_line && facing && aside_m <= ASIDE_M && ahead_m > 0.0).then_some(ahead_m)
}

/// What a line may be broken for: texts, columns, and tendons that cross.
struct Reasons<'d> {
    texts: RTree<GeomWithData<[f64; 2], &'d Text>>,
    crossing: RTree<GeomWithData<Rectangle<[f64; 2]>, Line<f64>>>,
    columns: RTree<Rectangle<[f64; 2]>>,
}

impl<'d> Reasons<'d> {
    fn of(drawing: &'d Drawing, tendons: &Picked) -> Self {
        let texts = drawing.texts.iter().map(|text| {
            let [a, b, c, d] = text.corners;
            let middle = (a + b + c + d) / 4.0;
            GeomWithData::new([middle.x, middle.y], text)
        });
        let lines = drawing
            .shapes
            .iter()
            .filter(|shape| tendons.picks(drawing, shape));
        let lines = lines
            .flat_map(|shape| shape.path.segments())
            .map(|segment| {
                let line = Line::new(segment.start(), segment.end());
                let corners =
                    Rectangle::from_corners([line.start.x, line.start.y], [line.end.x, line.end.y]);
                GeomWithData::new(corners, line)
            });
        let small = drawing
            .shapes
            .iter()
            .filter(|shape| shape.closed && shape.path.length_m() <= COLUMN_M);
        let columns = small.filter_map(|shape| {
            let around = shape.path.to_line_string(ASIDE_M).bounding_rect()?;
            Some(Rectangle::from_corners(
                [around.min().x, around.min().y],
                [around.max().x, around.max().y],
            ))
        });
        Self {
            columns: RTree::bulk_load(
                columns
                    .filter(|one| one.distance_2(&[0.0, 0.0]).is_finite())
                    .collect(),
            ),
            texts: RTree::bulk_load(
                texts
                    .filter(|text| text.geom().iter().all(|x| x.is_finite()))
                    .collect(),
            ),
            crossing: RTree::bulk_load(lines.filter(|line| finite(line.data)).collect()),
        }
    }

    fn column_in(&self, gap: Line<f64>) -> bool {
        let middle = [
            f64::midpoint(gap.start.x, gap.end.x),
            f64::midpoint(gap.start.y, gap.end.y),
        ];
        self.columns.locate_at_point(&middle).is_some()
    }

    fn stand_in(&self, gap: Line<f64>) -> bool {
        let (from, to) = ([gap.start.x, gap.start.y], [gap.end.x, gap.end.y]);
        let length_m = (to[0] - from[0]).hypot(to[1] - from[1]);
        let middle = [f64::midpoint(from[0], to[0]), f64::midpoint(from[1], to[1])];
        let holds = |text: &Text| {
            let [a, b, c, d] = text.corners;
            let at = (a + b + c + d) / 4.0;
            let along = ((at.x - from[0]) * (to[0] - from[0])
                + (at.y - from[1]) * (to[1] - from[1]))
                / length_m;
            let aside =
                ((at.x - from[0]) * (to[1] - from[1]) - (at.y - from[1]) * (to[0] - from[0])).abs()
                    / length_m;
            (0.0..=length_m).contains(&along) && aside <= text.height_m
        };
        let mut texts = self
            .texts
            .locate_within_distance(middle, 0.25 * length_m * length_m + 1e-9);
        let around = AABB::from_corners(from, to);
        let mut lines = self.crossing.locate_in_envelope_intersecting(&around);
        texts.any(|text| holds(text.data)) || lines.any(|line| crosses(line.data, gap))
    }
}

/// Whether a line crosses a gap: one that only touches its ends is one of the pieces.
fn crosses(line: Line<f64>, gap: Line<f64>) -> bool {
    let (along, across) = (gap.delta(), line.delta());
    let sine = (along.x * across.y - along.y * across.x).abs();
    let square = sine > 0.2 * along.x.hypot(along.y) * across.x.hypot(across.y);
    square && line.intersects(&gap)
}

fn finite(line: Line<f64>) -> bool {
    [line.start.x, line.start.y, line.end.x, line.end.y]
        .iter()
        .all(|x| x.is_finite())
}
