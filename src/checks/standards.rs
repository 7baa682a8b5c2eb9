//! Stress limits of the standards whose long-term loss the job asks for.

use super::{Worked, stressing};
use crate::finding::{Finding, Level, Rule, Wording};
use crate::job::{Job, LongTermMethod};
use crate::units::STRESS;

/// See [`Rule::meaning`].
pub static STANDARD_STRESS: Rule = Rule {
    name: "standard-stress",
    meaning: "At jacking, after lock-off and in service the strand's stress is within what the standard of each named method \
              allows: en1992 min(0.80 fpk, 0.90 fp0.1k) at jacking (EN 1992-1-1 5.10.2.1), min(0.75 fpk, 0.85 fp0.1k) after \
              lock-off (5.10.3), 0.75 fpk in service (7.2(5), from memory); aci423 min(0.80 fpu, 0.94 fpy) at jacking, 0.70 \
              fpu at the anchors after lock-off (ACI 318-19 20.3.2.5.1, from memory), unless jacking-stress and anchor-stress \
              say so already; bs8110 0.80 fpu, usually 0.75, at jacking, 0.75, usually 0.70, after lock-off (BS 8110-1 4.7.1, \
              from memory); as3600 0.85 fpb at jacking (AS 3600 17.3.4.6, from memory). At a stage that is not named here no \
              limit of that standard was at hand; direct is no standard and has none.",
};

/// Ratios nearer to their limit than this are at it.
const ROUNDING: f64 = 1e-9;

/// Greatest stress of a tendon by one method.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct MethodStress {
    /// The method.
    pub method: LongTermMethod,
    /// After lock-off and elastic shortening: station, metres, and stress, MPa.
    pub transfer: (f64, f64),
    /// In service.
    pub service: (f64, f64),
}

/// When a limit holds.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Stage {
    Jacking,
    /// At the anchors after lock-off.
    Anchor,
    /// Anywhere after lock-off and elastic shortening.
    Transfer,
    Service,
}

/// A limit of a standard.
struct Limit {
    method: LongTermMethod,
    stage: Stage,
    level: Level,
    of_strength: f64,
    of_yield: Option<f64>,
    clause: &'static str,
}

const fn limit(
    method: LongTermMethod,
    stage: Stage,
    level: Level,
    of_strength: f64,
    of_yield: Option<f64>,
    clause: &'static str,
) -> Limit {
    Limit {
        method,
        stage,
        level,
        of_strength,
        of_yield,
        clause,
    }
}

/// The graver of a stage first.
#[rustfmt::skip]
static LIMITS: [Limit; 10] = {
    use LongTermMethod::{Aci423, As3600, Bs8110, En1992};
    use Level::{Error, Warning};
    use Stage::{Anchor, Jacking, Service, Transfer};
    [
        limit(En1992, Jacking, Error, 0.80, Some(0.90), "EN 1992-1-1 5.10.2.1"),
        limit(En1992, Transfer, Error, 0.75, Some(0.85), "EN 1992-1-1 5.10.3"),
        limit(En1992, Service, Error, 0.75, None, "EN 1992-1-1 7.2(5), from memory"),
        limit(Aci423, Jacking, Error, 0.80, Some(0.94), "ACI 318-19 20.3.2.5.1, from memory"),
        limit(Aci423, Anchor, Error, 0.70, None, "ACI 318-19 20.3.2.5.1, from memory"),
        limit(Bs8110, Jacking, Error, 0.80, None, "BS 8110-1 4.7.1, from memory"),
        limit(Bs8110, Jacking, Warning, 0.75, None, "BS 8110-1 4.7.1, what is usual, from memory"),
        limit(Bs8110, Transfer, Error, 0.75, None, "BS 8110-1 4.7.1, from memory"),
        limit(Bs8110, Transfer, Warning, 0.70, None, "BS 8110-1 4.7.1, what is usual, from memory"),
        limit(As3600, Jacking, Error, 0.85, None, "AS 3600 17.3.4.6, from memory"),
    ]
};

impl Limit {
    /// Greatest stress over strength.
    fn ratio(&self, job: &Job) -> f64 {
        self.of_yield.map_or(self.of_strength, |of_yield| {
            self.of_strength.min(of_yield * job.tendon.yield_ratio)
        })
    }

    fn broken(&self, ratio: f64, job: &Job) -> bool {
        ratio > self.ratio(job) + ROUNDING
    }
}

/// Of a method's limits at a stage, the gravest that a stress breaks.
fn broken(method: LongTermMethod, stage: Stage, ratio: f64, job: &Job) -> Option<&'static Limit> {
    LIMITS
        .iter()
        .find(|limit| limit.method == method && limit.stage == stage && limit.broken(ratio, job))
}

/// The jacking stress is the job's: one finding for each standard.
pub(super) fn jacking(job: &Job) -> Vec<Finding> {
    let ratio = job.stressing.jacking_ratio;
    let methods = job.long_term.all_methods().into_iter();
    // What ACI 318 allows is the default of that rule's own limits.
    let said = stressing::jacking_stress(job).is_some();
    methods
        .filter(|&method| !(said && method == LongTermMethod::Aci423))
        .filter_map(|method| broken(method, Stage::Jacking, ratio, job))
        .map(|limit| {
            Finding::new(
                &STANDARD_STRESS,
                limit.level,
                format!(
                    "the job jacks to {ratio:.3} of strength; at most {:.3} was expected ({})",
                    limit.ratio(job),
                    limit.clause
                ),
                "lower stressing.jacking_ratio, or name the method of the standard that governs the job",
            )
        })
        .collect()
}

/// After lock-off and in service, by each method: at the most stressed place.
pub(super) fn along(worked: &Worked, job: &Job) -> Vec<Finding> {
    let Some(forces) = worked.forces else {
        return Vec::new();
    };
    let strength_mpa = forces.steel.strength_mpa;
    let by_method = worked.by_method.iter().flat_map(|one| {
        [
            (one.method, Stage::Transfer, "after lock-off", one.transfer),
            (one.method, Stage::Service, "in service", one.service),
        ]
    });
    let at_anchor = anchor(worked, job).into_iter();
    let stages = at_anchor.chain(by_method);
    stages
        .filter_map(|(method, stage, when, (station_m, stress_mpa))| {
            let ratio = stress_mpa / strength_mpa;
            let limit = broken(method, stage, ratio, job)?;
            Some(worked.finding(
                &STANDARD_STRESS,
                limit.level,
                station_m,
                Wording::of(|units| {
                    format!(
                        "{when} the strand carries {}, {ratio:.3} of its strength; at most {:.3} was expected ({})",
                        units.of(STRESS).said(stress_mpa, 0),
                        limit.ratio(job),
                        limit.clause
                    )
                }),
                "jack to less, or seat the wedges with the draw-in that the system really has",
            ))
        })
        .collect()
}

/// The more stressed anchor after lock-off, for the standards that have a limit there: ACI 318's is the default of the rule
/// anchor-stress, which may have said it.
fn anchor(worked: &Worked, job: &Job) -> Option<(LongTermMethod, Stage, &'static str, (f64, f64))> {
    let method = LongTermMethod::Aci423;
    let named = job.long_term.all_methods().contains(&method);
    if !named || stressing::anchor_stress(worked, job).is_some() {
        return None;
    }
    let steel = worked.forces?.steel;
    let ends = worked.end_stations_m().into_iter().zip(worked.lock_off_kn?);
    let (station_m, force_kn) = ends.max_by(|a, b| a.1.total_cmp(&b.1))?;
    let at = (station_m, steel.stress_mpa(force_kn));
    Some((method, Stage::Anchor, "at the anchor after lock-off", at))
}

#[cfg(test)]
mod tests {
    use super::super::testing::{forces, job, straight, worked};
    use super::*;

    fn with(method: LongTermMethod) -> Job {
        let mut job = job();
        job.long_term.method = method;
        job
    }

    #[test]
    fn each_standard_has_its_own_limit_at_the_jack() {
        use LongTermMethod::{As3600, Bs8110, Direct, En1992};
        for (method, ratio, level) in [
            (Direct, 0.99, None),
            (En1992, 0.80, None),
            (En1992, 0.801, Some(Level::Error)),
            (Bs8110, 0.75, None),
            (Bs8110, 0.751, Some(Level::Warning)),
            (Bs8110, 0.801, Some(Level::Error)),
            (As3600, 0.85, None),
            (As3600, 0.851, Some(Level::Error)),
        ] {
            let mut job = with(method);
            job.stressing.jacking_ratio = ratio;
            let found = jacking(&job);
            assert_eq!(found.first().map(|f| f.level), level, "{method:?} {ratio}");
            assert!(found.len() <= 1);
        }
        // Of a strand that yields early the yield stress binds.
        let mut job = with(En1992);
        job.tendon.yield_ratio = 0.85;
        job.stressing.jacking_ratio = 0.77;
        assert_eq!(jacking(&job).len(), 1);
    }

    #[test]
    fn after_lock_off_and_in_service_the_worst_place_speaks() {
        use LongTermMethod::{Bs8110, En1992};
        let (tendon, forces) = (straight(20.0), forces());
        let strength = forces.steel.strength_mpa;
        let speaks = |method, transfer: f64, service: f64| {
            let stresses = [MethodStress {
                method,
                transfer: (7.0, transfer * strength),
                service: (8.0, service * strength),
            }];
            let mut worked = worked(&tendon);
            worked.forces = Some(&forces);
            worked.by_method = &stresses;
            let found = along(&worked, &with(method));
            found
                .iter()
                .map(|f| (f.level, f.station_m.unwrap_or_default()))
                .collect::<Vec<_>>()
        };
        assert_eq!(speaks(En1992, 0.75, 0.75), []);
        assert_eq!(speaks(En1992, 0.751, 0.6), [(Level::Error, 7.0)]);
        assert_eq!(
            speaks(En1992, 0.76, 0.751),
            [(Level::Error, 7.0), (Level::Error, 8.0)]
        );
        assert_eq!(speaks(Bs8110, 0.70, 0.6), []);
        assert_eq!(speaks(Bs8110, 0.701, 0.6), [(Level::Warning, 7.0)]);
        assert_eq!(speaks(Bs8110, 0.751, 0.6), [(Level::Error, 7.0)]);
    }

    #[test]
    fn aci_318_speaks_where_the_job_has_widened_its_limits_and_once_only() {
        let mut job = with(LongTermMethod::Aci423);
        job.stressing.jacking_ratio = 0.81;
        assert!(stressing::jacking_stress(&job).is_some() && jacking(&job).is_empty());
        job.limits.jacking_stress_ratio = 0.90;
        assert!(stressing::jacking_stress(&job).is_none());
        assert!(
            jacking(&job)[0]
                .text
                .contains("ACI 318-19 20.3.2.5.1, from memory")
        );
        // 0.94 of a yield at 0.84 of strength.
        (job.tendon.yield_ratio, job.limits.jacking_yield_ratio) = (0.84, 0.99);
        job.stressing.jacking_ratio = 0.795;
        assert!(jacking(&job)[0].text.contains("at most 0.790"));

        let (tendon, forces) = (straight(20.0), forces());
        let at = |ratio: f64| ratio * forces.steel.strength_mpa * forces.steel.area_mm2 / 1000.0;
        let mut worked = worked(&tendon);
        worked.forces = Some(&forces);
        worked.lock_off_kn = Some([at(0.65), at(0.701)]);
        assert!(along(&worked, &job).is_empty(), "anchor-stress says it");
        job.limits.anchor_stress_ratio = 0.75;
        let found = along(&worked, &job);
        assert_eq!(found.len(), 1);
        assert_eq!(found[0].station_m, Some(20.0));
        worked.lock_off_kn = Some([at(0.65), at(0.70)]);
        assert!(along(&worked, &job).is_empty());
        job.long_term.method = LongTermMethod::Direct;
        worked.lock_off_kn = Some([at(0.65), at(0.74)]);
        assert!(along(&worked, &job).is_empty());
    }
}
