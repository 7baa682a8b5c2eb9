//! Intermediate anchors, and the pulls between them, of a tendon that has any.

use serde::Serialize;

use super::{LiveRecord, number};
use crate::analysis::{Sample, TendonResult};
use crate::floor::{PourJoint, Tendon};
use crate::losses::Forces;

/// An intermediate anchor; the forces are the lesser of those on its two sides.
#[derive(Debug, Serialize)]
pub(in crate::report) struct JointRecord {
    pub(in crate::report) station_m: Option<f64>,
    pub(in crate::report) x_m: Option<f64>,
    pub(in crate::report) y_m: Option<f64>,
    pub(in crate::report) jacking_kn: Option<f64>,
    pub(in crate::report) lockoff_kn: Option<f64>,
    pub(in crate::report) transfer_kn: Option<f64>,
    pub(in crate::report) service_kn: Option<f64>,
}

/// Samples nearer to a joint than this are at it, metres.
const AT_M: f64 = 1e-6;

/// A jack of a pull; where two pull together, each has a record of the same order.
#[derive(Debug, Serialize)]
pub(in crate::report) struct PullRecord {
    /// From 1.
    pub(in crate::report) order: usize,
    pub(in crate::report) from_m: Option<f64>,
    pub(in crate::report) to_m: Option<f64>,
    /// Station of the jack.
    pub(in crate::report) at_m: Option<f64>,
    #[serde(flatten)]
    pub(in crate::report) live: LiveRecord,
}

/// The intermediate anchors of a tendon, in order of station.
pub(super) fn joints(tendon: &Tendon, result: &TendonResult) -> Vec<JointRecord> {
    let of = |joint: &PourJoint| {
        let at = |sample: &&Sample| (sample.station_m - joint.station_m).abs() <= AT_M;
        let least = |stage: usize| {
            let sides = result.samples.iter().filter(at);
            let forces_kn = sides.filter_map(|sample| *sample.forces_kn.get(stage)?);
            forces_kn.reduce(f64::min).and_then(number)
        };
        let [jacking_kn, lockoff_kn, transfer_kn, service_kn] = [0, 1, 2, 3].map(least);
        JointRecord {
            station_m: number(joint.station_m),
            x_m: number(joint.place.x),
            y_m: number(joint.place.y),
            jacking_kn,
            lockoff_kn,
            transfer_kn,
            service_kn,
        }
    };
    tendon.joints.iter().map(of).collect()
}

/// The pulls in order of stressing; none where the tendon is stressed in one.
pub(super) fn pulls(forces: Option<&Forces>) -> Vec<PullRecord> {
    let pulls = forces.into_iter().flat_map(|forces| &forces.pulls);
    pulls
        .zip(1..)
        .flat_map(|(pull, order)| {
            let [from_m, to_m] = pull.stations_m;
            pull.jacks().map(move |(at_m, end)| PullRecord {
                order,
                from_m: number(from_m),
                to_m: number(to_m),
                at_m: number(at_m),
                live: LiveRecord::of(Some(pull.forces.jack_kn), Some(end)),
            })
        })
        .collect()
}
