//! A tendon's result under the names and in the units that the outputs share.

mod methods;
mod pulls;

use std::collections::BTreeMap;

use serde::Serialize;

use self::methods::MethodRecord;
use self::pulls::{JointRecord, PullRecord};
use crate::analysis::{PointResult, TendonResult};
use crate::finding::{Finding, Level};
use crate::floor::{EndKind, Point, PointKind, Run, Tendon};
use crate::losses::{EndForces, Forces};

/// A tendon; what is not known is `None` and stays empty in every output.
#[derive(Debug, Serialize)]
pub(super) struct TendonRecord<'a> {
    pub(super) mark: &'a str,
    /// Whether it is a copy of its group's typical tendon; only then is it said.
    #[serde(skip_serializing_if = "std::ops::Not::not")]
    pub(super) made: bool,
    pub(super) handle: &'a str,
    pub(super) layer: &'a str,
    pub(super) run: Run,
    pub(super) tendons: u32,
    pub(super) strands: Option<u32>,
    /// The size worked with; where there is none, what the drawing says.
    pub(super) strand: Option<&'a str>,
    #[serde(skip_serializing_if = "Option::is_none")]
    pub(super) required_kn: Option<f64>,
    #[serde(skip_serializing_if = "Option::is_none")]
    pub(super) required_kn_per_m: Option<f64>,
    pub(super) area_mm2: Option<f64>,
    pub(super) length_m: Option<f64>,
    pub(super) plan_length_m: Option<f64>,
    pub(super) radius_min_m: Option<f64>,
    pub(super) radius_plan_min_m: Option<f64>,
    pub(super) ends: [EndRecord; 2],
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub(super) joints: Vec<JointRecord>,
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub(super) pulls: Vec<PullRecord>,
    pub(super) points: Vec<PointRecord>,
    pub(super) losses: Option<LossRecord>,
    pub(super) mean_service_kn: Option<f64>,
    /// By each method that the job names; empty where there are no forces.
    pub(super) losses_by_method: BTreeMap<&'static str, MethodRecord>,
    /// Greatest less least mean service force by method, over the drawn method's.
    pub(super) method_spread_ratio: Option<f64>,
    /// Angle turned in space over the whole length.
    pub(super) angle_rad: Option<f64>,
    /// Share of the jacking force lost to angle alone, down to the point of least force.
    pub(super) curvature_loss_ratio: Option<f64>,
    pub(super) concrete_stress_mpa: Option<f64>,
}

/// An end; only a live one says what the jack does.
#[derive(Debug, Serialize)]
pub(super) struct EndRecord {
    pub(super) kind: Option<EndKind>,
    pub(super) x_m: Option<f64>,
    pub(super) y_m: Option<f64>,
    #[serde(flatten)]
    pub(super) live: Option<LiveRecord>,
}

/// What is measured at a jack.
#[derive(Debug, Serialize)]
pub(super) struct LiveRecord {
    pub(super) jacking_kn: Option<f64>,
    pub(super) extension_mm: Option<f64>,
    pub(super) extension_net_mm: Option<f64>,
    pub(super) draw_in_reach_m: Option<f64>,
}

/// A profile point.
#[derive(Debug, Serialize)]
pub(super) struct PointRecord {
    pub(super) kind: PointKind,
    pub(super) station_m: Option<f64>,
    pub(super) x_m: Option<f64>,
    pub(super) y_m: Option<f64>,
    pub(super) height_mm: Option<f64>,
    pub(super) level_m: Option<f64>,
    pub(super) angle_rad: Option<f64>,
    pub(super) jacking_kn: Option<f64>,
    pub(super) lockoff_kn: Option<f64>,
    pub(super) transfer_kn: Option<f64>,
    pub(super) service_kn: Option<f64>,
    /// By each method that the job names; empty where there are no forces.
    pub(super) service_by_method_kn: BTreeMap<&'static str, Option<f64>>,
}

/// Losses by cause.
#[derive(Debug, Serialize)]
pub(super) struct LossRecord {
    pub(super) friction_curvature_kn: Option<f64>,
    pub(super) friction_wobble_kn: Option<f64>,
    pub(super) draw_in_kn: Option<f64>,
    pub(super) shortening_mpa: Option<f64>,
    pub(super) shrinkage_mpa: Option<f64>,
    pub(super) creep_mpa: Option<f64>,
    pub(super) relaxation_mpa: Option<f64>,
}

/// A finding.
#[derive(Debug, Serialize)]
pub(super) struct FindingRecord<'a> {
    pub(super) rule: &'static str,
    pub(super) level: Level,
    pub(super) tendon: Option<&'a str>,
    pub(super) station_m: Option<f64>,
    pub(super) x_m: Option<f64>,
    pub(super) y_m: Option<f64>,
    pub(super) text: &'a str,
    pub(super) remedy: &'a str,
}

/// A number fit for an output: finite, and zero without a sign.
pub(super) fn number(value: f64) -> Option<f64> {
    value.is_finite().then_some(value + 0.0)
}

impl<'a> TendonRecord<'a> {
    /// One tendon's record.
    pub(super) fn of(tendon: &'a Tendon, result: &'a TendonResult) -> Self {
        let forces = result.forces.as_ref();
        Self {
            mark: &tendon.mark,
            made: tendon.made,
            handle: &tendon.handle,
            layer: &tendon.layer,
            run: tendon.run,
            tendons: tendon.tendons,
            strands: tendon.strands,
            strand: result.strand.as_deref().or(tendon.strand.as_deref()),
            required_kn: tendon.required_kn.and_then(number),
            required_kn_per_m: tendon.required_kn_per_m.and_then(number),
            area_mm2: result.area_mm2.and_then(number),
            length_m: result
                .profile
                .as_ref()
                .and_then(|profile| number(profile.length_m())),
            plan_length_m: number(tendon.path.length_m()),
            radius_min_m: result
                .profile
                .as_ref()
                .and_then(|profile| number(profile.radius_min_m()?.radius_m)),
            radius_plan_min_m: result
                .plan_tightest
                .and_then(|tightest| number(tightest.radius_m)),
            ends: [
                EndRecord::of(tendon, forces, 0),
                EndRecord::of(tendon, forces, 1),
            ],
            joints: pulls::joints(tendon, result),
            pulls: pulls::pulls(forces),
            points: points(tendon, result),
            losses: forces.map(LossRecord::of),
            mean_service_kn: forces.and_then(|forces| number(forces.later?.mean_service_kn)),
            losses_by_method: methods::losses(result),
            method_spread_ratio: result.spread().and_then(|spread| number(spread.ratio)),
            angle_rad: result
                .points
                .last()
                .and_then(|point| point.angle_rad)
                .and_then(number),
            curvature_loss_ratio: result
                .turning
                .and_then(|turning| number(turning.loss_ratio)),
            concrete_stress_mpa: result.concrete_stress_mpa.and_then(number),
        }
    }
}

/// Points with their results; a tendon whose points have no results yet still shows what the drawing says.
fn points(tendon: &Tendon, result: &TendonResult) -> Vec<PointRecord> {
    let unknown = PointResult {
        angle_rad: None,
        level_m: None,
        forces_kn: [None; 4],
    };
    let results = result
        .points
        .iter()
        .copied()
        .chain(std::iter::repeat(unknown));
    tendon
        .points
        .iter()
        .zip(results)
        .enumerate()
        .map(|(index, (point, worked))| {
            PointRecord::of(point, &worked, methods::service_kn(result, index))
        })
        .collect()
}

impl EndRecord {
    fn of(tendon: &Tendon, forces: Option<&Forces>, which: usize) -> Self {
        let end = &tendon.ends[which.min(1)];
        let live = end.kind == Some(EndKind::Live);
        Self {
            kind: end.kind,
            x_m: number(end.place.x),
            y_m: number(end.place.y),
            live: live.then(|| {
                let at_end = forces.map(|forces| &forces.ends[which.min(1)]);
                LiveRecord::of(forces.map(|forces| forces.jack_kn), at_end)
            }),
        }
    }
}

impl LiveRecord {
    fn of(jack_kn: Option<f64>, end: Option<&EndForces>) -> Self {
        Self {
            jacking_kn: jack_kn.and_then(number),
            extension_mm: end.and_then(|end| end.extension_mm).and_then(number),
            extension_net_mm: end.and_then(|end| end.extension_net_mm).and_then(number),
            draw_in_reach_m: end.and_then(|end| end.draw_in_reach_m).and_then(number),
        }
    }
}

impl PointRecord {
    fn of(
        point: &Point,
        result: &PointResult,
        service_by_method_kn: BTreeMap<&'static str, Option<f64>>,
    ) -> Self {
        let [jacking_kn, lockoff_kn, transfer_kn, service_kn] =
            result.forces_kn.map(|force_kn| force_kn.and_then(number));
        // An anchor that the drawing gives no height has the one it was worked out with.
        let height_m = point
            .height_m
            .or_else(|| Some(result.level_m? - point.faces().soffit_m()?));
        Self {
            kind: point.kind,
            station_m: number(point.station_m),
            x_m: number(point.place.x),
            y_m: number(point.place.y),
            height_mm: height_m.and_then(|height_m| number(height_m * 1000.0)),
            level_m: result.level_m.or_else(|| point.level_m()).and_then(number),
            angle_rad: result.angle_rad.and_then(number),
            jacking_kn,
            lockoff_kn,
            transfer_kn,
            service_kn,
            service_by_method_kn,
        }
    }
}

impl LossRecord {
    fn of(forces: &Forces) -> Self {
        let (totals, later) = (&forces.totals, forces.later);
        Self {
            friction_curvature_kn: number(totals.friction_curvature_kn),
            friction_wobble_kn: number(totals.friction_wobble_kn),
            draw_in_kn: number(totals.draw_in_kn),
            shortening_mpa: later.and_then(|later| number(later.shortening_mpa)),
            shrinkage_mpa: later.and_then(|later| number(later.shrinkage_mpa)),
            creep_mpa: later.and_then(|later| number(later.creep_mpa)),
            relaxation_mpa: later.and_then(|later| number(later.relaxation_mpa)),
        }
    }
}

impl<'a> FindingRecord<'a> {
    /// One finding's record.
    pub(super) fn of(finding: &'a Finding) -> Self {
        Self {
            rule: finding.rule.name,
            level: finding.level,
            tendon: finding.tendon.as_deref(),
            station_m: finding.station_m.and_then(number),
            x_m: finding.place.and_then(|place| number(place.x)),
            y_m: finding.place.and_then(|place| number(place.y)),
            text: &finding.text,
            remedy: &finding.remedy,
        }
    }
}
