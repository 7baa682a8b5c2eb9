//! Hand-made tendons for the rules' tests.

use geo::{Coord, Polygon};

use super::Worked;
use crate::floor::{End, EndKind, Point, PointKind, Run, Tendon};
use crate::geometry::Path;
use crate::job::Job;
use crate::losses::{EndForces, Forces, LossTotals, Steel};
use crate::profile::{Profile, Span};

/// The default job.
pub(super) fn job() -> Job {
    Job::default()
}

/// A straight tendon along x, live at the origin and dead at its end.
pub(super) fn straight(length_m: f64) -> Tendon {
    along(Path::through(&[
        Coord { x: 0.0, y: 0.0 },
        Coord {
            x: length_m,
            y: 0.0,
        },
    ]))
}

/// A tendon along a line, live at its start and dead at its end.
pub(super) fn along(path: Path) -> Tendon {
    let end = |kind, place: Option<Coord<f64>>| End {
        kind: Some(kind),
        place: place.unwrap_or_default(),
    };
    Tendon {
        mark: "D001".to_owned(),
        mark_drawn: true,
        made: false,
        handle: "2A7".to_owned(),
        layer: "TENDON-DISTRIBUTED".to_owned(),
        run: Run::Distributed,
        tendons: 1,
        strands: Some(5),
        strand: Some("12.7".to_owned()),
        required_kn: None,
        required_kn_per_m: None,
        joints: Vec::new(),
        ends: [
            end(EndKind::Live, path.start()),
            end(EndKind::Dead, path.end()),
        ],
        points: Vec::new(),
        path,
    }
}

/// A point on the x axis in a slab 200 mm thick.
pub(super) fn point(kind: PointKind, station_m: f64, height_m: Option<f64>) -> Point {
    Point {
        kind,
        station_m,
        place: Coord {
            x: station_m,
            y: 0.0,
        },
        drawn_m: None,
        height_m,
        other_soffit_m: None,
        thickness_m: Some(0.2),
        top_m: 0.0,
    }
}

/// A tendon of which only the plan is known.
pub(super) fn worked(tendon: &Tendon) -> Worked<'_> {
    Worked {
        tendon,
        profile: None,
        forces: None,
        turning: None,
        lock_off_kn: None,
        by_method: &[],
    }
}

/// One piece from a high point, level there at −40 mm, to a low point: distance l, drop h, hogging length a.
pub(super) fn high_to_low(l_m: f64, h_m: f64, a_m: f64) -> Profile {
    let join_slope = -2.0 * h_m / l_m;
    let hogging = Span {
        start_m: 0.0,
        length_m: a_m,
        level_m: -0.04,
        slope: 0.0,
        curvature_per_m: join_slope / a_m,
        plan_curvature_per_m: 0.0,
    };
    let sagging = Span {
        start_m: a_m,
        length_m: l_m - a_m,
        level_m: -0.04 - h_m * a_m / l_m,
        slope: join_slope,
        curvature_per_m: -join_slope / (l_m - a_m),
        plan_curvature_per_m: 0.0,
    };
    Profile::new(vec![hogging, sagging], Vec::new())
}

/// Forces in five strands of 98.7 mm² jacked from station 0.
pub(super) fn forces() -> Forces {
    let end = |kind| EndForces {
        kind,
        extension_mm: (kind == EndKind::Live).then_some(110.0),
        extension_net_mm: (kind == EndKind::Live).then_some(104.0),
        draw_in_reach_m: (kind == EndKind::Live).then_some(12.0),
        draw_in_reaches_far: false,
    };
    Forces {
        steel: Steel {
            area_mm2: 493.5,
            strength_mpa: 1860.0,
            modulus_mpa: 195_000.0,
        },
        jack_kn: 688.4,
        ends: [end(EndKind::Live), end(EndKind::Dead)],
        totals: LossTotals::default(),
        later: None,
        least_jacking_kn: 640.0,
        least_jacking_station_m: 20.0,
        least_jacking_angle_rad: 0.0,
        pulls: Vec::new(),
    }
}

/// A rectangle with its sides along the axes.
pub(super) fn rectangle(x0: f64, y0: f64, x1: f64, y1: f64) -> Polygon<f64> {
    geo::Rect::new(Coord { x: x0, y: y0 }, Coord { x: x1, y: y1 }).to_polygon()
}
