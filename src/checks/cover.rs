//! Where the duct lies between the slab's faces.

use super::Worked;
use super::chords::Chords;
use super::ground::{Ground, Stretch};
use super::words::{also_at, short, worst_of};
use crate::finding::{Finding, Level, Rule, Wording};
use crate::floor::{Faces, Point, PointKind};
use crate::job::{Datum, Job};
use crate::profile::Span;
use crate::units::Units;

/// See [`Rule::meaning`].
pub static HEIGHT_OUTSIDE_COVER: Rule = Rule {
    name: "height-outside-cover",
    meaning: "Along the whole curve the duct lies in the local slab with limits.cover_mm of concrete to either face.",
};

/// Overruns below this are rounding, metres.
const ROUNDING_M: f64 = 1e-6;

/// Two bad places nearer than this are one place, metres.
const ONE_PLACE_M: f64 = 1.0;

pub(super) fn height_outside_cover(
    worked: &Worked,
    ground: &Ground,
    chords: &Chords,
    job: &Job,
) -> Option<Finding> {
    let mut overruns = Vec::new();
    if let Some(profile) = worked.profile {
        let stretches = ground.faces_along(chords);
        let mut first = 0;
        for span in &profile.spans {
            let end_m = span.end_m();
            while stretches
                .get(first)
                .is_some_and(|held| held.to_m <= span.start_m)
            {
                first += 1;
            }
            let within = stretches
                .iter()
                .skip(first)
                .take_while(|held| held.from_m < end_m);
            for stretch in within {
                overruns.extend(overrun_in(span, stretch, job));
            }
        }
    }
    // Where there is no curve, the heights that are known are still checked where they stand; support heights always.
    for point in &worked.tendon.points {
        if worked.profile.is_some() && point.kind != PointKind::Support {
            continue;
        }
        if let Some(level_m) = point.level_m() {
            let bend = match point.kind {
                PointKind::High => -1.0,
                PointKind::Low => 1.0,
                PointKind::Anchor | PointKind::Support => 0.0,
            };
            overruns.extend(overrun_at(
                point.station_m,
                level_m,
                point.faces(),
                bend,
                job,
            ));
        }
    }
    let (worst, others) = worst_of(merged(overruns), |o| o.over_m, |o| o.station_m)?;
    Some(worked.finding(
        &HEIGHT_OUTSIDE_COVER,
        Level::Error,
        worst.station_m,
        Wording::of(|units| overrun_text(&worst, job, units) + &also_at(&others, units)),
        "correct the height, or the slab thickness if a zone or its text is wrong; check which soffit and which part of the \
         duct the heights are measured to, since a height read from the wrong soffit looks like this",
    ))
}

/// A place where the duct comes too near a face.
struct Overrun {
    station_m: f64,
    /// By how much, metres.
    over_m: f64,
    level_m: f64,
    faces: Faces,
    /// Clear distance between duct and face, metres; negative outside.
    clear_m: f64,
    top: bool,
}

/// Distances from the strands' centroid down to the duct's underside and up to its top, metres. Where heights are given
/// to the duct, the strand lies in it as it is pulled: at its top where the curve sags, at its bottom where it hogs.
fn duct_around(curvature_per_m: f64, job: &Job) -> (f64, f64) {
    let height_m = job.tendon.duct_height_m;
    let reading = &job.conventions.height;
    let below_m = match reading.datum {
        Datum::DuctUnderside | Datum::Chair if curvature_per_m > 0.0 => {
            reading.strand_in_duct_low_m
        }
        Datum::DuctUnderside | Datum::Chair if curvature_per_m < 0.0 => {
            reading.strand_in_duct_high_m
        }
        Datum::DuctUnderside | Datum::Chair | Datum::Centroid => height_m / 2.0,
    };
    (below_m, height_m - below_m)
}

fn overrun_at(
    station_m: f64,
    level_m: f64,
    faces: Faces,
    curvature_per_m: f64,
    job: &Job,
) -> Option<Overrun> {
    let (below_m, above_m) = duct_around(curvature_per_m, job);
    let clear_top_m = faces.top_m - (level_m + above_m);
    let clear_soffit_m = faces
        .soffit_m()
        .map(|soffit_m| level_m - below_m - soffit_m);
    let top = clear_soffit_m.is_none_or(|clear_m| clear_top_m < clear_m);
    let clear_m = clear_soffit_m.map_or(clear_top_m, |clear_m| clear_m.min(clear_top_m));
    let over_m = job.limits.cover_m - clear_m;
    (over_m > ROUNDING_M).then_some(Overrun {
        station_m,
        over_m,
        level_m,
        faces,
        clear_m,
        top,
    })
}

fn overrun_of(point: &Point, level_m: f64, job: &Job) -> Option<Overrun> {
    let bend = match point.kind {
        PointKind::High => -1.0,
        PointKind::Low => 1.0,
        PointKind::Anchor | PointKind::Support => 0.0,
    };
    overrun_at(point.station_m, level_m, point.faces(), bend, job)
}

/// What the duct of a point does that it should not at the faces there, in words; `None` where nothing.
pub(super) fn duct_outside(point: &Point, job: &Job) -> Option<Wording> {
    let overrun = overrun_of(point, point.level_m()?, job)?;
    let face = if overrun.top { "top" } else { "soffit" };
    Some(Wording::of(|units| {
        duct_words(&overrun, &format!(" to the {face}"), units)
    }))
}

/// The worst place of one piece of curve between faces that do not step: at its ends or where it is level.
fn overrun_in(span: &Span, stretch: &Stretch<Faces>, job: &Job) -> Option<Overrun> {
    let from_m = (stretch.from_m - span.start_m).max(0.0);
    let to_m = (stretch.to_m - span.start_m).min(span.length_m);
    let level_along_m = -span.slope / span.curvature_per_m;
    let level_place = (level_along_m > from_m && level_along_m < to_m).then_some(level_along_m);
    [Some(from_m), level_place, Some(to_m)]
        .into_iter()
        .flatten()
        .filter_map(|along_m| {
            let level_m = span.level_at(along_m);
            let station_m = span.start_m + along_m;
            overrun_at(station_m, level_m, stretch.holds, span.curvature_per_m, job)
        })
        .reduce(|held, next| {
            if next.over_m > held.over_m {
                next
            } else {
                held
            }
        })
}

/// Bad places with those next to one another taken together, each at its worst.
fn merged(mut overruns: Vec<Overrun>) -> Vec<Overrun> {
    overruns.sort_by(|a, b| a.station_m.total_cmp(&b.station_m));
    let mut kept: Vec<Overrun> = Vec::new();
    for next in overruns {
        match kept.last_mut() {
            Some(last) if last.top == next.top && next.station_m - last.station_m < ONE_PLACE_M => {
                if next.over_m > last.over_m {
                    *last = next;
                }
            }
            _ => kept.push(next),
        }
    }
    kept
}

fn overrun_text(worst: &Overrun, job: &Job, units: Units) -> String {
    let short = |length_m: f64| short(length_m, units);
    let slab = worst
        .faces
        .thickness_m
        .map_or("slab".to_owned(), |thickness_m| {
            format!("{} slab", short(thickness_m))
        });
    let below_top_m = worst.faces.top_m - worst.level_m;
    let strand = match (worst.top, worst.faces.soffit_m()) {
        (false, Some(soffit_m)) => {
            let height_m = worst.level_m - soffit_m;
            if height_m < 0.0 {
                format!(
                    "the strand is {} below the soffit of the {slab}",
                    short(-height_m)
                )
            } else {
                format!(
                    "the strand is {} above the soffit of the {slab}",
                    short(height_m)
                )
            }
        }
        _ if below_top_m < 0.0 => {
            format!(
                "the strand is {} above the top of the {slab}",
                short(-below_top_m)
            )
        }
        _ => format!(
            "the strand is {} below the top of the {slab}",
            short(below_top_m)
        ),
    };
    let duct = duct_words(worst, "", units);
    format!(
        "{strand} and {duct}; at least {} of cover was expected (limits.cover_mm, tendon.duct_height_mm {})",
        short(job.limits.cover_m),
        short(job.tendon.duct_height_m)
    )
}

fn duct_words(overrun: &Overrun, of_face: &str, units: Units) -> String {
    let face = if overrun.top { "top" } else { "soffit" };
    if overrun.clear_m < 0.0 {
        format!(
            "its duct passes the {face} by {}",
            short(-overrun.clear_m, units)
        )
    } else {
        format!(
            "its duct has {} of cover{of_face}",
            short(overrun.clear_m, units)
        )
    }
}

#[cfg(test)]
mod tests {
    use super::super::testing::{job, point, straight, worked};
    use super::*;
    use crate::floor::{Slab, Tendon, Zone};
    use crate::profile::Profile;
    use geo::polygon;

    fn slab_200() -> Slab {
        Slab {
            thickness_m: Some(0.2),
            ..Slab::default()
        }
    }

    fn cover_finding(tendon: &Tendon, profile: &Profile, slab: &Slab) -> Option<Finding> {
        let mut worked = worked(tendon);
        worked.profile = Some(profile);
        let ground = Ground::of(slab);
        height_outside_cover(&worked, &ground, &Chords::of(&tendon.path), &job())
    }

    /// A level line at a height above the soffit of a slab 200 mm thick.
    fn level(height_m: f64) -> Profile {
        Profile::new(
            vec![Span {
                start_m: 0.0,
                length_m: 10.0,
                level_m: height_m - 0.2,
                slope: 0.0,
                curvature_per_m: 0.0,
                plan_curvature_per_m: 0.0,
            }],
            Vec::new(),
        )
    }

    #[test]
    fn the_duct_may_lie_at_the_cover_and_no_nearer_to_either_face() {
        let tendon = straight(10.0);
        let least_m = job().limits.cover_m + job().tendon.duct_height_m / 2.0;
        for height_m in [least_m, 0.2 - least_m] {
            assert_eq!(cover_finding(&tendon, &level(height_m), &slab_200()), None);
        }
        let low = cover_finding(&tendon, &level(least_m - 0.001), &slab_200());
        assert!(low.is_some_and(|f| f.text.contains("above the soffit of the 200 mm slab")));
        let high = cover_finding(&tendon, &level(0.2 - least_m + 0.001), &slab_200());
        assert!(high.is_some_and(|f| f.text.contains("below the top of the 200 mm slab")));
    }

    #[test]
    fn a_strand_outside_the_concrete_is_said_to_be() {
        let tendon = straight(10.0);
        let found = cover_finding(&tendon, &level(-0.012), &slab_200());
        assert!(found.is_some_and(|f| f.text.contains("12 mm below the soffit")));
        let found = cover_finding(&tendon, &level(0.215), &slab_200());
        assert!(found.is_some_and(|f| f.text.contains("15 mm above the top")));
    }

    #[test]
    fn a_soffit_that_steps_up_between_points_is_met_by_the_curve() {
        let tendon = straight(10.0);
        let mut slab = slab_200();
        assert_eq!(cover_finding(&tendon, &level(0.06), &slab), None);
        slab.zones.push(Zone {
            outline: polygon![(x: 3.0, y: -1.0), (x: 5.0, y: -1.0), (x: 5.0, y: 1.0), (x: 3.0, y: 1.0)],
            thickness_m: 0.15,
            top_m: 0.0,
        });
        let found = cover_finding(&tendon, &level(0.06), &slab);
        assert!(found.is_some_and(|f| f.station_m == Some(3.0) && f.text.contains("150 mm slab")));
    }

    #[test]
    fn a_known_height_is_checked_even_where_the_curve_is_not_known() {
        let mut tendon = straight(10.0);
        tendon.points = vec![
            point(PointKind::Anchor, 0.0, Some(0.1)),
            point(PointKind::High, 4.0, Some(0.195)),
            point(PointKind::Low, 7.0, None),
            point(PointKind::Anchor, 10.0, Some(0.1)),
        ];
        let slab = slab_200();
        let ground = Ground::of(&slab);
        let chords = Chords::of(&tendon.path);
        let found = height_outside_cover(&worked(&tendon), &ground, &chords, &job());
        assert!(found.is_some_and(|f| f.station_m == Some(4.0)));
    }

    #[test]
    fn a_support_height_outside_the_cover_is_seen_beside_a_curve_that_is_not() {
        let mut tendon = straight(10.0);
        assert_eq!(cover_finding(&tendon, &level(0.1), &slab_200()), None);
        tendon.points = vec![point(PointKind::Support, 6.0, Some(0.01))];
        let found = cover_finding(&tendon, &level(0.1), &slab_200());
        assert!(found.is_some_and(|f| f.station_m == Some(6.0)));
    }

    #[test]
    fn a_height_to_the_duct_puts_the_duct_where_the_drawing_does() {
        // Underside at the cover itself, sagging: the strand lies at its place in the duct above it.
        let slab = Faces::general(Some(0.2));
        let mut job = job();
        job.conventions.height.datum = Datum::DuctUnderside;
        let strand_m = job.limits.cover_m + job.conventions.height.strand_in_duct_low_m;
        assert!(overrun_at(0.0, strand_m - 0.2, slab, 0.01, &job).is_none());
        let found = overrun_at(0.0, strand_m - 0.201, slab, 0.01, &job);
        assert!(found.is_some_and(|f| !f.top && (f.over_m - 0.001).abs() < 1e-9));
        // Hogging, the duct's top stands above the strand by the rest of the duct's height.
        let above_m = job.tendon.duct_height_m - job.conventions.height.strand_in_duct_high_m;
        let level_m = -(job.limits.cover_m + above_m);
        assert!(overrun_at(0.0, level_m, slab, -0.01, &job).is_none());
        let found = overrun_at(0.0, level_m + 0.001, slab, -0.01, &job);
        assert!(found.is_some_and(|f| f.top));
    }
}
