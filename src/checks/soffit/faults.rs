//! What speaks against one reading of a tendon's heights.

use super::super::cover::duct_outside;
use super::super::words::{long, short};
use crate::finding::Wording;
use crate::floor::{Faces, Point, PointKind, Tendon};
use crate::job::Job;
use crate::profile::Profile;
use crate::units::LONG;

/// A tendon under one reading of its heights.
pub(super) struct Reading<'a> {
    pub(super) tendon: &'a Tendon,
    pub(super) profile: Option<&'a Profile>,
}

/// What speaks against a reading of one point.
pub(super) struct Fault {
    pub(super) point: usize,
    pub(super) text: Wording,
}

/// No strand climbs more steeply from one height to the next, metre per metre.
const STEEP: f64 = 0.12;
/// What rounded heights may add to that, metres.
const ROUNDED_M: f64 = 0.005;
/// Steps smaller than this are no jump of a high point, metres.
const LEAST_JUMP_M: f64 = 0.04;
/// Drops deeper than the slab by less are none, metres.
const SAME_M: f64 = 0.0005;

/// What speaks against a reading at some points and beside them.
pub(super) fn faults(reading: &Reading, group: &[usize], job: &Job) -> Vec<Fault> {
    let points = &reading.tendon.points;
    let mut faults = Vec::new();
    for &at in group {
        let Some(point) = points.get(at) else {
            continue;
        };
        let text = duct_outside(point, job)
            .or_else(|| upside_down(points, at))
            .or_else(|| jump(points, at))
            .or_else(|| tight(reading.profile?, points, at, job))
            .or_else(|| off_curve(reading.profile?, points, at, job));
        faults.extend(text.map(|text| Fault { point: at, text }));
    }
    faults
}

/// Bending points beside a point.
fn beside(points: &[Point], at: usize) -> [Option<&Point>; 2] {
    let bends = |point: &&Point| point.kind != PointKind::Support;
    let before = points.get(..at).and_then(|p| p.iter().rev().find(bends));
    let after = points.get(at + 1..).and_then(|p| p.iter().find(bends));
    [before, after]
}

/// A high point not above the low point beside it, or the reverse.
fn upside_down(points: &[Point], at: usize) -> Option<Wording> {
    let point = points.get(at)?;
    let (up, kind) = match point.kind {
        PointKind::High => (1.0, PointKind::Low),
        PointKind::Low => (-1.0, PointKind::High),
        PointKind::Anchor | PointKind::Support => return None,
    };
    let level_m = point.level_m()?;
    let other = beside(points, at)
        .into_iter()
        .flatten()
        .filter(|other| other.kind == kind)
        .find(|other| {
            let other_m = other.level_m();
            other_m.is_some_and(|other_m| up * (level_m - other_m) <= 0.0)
        })?;
    let (which, than) = if up > 0.0 {
        ("low", "not above")
    } else {
        ("high", "not below")
    };
    Some(Wording::of(|units| {
        let station = long(other.station_m, units);
        format!("is {than} the {which} point at station {station}")
    }))
}

/// A climb from the height before or to the one after that no strand makes.
fn jump(points: &[Point], at: usize) -> Option<Wording> {
    let point = points.get(at)?;
    let level_m = point.level_m()?;
    let next = [at.checked_sub(1), Some(at + 1)];
    let mut near = next.into_iter().flatten().filter_map(|at| points.get(at));
    near.find_map(|other| {
        let (apart_m, climb_m) = (
            (other.station_m - point.station_m).abs(),
            (other.level_m()? - level_m).abs(),
        );
        (climb_m > STEEP * apart_m + ROUNDED_M).then(|| {
            Wording::of(|units| {
                format!(
                    "jumps by {} against the height at station {}",
                    short(climb_m, units),
                    long(other.station_m, units)
                )
            })
        })
    })
}

/// A hogging radius below its limit between the bending points beside a point.
fn tight(profile: &Profile, points: &[Point], at: usize, job: &Job) -> Option<Wording> {
    let station_m = points.get(at)?.station_m;
    let [before, after] = beside(points, at).map(|p| p.map_or(station_m, |p| p.station_m));
    let radius_m = profile
        .spans
        .iter()
        .filter(|span| span.curvature_per_m < 0.0)
        .filter(|span| span.end_m() > before && span.start_m < after)
        .map(|span| -1.0 / span.curvature_per_m)
        .min_by(f64::total_cmp)?;
    let limit_m = job.limits.hogging_radius_error_m;
    (radius_m < limit_m).then(|| {
        Wording::of(|units| {
            format!(
                "leaves a hogging radius of {} beside it, where {} was expected (limits.hogging_radius_error_m)",
                long(radius_m, units),
                units.of(LONG).given(limit_m)
            )
        })
    })
}

/// A support off the curve: the point itself, or one between it and the bending points beside it.
fn off_curve(profile: &Profile, points: &[Point], at: usize, job: &Job) -> Option<Wording> {
    let station_m = points.get(at)?.station_m;
    let [before, after] = beside(points, at).map(|p| p.map_or(station_m, |p| p.station_m));
    let supports = points.iter().filter(|point| {
        point.kind == PointKind::Support && point.station_m >= before && point.station_m <= after
    });
    let (support, off_m) = supports
        .filter_map(|point| {
            let off_m = point.level_m()? - profile.level_m(point.station_m);
            (off_m.abs() > job.limits.support_residual_error_m).then_some((point, off_m))
        })
        .max_by(|a, b| a.1.abs().total_cmp(&b.1.abs()))?;
    Some(Wording::of(|units| {
        format!(
            "the support height at station {} lies {} off the curve",
            long(support.station_m, units),
            short(off_m.abs(), units)
        )
    }))
}

/// High points in a drop that lie in the lower half of the general slab's depth, or lower than the tendon's high points
/// elsewhere by most of the step, where turned to the other soffit they lie as high points do.
pub(super) fn lying_low(
    used: &Tendon,
    turned: &Tendon,
    group: &[usize],
    general: Faces,
) -> Vec<Fault> {
    let depth_m = |point: &Point| Some(point.top_m - point.level_m()?);
    let elsewhere: Vec<f64> = used
        .points
        .iter()
        .filter(|point| point.kind == PointKind::High && point.other_soffit_m.is_none())
        .filter_map(depth_m)
        .collect();
    let deepest_m = elsewhere.iter().copied().reduce(f64::max);
    let fault = |&at: &usize| {
        let (point, other) = (used.points.get(at)?, turned.points.get(at)?);
        let slab_m = general.thickness_m?;
        if point.kind != PointKind::High || point.thickness_m? <= slab_m + SAME_M {
            return None;
        }
        let (here_m, there_m) = (depth_m(point)?, depth_m(other)?);
        let step_m = here_m - there_m;
        let text = match deepest_m {
            Some(usual_m)
                if step_m >= LEAST_JUMP_M
                    && here_m > usual_m + 0.5 * step_m
                    && (there_m - usual_m).abs() < 0.25 * step_m =>
            {
                Wording::of(|units| {
                    format!(
                        "lower by {} than this tendon's high points outside",
                        short(here_m - usual_m, units)
                    )
                })
            }
            _ if here_m > 0.5 * slab_m && there_m < 0.3 * slab_m => Wording::of(|units| {
                format!(
                    "lower than the middle of the general slab, {}",
                    short(0.5 * slab_m, units)
                )
            }),
            _ => return None,
        };
        Some(Fault { point: at, text })
    };
    group.iter().filter_map(fault).collect()
}
