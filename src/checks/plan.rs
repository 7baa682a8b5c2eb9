//! What the line does in plan.

use super::Worked;
use super::words::{also_at, long, worst_of};
use crate::finding::{Finding, Level, Rule, Wording};
use crate::geometry::{Path, Segment};
use crate::job::Job;
use crate::profile::Tightest;
use crate::units::LONG;

/// See [`Rule::meaning`].
pub static PLAN_RADIUS: Rule = Rule {
    name: "plan-radius",
    meaning: "In plan a tendon turns with at least limits.plan_radius_m (common practice: 6 m flat duct, 3 m single strand); \
              at a bare vertex the largest fillet that fits counts.",
};

/// Turns below half a degree are drafting, not bends.
const DRAFTING_RAD: f64 = 0.5 * std::f64::consts::PI / 180.0;

/// A turn in plan.
#[derive(Debug, Clone, Copy, PartialEq)]
struct Turn {
    station_m: f64,
    radius_m: f64,
    angle_rad: f64,
    bare: bool,
}

/// Least radius of a plan line, over its arcs and the largest fillets of its bare vertices, and where; `None` if straight.
/// Turns below half a degree are left out.
pub fn tightest_in_plan(path: &Path) -> Option<Tightest> {
    turns(path)
        .into_iter()
        .map(|turn| Tightest {
            radius_m: turn.radius_m,
            station_m: turn.station_m,
        })
        .min_by(|a, b| a.radius_m.total_cmp(&b.radius_m))
}

fn turns(path: &Path) -> Vec<Turn> {
    let mut found: Vec<Turn> = path
        .corners()
        .into_iter()
        .filter(|corner| corner.turn_rad.abs() >= DRAFTING_RAD)
        .map(|corner| Turn {
            station_m: corner.station_m,
            radius_m: corner.fillet_radius_m,
            angle_rad: corner.turn_rad.abs(),
            bare: true,
        })
        .collect();
    // Arcs in a row that turn the same way are one curve: a spline comes as many short arcs.
    let mut curve: Vec<(f64, f64, f64)> = Vec::new();
    let pieces: Vec<(f64, &Segment)> = path.pieces().collect();
    for (index, &(start_m, piece)) in pieces.iter().enumerate() {
        let Segment::Arc {
            radius_m,
            sweep_rad,
            ..
        } = *piece
        else {
            continue;
        };
        curve.push((start_m + piece.length_m() / 2.0, radius_m, sweep_rad));
        let goes_on = matches!(
            pieces.get(index + 1),
            Some((_, Segment::Arc { sweep_rad: next_rad, .. })) if (*next_rad > 0.0) == (sweep_rad > 0.0)
        );
        if goes_on {
            continue;
        }
        let angle_rad: f64 = curve.iter().map(|arc| arc.2.abs()).sum();
        let tightest = curve.iter().copied().min_by(|a, b| a.1.total_cmp(&b.1));
        if let Some((station_m, radius_m, _)) = tightest
            && angle_rad >= DRAFTING_RAD
        {
            found.push(Turn {
                station_m,
                radius_m,
                angle_rad,
                bare: false,
            });
        }
        curve.clear();
    }
    found
}

pub(super) fn plan_radius(worked: &Worked, job: &Job) -> Option<Finding> {
    let limit_m = job.limits.plan_radius_m;
    let tight: Vec<Turn> = turns(&worked.tendon.path)
        .into_iter()
        .filter(|turn| turn.radius_m < limit_m - 1e-6)
        .collect();
    let (worst, others) = worst_of(tight, |turn| -turn.radius_m, |turn| turn.station_m)?;
    let degrees = worst.angle_rad.to_degrees();
    let on = if worst.bare {
        "at a bare vertex, where the largest fillet that fits its legs has"
    } else {
        "on"
    };
    Some(worked.finding(
        &PLAN_RADIUS,
        Level::Warning,
        worst.station_m,
        Wording::of(|units| {
            format!(
                "the plan line turns {degrees:.1}° {on} a radius of {}; at least {} was expected (limits.plan_radius_m){}",
                long(worst.radius_m, units),
                units.of(LONG).given(limit_m),
                also_at(&others, units)
            )
        }),
        "sweep the tendon over a greater length with a larger radius, or move the obstacle or the anchor it turns for; a \
         tight sweep pushes the duct sideways and wants hairpins",
    ))
}

#[cfg(test)]
mod tests {
    use super::super::testing::{along, job, worked};
    use super::*;
    use geo::Coord;

    fn at(x: f64, y: f64) -> Coord<f64> {
        Coord { x, y }
    }

    /// A straight, an arc of this radius through a quarter of a radian, and on.
    fn swept(radius_m: f64, sweep_rad: f64) -> Path {
        let centre = at(5.0, radius_m);
        let arc = Segment::Arc {
            centre,
            radius_m,
            start_rad: -std::f64::consts::FRAC_PI_2,
            sweep_rad,
        };
        let end = arc.end();
        Path::new([
            Segment::Line {
                from: at(0.0, 0.0),
                to: at(5.0, 0.0),
            },
            arc,
            Segment::Line {
                from: end,
                to: at(end.x + 5.0 * sweep_rad.cos(), end.y + 5.0 * sweep_rad.sin()),
            },
        ])
    }

    #[test]
    fn an_arc_may_have_the_limit_and_no_less() {
        let limit_m = job().limits.plan_radius_m;
        assert_eq!(
            plan_radius(&worked(&along(swept(limit_m, 0.25))), &job()),
            None
        );
        let found = plan_radius(&worked(&along(swept(limit_m - 0.1, 0.25))), &job());
        assert!(found.is_some_and(|f| f.level == Level::Warning && f.text.contains("14.3°")));
    }

    #[test]
    fn a_bare_vertex_counts_by_its_largest_fillet_and_drafting_noise_not_at_all() {
        let limit_m = job().limits.plan_radius_m;
        // Legs of 4 m leave a tangent of 2 m: R = 2/tan(φ/2).
        let bent = |turn_rad: f64| {
            along(Path::through(&[
                at(-4.0, 0.0),
                at(0.0, 0.0),
                at(4.0 * turn_rad.cos(), 4.0 * turn_rad.sin()),
            ]))
        };
        let limit_rad = 2.0 * (2.0 / limit_m).atan();
        assert_eq!(plan_radius(&worked(&bent(limit_rad - 0.001)), &job()), None);
        let found = plan_radius(&worked(&bent(limit_rad + 0.001)), &job());
        assert!(found.is_some_and(|f| f.station_m == Some(4.0) && f.text.contains("bare vertex")));
        let noise = along(Path::through(&[
            at(-0.02, 0.0),
            at(0.0, 0.0),
            at(4.0, 0.03),
        ]));
        assert_eq!(plan_radius(&worked(&noise), &job()), None);
    }

    #[test]
    fn a_straight_line_has_no_least_radius_and_an_arc_has_its_own() {
        let least_m = |path: &Path| tightest_in_plan(path).map(|tightest| tightest.radius_m);
        assert_eq!(least_m(&Path::through(&[at(0.0, 0.0), at(9.0, 0.0)])), None);
        assert_eq!(least_m(&swept(7.5, 0.2)), Some(7.5));
        assert_eq!(least_m(&swept(7.5, 0.001)), None);
    }
}
