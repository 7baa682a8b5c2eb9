//! Jacking, lock-off and the force left along the tendon.

use super::Worked;
use super::pulls::Pulled;
use super::words::{also_at, long, worst_of};
use crate::finding::{Finding, Level, Rule, Wording};
use crate::job::Job;
use crate::units::{FORCE, STRESS, Units};

/// See [`Rule::meaning`].
pub static JACKING_STRESS: Rule = Rule {
    name: "jacking-stress",
    meaning: "The jacking stress is at most limits.jacking_stress_ratio of strength and limits.jacking_yield_ratio of yield \
              (0.80 fpu and 0.94 fpy: ACI 318-19 20.3.2.5.1, from memory).",
};

/// See [`Rule::meaning`].
pub static ANCHOR_STRESS: Rule = Rule {
    name: "anchor-stress",
    meaning: "After lock-off the stress at an anchor is at most limits.anchor_stress_ratio of strength (0.70 fpu: ACI 318-19 \
              20.3.2.5.1, from memory).",
};

/// See [`Rule::meaning`].
pub static FAR_END_FORCE: Rule = Rule {
    name: "far-end-force",
    meaning: "At jacking the least force along a tendon is at least limits.far_end_ratio of the jacking force (common \
              practice: 0.80).",
};

/// See [`Rule::meaning`].
pub static DRAW_IN_REACHES_DEAD_END: Rule = Rule {
    name: "draw-in-reaches-dead-end",
    meaning: "In a tendon stressed from one end the draw-in dies out before the dead end; in a short one it takes force from \
              the whole length.",
};

/// Ratios nearer to their limit than this are at it.
const ROUNDING: f64 = 1e-9;

/// The two limits bind the ratio to strength, whatever the strand's size: one finding for the job.
pub(super) fn jacking_stress(job: &Job) -> Option<Finding> {
    let (limits, yield_ratio) = (&job.limits, job.tendon.yield_ratio);
    let ratio = job.stressing.jacking_ratio;
    let of_yield = limits.jacking_yield_ratio * yield_ratio;
    let (limit, from) = if of_yield < limits.jacking_stress_ratio {
        (
            of_yield,
            format!(
                "{} of yield, which is {yield_ratio} of strength: limits.jacking_yield_ratio, tendon.yield_ratio",
                limits.jacking_yield_ratio
            ),
        )
    } else {
        (
            limits.jacking_stress_ratio,
            "limits.jacking_stress_ratio".to_owned(),
        )
    };
    if ratio <= limit + ROUNDING {
        return None;
    }
    let mut strengths: Vec<f64> = job.tendon.strands.iter().map(|s| s.strength_mpa).collect();
    strengths.sort_by(f64::total_cmp);
    strengths.dedup();
    let stresses = |units: Units| {
        let stress = units.of(STRESS);
        let each: Vec<String> = strengths
            .iter()
            .map(|strength_mpa| {
                format!(
                    "{} against {} for strand of {}",
                    stress.said(ratio * strength_mpa, 0),
                    stress.said(limit * strength_mpa, 0),
                    stress.said(*strength_mpa, 0)
                )
            })
            .collect();
        each.join(", ")
    };
    Some(Finding::new(
        &JACKING_STRESS,
        Level::Error,
        Wording::of(|units| {
            format!(
                "the job jacks to {ratio:.3} of strength ({}); at most {limit:.3} was expected ({from}; the default is ACI \
                 318-19 20.3.2.5.1's, from memory)",
                stresses(units)
            )
        }),
        "lower stressing.jacking_ratio, or set the limits of the code that governs the job",
    ))
}

pub(super) fn anchor_stress(worked: &Worked, job: &Job) -> Option<Finding> {
    let pulls = worked.pulls();
    let steel = &worked.forces?.steel;
    let limit = job.limits.anchor_stress_ratio;
    let anchors = pulls
        .iter()
        .filter_map(|pull| Some(pull.stations_m.into_iter().zip(pull.lock_off_kn?)));
    let high: Vec<(f64, f64)> = anchors
        .flatten()
        .map(|(station_m, force_kn)| (station_m, steel.stress_mpa(force_kn)))
        .filter(|&(_, stress_mpa)| stress_mpa > (limit + ROUNDING) * steel.strength_mpa)
        .collect();
    let ((station_m, stress_mpa), mut others) = worst_of(high, |end| end.1, |end| end.0)?;
    others.dedup();
    others.retain(|other_m| (other_m - station_m).abs() > 0.0);
    let also = |units: Units| match (others.is_empty(), pulls.len()) {
        (true, _) => String::new(),
        (false, 1) => ", and the other anchor is above it too".to_owned(),
        (false, _) => also_at(&others, units),
    };
    Some(worked.finding(
        &ANCHOR_STRESS,
        Level::Error,
        station_m,
        Wording::of(|units| {
            let stress = units.of(STRESS);
            format!(
                "after lock-off the strand at the anchor carries {}, {:.3} of its strength of {}; at most {limit:.3} was \
                 expected (limits.anchor_stress_ratio; the default is ACI 318-19 20.3.2.5.1's, from memory){}",
                stress.said(stress_mpa, 0),
                stress_mpa / steel.strength_mpa,
                stress.said(steel.strength_mpa, 0),
                also(units)
            )
        }),
        "jack to less, or seat the wedges with the draw-in that the system really has: a small draw-in leaves the anchor too \
         highly stressed",
    ))
}

pub(super) fn far_end_force(worked: &Worked, job: &Job) -> Option<Finding> {
    let limit = job.limits.far_end_ratio;
    let ratio = |pull: &Pulled| pull.forces.least_jacking_kn / pull.forces.jack_kn;
    let mut low = worked.pulls();
    low.retain(|pull| !ratio(pull).is_nan() && ratio(pull) < limit - ROUNDING);
    let least_m = |pull: &Pulled| pull.forces.least_jacking_station_m;
    let (worst, others) = worst_of(low, |pull| -ratio(pull), least_m)?;
    let (forces, ratio) = (worst.forces, ratio(&worst));
    let both_live = forces.both_live();
    let place = if both_live {
        "between its two live ends"
    } else {
        "at its far end"
    };
    let remedy = match (worst.of_several, both_live) {
        (true, _) => {
            "flatten the profile or the sweeps, or move the pour joints so that the segment is shorter; check the friction \
             numbers of the job first"
        }
        (false, true) => {
            "flatten the profile or the sweeps, or divide the tendon at a pour joint; it is stressed from both ends already"
        }
        (false, false) => {
            "stress from both ends, flatten the profile or the sweeps, or shorten the tendon; check the friction numbers of \
             the job first"
        }
    };
    Some(worked.finding(
        &FAR_END_FORCE,
        Level::Warning,
        forces.least_jacking_station_m,
        Wording::of(|units| {
            let force = units.of(FORCE);
            format!(
                "{} of the {} jacked are left {place}{}, {ratio:.3} of it; at least {limit:.3} was expected \
                 (limits.far_end_ratio){}",
                force.said(forces.least_jacking_kn, 1),
                force.said(forces.jack_kn, 1),
                worst.of_segment(units),
                also_at(&others, units)
            )
        }),
        remedy,
    ))
}

pub(super) fn draw_in_reaches_dead_end(worked: &Worked) -> Option<Finding> {
    let mut reached = worked.pulls();
    reached.retain(|pull| {
        pull.one_jack()
            .is_some_and(|(live, _)| live.draw_in_reaches_far)
    });
    let fixed_m = |pull: &Pulled| {
        pull.one_jack()
            .map_or(0.0, |(_, fixed)| pull.stations_m[fixed])
    };
    // The shortest suffers most.
    let (worst, others) = worst_of(reached, |pull| -pull.length_m(), fixed_m)?;
    let (_, fixed) = worst.one_jack()?;
    let left = |units: Units| {
        let force = |force_kn: f64| units.of(FORCE).said(force_kn, 1);
        worst.lock_off_kn.map_or(String::new(), |lock_off_kn| {
            format!(
                ", where {} of the {} jacked are left after lock-off",
                force(lock_off_kn[fixed]),
                force(worst.forces.jack_kn)
            )
        })
    };
    let end = if worst.of_several {
        "fixed anchor"
    } else {
        "dead end"
    };
    Some(worked.finding(
        &DRAW_IN_REACHES_DEAD_END,
        Level::Warning,
        worst.stations_m[fixed],
        Wording::of(|units| {
            format!(
                "the draw-in is felt along the whole {}{}, as far as the {end}{}; it was expected to die out before it \
                 (stressing.draw_in_mm){}",
                long(worst.length_m(), units),
                worst.of_segment(units),
                left(units),
                also_at(&others, units)
            )
        }),
        "make sure that the force worked out for this short tendon is the one the design counts on; power seating or shims \
         lessen the draw-in",
    ))
}

#[cfg(test)]
mod tests {
    use super::super::testing::{forces, job, straight, worked};
    use super::*;
    use crate::floor::EndKind;

    #[test]
    fn the_job_may_jack_to_the_lower_of_both_limits() {
        let mut job = job();
        job.limits.jacking_stress_ratio = 0.80;
        job.limits.jacking_yield_ratio = 0.94;
        job.tendon.yield_ratio = 0.90;
        job.stressing.jacking_ratio = 0.80;
        assert_eq!(jacking_stress(&job), None);
        job.stressing.jacking_ratio = 0.801;
        let found = jacking_stress(&job);
        assert!(found.is_some_and(|f| f.text.contains("limits.jacking_stress_ratio")));
        job.tendon.yield_ratio = 0.85;
        job.stressing.jacking_ratio = 0.798;
        assert_eq!(jacking_stress(&job), None);
        job.stressing.jacking_ratio = 0.80;
        let found = jacking_stress(&job);
        assert!(
            found.is_some_and(
                |f| f.text.contains("limits.jacking_yield_ratio") && f.tendon.is_none()
            )
        );
    }

    #[test]
    fn the_anchor_may_keep_its_share_of_strength() {
        let (tendon, forces) = (straight(20.0), forces());
        let at = |ratio: f64| ratio * forces.steel.strength_mpa * forces.steel.area_mm2 / 1000.0;
        let mut worked = worked(&tendon);
        worked.forces = Some(&forces);
        worked.lock_off_kn = Some([at(0.700), at(0.65)]);
        assert_eq!(anchor_stress(&worked, &job()), None);
        worked.lock_off_kn = Some([at(0.65), at(0.701)]);
        let found = anchor_stress(&worked, &job());
        assert!(found.is_some_and(|f| f.station_m == Some(20.0) && f.text.contains("0.701")));
    }

    #[test]
    fn the_far_end_keeps_its_share_of_the_jacking_force() {
        let (tendon, mut forces) = (straight(20.0), forces());
        let ratio = job().limits.far_end_ratio;
        for (share, speaks) in [(ratio, false), (ratio - 0.001, true)] {
            forces.least_jacking_kn = share * forces.jack_kn;
            forces.least_jacking_station_m = 20.0;
            let mut worked = worked(&tendon);
            worked.forces = Some(&forces);
            let found = far_end_force(&worked, &job());
            assert_eq!(found.is_some(), speaks);
            assert!(found.is_none_or(|f| f.station_m == Some(20.0)));
        }
    }

    #[test]
    fn draw_in_that_meets_the_other_jacks_draw_in_reaches_no_dead_end() {
        let (tendon, mut forces) = (straight(6.0), forces());
        let speaks = |forces: &crate::losses::Forces| {
            let mut worked = worked(&tendon);
            worked.forces = Some(forces);
            draw_in_reaches_dead_end(&worked).and_then(|found| found.station_m)
        };
        assert_eq!(speaks(&forces), None);
        forces.ends[0].draw_in_reaches_far = true;
        assert_eq!(speaks(&forces), Some(6.0));
        forces.ends[1].kind = EndKind::Live;
        assert_eq!(speaks(&forces), None);
    }
}
