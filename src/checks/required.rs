//! The force left along a tendon against the force that its label requires.

use geo::{Coord, Line, Point};
use rstar::RTree;
use rstar::primitives::GeomWithData;

use super::Worked;
use crate::finding::{Finding, Level, Rule, Wording};
use crate::floor::{Floor, Tendon};
use crate::units::{FORCE, FORCE_PER_WIDTH, LONG};

/// See [`Rule::meaning`].
pub static FORCE_BELOW_REQUIRED: Rule = Rule {
    name: "force-below-required",
    meaning: "Where a label gives a force instead of a count, the mean service force of the line's tendons together is at \
              least that; a force per width is compared over half the distance to the neighbours of its run on either side \
              (common practice: labels give effective forces).",
};

/// Neighbours farther off than this share no strip of slab, metres.
const NEIGHBOUR_M: f64 = 8.0;
/// Lines leave arcs by no more than this, metres.
const CHORD_M: f64 = 0.05;
/// Labels round their force to so much of itself, at the least.
const ROUNDING: f64 = 1e-3;

/// The required force of the line against the mean service force of all its tendons.
pub(super) fn force_below_required(worked: &Worked) -> Option<Finding> {
    let tendon = worked.tendon;
    let required_kn = tendon.required_kn?;
    let mean_kn = f64::from(tendon.tendons) * worked.forces?.later?.mean_service_kn;
    if mean_kn >= required_kn * (1.0 - ROUNDING) {
        return None;
    }
    let count = match tendon.tendons {
        1 => String::new(),
        count => format!(" in {count} tendons together"),
    };
    Some(worked.finding(
        &FORCE_BELOW_REQUIRED,
        Level::Error,
        tendon.path.length_m() / 2.0,
        Wording::of(|units| {
            let force = units.of(FORCE);
            format!(
                "the mean service force is {}{count}; the label requires {}",
                force.said(mean_kn, 0),
                force.said(required_kn, 0)
            )
        }),
        "add strands or tendons, or check the label: the force in it is taken for the effective force of the whole line",
    ))
}

/// Forces per width; `mean_service_kn` is one tendon's, by the floor's tendons, where it is known.
pub fn per_width(floor: &Floor, mean_service_kn: &[Option<f64>]) -> Vec<Finding> {
    let tendons = &floor.tendons;
    if tendons
        .iter()
        .all(|tendon| tendon.required_kn_per_m.is_none())
    {
        return Vec::new();
    }
    let chords = tendons.iter().enumerate().flat_map(|(at, tendon)| {
        let lines = tendon.path.to_line_string(CHORD_M);
        let lines: Vec<Line<f64>> = lines.lines().collect();
        lines
            .into_iter()
            .map(move |line| GeomWithData::new(line, at))
    });
    let index = RTree::bulk_load(chords.collect());
    tendons
        .iter()
        .enumerate()
        .zip(mean_service_kn)
        .filter_map(|((at, tendon), mean_kn)| {
            let required = tendon.required_kn_per_m?;
            let total_kn = f64::from(tendon.tendons) * (*mean_kn)?;
            let finding = |level, text| {
                let middle_m = tendon.path.length_m() / 2.0;
                Finding::new(
                    &FORCE_BELOW_REQUIRED,
                    level,
                    text,
                    "draw the tendons closer, or check the label: its force is taken for the effective force",
                )
                .on_tendon(&tendon.mark)
                .at_station(middle_m)
                .at_place(tendon.path.place_at(middle_m))
            };
            let Some(width_m) = width_m(at, tendons, &index) else {
                return Some(finding(
                    Level::Note,
                    Wording::of(|units| {
                        format!(
                            "the label requires {}, which was not compared: no tendon of its run lies beside it within {}, \
                             so its width is not known",
                            units.of(FORCE_PER_WIDTH).said(required, 0),
                            units.of(LONG).brief(NEIGHBOUR_M, 1)
                        )
                    }),
                ));
            };
            let given = total_kn / width_m;
            (given < required * (1.0 - ROUNDING)).then(|| {
                finding(
                    Level::Error,
                    Wording::of(|units| {
                        let per_width = units.of(FORCE_PER_WIDTH);
                        format!(
                            "the mean service force is {} ({} over {} between its neighbours); the label requires {}",
                            per_width.said(given, 0),
                            units.of(FORCE).said(total_kn, 0),
                            units.of(LONG).said(width_m, 2),
                            per_width.said(required, 0)
                        )
                    }),
                )
            })
        })
        .collect()
}

type Chord = GeomWithData<Line<f64>, usize>;

/// Half the distance to the neighbours on either side, at mid-length; one side alone counts twice.
fn width_m(at: usize, tendons: &[Tendon], index: &RTree<Chord>) -> Option<f64> {
    let tendon = tendons.get(at)?;
    let middle_m = tendon.path.length_m() / 2.0;
    let place = tendon.path.place_at(middle_m);
    let (sin, cos) = tendon.path.heading_at(middle_m).sin_cos();
    let mut sides = [None, None];
    let near = index.nearest_neighbor_iter_with_distance_2(&Point::from(place));
    for (chord, square) in near {
        if square > NEIGHBOUR_M * NEIGHBOUR_M {
            break;
        }
        let same_run = |other: &Tendon| other.run == tendon.run;
        if chord.data == at || !tendons.get(chord.data).is_some_and(same_run) {
            continue;
        }
        let foot = nearest_on(chord.geom(), place);
        let (dx, dy) = (foot.x - place.x, foot.y - place.y);
        let across_m = cos * dy - sin * dx;
        // What lies ahead rather than beside is another stretch of the run.
        if across_m.abs() < 0.7 * dx.hypot(dy) || across_m == 0.0 {
            continue;
        }
        let side = &mut sides[usize::from(across_m < 0.0)];
        *side = side.or(Some(across_m.abs()));
    }
    match sides {
        [Some(left_m), Some(right_m)] => Some(f64::midpoint(left_m, right_m)),
        [one, other] => one.or(other),
    }
}

fn nearest_on(line: &Line<f64>, place: Coord<f64>) -> Coord<f64> {
    let along = line.delta();
    let square = along.x * along.x + along.y * along.y;
    if square <= 0.0 {
        return line.start;
    }
    let from = place - line.start;
    let share = ((from.x * along.x + from.y * along.y) / square).clamp(0.0, 1.0);
    line.start + along * share
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::checks::testing::{along, forces, straight, worked};
    use crate::geometry::Path;
    use crate::losses::LaterLosses;

    #[test]
    fn the_force_of_all_tendons_of_a_line_meets_what_the_label_requires() {
        let mut forces = forces();
        forces.later = Some(LaterLosses {
            mean_service_kn: 530.0,
            ..LaterLosses::default()
        });
        let mut tendon = straight(20.0);
        tendon.tendons = 3;
        for (required_kn, short) in [(1590.0, false), (1591.0, false), (1593.0, true)] {
            tendon.required_kn = Some(required_kn);
            let worked = Worked {
                forces: Some(&forces),
                ..worked(&tendon)
            };
            assert_eq!(
                force_below_required(&worked).is_some(),
                short,
                "{required_kn}"
            );
        }
        assert!(force_below_required(&worked(&tendon)).is_none());
    }

    fn beside(ys_m: &[f64], required: f64) -> Vec<Finding> {
        let line = |&y: &f64| {
            let mut tendon = along(Path::through(&[Coord { x: 0.0, y }, Coord { x: 20.0, y }]));
            tendon.required_kn_per_m = (y == 0.0).then_some(required);
            tendon
        };
        let floor = Floor {
            tendons: ys_m.iter().map(line).collect(),
            ..Floor::default()
        };
        per_width(&floor, &vec![Some(530.0); ys_m.len()])
    }

    #[test]
    fn a_force_per_width_is_compared_over_half_the_way_to_both_neighbours() {
        // 530 kN over (1.0 + 1.5) / 2 m is 424 kN/m.
        assert!(beside(&[-1.0, 0.0, 1.5], 423.0).is_empty());
        let found = beside(&[-1.0, 0.0, 1.5], 426.0);
        assert_eq!(found.len(), 1);
        assert_eq!(found[0].level, Level::Error);
        assert!(found[0].text.contains("424 kN/m"), "{}", found[0].text);
    }

    #[test]
    fn without_a_neighbour_the_width_is_not_guessed() {
        let found = beside(&[0.0, 30.0], 1.0);
        assert_eq!(found.len(), 1);
        assert_eq!(found[0].level, Level::Note);
    }
}
