//! Which soffit heights are measured from, where the local one and the general slab's are two.

mod faults;

use faults::{Fault, Reading, faults, lying_low};

use super::Worked;
use super::ground::Ground;
use super::words::{also_at, long, short};
use crate::finding::{Finding, Level, Rule, Wording};
use crate::floor::{Point, PointKind};
use crate::job::{Job, Soffit};
use crate::profile;
use crate::units::Units;

/// See [`Rule::meaning`].
pub static SOFFIT_DOUBTFUL: Rule = Rule {
    name: "soffit-doubtful",
    meaning: "In a drop, a beam or a step a height reads as it should from the soffit that the job names (height.soffit), \
              and not only from the other one: it keeps its cover and order, does not jump against its neighbours, leaves a \
              hogging radius of at least limits.hogging_radius_error_m, and a high point in a drop lies high (common \
              practice: a height read from the wrong soffit at a drop of 150 mm gives a false radius near 1 m).",
};

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
