//! One tendon by every method of long-term loss that the job names.

use std::collections::BTreeMap;

use super::{Refusal, TendonResult, samples};
use crate::checks::Ground;
use crate::checks::standards::MethodStress;
use crate::finding::{Finding, Level, Rule};
use crate::floor::{Faces, Tendon};
use crate::job::{LongTerm, LongTermMethod};
use crate::losses::long_term::{self, Case, Lost, Method, NoLoss, Place, When};
use crate::losses::{Along, Effective, NoForce, faces_by_points};

/// See its meaning.
pub(super) static METHOD_WITHOUT_LOSS: Rule = Rule {
    name: "method-without-loss",
    meaning: "Every method of long-term loss that the job names covers the job's concrete, ages, humidity and thickness and \
              the tendon's stress; where a clause does not, it is named, and there is no force by that method.",
};

/// Days after stressing at which the force is shown, before the final.
pub const DAYS: [f64; 5] = [1.0, 7.0, 28.0, 90.0, 365.0];

/// A tendon by one method.
#[derive(Debug, Clone)]
pub struct MethodResult {
    /// The method.
    pub method: LongTermMethod,
    /// What it gives, or why nothing.
    pub outcome: Result<MethodForces, NoForce>,
    /// Mean force in the end, kN: also where the job asks at an age that the method knows nothing of.
    pub final_kn: Option<f64>,
}

impl MethodResult {
    /// Why the method gives no force before the end; `None` where it gives one, or no force at all.
    pub fn no_force_in_time(&self) -> Option<NoLoss> {
        let silent = self.outcome.is_ok() && !self.method.knows_time();
        silent.then(|| NoLoss::FinalOnly(self.method.word()))
    }
}

/// What a method gives.
#[derive(Debug, Clone, PartialEq)]
pub struct MethodForces {
    /// The method, made for this tendon: its working comes from it.
    pub made: Method,
    /// The mean of the tendon's places, where the working is shown.
    pub mean: Place,
    /// The mean of the losses along the tendon, MPa.
    pub lost: Lost,
    /// Mean service force along the tendon, kN.
    pub mean_service_kn: f64,
    /// Service force at each of the tendon's points, kN.
    pub service_kn: Vec<f64>,
    /// Greatest force after elastic shortening, and in service: station, metres, and kN; by a standard's method only.
    pub greatest_kn: Option<[(f64, f64); 2]>,
    /// Mean force some days after stressing, in the order of [`DAYS`], kN; `None` where the method knows no time.
    pub in_time_kn: [Option<f64>; DAYS.len()],
}

/// Where the concrete lies along a tendon, for the methods that ask: by the slab's zones where they are known, else by the
/// tendon's own points.
pub(super) fn faces(
    tendon: &Tendon,
    ground: Option<&Ground<'_>>,
    job: &LongTerm,
) -> Vec<(f64, Faces)> {
    if !job.asks_published() {
        return Vec::new();
    }
    let by_zones = ground.map(|ground| ground.faces_from(&tendon.path));
    by_zones
        .filter(|faces| faces.iter().any(|(_, faces)| faces.thickness_m.is_some()))
        .unwrap_or_else(|| faces_by_points(tendon))
}

/// A sentence for each of the job's methods that quotes something from memory.
pub(super) fn recalled(job: &LongTerm) -> Vec<String> {
    let methods = job.all_methods().into_iter();
    methods
        .filter_map(|method| {
            let what = long_term::recalled(method)?;
            Some(format!(
                "{} quotes from memory, to be checked against the standard: {what}.",
                method.word()
            ))
        })
        .collect()
}

/// When the job asks for the service force.
pub(super) fn asked(job: &LongTerm) -> When {
    job.published.asked_days.map_or(When::Final, When::Age)
}

/// The tendon by each of the job's methods, the drawn one, worked out already, first.
pub(super) fn by_each(
    tendon: &Tendon,
    along: &Along<'_, '_>,
    job: &LongTerm,
    case: &Case,
    drawn: &Result<Effective<'_>, NoForce>,
) -> Vec<MethodResult> {
    let mean_kn = |method: LongTermMethod, when| {
        let at = Effective::new(along, job, method, case, when).ok()?;
        Some(at.mean_service_kn())
    };
    let work = |method: LongTermMethod| {
        let effective = if method == job.method {
            drawn.clone()?
        } else {
            Effective::new(along, job, method, case, asked(job))?
        };
        let stressing_days = job.published.stressing_days;
        let stations = tendon.points.iter().map(|point| point.station_m);
        Ok(MethodForces {
            made: effective.method(),
            mean: effective.mean_place(),
            lost: effective.mean_lost(),
            mean_service_kn: effective.mean_service_kn(),
            service_kn: stations
                .map(|station_m| effective.service_kn(station_m))
                .collect(),
            greatest_kn: (method != LongTermMethod::Direct)
                .then(|| greatest(tendon, along, &effective)),
            in_time_kn: DAYS.map(|days| {
                let when = When::Age(stressing_days + days);
                if method.knows_time() {
                    mean_kn(method, when)
                } else {
                    None
                }
            }),
        })
    };
    let named = job.all_methods().into_iter();
    named
        .map(|method| {
            let outcome: Result<MethodForces, NoForce> = work(method);
            let final_kn = match (asked(job), &outcome) {
                (When::Final, Ok(forces)) => Some(forces.mean_service_kn),
                (When::Final, Err(_)) => None,
                (When::Age(_), _) => mean_kn(method, When::Final),
            };
            MethodResult {
                method,
                outcome,
                final_kn,
            }
        })
        .collect()
}

/// The greatest forces after elastic shortening and in service: at the samples, and where a draw-in ends.
fn greatest(tendon: &Tendon, along: &Along<'_, '_>, effective: &Effective<'_>) -> [(f64, f64); 2] {
    let mut greatest = [(0.0, 0.0); 2];
    let stations = samples::stations(tendon).into_iter();
    for station_m in stations.chain(along.pulls().peaks_m()) {
        // Of the two forces at an intermediate anchor the greater counts here.
        for [.., transfer_kn, service_kn] in effective.sides_kn(station_m) {
            for (held, force_kn) in greatest.iter_mut().zip([transfer_kn, service_kn]) {
                if force_kn > held.1 {
                    *held = (station_m, force_kn);
                }
            }
        }
    }
    greatest
}

/// The greatest stresses after elastic shortening and in service, by each method that gives a loss.
pub(super) fn stresses(result: &TendonResult) -> Vec<MethodStress> {
    let Some(steel) = result.forces.as_ref().map(|forces| forces.steel) else {
        return Vec::new();
    };
    let of = |one: &MethodResult| {
        let forces = one.outcome.as_ref().ok()?;
        let [transfer, service] = forces
            .greatest_kn?
            .map(|(station_m, force_kn)| (station_m, steel.stress_mpa(force_kn)));
        Some(MethodStress {
            method: one.method,
            transfer,
            service,
        })
    };
    result.by_method.iter().filter_map(of).collect()
}

/// A finding for each reason why a method beside the drawn one gives no loss, with the tendons that it holds for.
pub(super) fn without_loss(tendons: &[Tendon], results: &[TendonResult]) -> Vec<Finding> {
    let mut reasons: BTreeMap<(LongTermMethod, String), Vec<&str>> = BTreeMap::new();
    for (tendon, result) in tendons.iter().zip(results) {
        for other in result.by_method.iter().skip(1) {
            if let Err(reason) = &other.outcome {
                let key = (other.method, reason.to_string());
                reasons.entry(key).or_default().push(&tendon.mark);
            }
        }
    }
    reasons
        .into_iter()
        .map(|((method, reason), marks)| {
            let first = marks.first().copied().unwrap_or_default();
            let on = match marks.len() {
                1 => first.to_owned(),
                count => format!("{count} tendons, the first of them {first}"),
            };
            let text = format!(
                "{}: {reason}; no force by this method on {on}",
                method.word()
            );
            Finding::new(&METHOD_WITHOUT_LOSS, Level::Warning, text, REMEDY)
        })
        .collect()
}

/// What to do where a method gives no loss.
pub(super) const REMEDY: &str = "correct the key of [long_term] that the clause speaks of, or name a method that covers the job";

/// Why a tendon has no forces by the drawn method.
pub(super) fn refusal(method: LongTermMethod, reason: NoForce) -> Refusal {
    match reason {
        NoForce::Stress(reason) => reason.into(),
        NoForce::Loss(reason) => Refusal::Method(method, reason),
    }
}
