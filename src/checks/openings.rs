//! Where the line passes openings.

use std::collections::{BTreeMap, BTreeSet};

use geo::{Coord, Line};

use super::Worked;
use super::chords::Chords;
use super::ground::{Ground, Stretch, share_along};
use super::words::{also_at, long, short, worst_of};
use crate::finding::{Finding, Level, Rule, Wording};
use crate::geometry::distance_m;
use crate::job::Job;

/// See [`Rule::meaning`].
pub static CROSSES_OPENING: Rule = Rule {
    name: "crosses-opening",
    meaning: "A tendon does not run through an opening, and keeps limits.opening_clearance_mm from it (common practice: \
              150 mm); one that is anchored at the opening's edge may touch it there.",
};

/// Shorter pieces inside an opening are a touch, metres.
const TOUCH_M: f64 = 0.001;

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
            Wording::of(|units| {
                format!(
                    "the tendon runs through an opening from station {} to {}; it was expected to pass openings at {} or \
                     more (limits.opening_clearance_mm){}",
                    long(worst.from_m, units),
                    long(worst.to_m, units),
                    short(job.limits.opening_clearance_m, units),
                    also_at(&others, units)
                )
            }),
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
        Wording::of(|units| {
            format!(
                "the tendon passes an opening at {}; at least {} was expected (limits.opening_clearance_mm){}",
                short(worst.distance_m, units),
                short(clearance_m, units),
                also_at(&others, units)
            )
        }),
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

#[cfg(test)]
mod tests {
    use super::super::testing::{along, job, rectangle, straight, worked};
    use super::*;
    use crate::floor::{Slab, Tendon};
    use crate::geometry::Path;
    use proptest::prelude::*;

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
