//! Laws that hold for every tendon, tried on tendons drawn by chance.

use geo::Coord;
use proptest::prelude::*;
use tautplan::floor::{End, EndKind, Point, PointKind, PourJoint, Run, Tendon};
use tautplan::geometry::{Path, Segment};
use tautplan::job::{Job, Profiling};
use tautplan::losses::{Friction, Pulls, Steel, Stressed, first_end};
use tautplan::profile::{Profile, build};

use EndKind::{Dead, Live};

const STEEL: Steel = Steel {
    area_mm2: 493.5,
    strength_mpa: 1860.0,
    modulus_mpa: 195_000.0,
};
const JACK_KN: f64 = 688.4;
const FRICTION: Friction = Friction {
    mu_per_rad: 0.19,
    per_m: 0.19 * 0.008,
};

/// A plan line of pieces, and spans with their low's share and height, and the high that follows.
#[derive(Debug, Clone)]
struct Meant {
    bulges: Vec<f64>,
    spans: Vec<(f64, f64, f64, f64)>,
}

impl Meant {
    fn path(&self) -> Path {
        let length_m: f64 = self.spans.iter().map(|span| span.0).sum();
        let count = u32::try_from(self.bulges.len()).expect("few");
        let pieces = (0..count).zip(&self.bulges).map(|(at, &bulge)| {
            let x = |part: u32| length_m * f64::from(part) / f64::from(count);
            let to = Coord {
                x: x(at + 1),
                y: 0.0,
            };
            Segment::from_bulge(Coord { x: x(at), y: 0.0 }, to, bulge)
        });
        Path::new(pieces)
    }

    /// The tendon on this line; the heights keep their share of its length.
    fn tendon(&self, path: Path) -> Tendon {
        let total_m: f64 = self.spans.iter().map(|span| span.0).sum();
        let stretch = path.length_m() / total_m;
        let mut points = vec![(PointKind::Anchor, 0.0, 0.12)];
        let mut start_m = 0.0;
        for &(span_m, share, low_m, high_m) in &self.spans {
            points.push((PointKind::Low, start_m + share * span_m, low_m));
            start_m += span_m;
            points.push((PointKind::High, start_m, high_m));
        }
        points.pop();
        points.push((PointKind::Anchor, total_m, 0.12));
        let end = |place| End { kind: None, place };
        Tendon {
            mark: "T".to_owned(),
            mark_drawn: true,
            made: false,
            handle: "1".to_owned(),
            layer: "TENDON-BANDED".to_owned(),
            run: Run::Banded,
            tendons: 1,
            strands: Some(5),
            strand: Some("12.7".to_owned()),
            required_kn: None,
            required_kn_per_m: None,
            joints: Vec::new(),
            ends: [end(path.place_at(0.0)), end(path.place_at(path.length_m()))],
            points: points
                .into_iter()
                .map(|(kind, station_m, height_m)| Point {
                    kind,
                    station_m: station_m * stretch,
                    place: path.place_at(station_m * stretch),
                    drawn_m: None,
                    height_m: Some(height_m),
                    other_soffit_m: None,
                    thickness_m: Some(0.25),
                    top_m: 0.0,
                })
                .collect(),
            path,
        }
    }
}

fn curve(tendon: &Tendon) -> Profile {
    let profiling = Profiling {
        inflection: 0.1,
        fit_inflection: false,
    };
    build(tendon, &profiling).expect("every level is known")
}

fn reversed(tendon: &Tendon) -> Tendon {
    let length_m = tendon.path.length_m();
    let mut back = tendon.clone();
    back.path = tendon.path.reversed();
    back.points.reverse();
    for point in &mut back.points {
        point.station_m = length_m - point.station_m;
    }
    back.ends.reverse();
    back.joints.reverse();
    for joint in &mut back.joints {
        joint.station_m = length_m - joint.station_m;
    }
    back
}

/// The tendon with intermediate anchors at these shares of its length.
fn divided(mut tendon: Tendon, shares: &[f64]) -> Tendon {
    let path = &tendon.path;
    let joints = shares.iter().map(|share| {
        let station_m = share * path.length_m();
        let place = path.place_at(station_m);
        PourJoint { station_m, place }
    });
    tendon.joints = joints.collect();
    tendon
}

/// All pulls of a tendon, the pour at the left or lower end first.
fn pulled<'p>(tendon: &Tendon, profile: &'p Profile, kinds: [EndKind; 2]) -> Option<Pulls<'p>> {
    let job = Job::default().stressing;
    let first = first_end(tendon, &job.first_pour);
    Pulls::new(profile, STEEL, kinds, first, &job).ok()
}

fn shares() -> impl Strategy<Value = Vec<f64>> {
    prop_oneof![
        Just(vec![0.5]),
        (0.25..0.45, 0.55..0.75).prop_map(|(a, b)| vec![a, b]),
        (0.2..0.3, 0.4..0.6, 0.7..0.8).prop_map(|(a, b, c)| vec![a, b, c]),
    ]
}

fn stressed(profile: &Profile, kinds: [EndKind; 2], slips_m: [f64; 2]) -> Option<Stressed<'_>> {
    Stressed::jacked(profile, STEEL, JACK_KN, kinds, FRICTION, slips_m).ok()
}

/// Stations close together along a tendon.
fn stations(profile: &Profile, count: u32) -> impl Iterator<Item = f64> {
    let length_m = profile.plan_length_m();
    (0..=count).map(move |at| length_m * f64::from(at) / f64::from(count))
}

/// Of two tendons that ought to be alike, both are refused or none is.
fn alike_refused(a: Option<&Stressed<'_>>, b: Option<&Stressed<'_>>) -> Result<(), TestCaseError> {
    prop_assert_eq!(a.is_some(), b.is_some());
    Ok(())
}

fn meant() -> impl Strategy<Value = Meant> {
    (
        prop::collection::vec(-0.06..0.06, 1..5),
        prop::collection::vec((6.0..11.0, 0.38..0.62, 0.03..0.06, 0.17..0.21), 1..5),
    )
        .prop_map(|(bulges, spans)| Meant { bulges, spans })
}

fn kinds() -> impl Strategy<Value = [EndKind; 2]> {
    prop_oneof![Just([Live, Dead]), Just([Dead, Live]), Just([Live, Live])]
}

proptest! {
    #![proptest_config(ProptestConfig { failure_persistence: None, cases: 200, ..ProptestConfig::default() })]

    #[test]
    fn reversing_a_tendon_mirrors_its_forces(meant in meant(), kinds in kinds(), slip_m in 0.0..0.012) {
        let tendon = meant.tendon(meant.path());
        let (there, back) = (curve(&tendon), curve(&reversed(&tendon)));
        let turned = [kinds[1], kinds[0]];
        let both = (stressed(&there, kinds, [slip_m; 2]), stressed(&back, turned, [slip_m; 2]));
        prop_assert_eq!(both.0.is_some(), both.1.is_some());
        if let (Some(a), Some(b)) = both {
            let length_m = there.plan_length_m();
            for station_m in stations(&there, 97) {
                let ([ja, la], [jb, lb]) = (a.both_kn(station_m), b.both_kn(length_m - station_m));
                prop_assert!((ja - jb).abs() < 1e-6 * JACK_KN && (la - lb).abs() < 1e-6 * JACK_KN);
            }
        }
    }

    #[test]
    fn where_the_tendon_lies_and_how_it_is_turned_changes_nothing(
        meant in meant(), kinds in kinds(), turn_rad in -3.0..3.0, dx in -1e4..1e4, dy in -1e4..1e4,
    ) {
        let path = meant.path();
        let (sin, cos) = f64::sin_cos(turn_rad);
        let go = |p: Coord<f64>| Coord { x: cos * p.x - sin * p.y + dx, y: sin * p.x + cos * p.y + dy };
        let moved = Path::new(path.segments().iter().map(|segment| match *segment {
            Segment::Line { from, to } => Segment::Line { from: go(from), to: go(to) },
            Segment::Arc { centre, radius_m, start_rad, sweep_rad } =>
                Segment::Arc { centre: go(centre), radius_m, start_rad: start_rad + turn_rad, sweep_rad },
        }));
        let (here, there) = (curve(&meant.tendon(path)), curve(&meant.tendon(moved)));
        let both = (stressed(&here, kinds, [0.006; 2]), stressed(&there, kinds, [0.006; 2]));
        let (Some(a), Some(b)) = &both else {
            return alike_refused(both.0.as_ref(), both.1.as_ref());
        };
        for station_m in stations(&here, 50) {
            prop_assert!((a.lockoff_kn(station_m) - b.lockoff_kn(station_m)).abs() < 1e-7 * JACK_KN);
        }
    }

    #[test]
    fn splitting_the_plan_line_changes_nothing(meant in meant(), share in 0.05..0.95) {
        let whole = meant.path();
        let mut pieces = Vec::new();
        for segment in whole.segments() {
            match *segment {
                Segment::Line { from, to } => {
                    let cut = segment.place_at(share * segment.length_m());
                    pieces.extend([Segment::Line { from, to: cut }, Segment::Line { from: cut, to }]);
                }
                Segment::Arc { centre, radius_m, start_rad, sweep_rad } => pieces.extend([
                    Segment::Arc { centre, radius_m, start_rad, sweep_rad: share * sweep_rad },
                    Segment::Arc {
                        centre,
                        radius_m,
                        start_rad: start_rad + share * sweep_rad,
                        sweep_rad: (1.0 - share) * sweep_rad,
                    },
                ]),
            }
        }
        let (one, many) = (curve(&meant.tendon(whole)), curve(&meant.tendon(Path::new(pieces))));
        let both = (stressed(&one, [Live, Dead], [0.006; 2]), stressed(&many, [Live, Dead], [0.006; 2]));
        let (Some(a), Some(b)) = &both else {
            return alike_refused(both.0.as_ref(), both.1.as_ref());
        };
        for station_m in stations(&one, 50) {
            prop_assert!((a.lockoff_kn(station_m) - b.lockoff_kn(station_m)).abs() < 1e-8 * JACK_KN);
        }
    }

    #[test]
    fn a_segment_between_two_anchors_is_a_tendon_by_itself(meant in meant(), kinds in kinds(), shares in shares()) {
        let tendon = divided(meant.tendon(meant.path()), &shares);
        let whole = curve(&tendon);
        let Some(pulls) = pulled(&tendon, &whole, kinds) else { return Ok(()) };
        let forces = pulls.forces();
        prop_assert_eq!(forces.pulls.len(), shares.len() + 1);
        let (mut length_m, mut angle_rad, mut locked_kn_m) = (0.0, 0.0, 0.0);
        for (turn, pull) in forces.pulls.iter().enumerate() {
            let [from_m, to_m] = pull.stations_m;
            let alone = whole.between(from_m, to_m);
            length_m += alone.length_m();
            angle_rad += alone.total_angle_rad();
            // Of two live ends the first pull has two jacks; every other one has the far anchor's.
            let own = pull.forces.ends.map(|end| end.kind);
            prop_assert_eq!(own == [Live; 2], kinds == [Live; 2] && turn == 0);
            let alone = Stressed::new(&alone, STEEL, own, &Job::default().stressing).expect("it was stressed");
            locked_kn_m += alone.mean_lockoff_kn() * alone.profile().length_m();
            for (here, by_itself) in pull.forces.ends.iter().zip(alone.ends()) {
                prop_assert_eq!(here.kind, by_itself.kind);
                let apart_mm = |a: Option<f64>, b: Option<f64>| a.zip(b).map_or(0.0, |(a, b)| (a - b).abs());
                prop_assert_eq!(here.extension_mm.is_some(), by_itself.extension_mm.is_some());
                prop_assert!(apart_mm(here.extension_mm, by_itself.extension_mm) < 1e-9);
                prop_assert!(apart_mm(here.extension_net_mm, by_itself.extension_net_mm) < 1e-9);
            }
            for share in [0.001, 0.2, 0.5, 0.77, 0.999] {
                let along_m = share * (to_m - from_m);
                let ([ja, la], [jb, lb]) = (pulls.both_kn(from_m + along_m), alone.both_kn(along_m));
                prop_assert!((ja - jb).abs() < 1e-9 * JACK_KN && (la - lb).abs() < 1e-9 * JACK_KN);
            }
        }
        prop_assert!((length_m - whole.length_m()).abs() < 1e-9);
        // A bare vertex may stand at an anchor.
        let bent = whole.bends.iter().filter(|bend| tendon.joints.iter().any(|joint| (joint.station_m - bend.station_m).abs() < 1e-5));
        let bent_rad: f64 = bent.map(|bend| bend.angle_rad).sum();
        prop_assert!((angle_rad + bent_rad - whole.total_angle_rad()).abs() < 1e-9);
        prop_assert!((pulls.mean_lockoff_kn() - locked_kn_m / length_m).abs() < 1e-9 * JACK_KN);
        // At an anchor two forces meet, and the lesser is the tendon's.
        for joint in &tendon.joints {
            let sides: Vec<[f64; 2]> = pulls.sides_kn(joint.station_m).collect();
            prop_assert_eq!(sides.len(), 2);
            let [jacking_kn, lockoff_kn] = pulls.both_kn(joint.station_m);
            prop_assert!(jacking_kn <= sides[0][0] && jacking_kn <= sides[1][0]);
            prop_assert!(lockoff_kn <= sides[0][1] && lockoff_kn <= sides[1][1]);
        }
    }

    #[test]
    fn reversing_a_divided_tendon_mirrors_its_pulls(meant in meant(), kinds in kinds(), shares in shares()) {
        let tendon = divided(meant.tendon(meant.path()), &shares);
        let turned = reversed(&tendon);
        let (there, back) = (curve(&tendon), curve(&turned));
        let both = (pulled(&tendon, &there, kinds), pulled(&turned, &back, [kinds[1], kinds[0]]));
        prop_assert_eq!(both.0.is_some(), both.1.is_some());
        let (Some(a), Some(b)) = both else { return Ok(()) };
        let length_m = there.plan_length_m();
        for station_m in stations(&there, 97) {
            let ([ja, la], [jb, lb]) = (a.both_kn(station_m), b.both_kn(length_m - station_m));
            prop_assert!((ja - jb).abs() < 1e-6 * JACK_KN && (la - lb).abs() < 1e-6 * JACK_KN);
        }
        for (one, other) in a.forces().pulls.iter().zip(&b.forces().pulls) {
            for end in [0, 1] {
                prop_assert!((one.stations_m[end] - (length_m - other.stations_m[1 - end])).abs() < 1e-6);
                let (here, mirrored) = (&one.forces.ends[end], &other.forces.ends[1 - end]);
                prop_assert_eq!(here.kind, mirrored.kind);
                let apart_mm = here.extension_mm.zip(mirrored.extension_mm).map_or(0.0, |(a, b)| (a - b).abs());
                prop_assert!(apart_mm < 1e-4, "{apart_mm}");
            }
        }
    }

    #[test]
    fn the_area_between_the_curves_is_the_draw_in(meant in meant(), kinds in kinds(), slips_m in [0.001..0.02, 0.001..0.02]) {
        let tendon = meant.tendon(meant.path());
        let profile = curve(&tendon);
        let Some(stressed) = stressed(&profile, kinds, slips_m) else { return Ok(()) };
        let (mut area, mut before) = (0.0, None);
        for station_m in stations(&profile, 20_000) {
            let [jacking_kn, lockoff_kn] = stressed.both_kn(station_m);
            prop_assert!(lockoff_kn <= jacking_kn * (1.0 + 1e-12), "lock-off above jacking");
            let now = (profile.arc_length_m(station_m), jacking_kn - lockoff_kn);
            if let Some((arc_m, gap_kn)) = before.replace(now) {
                area += (now.0 - arc_m) * f64::midpoint(now.1, gap_kn);
            }
        }
        let slip_m: f64 = kinds.iter().zip(slips_m).filter(|(kind, _)| **kind == Live).map(|(_, slip_m)| slip_m).sum();
        let wanted = slip_m * STEEL.modulus_mpa * STEEL.area_mm2 / 1000.0;
        prop_assert!((area - wanted).abs() < 2e-3 * wanted, "area {area}, wanted {wanted}");
    }

    #[test]
    fn extensions_are_the_forces_summed_along_the_tendon(meant in meant(), kinds in kinds(), slips_m in [0.0..0.02, 0.0..0.02]) {
        let tendon = meant.tendon(meant.path());
        let profile = curve(&tendon);
        let Some(stressed) = stressed(&profile, kinds, slips_m) else { return Ok(()) };
        let (_, least_m) = stressed.least_jacking();
        // Jacking force before and beyond the place of least force, and force after lock-off all along, by strips.
        let (mut shares, mut locked_kn_m) = ([0.0; 2], 0.0);
        let mut before: Option<(f64, [f64; 2])> = None;
        let mut along: Vec<f64> = stations(&profile, 20_000).chain([least_m]).collect();
        along.sort_by(f64::total_cmp);
        for station_m in along {
            let now = (profile.arc_length_m(station_m), stressed.both_kn(station_m));
            if let Some((arc_m, [jacking_kn, lockoff_kn])) = before.replace(now) {
                let strip_m = now.0 - arc_m;
                shares[usize::from(station_m > least_m)] += strip_m * f64::midpoint(jacking_kn, now.1[0]);
                locked_kn_m += strip_m * f64::midpoint(lockoff_kn, now.1[1]);
            }
        }
        let stiffness_kn = STEEL.modulus_mpa * STEEL.area_mm2 / 1000.0;
        let (mut net_mm, mut lost_mm) = (0.0, 0.0);
        for (end, (share_kn_m, slip_m)) in stressed.ends().iter().zip(shares.iter().zip(slips_m)) {
            if let (Some(gross), Some(net)) = (end.extension_mm, end.extension_net_mm) {
                let summed_mm = 1000.0 * share_kn_m / stiffness_kn;
                prop_assert!((gross - summed_mm).abs() < 2e-3 * summed_mm, "gross {gross}, summed {summed_mm}");
                lost_mm += 1000.0 * slip_m;
                net_mm += net;
            }
        }
        let summed_mm = 1000.0 * locked_kn_m / stiffness_kn;
        prop_assert!((net_mm - summed_mm).abs() < 2e-3 * (summed_mm + lost_mm), "net {net_mm}, summed {summed_mm}");
    }

    #[test]
    fn force_never_rises_away_from_the_jack(meant in meant()) {
        let tendon = meant.tendon(meant.path());
        let profile = curve(&tendon);
        let stressed = stressed(&profile, [Live, Dead], [0.0; 2]).expect("friction leaves a force");
        let mut before_kn = JACK_KN;
        for station_m in stations(&profile, 500) {
            let now_kn = stressed.jacking_kn(station_m);
            prop_assert!(now_kn <= before_kn * (1.0 + 1e-12));
            before_kn = now_kn;
        }
    }

    #[test]
    fn the_curve_turns_and_runs_as_a_fine_polygon_does(meant in meant()) {
        let path = meant.path();
        let tendon = meant.tendon(path.clone());
        let profile = curve(&tendon);
        let places: Vec<[f64; 3]> = stations(&profile, 20_000)
            .map(|s| { let p = path.place_at(s); [p.x, p.y, profile.level_m(s)] })
            .collect();
        let chords: Vec<[f64; 3]> = places.windows(2).map(|w| std::array::from_fn(|i| w[1][i] - w[0][i])).collect();
        let size = |v: &[f64; 3]| v.iter().map(|x| x * x).sum::<f64>().sqrt();
        let length_m: f64 = chords.iter().map(size).sum();
        prop_assert!((length_m - profile.length_m()).abs() < 1e-5 * length_m);
        let angle_rad: f64 = chords
            .windows(2)
            .map(|w| {
                let (a, b) = (&w[0], &w[1]);
                let cross = [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]];
                let dot: f64 = a.iter().zip(b).map(|(x, y)| x * y).sum();
                size(&cross).atan2(dot)
            })
            .sum();
        prop_assert!((angle_rad - profile.total_angle_rad()).abs() < 2e-3 * angle_rad, "{angle_rad} {}", profile.total_angle_rad());
    }
}

/// A parabola is a quadratic Bézier curve, whose length an independent library knows.
#[test]
fn the_length_of_a_parabola_is_that_of_a_quadratic_bezier() {
    use kurbo::ParamCurveArclen;
    let meant = Meant {
        bulges: vec![0.0],
        spans: vec![(20.0, 0.5, 0.03, 0.2)],
    };
    let profile = curve(&meant.tendon(meant.path()));
    let [first, ..] = profile.spans.as_slice() else {
        panic!("no span")
    };
    let (start, end) = (first.level_m, first.level_at(first.length_m));
    let crown = (
        first.length_m / 2.0,
        start + first.slope * first.length_m / 2.0,
    );
    let bezier = kurbo::QuadBez::new((0.0, start), crown, (first.length_m, end));
    let length_m = bezier.arclen(1e-10);
    assert!((first.arc_length_to(first.length_m) - length_m).abs() < 1e-8 * length_m);
}
