//! Which soffit heights are measured from, where the local one and the general slab's are two.

use super::Worked;
use super::cover::duct_outside;
use super::ground::Ground;
use super::words::{also_at, long, short};
use crate::finding::{Finding, Level, Rule, Wording};
use crate::floor::{Faces, Point, PointKind, Tendon};
use crate::job::{Job, Soffit};
use crate::profile::{self, Profile};
use crate::units::{LONG, Units};

/// See [`Rule::meaning`].
pub static SOFFIT_DOUBTFUL: Rule = Rule {
    name: "soffit-doubtful",
    meaning: "In a drop, a beam or a step a height reads as it should from the soffit that the job names (height.soffit), \
              and not only from the other one: it keeps its cover and order, does not jump against its neighbours, leaves a \
              hogging radius of at least limits.hogging_radius_error_m, and a high point in a drop lies high (common \
              practice: a height read from the wrong soffit at a drop of 150 mm gives a false radius near 1 m).",
};

/// No strand climbs more steeply from one height to the next, metre per metre.
const STEEP: f64 = 0.12;
/// What rounded heights may add to that, metres.
const ROUNDED_M: f64 = 0.005;
/// Steps smaller than this are no jump of a high point, metres.
const LEAST_JUMP_M: f64 = 0.04;
/// Drops deeper than the slab by less are none, metres.
const SAME_M: f64 = 0.0005;

/// A tendon under one reading of its heights.
struct Reading<'a> {
    tendon: &'a Tendon,
    profile: Option<&'a Profile>,
}

/// What speaks against a reading of one point.
struct Fault {
    point: usize,
    text: Wording,
}

pub(super) fn soffit_doubtful(worked: &Worked, ground: &Ground, job: &Job) -> Option<Finding> {
    let tendon = worked.tendon;
    let stepped = |at: &usize| {
        let point: Option<&Point> = tendon.points.get(*at);
        point.is_some_and(|point| point.other_soffit_m.is_some())
    };
    let all: Vec<usize> = (0..tendon.points.len()).filter(stepped).collect();
    let used = Reading {
        tendon,
        profile: worked.profile,
    };
    let faults = resolved(&all, &used, ground, job)?;
    let (first, rest) = faults.split_first()?;
    let point = tendon.points.get(first.point)?;
    let others: Vec<f64> = rest
        .iter()
        .filter_map(|fault| tendon.points.get(fault.point))
        .map(|point| point.station_m)
        .collect();
    let (here, there, other) = match job.conventions.height.soffit {
        Soffit::Local => ("the local soffit", "the general slab's soffit", "general"),
        Soffit::General => ("the general slab's soffit", "the local soffit", "local"),
    };
    Some(worked.finding(
        &SOFFIT_DOUBTFUL,
        Level::Warning,
        point.station_m,
        Wording::of(|units| {
            format!(
                "read from {here} the {} at station {} lies {}, and {}; read from {there} it would lie {}, which nothing \
                 speaks against; it was left as the job says{}",
                kind(point.kind),
                long(point.station_m, units),
                below_top(point, point.height_m, units),
                first.text.in_units(units),
                below_top(point, point.other_soffit_m, units),
                also_at(&others, units)
            )
        }),
        format!(
            "if this drawing measures heights from {there}, set `soffit = \"{other}\"` in the job file's [height] table; if \
             not, correct the height, or the thickness or level of the zone it stands in"
        ),
    ))
}

/// Faults that are gone under the other reading: of all points in steps together, since a drawing has one convention;
/// or else of those in one step, or of one of them.
fn resolved(all: &[usize], used: &Reading, ground: &Ground, job: &Job) -> Option<Vec<Fault>> {
    let of = |group: &[usize]| better(group, used, ground, job);
    if all.is_empty() {
        return None;
    }
    if let Some(faults) = of(all) {
        return Some(faults);
    }
    let mut faults = Vec::new();
    for run in all.chunk_by(|a, b| a + 1 == *b) {
        match of(run) {
            Some(found) => faults.extend(found),
            None => faults.extend(run.chunks(1).filter_map(of).flatten()),
        }
    }
    (!faults.is_empty()).then_some(faults)
}

/// The faults of these points as they are, if turned to the other soffit they have none.
fn better(group: &[usize], used: &Reading, ground: &Ground, job: &Job) -> Option<Vec<Fault>> {
    let mut turned = used.tendon.clone();
    for &at in group {
        if let Some(point) = turned.points.get_mut(at) {
            point.height_m = point.other_soffit_m;
        }
    }
    let profile = profile::build(&turned, &job.profile).ok();
    let other = Reading {
        tendon: &turned,
        profile: profile.as_ref(),
    };
    let general = ground.general();
    let mut faults = faults(used, group, job);
    faults.extend(lying_low(used.tendon, &turned, group, general));
    faults.sort_by_key(|fault| fault.point);
    faults.dedup_by_key(|fault| fault.point);
    let sound = || {
        self::faults(&other, group, job).is_empty()
            && lying_low(&turned, used.tendon, group, general).is_empty()
    };
    (!faults.is_empty() && sound()).then_some(faults)
}

/// What speaks against a reading at some points and beside them.
fn faults(reading: &Reading, group: &[usize], job: &Job) -> Vec<Fault> {
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
fn lying_low(used: &Tendon, turned: &Tendon, group: &[usize], general: Faces) -> Vec<Fault> {
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

fn kind(kind: PointKind) -> &'static str {
    match kind {
        PointKind::Anchor => "anchor",
        PointKind::High => "high point",
        PointKind::Low => "low point",
        PointKind::Support => "support",
    }
}

/// Where a point lies by one of its heights.
fn below_top(point: &Point, height_m: Option<f64>, units: Units) -> String {
    let (Some(height_m), Some(level_m)) = (
        height_m,
        height_m.and_then(|height_m| point.level_of_m(height_m)),
    ) else {
        return "at no known level".to_owned();
    };
    let below_m = point.top_m - level_m;
    let (side, off_m) = if below_m < 0.0 {
        ("above", -below_m)
    } else {
        ("below", below_m)
    };
    format!(
        "{} {side} the top and {} above the soffit there",
        short(off_m, units),
        short(height_m, units)
    )
}
