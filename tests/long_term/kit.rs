//! A slab with one tendon in it, worked out by every method.

use geo::{Coord, Polygon, Rect};
use tautplan::analysis::{Analysis, MethodForces, work};
use tautplan::floor::{End, EndKind, Floor, Point, PointKind, Run, Slab, Tendon, Zone};
use tautplan::geometry::Path;
use tautplan::job::{Job, LongTermMethod};

fn rectangle(x1: f64, y1: f64, x2: f64, y2: f64) -> Polygon<f64> {
    Rect::new(Coord { x: x1, y: y1 }, Coord { x: x2, y: y2 }).to_polygon()
}

/// 20 m by 4 m, 250 mm, with zones of this thickness and top between these places along it.
pub(crate) fn slab(zones: &[(f64, f64, f64, f64)]) -> Slab {
    Slab {
        outlines: vec![rectangle(0.0, 0.0, 20.0, 4.0)],
        thickness_m: Some(0.250),
        zones: zones
            .iter()
            .map(|&(from_m, to_m, thickness_m, top_m)| Zone {
                outline: rectangle(from_m, -1.0, to_m, 5.0),
                thickness_m,
                top_m,
            })
            .collect(),
        ..Slab::default()
    }
}

/// A tendon from (0, 2) to (20, 2) through these heights above the local soffit, in a slab of this thickness and top there.
pub(crate) fn tendon(points: &[(PointKind, f64, f64, f64, f64)]) -> Tendon {
    let at = |x: f64| Coord { x, y: 2.0 };
    let end = |kind, x| End {
        kind: Some(kind),
        place: at(x),
    };
    Tendon {
        mark: "D1".to_owned(),
        mark_drawn: true,
        made: false,
        handle: "1".to_owned(),
        layer: "TENDON-DISTRIBUTED".to_owned(),
        run: Run::Distributed,
        path: Path::through(&[at(0.0), at(20.0)]),
        tendons: 1,
        strands: Some(5),
        strand: Some("12.7".to_owned()),
        required_kn: None,
        required_kn_per_m: None,
        joints: Vec::new(),
        ends: [end(EndKind::Live, 0.0), end(EndKind::Dead, 20.0)],
        points: points
            .iter()
            .map(|&(kind, station_m, height_m, thickness_m, top_m)| Point {
                kind,
                station_m,
                place: at(station_m),
                drawn_m: Some(height_m),
                height_m: Some(height_m),
                other_soffit_m: None,
                thickness_m: Some(thickness_m),
                top_m,
            })
            .collect(),
    }
}

pub(crate) const ALL: [&str; 5] = ["en1992", "aci423", "bs8110", "as3600", "direct"];

pub(crate) fn job() -> Job {
    let mut job = Job::default();
    job.long_term.method = LongTermMethod::En1992;
    job.long_term.methods = ALL.map(str::to_owned).to_vec();
    job.long_term.published.basic_relaxation = Some(0.02);
    job.long_term.published.relaxation_stress_factor = Some(1.1);
    job.long_term.published.balanced_share = 0.8;
    job
}

pub(crate) fn worked(slab: Slab, tendon: Tendon, job: &Job) -> Analysis {
    let floor = Floor {
        tendons: vec![tendon],
        slab,
    };
    work(floor, job, Vec::new())
}

/// What each method gives for the one tendon.
pub(crate) fn each(analysis: &Analysis) -> Vec<&MethodForces> {
    let by_method = &analysis.results[0].by_method;
    by_method
        .iter()
        .map(|one| one.outcome.as_ref().expect("covered"))
        .collect()
}
