//! What each method of long-term loss gives, by its word.

use std::collections::BTreeMap;

use serde::Serialize;

use super::number;
use crate::analysis::{DAYS, TendonResult};

/// A method's losses, mean along the tendon; or why there are none.
#[derive(Debug, Serialize)]
pub(in crate::report) struct MethodRecord {
    pub(in crate::report) shortening_mpa: Option<f64>,
    pub(in crate::report) shrinkage_mpa: Option<f64>,
    pub(in crate::report) creep_mpa: Option<f64>,
    pub(in crate::report) relaxation_mpa: Option<f64>,
    pub(in crate::report) mean_service_kn: Option<f64>,
    /// Mean force some days after stressing, in order; null where the method knows no time.
    pub(in crate::report) mean_force_in_time: Vec<InTime>,
    pub(in crate::report) mean_force_final_kn: Option<f64>,
    /// Why there is no force before the end.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub(in crate::report) no_force_in_time: Option<String>,
    #[serde(skip_serializing_if = "Option::is_none")]
    pub(in crate::report) no_loss: Option<String>,
}

/// Mean force at a time.
#[derive(Debug, Serialize)]
pub(in crate::report) struct InTime {
    pub(in crate::report) days: f64,
    pub(in crate::report) force_kn: Option<f64>,
}

/// Losses by method.
pub(super) fn losses(result: &TendonResult) -> BTreeMap<&'static str, MethodRecord> {
    result
        .by_method
        .iter()
        .map(|one| {
            let forces = one.outcome.as_ref().ok();
            let lost = forces.map(|forces| &forces.lost);
            let in_time = DAYS.into_iter().enumerate().map(|(at, days)| InTime {
                days,
                force_kn: forces
                    .and_then(|forces| *forces.in_time_kn.get(at)?)
                    .and_then(number),
            });
            let record = MethodRecord {
                shortening_mpa: lost.and_then(|lost| number(lost.shortening_mpa)),
                shrinkage_mpa: lost.and_then(|lost| number(lost.shrinkage_mpa)),
                creep_mpa: lost.and_then(|lost| number(lost.creep_mpa)),
                relaxation_mpa: lost.and_then(|lost| number(lost.relaxation_mpa)),
                mean_service_kn: forces.and_then(|forces| number(forces.mean_service_kn)),
                mean_force_in_time: in_time.collect(),
                mean_force_final_kn: one.final_kn.and_then(number),
                no_force_in_time: one.no_force_in_time().map(|reason| reason.to_string()),
                no_loss: one.outcome.as_ref().err().map(ToString::to_string),
            };
            (one.method.word(), record)
        })
        .collect()
}

/// Service force by method at a point, kN.
pub(super) fn service_kn(
    result: &TendonResult,
    point: usize,
) -> BTreeMap<&'static str, Option<f64>> {
    result
        .by_method
        .iter()
        .map(|one| {
            let forces = one.outcome.as_ref().ok();
            let force_kn = forces.and_then(|forces| forces.service_kn.get(point).copied());
            (one.method.word(), force_kn.and_then(number))
        })
        .collect()
}
