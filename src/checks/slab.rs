//! Where the line lies on the slab: openings and edges.

use std::collections::{BTreeMap, BTreeSet};

use geo::{Coord, Line};

use super::Worked;
use super::chords::Chords;
use super::ground::{Ground, Stretch, share_along};
use super::words::{also_at, mm, worst_of};
use crate::finding::{Finding, Level, Rule};
use crate::floor::Floor;
use crate::geometry::distance_m;
use crate::job::Job;

/// See [`Rule::meaning`].
pub static CROSSES_OPENING: Rule = Rule {
    name: "crosses-opening",
    meaning: "A tendon does not run through an opening, and keeps limits.opening_clearance_mm from it (common practice: \
              150 mm); one that is anchored at the opening's edge may touch it there.",
};

/// See [`Rule::meaning`].
pub static LEAVES_SLAB: Rule = Rule {
    name: "leaves-slab",
    meaning: "A tendon lies inside the slab's outlines, anchors at the edge within limits.edge_tolerance_mm.",
};

/// Shorter pieces inside an opening are a touch, metres.
const TOUCH_M: f64 = 0.001;

/// Steps at which a stretch outside the slab is measured, metres.
const STEP_M: f64 = 0.25;

pub(super) fn crosses_opening(
    worked: &Worked,
    ground: &Ground,
    chords: &Chords,
    job: &Job,
) -> Vec<Finding> {
    if ground.openings.is_empty() {
        return Vec::new();
    }
    let ends_m = worked.end_stations_m();
    let tolerance_m = job.limits.edge_tolerance_m;
    let inside: Vec<Stretch<Vec<usize>>> = ground
        .openings
        .stretches(chords, |place| ground.openings.holding(place, true))
        .into_iter()
        .filter(|stretch| !stretch.holds.is_empty())
        .filter(|stretch| {
            let at_end = stretch.from_m <= ends_m[0] || stretch.to_m >= ends_m[1];
            let length_m = stretch.to_m - stretch.from_m;
            length_m
                > if at_end {
                    tolerance_m.max(TOUCH_M)
                } else {
                    TOUCH_M
                }
        })
        .collect();
    let crossed: BTreeSet<usize> = inside
        .iter()
        .flat_map(|s| s.holds.iter().copied())
        .collect();
    let mut found = Vec::new();
    if let Some((worst, others)) = worst_of(inside, |s| s.to_m - s.from_m, |s| s.from_m) {
        found.push(worked.finding(
            &CROSSES_OPENING,
            Level::Error,
            f64::midpoint(worst.from_m, worst.to_m),
            format!(
                "the tendon runs through an opening from station {:.2} m to {:.2} m; it was expected to pass openings at \
                 {} or more (limits.opening_clearance_mm){}",
                worst.from_m,
                worst.to_m,
                mm(job.limits.opening_clearance_m),
                also_at(&others)
            ),
            "sweep the tendon around the opening, or stop it with an anchor at either side; check with the services drawing \
             that the opening is where it is drawn",
        ));
    }
    found.extend(near_opening(worked, ground, chords, job, &crossed));
    found
}

/// Where a tendon comes nearest to an opening.
#[derive(Debug, Clone, Copy)]
struct Near {
    station_m: f64,
    distance_m: f64,
}

fn near_opening(
    worked: &Worked,
    ground: &Ground,
    chords: &Chords,
    job: &Job,
    crossed: &BTreeSet<usize>,
) -> Option<Finding> {
    let clearance_m = job.limits.opening_clearance_m;
    let [start_m, end_m] = worked.end_stations_m();
    let mut nearest: BTreeMap<usize, Vec<Near>> = BTreeMap::new();
    for chord in &chords.0 {
        for (edge, opening) in ground.openings.edges_near(chord.line, clearance_m) {
            if crossed.contains(&opening) {
                continue;
            }
            let (share, distance_m) = nearest_between(chord.line, edge);
            if distance_m < clearance_m - 1e-6 {
                nearest.entry(opening).or_default().push(Near {
                    station_m: chord.start_m + share * chord.length_m,
                    distance_m,
                });
            }
        }
    }
    let mut places = Vec::new();
    for nears in nearest.values() {
        // A tendon anchored at an opening's edge has to come near it there.
        let anchored = |station_m: f64| {
            nears.iter().any(|near| {
                (near.station_m - station_m).abs() < 1e-6
                    && near.distance_m <= job.limits.edge_tolerance_m
            })
        };
        let (at_start, at_end) = (anchored(start_m), anchored(end_m));
        let meant = nears.iter().copied().filter(|near| {
            !(at_start && near.station_m - start_m < 2.0 * clearance_m
                || at_end && end_m - near.station_m < 2.0 * clearance_m)
        });
        places.extend(meant.min_by(|a, b| {
            a.distance_m
                .total_cmp(&b.distance_m)
                .then(a.station_m.total_cmp(&b.station_m))
        }));
    }
    let (worst, others) = worst_of(places, |near| -near.distance_m, |near| near.station_m)?;
    Some(worked.finding(
        &CROSSES_OPENING,
        Level::Warning,
        worst.station_m,
        format!(
            "the tendon passes an opening at {}; at least {} was expected (limits.opening_clearance_mm){}",
            mm(worst.distance_m),
            mm(clearance_m),
            also_at(&others)
        ),
        "move the tendon off the opening's edge, or let the engineer detail the edge for the tendon's turning force",
    ))
}

/// Nearest approach of a chord to an edge: where along the chord (0 to 1), and how near, metres.
fn nearest_between(chord: Line<f64>, edge: Line<f64>) -> (f64, f64) {
    if let Some(meeting) = geo::line_intersection::line_intersection(chord, edge) {
        let place = match meeting {
            geo::LineIntersection::SinglePoint { intersection, .. } => intersection,
            geo::LineIntersection::Collinear { intersection } => intersection.start,
        };
        return (share_along(chord, place), 0.0);
    }
    let on = |line: Line<f64>, share: f64| line.start + line.delta() * share;
    let from_chord = |share: f64| {
        let place: Coord<f64> = on(chord, share);
        (share, distance_m(place, on(edge, share_along(edge, place))))
    };
    let from_edge = |place: Coord<f64>| {
        let share = share_along(chord, place);
        (share, distance_m(place, on(chord, share)))
    };
    [from_chord(1.0), from_edge(edge.start), from_edge(edge.end)]
        .into_iter()
        .fold(from_chord(0.0), |held, next| {
            if next
                .1
                .total_cmp(&held.1)
                .then(next.0.total_cmp(&held.0))
                .is_lt()
            {
                next
            } else {
                held
            }
        })
}

pub(super) fn leaves_slab(
    worked: &Worked,
    ground: &Ground,
    chords: &Chords,
    job: &Job,
) -> Option<Finding> {
    if ground.outlines.is_empty() {
        return None;
    }
    let outside = ground.outlines.stretches(chords, |place| {
        ground.outlines.holding(place, false).is_empty()
    });
    let mut places = Vec::new();
    for stretch in outside.into_iter().filter(|stretch| stretch.holds) {
        let farthest = samples_m(&stretch, chords)
            .into_iter()
            .filter_map(|station_m| {
                let place = worked.tendon.path.place_at(station_m);
                let distance_m = ground.outlines.edge_distance_m(place)?;
                Some(Near {
                    station_m,
                    distance_m,
                })
            })
            .reduce(|held, next| {
                if next.distance_m > held.distance_m {
                    next
                } else {
                    held
                }
            });
        places.extend(
            farthest
                .filter(|far| far.distance_m > job.limits.edge_tolerance_m + 1e-6)
                .map(|far| (far, stretch)),
        );
    }
    let ((worst, stretch), others) =
        worst_of(places, |place| place.0.distance_m, |place| place.1.from_m)?;
    Some(worked.finding(
        &LEAVES_SLAB,
        Level::Error,
        worst.station_m,
        format!(
            "the tendon lies outside the slab edge from station {:.2} m to {:.2} m, by up to {}; at most {} was expected \
             (limits.edge_tolerance_mm){}",
            stretch.from_m,
            stretch.to_m,
            mm(worst.distance_m),
            mm(job.limits.edge_tolerance_m),
            also_at(&others)
        ),
        "bring the tendon back inside the slab edge, or correct the edge; check that the whole edge is drawn and its layer \
         named in the job file (layers.slab_edge)",
    ))
}

/// Stations of a stretch at steps of no more than 0.25 m, its ends and the line's vertices among them, in order.
fn samples_m(stretch: &Stretch<bool>, chords: &Chords) -> Vec<f64> {
    let length_m = stretch.to_m - stretch.from_m;
    #[expect(
        clippy::cast_possible_truncation,
        clippy::cast_sign_loss,
        reason = "clamped to 1..=4096"
    )]
    let count = (length_m / STEP_M).ceil().clamp(1.0, 4096.0) as u32;
    let steps =
        (0..=count).map(|step| stretch.from_m + length_m * f64::from(step) / f64::from(count));
    let vertices = chords
        .0
        .iter()
        .map(|chord| chord.start_m)
        .filter(|&station_m| station_m > stretch.from_m && station_m < stretch.to_m);
    let mut samples: Vec<f64> = steps.chain(vertices).collect();
    samples.sort_by(f64::total_cmp);
    samples
}

/// Says that nothing can be said of tendons leaving the slab, where no edge was read.
pub(super) fn no_outline(floor: &Floor) -> Option<Finding> {
    (floor.slab.outlines.is_empty() && !floor.tendons.is_empty()).then(|| {
        Finding::new(
            &LEAVES_SLAB,
            Level::Note,
            "no closed slab edge was found, so whether tendons leave the slab was not looked at",
            "draw the slab edge as closed lines on the layers that the job file names for it (layers.slab_edge)",
        )
    })
}

#[cfg(test)]
mod tests {
    use super::super::testing::{along, job, straight, worked};
    use super::*;
    use crate::floor::{Slab, Tendon};
    use crate::geometry::Path;
    use geo::Polygon;
    use proptest::prelude::*;

    fn rectangle(x0: f64, y0: f64, x1: f64, y1: f64) -> Polygon<f64> {
        geo::Rect::new(Coord { x: x0, y: y0 }, Coord { x: x1, y: y1 }).to_polygon()
    }

    fn opening(x0: f64, y0: f64, x1: f64, y1: f64) -> Slab {
        Slab {
            openings: vec![rectangle(x0, y0, x1, y1)],
            ..Slab::default()
        }
    }

    fn crossings(tendon: &Tendon, slab: &Slab) -> Vec<(Level, Option<f64>)> {
        crosses_opening(
            &worked(tendon),
            &Ground::of(slab),
            &Chords::of(&tendon.path),
            &job(),
        )
        .into_iter()
        .map(|found| (found.level, found.station_m))
        .collect()
    }

    #[test]
    fn a_tendon_through_an_opening_is_an_error_in_its_middle() {
        let found = crossings(&straight(20.0), &opening(6.0, -1.0, 8.0, 1.0));
        assert_eq!(found, vec![(Level::Error, Some(7.0))]);
        let within = crossings(&straight(20.0), &opening(-5.0, -1.0, 50.0, 1.0));
        assert_eq!(within, vec![(Level::Error, Some(10.0))]);
    }

    #[test]
    fn beside_an_opening_the_clearance_decides() {
        let clear_m = job().limits.opening_clearance_m;
        let near = opening(6.0, clear_m - 0.001, 8.0, 2.0);
        assert_eq!(
            crossings(&straight(20.0), &near),
            vec![(Level::Warning, Some(6.0))]
        );
        assert_eq!(
            crossings(&straight(20.0), &opening(6.0, clear_m, 8.0, 2.0)),
            vec![]
        );
    }

    #[test]
    fn an_anchor_at_an_openings_edge_is_no_crossing() {
        assert_eq!(
            crossings(&straight(20.0), &opening(20.0, -1.0, 22.0, 1.0)),
            vec![]
        );
        let tolerance_m = job().limits.edge_tolerance_m;
        let a_little = opening(20.0 - tolerance_m / 2.0, -1.0, 22.0, 1.0);
        assert!(
            crossings(&straight(20.0), &a_little)
                .iter()
                .all(|f| f.0 != Level::Error)
        );
        let beyond = opening(20.0 - tolerance_m * 2.0, -1.0, 22.0, 1.0);
        assert!(
            crossings(&straight(20.0), &beyond)
                .iter()
                .any(|f| f.0 == Level::Error)
        );
    }

    fn leaving(tendon: &Tendon, slab: &Slab) -> Option<Finding> {
        leaves_slab(
            &worked(tendon),
            &Ground::of(slab),
            &Chords::of(&tendon.path),
            &job(),
        )
    }

    #[test]
    fn an_anchor_may_stand_outside_by_the_tolerance() {
        let tolerance_m = job().limits.edge_tolerance_m;
        let slab = |edge_m: f64| Slab {
            outlines: vec![rectangle(0.0, -5.0, edge_m, 5.0)],
            ..Slab::default()
        };
        assert_eq!(leaving(&straight(20.0), &slab(20.0)), None);
        assert_eq!(leaving(&straight(20.0), &slab(20.0 - tolerance_m)), None);
        let found = leaving(&straight(20.0), &slab(20.0 - tolerance_m - 0.001));
        assert!(found.is_some_and(|f| f.level == Level::Error && f.station_m == Some(20.0)));
    }

    #[test]
    fn a_notch_in_the_edge_and_a_joint_between_slabs() {
        let mut slab = Slab {
            outlines: vec![
                rectangle(0.0, -5.0, 9.99, 5.0),
                rectangle(10.01, -5.0, 20.0, 5.0),
            ],
            ..Slab::default()
        };
        assert_eq!(
            leaving(&straight(20.0), &slab),
            None,
            "a joint of 20 mm is no edge"
        );
        slab.outlines[1] = rectangle(12.0, -5.0, 20.0, 5.0);
        let found = leaving(&straight(20.0), &slab);
        assert!(found.is_some_and(|f| f.text.contains("from station 9.99 m to 12.00 m")));
    }

    #[test]
    fn a_tendon_that_swings_out_and_back_is_seen() {
        let slab = Slab {
            outlines: vec![rectangle(0.0, -5.0, 20.0, 1.0)],
            ..Slab::default()
        };
        let at = |x, y| Coord { x, y };
        let swung = along(Path::through(&[at(0.0, 0.0), at(10.0, 1.5), at(20.0, 0.0)]));
        assert!(leaving(&swung, &slab).is_some_and(|f| f.text.contains("by up to 500 mm")));
        let kept = along(Path::through(&[at(0.0, 0.0), at(10.0, 0.9), at(20.0, 0.0)]));
        assert_eq!(leaving(&kept, &slab), None);
    }

    #[test]
    fn a_missing_slab_edge_is_said_once() {
        let mut floor = Floor {
            tendons: vec![straight(10.0)],
            ..Floor::default()
        };
        assert!(no_outline(&floor).is_some_and(|f| f.level == Level::Note));
        floor.slab.outlines.push(rectangle(0.0, -5.0, 20.0, 5.0));
        assert_eq!(no_outline(&floor), None);
    }

    proptest! {
        #![proptest_config(ProptestConfig { cases: 128, failure_persistence: None, ..ProptestConfig::default() })]

        /// Walking the line in small steps is a slow way to the same answer, and walking it the other way changes nothing.
        #[test]
        fn an_opening_is_crossed_where_a_walk_along_the_line_steps_into_it(
            (x0, y0) in (0.0..18.0, -3.0..3.0),
            (width, depth) in (0.2..3.0, 0.2..3.0),
            (rise_a, rise_b) in (-3.0..3.0, -3.0..3.0),
        ) {
            let slab = opening(x0, y0, x0 + width, y0 + depth);
            let points = [
                Coord { x: -1.0, y: 0.0 },
                Coord { x: 10.0, y: rise_a },
                Coord { x: 22.0, y: rise_b },
            ];
            let tendon = along(Path::through(&points));
            let length_m = tendon.path.length_m();
            let inside = (0..=20_000)
                .filter(|&step| {
                    let place = tendon.path.place_at(length_m * f64::from(step) / 20_000.0);
                    place.x > x0 && place.x < x0 + width && place.y > y0 && place.y < y0 + depth
                })
                .count();
            let found = crossings(&tendon, &slab);
            let crossed = found.iter().any(|f| f.0 == Level::Error);
            // A step is about 1 mm: a touch of one or two steps may go either way.
            prop_assert!(inside == 0 && !crossed || inside > 2 && crossed || (1..=2).contains(&inside), "{inside} {found:?}");

            let mut back = tendon.clone();
            back.path = tendon.path.reversed();
            let mirrored = crossings(&back, &slab);
            prop_assert_eq!(found.len(), mirrored.len());
            for (a, b) in found.iter().zip(&mirrored) {
                prop_assert_eq!(a.0, b.0);
                prop_assert!((a.1.unwrap_or(0.0) + b.1.unwrap_or(0.0) - length_m).abs() < 1e-6);
            }
        }
    }
}
