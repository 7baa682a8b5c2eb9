//! Floors made by hand: parabolas between heights, forces by plain friction; near enough to the trade to be looked at.

use geo::Coord;

use crate::analysis::{Analysis, PointResult, Sample, TendonResult};
use crate::annotate::place::{Quad, Spot, readable_rad};
use crate::floor::{End, EndKind, Floor, Point, PointKind, Run, Slab, Tendon};
use crate::geometry::{Path, step};
use crate::losses::{EndForces, Forces, LaterLosses, LossTotals, Steel};
use crate::profile::Profile;

/// A tendon with its result.
pub(super) type Worked = (Tendon, TendonResult);

/// A floor of those tendons, on a slab around them.
pub(super) fn analysis(tendons: Vec<Worked>) -> Analysis {
    let (tendons, results) = tendons.into_iter().unzip();
    Analysis {
        floor: Floor {
            tendons,
            slab: Slab::default(),
        },
        results,
        findings: Vec::new(),
        assumptions: vec!["the drawing names no unit; millimetres are assumed".to_owned()],
        fallbacks: Vec::new(),
    }
}

/// Parallel tendons of 30 m along x, live at both ends.
pub(super) fn band(count: u32, spacing_m: f64) -> Vec<Worked> {
    (0..count)
        .map(|i| {
            let y = f64::from(i) * spacing_m;
            let (from, to) = (Coord { x: 0.0, y }, Coord { x: 30.0, y });
            through(&format!("B{}", i + 1), &[from, to], true)
        })
        .collect()
}

/// A floor of 36 m by 24 m: bands of six at 0.3 m on four column lines, and distributed tendons every 1.2 m across
/// them; some swept sideways, some drawn from the other end.
pub(super) fn two_way() -> Vec<Worked> {
    let mut tendons = Vec::new();
    for row in 0..4_u32 {
        for i in 0..6_u32 {
            let y = 8.0 * f64::from(row) - 0.75 + 0.3 * f64::from(i);
            let mark = format!("B{:03}", 6 * row + i + 1);
            let mut places = vec![Coord { x: -0.3, y }, Coord { x: 36.3, y }];
            if row == 2 {
                places = vec![
                    Coord { x: -0.3, y },
                    Coord { x: 12.0, y },
                    Coord {
                        x: 18.0,
                        y: y + 0.4,
                    },
                    Coord {
                        x: 36.3,
                        y: y + 0.4,
                    },
                ];
            }
            if i % 2 == 1 {
                places.reverse();
            }
            tendons.push(through(&mark, &places, true));
        }
    }
    for i in 0..30_u32 {
        let x = 0.6 + 1.2 * f64::from(i);
        let (low, high) = (Coord { x, y: -1.2 }, Coord { x, y: 25.2 });
        let places = if i % 2 == 0 { [low, high] } else { [high, low] };
        tendons.push(through(&format!("D{:03}", i + 1), &places, false));
    }
    tendons
}

/// A tendon from place to place, live at its start.
pub(super) fn line(mark: &str, from: Coord<f64>, to: Coord<f64>) -> Worked {
    through(mark, &[from, to], false)
}

/// Takes the forces away and leaves the curve.
pub(super) fn without_forces((_, result): &mut Worked) {
    result.forces = None;
    for point in &mut result.points {
        point.forces_kn = [None; 4];
    }
    for sample in &mut result.samples {
        sample.forces_kn = [None; 4];
    }
}

/// Adds a high so far from either anchor.
pub(super) fn crowd_ends((tendon, result): &mut Worked, off_m: f64) {
    let high = |station_m: f64| Point {
        kind: PointKind::High,
        station_m,
        place: tendon.path.place_at(station_m),
        drawn_m: None,
        height_m: Some(0.2),
        other_soffit_m: None,
        thickness_m: Some(0.25),
        top_m: 0.0,
    };
    let (first, last) = (high(off_m), high(tendon.path.length_m() - off_m));
    tendon.points.insert(1, first);
    tendon.points.insert(tendon.points.len() - 1, last);
    let new = result.points[0];
    result.points.insert(1, new);
    result.points.insert(result.points.len() - 1, new);
}

/// Gives each point a force of its own, from which the point can be told: `from_kn` and its number.
pub(super) fn number_points((_, result): &mut Worked, from_kn: f64) {
    for (number, point) in (0_u32..).zip(&mut result.points) {
        point.forces_kn = [Some(from_kn + f64::from(number)); 4];
    }
    for sample in &mut result.samples {
        sample.forces_kn = [None; 4];
    }
}

/// Boxes of the height labels that a drafter would set beside the points.
pub(super) fn labels(analysis: &Analysis) -> Vec<Quad> {
    analysis
        .floor
        .tendons
        .iter()
        .flat_map(|tendon| {
            tendon.points.iter().map(|point| {
                let rotation_rad = readable_rad(tendon.path.heading_at(point.station_m));
                let up = rotation_rad + std::f64::consts::FRAC_PI_2;
                Spot {
                    centre: step(point.place, up, 0.11),
                    width_m: 0.36,
                    height_m: 0.12,
                    rotation_rad,
                }
                .quad(0.0)
            })
        })
        .collect()
}

const JACK_KN: f64 = 688.0;
const HIGH_M: f64 = -0.05;
const LOW_M: f64 = -0.21;

fn through(mark: &str, places: &[Coord<f64>], both_live: bool) -> Worked {
    let path = Path::through(places);
    let length_m = path.length_m();
    let spans = (length_m / 8.0).round().max(1.0);
    let ends = [
        End {
            kind: Some(EndKind::Live),
            place: path.place_at(0.0),
        },
        End {
            kind: Some(if both_live {
                EndKind::Live
            } else {
                EndKind::Dead
            }),
            place: path.place_at(length_m),
        },
    ];
    let forces = |s: f64| forces_kn(s, length_m, both_live);
    let mut points = Vec::new();
    let mut results = Vec::new();
    let mut halves = 0.0;
    while halves <= 2.0 * spans {
        let station_m = (length_m * halves / (2.0 * spans)).min(length_m);
        let kind = match halves % 2.0 {
            odd if odd > 0.5 => PointKind::Low,
            _ if halves < 0.5 || halves > 2.0 * spans - 0.5 => PointKind::Anchor,
            _ => PointKind::High,
        };
        points.push(Point {
            kind,
            station_m,
            place: path.place_at(station_m),
            drawn_m: None,
            height_m: Some(0.25 + level_m(station_m / length_m * spans)),
            other_soffit_m: None,
            thickness_m: Some(0.25),
            top_m: 0.0,
        });
        results.push(PointResult {
            angle_rad: None,
            level_m: Some(level_m(station_m / length_m * spans)),
            forces_kn: forces(station_m).map(Some),
        });
        halves += 1.0;
    }
    let samples = (0..=120_u32)
        .map(|i| {
            let station_m = length_m * f64::from(i) / 120.0;
            Sample {
                station_m,
                place: path.place_at(station_m),
                level_m: level_m(station_m / length_m * spans),
                forces_kn: forces(station_m).map(Some),
            }
        })
        .collect();
    let kinds = ends.map(|end| end.kind.unwrap_or(EndKind::Dead));
    let result = TendonResult {
        profile: Some(Profile::new(Vec::new(), Vec::new())),
        forces: Some(whole(length_m, kinds)),
        strand: Some("12.7".to_owned()),
        area_mm2: Some(493.5),
        plan_tightest: None,
        turning: None,
        points: results,
        samples,
        concrete_stress_mpa: Some(1.4),
        by_method: Vec::new(),
    };
    let tendon = Tendon {
        mark: mark.to_owned(),
        mark_drawn: true,
        made: false,
        handle: "2A".to_owned(),
        layer: "TENDON-BANDED".to_owned(),
        run: Run::Banded,
        path,
        tendons: 1,
        strands: Some(5),
        strand: Some("12.7".to_owned()),
        required_kn: None,
        required_kn_per_m: None,
        joints: Vec::new(),
        ends,
        points,
    };
    (tendon, result)
}

/// Forces of a whole tendon.
fn whole(length_m: f64, kinds: [EndKind; 2]) -> Forces {
    let both_live = kinds == [EndKind::Live; 2];
    let least_m = if both_live { 0.5 } else { 1.0 } * length_m;
    let live = |kind| EndForces {
        kind,
        extension_mm: (kind == EndKind::Live).then_some(5.6 * length_m),
        extension_net_mm: (kind == EndKind::Live).then_some(5.6 * length_m - 6.0),
        draw_in_reach_m: (kind == EndKind::Live).then_some(12.0),
        draw_in_reaches_far: false,
    };
    Forces {
        steel: Steel {
            area_mm2: 493.5,
            strength_mpa: 1860.0,
            modulus_mpa: 195_000.0,
        },
        jack_kn: JACK_KN,
        ends: kinds.map(live),
        totals: LossTotals {
            friction_curvature_kn: 1.6 * length_m,
            ..LossTotals::default()
        },
        later: Some(LaterLosses {
            mean_service_kn: forces_kn(0.4 * length_m, length_m, both_live)[3],
            ..LaterLosses::default()
        }),
        least_jacking_kn: forces_kn(least_m, length_m, both_live)[0],
        least_jacking_station_m: least_m,
        least_jacking_angle_rad: 0.0,
        pulls: Vec::new(),
    }
}

/// A wave of one span a unit: high at whole numbers, low between.
fn level_m(spans: f64) -> f64 {
    let up = f64::midpoint(1.0, (spans * std::f64::consts::TAU).cos());
    LOW_M + (HIGH_M - LOW_M) * up
}

fn forces_kn(station_m: f64, length_m: f64, both_live: bool) -> [f64; 4] {
    let friction = |s: f64| JACK_KN * (-0.008 * s).exp();
    let far_m = length_m - station_m;
    let from_m = if both_live {
        station_m.min(far_m)
    } else {
        station_m
    };
    let jacking = friction(from_m);
    let drawn = JACK_KN * (-0.008 * 24.0_f64).exp() * (0.008 * from_m).exp();
    let lock_off = jacking.min(drawn);
    [
        jacking,
        lock_off,
        lock_off - 8.0,
        0.9 * (lock_off - 8.0) - 3.0,
    ]
}
