//! What the angles alone take from a tendon.

use super::Worked;
use super::pulls::Pulled;
use super::words::{also_at, worst_of};
use crate::finding::{Finding, Level, Rule, Wording};
use crate::floor::EndKind;
use crate::job::Job;
use crate::losses::{Forces, Pull};
use crate::profile::{Profile, SAME_PLACE_M, Segment};
use crate::units::{FORCE, TURN, Units};

/// See [`Rule::meaning`].
pub static CURVATURE_LOSS: Rule = Rule {
    name: "curvature-loss",
    meaning: "From the jack to the point of least force the angles alone take at most limits.curvature_loss_ratio of the \
              jacking force, 1 − exp(−μ α), and the tendon turns at most limits.angle_per_m_rad per metre.",
};

/// Ratios nearer to their limit than this are at it.
const ROUNDING: f64 = 1e-9;

/// How a tendon turns between its (first) live end and the point of least force, and what that costs.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Turning {
    /// Angle turned in space, radians.
    pub angle_rad: f64,
    /// Share of the jacking force lost to that angle alone.
    pub loss_ratio: f64,
    /// Angle over the plan distance, radians per metre.
    pub angle_per_m_rad: f64,
}

/// How a tendon turns, from its curve and forces; `None` where the point of least force is the jack itself. Of several pulls,
/// the one that leaves least while it is jacked.
pub fn turning(profile: &Profile, forces: &Forces) -> Option<Turning> {
    match Pull::governing(&forces.pulls) {
        Some(pull) => turned(profile, pull.stations_m[0], &pull.forces),
        None => turned(profile, 0.0, forces),
    }
}

/// The same of one pull, which starts at a station of the curve.
fn turned(profile: &Profile, from_m: f64, forces: &Forces) -> Option<Turning> {
    let own = |segment: &&Segment| (segment.from_m - from_m).abs() <= SAME_PLACE_M;
    let segment = profile.segments().iter().find(own);
    let profile = segment.map_or(profile, |segment| &segment.curve);
    let least_m = forces.least_jacking_station_m - from_m;
    let from_start_rad = forces.least_jacking_angle_rad;
    let (angle_rad, distance_m) = if forces.ends[0].kind == EndKind::Live {
        (from_start_rad, least_m)
    } else {
        (
            profile.total_angle_rad() - from_start_rad,
            profile.plan_length_m() - least_m,
        )
    };
    if distance_m <= 0.0 || forces.jack_kn <= 0.0 {
        return None;
    }
    Some(Turning {
        angle_rad,
        loss_ratio: forces.totals.friction_curvature_kn / forces.jack_kn,
        angle_per_m_rad: angle_rad / distance_m,
    })
}

pub(super) fn curvature_loss(worked: &Worked, job: &Job) -> Option<Finding> {
    let limits = &job.limits;
    let costly = |turning: &Turning| turning.loss_ratio > limits.curvature_loss_ratio + ROUNDING;
    let winding = |turning: &Turning| turning.angle_per_m_rad > limits.angle_per_m_rad + ROUNDING;
    let own = |pull: Pulled<'_>| {
        if pull.of_several {
            turned(worked.profile?, pull.stations_m[0], pull.forces)
        } else {
            worked.turning
        }
    };
    let beyond: Vec<_> = worked
        .pulls()
        .into_iter()
        .filter_map(|pull| Some((pull, own(pull)?)))
        .filter(|(_, turning)| costly(turning) || winding(turning))
        .collect();
    let least_m = |(pull, _): &(Pulled<'_>, Turning)| pull.forces.least_jacking_station_m;
    let ((pull, turning), others) = worst_of(beyond, |(_, turning)| turning.loss_ratio, least_m)?;
    let (forces, costly, winding) = (pull.forces, costly(&turning), winding(&turning));
    let expected = |units: Units| {
        let mut expected = Vec::new();
        if costly {
            expected.push(format!(
                "a loss of at most {:.1} % (limits.curvature_loss_ratio)",
                100.0 * limits.curvature_loss_ratio
            ));
        }
        if winding {
            expected.push(format!(
                "at most {} (limits.angle_per_m_rad)",
                units.of(TURN).given(limits.angle_per_m_rad)
            ));
        }
        expected.join(" and ")
    };
    Some(worked.finding(
        &CURVATURE_LOSS,
        Level::Warning,
        forces.least_jacking_station_m,
        Wording::of(|units| {
            let force = units.of(FORCE);
            format!(
                "down to the point of least force{} the tendon turns {:.3} rad, {}, which alone takes {:.1} % of the jacking \
                 force ({} of {}); {} was expected{}",
                pull.of_segment(units),
                turning.angle_rad,
                units.of(TURN).said(turning.angle_per_m_rad, 4),
                100.0 * turning.loss_ratio,
                force.said(forces.totals.friction_curvature_kn, 1),
                force.said(forces.jack_kn, 1),
                expected(units),
                also_at(&others, units)
            )
        }),
        match (pull.of_several, forces.both_live()) {
            (true, _) => {
                "look for a height read wrong first; then flatten the drape where it balances more load than it should, \
                 straighten the sweeps in plan, or move the pour joints so that the segment is shorter"
            }
            (false, true) => {
                "look for a height read wrong first; then flatten the drape where it balances more load than it should, \
                 straighten the sweeps in plan, or divide the tendon at a pour joint; it is stressed from both ends already"
            }
            (false, false) => {
                "look for a height read wrong first; then flatten the drape where it balances more load than it should, \
                 straighten the sweeps in plan, or stress from both ends"
            }
        },
    ))
}

#[cfg(test)]
mod tests {
    use super::super::testing::{along, forces, high_to_low, job, point, straight, worked};
    use super::*;
    use crate::geometry::Path;
    use crate::job::LongTermMethod;
    use crate::losses::long_term::{Turn, When};
    use crate::losses::{Along, Effective, Friction, Pulls, faces_by_points};

    fn found(loss_ratio: f64, drop_m: f64) -> Option<Finding> {
        let (tendon, mut forces) = (straight(10.0), forces());
        let profile = high_to_low(10.0, drop_m, 1.0);
        forces.least_jacking_station_m = 10.0;
        forces.least_jacking_angle_rad = profile.total_angle_rad();
        forces.totals.friction_curvature_kn = loss_ratio * forces.jack_kn;
        let mut worked = worked(&tendon);
        worked.forces = Some(&forces);
        worked.turning = turning(&profile, &forces);
        curvature_loss(&worked, &job())
    }

    #[test]
    fn the_share_lost_to_angle_alone_has_its_limit() {
        let limit = job().limits.curvature_loss_ratio;
        assert_eq!(found(limit, 0.1), None);
        let beyond = found(limit + 0.001, 0.1);
        assert!(
            beyond.is_some_and(
                |f| f.level == Level::Warning && f.text.contains("curvature_loss_ratio")
            )
        );
    }

    #[test]
    fn a_tendon_stressed_from_both_ends_is_not_told_to_be() {
        let remedy = |far_kind| {
            let (tendon, mut forces) = (straight(10.0), forces());
            let profile = high_to_low(10.0, 0.1, 1.0);
            forces.least_jacking_station_m = 10.0;
            forces.totals.friction_curvature_kn = 0.5 * forces.jack_kn;
            forces.ends[1].kind = far_kind;
            let mut worked = worked(&tendon);
            worked.forces = Some(&forces);
            worked.turning = turning(&profile, &forces);
            curvature_loss(&worked, &job()).map_or(String::new(), |found| found.remedy)
        };
        assert!(remedy(EndKind::Dead).ends_with("or stress from both ends"));
        assert!(remedy(EndKind::Live).ends_with("stressed from both ends already"));
    }

    #[test]
    fn the_angle_per_metre_has_its_limit_too() {
        // From high to low the strand turns 2 atan(2h/l) whatever the hogging length is.
        let drop_at = |angle_rad: f64| 5.0 * (angle_rad / 2.0).tan();
        let limit_rad = job().limits.angle_per_m_rad * 10.0;
        assert_eq!(found(0.01, drop_at(limit_rad - 0.001)), None);
        let beyond = found(0.01, drop_at(limit_rad + 0.001));
        assert!(beyond.is_some_and(|f| f.text.contains("angle_per_m_rad") && f.text.contains("1.001 rad")));
    }

    #[test]
    fn a_tendon_stressed_from_its_far_end_turns_the_same() {
        let profile = high_to_low(10.0, 0.1, 1.0);
        let mut forces = forces();
        forces.least_jacking_station_m = 10.0;
        forces.least_jacking_angle_rad = profile.total_angle_rad();
        let ahead = turning(&profile, &forces);
        forces.ends.swap(0, 1);
        forces.least_jacking_station_m = 0.0;
        forces.least_jacking_angle_rad = 0.0;
        let back = turning(&profile, &forces);
        assert!(
            ahead
                .zip(back)
                .is_some_and(|(a, b)| (a.angle_rad - b.angle_rad).abs() < 1e-12)
        );
        forces.least_jacking_station_m = 10.0;
        assert_eq!(
            turning(&profile, &forces),
            None,
            "nothing between jack and least force"
        );
    }

    #[test]
    fn angle_and_share_are_of_the_same_stretch_of_the_worked_out_tendon() {
        use crate::floor::EndKind::{Dead, Live};
        use crate::floor::PointKind::{Anchor, High, Low};
        let job = job();
        let corner = |x: f64| geo::Coord { x, y: 0.0 };
        let bent = |at_m: f64, turn_rad: f64| {
            let far = crate::geometry::step(corner(at_m), turn_rad, 24.0 - at_m);
            along(Path::through(&[corner(0.0), corner(at_m), far]))
        };
        // Straight; and with a bare vertex in which the curves of two jacks meet, and one in which they do not.
        for mut tendon in [straight(24.0), bent(11.0, 1.05), bent(3.0, -0.2)] {
            let marked = [
                (Anchor, 0.0, 0.1),
                (Low, 5.0, 0.03),
                (High, 12.0, 0.17),
                (Anchor, 24.0, 0.1),
            ];
            tendon.points = marked
                .map(|(kind, station_m, height_m)| point(kind, station_m, Some(height_m)))
                .to_vec();
            let profile = crate::profile::build(&tendon, &job.profile).expect("a curve");
            let steel = forces().steel;
            for kinds in [[Live, Dead], [Dead, Live], [Live, Live]] {
                let stressed =
                    Pulls::new(&profile, steel, kinds, 0, &job.stressing).expect("forces");
                let in_slab = Along::new(&stressed, faces_by_points(&tendon));
                let case = in_slab.case(&job.long_term, 1.2, Turn::of_many());
                let (direct, when) = (LongTermMethod::Direct, When::Final);
                let effective =
                    Effective::new(&in_slab, &job.long_term, direct, &case, when).expect("forces");
                let forces = effective.forces();
                let turned = turning(&profile, &forces).expect("a stretch");
                let from_angle = 1.0 - (-job.stressing.mu_per_rad * turned.angle_rad).exp();
                assert!(
                    (from_angle - turned.loss_ratio).abs() < 1e-9,
                    "{kinds:?}: {turned:?}"
                );
                let at_least_kn = stressed.both_kn(forces.least_jacking_station_m)[0];
                assert!((at_least_kn - forces.least_jacking_kn).abs() < 1e-9);
                // From jack to jack φ is W; two jacks leave exp(−W/2) where they meet, one leaves exp(−W).
                let whole = Friction::of(&job.stressing)
                    .exponent(profile.total_angle_rad(), profile.length_m());
                let left = if kinds == [Live, Live] {
                    0.5 * whole
                } else {
                    whole
                };
                let left_kn = forces.jack_kn * (-left).exp();
                assert!(
                    (forces.least_jacking_kn - left_kn).abs() < 1e-6,
                    "{kinds:?}"
                );
            }
        }
    }
}
