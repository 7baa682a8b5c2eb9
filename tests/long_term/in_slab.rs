//! A tendon in its slab: drop panels and steps as they are drawn, and what a method asks of the thickness.

use geo::{Coord, Polygon, Rect};
use tautplan::analysis::{Analysis, MethodForces, work};
use tautplan::floor::{End, EndKind, Floor, Point, PointKind, Run, Slab, Tendon, Zone};
use tautplan::geometry::Path;
use tautplan::job::{Job, LongTermMethod};

fn rectangle(x1: f64, y1: f64, x2: f64, y2: f64) -> Polygon<f64> {
    Rect::new(Coord { x: x1, y: y1 }, Coord { x: x2, y: y2 }).to_polygon()
}

/// 20 m by 4 m, 250 mm, with zones of this thickness and top between these places along it.
fn slab(zones: &[(f64, f64, f64, f64)]) -> Slab {
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
fn tendon(points: &[(PointKind, f64, f64, f64, f64)]) -> Tendon {
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

const ALL: [&str; 5] = ["en1992", "aci423", "bs8110", "as3600", "direct"];

fn job() -> Job {
    let mut job = Job::default();
    job.long_term.method = LongTermMethod::En1992;
    job.long_term.methods = ALL.map(str::to_owned).to_vec();
    job.long_term.published.basic_relaxation = Some(0.02);
    job.long_term.published.relaxation_stress_factor = Some(1.1);
    job.long_term.published.balanced_share = 0.8;
    job
}

fn worked(slab: Slab, tendon: Tendon, job: &Job) -> Analysis {
    let floor = Floor {
        tendons: vec![tendon],
        slab,
    };
    work(floor, job, Vec::new())
}

/// What each method gives for the one tendon.
fn each(analysis: &Analysis) -> Vec<&MethodForces> {
    let by_method = &analysis.results[0].by_method;
    by_method
        .iter()
        .map(|one| one.outcome.as_ref().expect("covered"))
        .collect()
}

const POINTS: [(PointKind, f64, f64); 3] = [
    (PointKind::Anchor, 0.0, 0.125),
    (PointKind::Low, 10.0, 0.040),
    (PointKind::Anchor, 20.0, 0.125),
];

#[test]
fn a_step_in_the_top_moves_mid_depth_with_it() {
    let all_at = |top_m: f64| {
        let points = POINTS.map(|(kind, at, height)| (kind, at, height, 0.250, top_m));
        let zones: &[_] = if top_m == 0.0 {
            &[]
        } else {
            &[(-1.0, 21.0, 0.250, top_m)]
        };
        worked(slab(zones), tendon(&points), &job())
    };
    let (level, stepped) = (all_at(0.0), all_at(-0.300));
    for (a, b) in each(&level).into_iter().zip(each(&stepped)) {
        assert!((a.mean.eccentricity - b.mean.eccentricity).abs() < 1e-9);
        for (a_kn, b_kn) in a.service_kn.iter().zip(&b.service_kn) {
            assert!((a_kn - b_kn).abs() < 1e-9 * a_kn, "{a_kn} {b_kn}");
        }
    }
}

#[test]
fn the_drying_thickness_is_the_mean_of_the_slab_as_drawn() {
    // The tendon's points see the panels; the panels themselves are 2 m of 20.
    let points = [
        (PointKind::Anchor, 0.0, 0.125, 0.250, 0.0),
        (PointKind::Low, 5.0, 0.040, 0.250, 0.0),
        (PointKind::High, 10.0, 0.380, 0.450, 0.0),
        (PointKind::Low, 15.0, 0.040, 0.250, 0.0),
        (PointKind::Anchor, 20.0, 0.125, 0.250, 0.0),
    ];
    let analysis = worked(slab(&[(9.0, 11.0, 0.450, 0.0)]), tendon(&points), &job());
    let drawn = each(&analysis)[0];
    let lines = drawn.made.equations(drawn.mean);
    let h_0 = lines.iter().find(|line| line.symbol == "h_0");
    let h_0 = h_0.expect("EN 1992-1-1 shows it").value;
    assert!(
        (h_0 - (2.0 * 450.0 + 18.0 * 250.0) / 20.0).abs() < 0.1,
        "{h_0}"
    );
}
