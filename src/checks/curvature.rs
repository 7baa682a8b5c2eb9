//! What the angles alone take from a tendon.

use super::Worked;
use crate::finding::{Finding, Level, Rule};
use crate::floor::EndKind;
use crate::job::Job;
use crate::losses::Forces;
use crate::profile::Profile;

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

/// How a tendon turns, from its curve and forces; `None` where the point of least force is the jack itself.
pub fn turning(profile: &Profile, forces: &Forces) -> Option<Turning> {
    let end_m = profile
        .spans
        .last()
        .map(|span| span.start_m + span.length_m)?;
    let jack_m = if forces.ends[0].kind == EndKind::Live {
        0.0
    } else {
        end_m
    };
    let least_m = forces.least_jacking_station_m;
    let (from_m, to_m) = (jack_m.min(least_m), jack_m.max(least_m));
    if to_m - from_m <= 0.0 || forces.jack_kn <= 0.0 {
        return None;
    }
    let angle_rad = profile.angle_at(to_m) - profile.angle_at(from_m);
    Some(Turning {
        angle_rad,
        loss_ratio: forces.totals.friction_curvature_kn / forces.jack_kn,
        angle_per_m_rad: angle_rad / (to_m - from_m),
    })
}

pub(super) fn curvature_loss(worked: &Worked, job: &Job) -> Option<Finding> {
    let forces = worked.forces?;
    let turning = turning(worked.profile?, forces)?;
    let limits = &job.limits;
    let costly = turning.loss_ratio > limits.curvature_loss_ratio + ROUNDING;
    let winding = turning.angle_per_m_rad > limits.angle_per_m_rad + ROUNDING;
    if !costly && !winding {
        return None;
    }
    let mut expected = Vec::new();
    if costly {
        expected.push(format!(
            "a loss of at most {:.1} % (limits.curvature_loss_ratio)",
            100.0 * limits.curvature_loss_ratio
        ));
    }
    if winding {
        expected.push(format!(
            "at most {} rad/m (limits.angle_per_m_rad)",
            limits.angle_per_m_rad
        ));
    }
    Some(worked.finding(
        &CURVATURE_LOSS,
        Level::Warning,
        forces.least_jacking_station_m,
        format!(
            "down to the point of least force the tendon turns {:.3} rad, {:.4} rad/m, which alone takes {:.1} % of the \
             jacking force ({:.1} kN of {:.1} kN); {} was expected",
            turning.angle_rad,
            turning.angle_per_m_rad,
            100.0 * turning.loss_ratio,
            forces.totals.friction_curvature_kn,
            forces.jack_kn,
            expected.join(" and ")
        ),
        "look for a height read wrong first; then flatten the drape where it balances more load than it should, straighten \
         the sweeps in plan, or stress from both ends",
    ))
}
