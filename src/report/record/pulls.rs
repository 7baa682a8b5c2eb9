//! Intermediate anchors, and the pulls between them, of a tendon that has any.

use serde::Serialize;

use super::{LiveRecord, number};
use crate::floor::{PourJoint, Tendon};
use crate::losses::Forces;

/// An intermediate anchor.
#[derive(Debug, Serialize)]
#[expect(
    clippy::struct_field_names,
    reason = "a name that holds a length says its unit"
)]
pub(in crate::report) struct JointRecord {
    pub(in crate::report) station_m: Option<f64>,
    pub(in crate::report) x_m: Option<f64>,
    pub(in crate::report) y_m: Option<f64>,
}

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
pub(super) fn joints(tendon: &Tendon) -> Vec<JointRecord> {
    let of = |joint: &PourJoint| JointRecord {
        station_m: number(joint.station_m),
        x_m: number(joint.place.x),
        y_m: number(joint.place.y),
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
