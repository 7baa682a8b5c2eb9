//! Where the line leaves the slab.

use super::Worked;
use super::chords::Chords;
use super::ground::{Ground, Stretch};
use super::words::{also_at, long, short, worst_of};
use crate::finding::{Finding, Level, Rule, Wording};
use crate::floor::Floor;
use crate::job::Job;

/// See [`Rule::meaning`].
pub static LEAVES_SLAB: Rule = Rule {
    name: "leaves-slab",
    meaning: "A tendon lies inside the slab's outlines, anchors at the edge within limits.edge_tolerance_mm.",
};

/// Steps at which a stretch outside the slab is measured, metres.
const STEP_M: f64 = 0.25;

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
                Some((station_m, distance_m))
            })
            .reduce(|held, next| if next.1 > held.1 { next } else { held });
        places.extend(
            farthest
                .filter(|far| far.1 > job.limits.edge_tolerance_m + 1e-6)
                .map(|far| (far, stretch)),
        );
    }
    let ((worst, stretch), others) = worst_of(places, |place| place.0.1, |place| place.1.from_m)?;
    Some(worked.finding(
        &LEAVES_SLAB,
        Level::Error,
        worst.0,
        Wording::of(|units| {
            format!(
                "the tendon lies outside the slab edge from station {} to {}, by up to {}; at most {} was expected \
                 (limits.edge_tolerance_mm){}",
                long(stretch.from_m, units),
                long(stretch.to_m, units),
                short(worst.1, units),
                short(job.limits.edge_tolerance_m, units),
                also_at(&others, units)
            )
        }),
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
    use super::super::testing::{along, job, rectangle, straight, worked};
    use super::*;
    use crate::floor::{Slab, Tendon};
    use crate::geometry::Path;
    use geo::Coord;

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
}
