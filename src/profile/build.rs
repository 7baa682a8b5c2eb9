//! Points to pieces.

use super::bends::turned_at;
use super::hogging::fitted_m;
use super::{Profile, SAME_PLACE_M, Span};
use crate::floor::{Point, PointKind, Tendon};
use crate::geometry::Path;
use crate::job::Profiling;

/// Why a tendon has no curve. Each list names points by their index in the tendon.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
pub enum Unknown {
    /// The plan line has no length, or the points do not run from its one end to its other.
    #[error("the points do not run from one end of a plan line to the other")]
    NoLine,
    /// Points whose level is not known: no height, or no slab thickness there.
    #[error("{} of the points lack a height or a slab thickness", .0.len())]
    Levels(Vec<usize>),
    /// Points that stand at the station of the point before them (within a millimetre), or before it.
    #[error("{} of the points stand where the point before them stands", .0.len())]
    Coincident(Vec<usize>),
}

/// Points nearer than this to the one before are one place with two levels, metres.
const CLOSEST_POINTS_M: f64 = 1e-3;

/// A point that bends the curve.
#[derive(Debug, Clone, Copy)]
struct Knot {
    kind: PointKind,
    station_m: f64,
    level_m: f64,
}

/// The curve through a tendon's points. Levels run through where the soffit steps.
///
/// High to low: two parabolas with the hogging length of the job. Anchor to low or high: one parabola, level at the low or
/// high point. Two highs, two lows or two anchors in a row: straight. Supports do not bend the curve; they fit the hogging
/// length where the job says so.
///
/// # Errors
/// [`Unknown`] says which points lack what.
pub fn build(tendon: &Tendon, job: &Profiling) -> Result<Profile, Unknown> {
    let knots = knots(tendon)?;
    let mut rising = Vec::with_capacity(2 * knots.len());
    for (index, pair) in knots.windows(2).enumerate() {
        if let [from, to] = *pair {
            let ends = SpanEnds {
                from,
                to,
                span_m: span_around(&knots, index),
            };
            ends.pieces(&tendon.points, job, &mut rising);
        }
    }
    let corners = tendon.path.corners();
    let spans = cut_to_plan(rising, &tendon.path);
    let bends = turned_at(&spans, &corners);
    let anchors_m: Vec<f64> = tendon.joints.iter().map(|joint| joint.station_m).collect();
    Ok(Profile::new(spans, bends).divided(&anchors_m))
}

/// The points that bend the curve, checked: known levels, in order, from end to end.
fn knots(tendon: &Tendon) -> Result<Vec<Knot>, Unknown> {
    let bending = || {
        tendon
            .points
            .iter()
            .enumerate()
            .filter(|(_, point)| point.kind != PointKind::Support)
    };
    let length_m = tendon.path.length_m();
    let stations: Vec<f64> = bending().map(|(_, point)| point.station_m).collect();
    let (Some(&first_m), Some(&last_m)) = (stations.first(), stations.last()) else {
        return Err(Unknown::NoLine);
    };
    let to_its_ends =
        first_m.abs() < CLOSEST_POINTS_M && (last_m - length_m).abs() < CLOSEST_POINTS_M;
    if stations.len() < 2 || !to_its_ends || length_m < CLOSEST_POINTS_M {
        return Err(Unknown::NoLine);
    }
    let unknown: Vec<usize> = bending()
        .filter(|(_, point)| point.level_m().is_none_or(|level_m| !level_m.is_finite()))
        .map(|(index, _)| index)
        .collect();
    if !unknown.is_empty() {
        return Err(Unknown::Levels(unknown));
    }
    let coincident: Vec<usize> = bending()
        .skip(1)
        .zip(&stations)
        .filter(|((_, point), before_m)| point.station_m - **before_m < CLOSEST_POINTS_M)
        .map(|((index, _), _)| index)
        .collect();
    if !coincident.is_empty() {
        return Err(Unknown::Coincident(coincident));
    }
    let mut knots: Vec<Knot> = bending()
        .filter_map(|(_, point)| {
            Some(Knot {
                kind: point.kind,
                station_m: point.station_m,
                level_m: point.level_m()?,
            })
        })
        .collect();
    if let Some(first) = knots.first_mut() {
        first.station_m = 0.0;
    }
    if let Some(last) = knots.last_mut() {
        last.station_m = length_m;
    }
    Ok(knots)
}

/// Length from the high point or anchor at or before a gap between knots to the next one at or after it, metres.
fn span_around(knots: &[Knot], gap: usize) -> f64 {
    let carries = |knot: &&Knot| knot.kind != PointKind::Low;
    let before = knots.iter().take(gap + 1).rev().find(carries);
    let after = knots.iter().skip(gap + 1).find(carries);
    match (before, after) {
        (Some(before), Some(after)) => after.station_m - before.station_m,
        _ => 0.0,
    }
}

/// Two knots in a row, and the length of the span they stand in.
struct SpanEnds {
    from: Knot,
    to: Knot,
    span_m: f64,
}

impl SpanEnds {
    fn pieces(&self, points: &[Point], job: &Profiling, out: &mut Vec<Span>) {
        use PointKind::{Anchor, High, Low};
        let (from, to) = (self.from, self.to);
        let length_m = to.station_m - from.station_m;
        let rise_m = to.level_m - from.level_m;
        // z = level + slope x + c x²/2 from the start; the parabola that is level at one end has c = ±2 rise/l².
        let bend_per_m = 2.0 * rise_m / (length_m * length_m);
        let piece = |slope: f64, curvature_per_m: f64| Span {
            start_m: from.station_m,
            length_m,
            level_m: from.level_m,
            slope,
            curvature_per_m,
            plan_curvature_per_m: 0.0,
        };
        match (from.kind, to.kind) {
            (Anchor, Low | High) => out.push(piece(2.0 * rise_m / length_m, -bend_per_m)),
            (Low | High, Anchor) => out.push(piece(0.0, bend_per_m)),
            (High, Low) => {
                let a_m = self.hogging_m(from, to, points, job);
                self.two_parabolas(a_m, out);
            }
            (Low, High) => {
                let a_m = self.hogging_m(to, from, points, job);
                self.two_parabolas(length_m - a_m, out);
            }
            _ => out.push(piece(rise_m / length_m, 0.0)),
        }
    }

    /// Hogging length at the high point, at most the whole distance, metres.
    fn hogging_m(&self, high: Knot, low: Knot, points: &[Point], job: &Profiling) -> f64 {
        let length_m = (high.station_m - low.station_m).abs();
        let fitted = job.fit_inflection.then(|| {
            let supports: Vec<(f64, f64)> = points
                .iter()
                .filter(|point| point.kind == PointKind::Support)
                .filter(|point| {
                    point.station_m > self.from.station_m && point.station_m < self.to.station_m
                })
                .filter_map(|point| {
                    Some(((point.station_m - high.station_m).abs(), point.level_m()?))
                })
                .collect();
            fitted_m(high.level_m, low.level_m, length_m, &supports)
        });
        fitted
            .flatten()
            .unwrap_or(job.inflection * self.span_m)
            .clamp(0.0, length_m)
    }

    /// Two parabolas that meet `join_m` after the start on the chord with slope 2h/l; either may have no length.
    fn two_parabolas(&self, join_m: f64, out: &mut Vec<Span>) {
        let length_m = self.to.station_m - self.from.station_m;
        let rise_m = self.to.level_m - self.from.level_m;
        let slope = 2.0 * rise_m / length_m;
        let join_m = if join_m < SAME_PLACE_M {
            0.0
        } else if length_m - join_m < SAME_PLACE_M {
            length_m
        } else {
            join_m
        };
        let rest_m = length_m - join_m;
        if join_m > 0.0 {
            out.push(Span {
                start_m: self.from.station_m,
                length_m: join_m,
                level_m: self.from.level_m,
                slope: 0.0,
                curvature_per_m: slope / join_m,
                plan_curvature_per_m: 0.0,
            });
        }
        if rest_m > 0.0 {
            out.push(Span {
                start_m: self.from.station_m + join_m,
                length_m: rest_m,
                level_m: self.from.level_m + rise_m * join_m / length_m,
                slope,
                curvature_per_m: -slope / rest_m,
                plan_curvature_per_m: 0.0,
            });
        }
    }
}

/// Pieces cut wherever the curvature of the plan line changes, each with the curvature of its part.
fn cut_to_plan(rising: Vec<Span>, path: &Path) -> Vec<Span> {
    let runs = curvature_runs(path);
    if let [(_, curvature_per_m)] = *runs {
        return rising
            .into_iter()
            .map(|span| Span {
                plan_curvature_per_m: curvature_per_m,
                ..span
            })
            .collect();
    }
    let mut cut = Vec::with_capacity(rising.len() + runs.len());
    for span in rising {
        let first = runs
            .partition_point(|&(start_m, _)| start_m <= span.start_m + SAME_PLACE_M)
            .saturating_sub(1);
        let mut from_m = 0.0;
        for (index, &(_, plan_curvature_per_m)) in runs.iter().enumerate().skip(first) {
            let next_m = runs
                .get(index + 1)
                .map_or(f64::INFINITY, |&(start_m, _)| start_m - span.start_m);
            let last = next_m > span.length_m - SAME_PLACE_M;
            let to_m = if last { span.length_m } else { next_m };
            cut.push(Span {
                plan_curvature_per_m,
                ..span.cut(from_m, to_m)
            });
            if last {
                break;
            }
            from_m = to_m;
        }
    }
    cut
}

/// Stations where the plan curvature changes, with the curvature from there on.
fn curvature_runs(path: &Path) -> Vec<(f64, f64)> {
    let mut runs: Vec<(f64, f64)> = Vec::new();
    for (start_m, segment) in path.pieces() {
        let curvature_per_m = segment.curvature_per_m();
        let same = runs.last().is_some_and(|&(_, held)| {
            (held - curvature_per_m).abs() <= 1e-12 * held.abs().max(curvature_per_m.abs())
        });
        if !same {
            runs.push((start_m, curvature_per_m));
        }
    }
    runs
}
