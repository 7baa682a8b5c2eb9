//! Mean concrete stress against areas and forces added up by hand.

use geo::{Coord, polygon};
use tautplan::analysis::{pair, stress, work};
use tautplan::floor::{End, EndKind, Floor, Point, PointKind, Run, Slab, Tendon, Zone};
use tautplan::geometry::Path;
use tautplan::job::Job;
use tautplan::profile;

fn at(x: f64, y: f64) -> Coord<f64> {
    Coord { x, y }
}

/// A straight level tendon at mid-depth, live at its start.
fn tendon(mark: &str, from: Coord<f64>, to: Coord<f64>, tendons: u32) -> Tendon {
    let path = Path::through(&[from, to]);
    let anchor = |station_m: f64, place| Point {
        kind: PointKind::Anchor,
        station_m,
        place,
        drawn_m: None,
        height_m: Some(0.125),
        other_soffit_m: None,
        thickness_m: Some(0.250),
        top_m: 0.0,
    };
    let points = vec![anchor(0.0, from), anchor(path.length_m(), to)];
    let end = |kind, place| End {
        kind: Some(kind),
        place,
    };
    Tendon {
        mark: mark.to_owned(),
        mark_drawn: true,
        made: false,
        handle: mark.to_owned(),
        layer: "TENDON-BANDED".to_owned(),
        run: Run::Banded,
        path,
        tendons,
        strands: Some(5),
        strand: Some("12.7".to_owned()),
        required_kn: None,
        required_kn_per_m: None,
        joints: Vec::new(),
        ends: [end(EndKind::Live, from), end(EndKind::Dead, to)],
        points,
    }
}

/// 20 m by 12 m, 250 mm.
fn slab() -> Slab {
    Slab {
        outlines: vec![
            polygon![(x: 0.0, y: 0.0), (x: 20.0, y: 0.0), (x: 20.0, y: 12.0), (x: 0.0, y: 12.0)],
        ],
        thickness_m: Some(0.250),
        ..Slab::default()
    }
}

/// Concrete stress of each tendon, MPa, and the mean force after lock-off of one tendon of its line, kN.
fn stresses(slab: Slab, tendons: Vec<Tendon>) -> Vec<(f64, f64)> {
    let job = Job::default();
    let floor = Floor { tendons, slab };
    let analysis = work(floor, &job, Vec::new());
    pair(&analysis)
        .map(|(tendon, result)| {
            let curve = profile::build(tendon, &job.profile).expect("levels are known");
            let locked_kn = stress(tendon, &curve, &job)
                .expect("it can be stressed")
                .mean_lockoff_kn();
            (
                result.concrete_stress_mpa.expect("the slab is known"),
                locked_kn,
            )
        })
        .collect()
}

/// kN over m², as MPa.
fn over(force_kn: f64, area_m2: f64) -> f64 {
    force_kn / area_m2 / 1000.0
}

#[track_caller]
fn close(found: f64, wanted: f64) {
    assert!(
        (found - wanted).abs() < 0.003 * wanted,
        "found {found} MPa, {wanted} MPa by hand"
    );
}

#[test]
fn one_tendon_presses_on_the_whole_width() {
    let found = stresses(slab(), vec![tendon("B1", at(0.0, 6.0), at(20.0, 6.0), 1)]);
    let (stress_mpa, locked_kn) = found[0];
    close(stress_mpa, over(locked_kn, 12.0 * 0.250));
}

#[test]
fn a_line_that_stands_for_four_tendons_presses_four_times() {
    let found = stresses(slab(), vec![tendon("B1", at(0.0, 6.0), at(20.0, 6.0), 4)]);
    let (stress_mpa, locked_kn) = found[0];
    close(stress_mpa, over(4.0 * locked_kn, 12.0 * 0.250));
}

#[test]
fn each_direction_has_sections_of_its_own() {
    let found = stresses(
        slab(),
        vec![
            tendon("B1", at(0.0, 3.0), at(20.0, 3.0), 1),
            tendon("B2", at(0.0, 9.0), at(20.0, 9.0), 1),
            tendon("D1", at(10.0, 0.0), at(10.0, 12.0), 1),
        ],
    );
    close(found[0].0, over(2.0 * found[0].1, 12.0 * 0.250));
    close(found[2].0, over(found[2].1, 20.0 * 0.250));
}

#[test]
fn thicker_zones_and_openings_count_in_the_section() {
    // All along the slab: a band 4 m wide and 400 mm thick, and an opening 2 m wide.
    let mut slab = slab();
    slab.zones.push(Zone {
        outline: polygon![(x: 0.0, y: 4.0), (x: 20.0, y: 4.0), (x: 20.0, y: 8.0), (x: 0.0, y: 8.0)],
        thickness_m: 0.400,
        top_m: 0.0,
    });
    slab.openings
        .push(polygon![(x: 0.1, y: 9.0), (x: 19.9, y: 9.0), (x: 19.9, y: 11.0), (x: 0.1, y: 11.0)]);
    let found = stresses(slab, vec![tendon("B1", at(0.0, 2.0), at(20.0, 2.0), 1)]);
    let (stress_mpa, locked_kn) = found[0];
    let wanted_mpa = over(locked_kn, 6.0 * 0.250 + 4.0 * 0.400);
    assert!(
        (stress_mpa - wanted_mpa).abs() < 0.01 * wanted_mpa,
        "{stress_mpa} against {wanted_mpa}"
    );
}
