//! Mean concrete stress against areas and forces added up by hand.

use std::f64::consts::PI;

use geo::{Coord, polygon};
use tautplan::analysis::{pair, stress, work};
use tautplan::floor::{End, EndKind, Floor, Point, PointKind, Run, Slab, Tendon, Zone};
use tautplan::geometry::{Path, Segment};
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

/// The floor mirrored about the y axis if so asked, then turned, then moved.
fn moved(floor: &Floor, mirrored: bool, turn_rad: f64, by: Coord<f64>) -> Floor {
    let (sin, cos) = turn_rad.sin_cos();
    let go = |place: Coord<f64>| {
        let x = if mirrored { -place.x } else { place.x };
        at(
            cos * x - sin * place.y + by.x,
            sin * x + cos * place.y + by.y,
        )
    };
    let outline = |polygon: &geo::Polygon<f64>| {
        let ring: Vec<Coord<f64>> = polygon.exterior().coords().map(|&c| go(c)).collect();
        geo::Polygon::new(geo::LineString::new(ring), Vec::new())
    };
    let mut floor = floor.clone();
    for tendon in &mut floor.tendons {
        let pieces = tendon.path.segments().iter().map(|piece| {
            let bulge = match *piece {
                Segment::Line { .. } => 0.0,
                Segment::Arc { sweep_rad, .. } => (sweep_rad / 4.0).tan(),
            };
            let bulge = if mirrored { -bulge } else { bulge };
            Segment::from_bulge(go(piece.start()), go(piece.end()), bulge)
        });
        tendon.path = Path::new(pieces.collect::<Vec<_>>());
        for point in &mut tendon.points {
            point.place = go(point.place);
        }
        for end in &mut tendon.ends {
            end.place = go(end.place);
        }
    }
    let slab = &mut floor.slab;
    for polygon in slab.outlines.iter_mut().chain(&mut slab.openings) {
        *polygon = outline(polygon);
    }
    for zone in &mut slab.zones {
        zone.outline = outline(&zone.outline);
    }
    slab.columns.clear();
    floor
}

/// The concrete stress of each tendon does not hang on how the plan lies.
fn same_however_it_lies(floor: &Floor, job: &Job) {
    let stresses = |floor: Floor| -> Vec<f64> {
        let analysis = work(floor, job, Vec::new());
        let stresses = pair(&analysis).filter_map(|(_, result)| result.concrete_stress_mpa);
        stresses.collect()
    };
    let first = stresses(moved(floor, false, 0.0, at(0.0, 0.0)));
    assert!(first.len() > 2);
    for mirrored in [false, true] {
        for turn_rad in [0.0, 0.6, 0.5 * PI, PI, 1.5 * PI] {
            for by in [at(0.0, 0.0), at(3000.0, 0.0), at(-1234.5, 777.7)] {
                let found = stresses(moved(floor, mirrored, turn_rad, by));
                for (first, found) in first.iter().zip(&found) {
                    assert!(
                        (first - found).abs() < 1e-6 * first,
                        "{first} MPa, {found} when turned by {turn_rad} and moved by {by:?}"
                    );
                }
            }
        }
    }
}

#[test]
fn stresses_do_not_hang_on_how_the_plan_lies() {
    let mut slab = slab();
    slab.zones.push(Zone {
        outline: polygon![(x: 2.0, y: 4.0), (x: 10.0, y: 4.0), (x: 10.0, y: 8.0), (x: 2.0, y: 8.0)],
        thickness_m: 0.400,
        top_m: 0.0,
    });
    slab.openings
        .push(polygon![(x: 5.2, y: 9.0), (x: 11.6, y: 9.0), (x: 11.6, y: 11.0), (x: 5.2, y: 11.0)]);
    let tendons = vec![
        tendon("B1", at(0.0, 2.0), at(10.0, 2.0), 1),
        tendon("B2", at(3.6, 6.0), at(20.0, 6.0), 3),
        tendon("B3", at(19.6, 7.0), at(6.0, 7.0), 1),
        tendon("D1", at(10.0, 0.0), at(10.0, 12.0), 2),
    ];
    same_however_it_lies(&Floor { tendons, slab }, &Job::default());
}

#[test]
fn on_a_demo_floor_stresses_do_not_hang_on_how_the_plan_lies() {
    let folder = std::path::Path::new(env!("CARGO_MANIFEST_DIR")).join("demo-drawings");
    let text = std::fs::read_to_string(folder.join("harbour-level-2.toml")).expect("a job file");
    let job = tautplan::job::read("", &text).expect("a job").job;
    let bytes = std::fs::read(folder.join("harbour-level-2.dxf")).expect("a drawing");
    let source = tautplan::drawing::open(bytes).expect("a drawing");
    let wanted = tautplan::drawing::Wanted::layers(job.layer_patterns()).expect("patterns");
    let (drawing, _) = tautplan::drawing::read(&source, &wanted, job.conventions.unit);
    let (mut floor, _) = tautplan::floor::read(&drawing, &job);
    // Bands over the columns alone would do; every tenth of the others joins them.
    let mut count = 0;
    floor.tendons.retain(|tendon| {
        count += 1;
        tendon.run == Run::Banded || count % 10 == 0
    });
    same_however_it_lies(&floor, &job);
}
