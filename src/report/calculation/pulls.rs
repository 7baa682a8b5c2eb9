//! What the sheet works out one after the other: the tendon, or each of its segments in the order of stressing.

use crate::analysis::TendonResult;
use crate::floor::{EndKind, Tendon};
use crate::losses::{EndForces, Forces};
use crate::profile::{Profile, SAME_PLACE_M};
use crate::units::{LONG, Units};

/// A pull with what the sheet needs of it.
pub(super) struct Shown<'a> {
    /// Its place in the order of stressing, from 1; `None` where the tendon is stressed in one.
    pub(super) order: Option<usize>,
    /// Stations of its two anchors, metres.
    pub(super) stations_m: [f64; 2],
    /// Its curve, from a station 0 of its own.
    pub(super) curve: &'a Profile,
    pub(super) forces: &'a Forces,
    /// Force at its anchors after lock-off, kN.
    lock_off_kn: [Option<f64>; 2],
}

/// A place in a pull: what it is, its station on the tendon, metres, and the force there while the jacks hold, kN.
pub(super) struct Stop {
    pub(super) name: &'static str,
    pub(super) station_m: f64,
    pub(super) jacking_kn: Option<f64>,
}

/// The pulls in order of stressing.
pub(super) fn shown<'a>(
    tendon: &Tendon,
    profile: &'a Profile,
    forces: &'a Forces,
    result: &TendonResult,
) -> Vec<Shown<'a>> {
    if forces.pulls.is_empty() {
        let locked =
            |end: Option<&crate::analysis::PointResult>| end.and_then(|end| end.forces_kn[1]);
        return vec![Shown {
            order: None,
            stations_m: [0.0, tendon.path.length_m()],
            curve: profile,
            forces,
            lock_off_kn: [locked(result.points.first()), locked(result.points.last())],
        }];
    }
    let pulls = forces.pulls.iter().zip(1..);
    pulls
        .filter_map(|(pull, order)| {
            let own_m = |from_m: f64| (from_m - pull.stations_m[0]).abs() <= SAME_PLACE_M;
            let segment = profile.segments().iter().find(|one| own_m(one.from_m))?;
            Some(Shown {
                order: Some(order),
                stations_m: pull.stations_m,
                curve: &segment.curve,
                forces: &pull.forces,
                lock_off_kn: pull.lock_off_kn.map(Some),
            })
        })
        .collect()
}

impl<'a> Shown<'a> {
    /// Whether one of its two anchors is jacked.
    pub(super) fn live(&self, end: usize) -> bool {
        self.forces
            .ends
            .get(end)
            .is_some_and(|end| end.kind == EndKind::Live)
    }

    /// Its jacks: station, force after lock-off, and what else is known of each.
    pub(super) fn jacks(&self) -> impl Iterator<Item = (f64, Option<f64>, &'a EndForces)> {
        let ends = self
            .stations_m
            .into_iter()
            .zip(self.lock_off_kn)
            .zip(&self.forces.ends);
        ends.filter(|(_, end)| end.kind == EndKind::Live)
            .map(|((station_m, lock_off_kn), end)| (station_m, lock_off_kn, end))
    }

    /// `  pull 2, station 12.000 m to 24.000 m:`; nothing where the tendon is stressed in one.
    pub(super) fn heading(&self, units: Units) -> Option<String> {
        let order = self.order?;
        let long = units.of(LONG);
        let [from, to] = self.stations_m.map(|station_m| long.said(station_m, 3));
        Some(format!("  pull {order}, station {from} to {to}:\n"))
    }

    /// Its anchors and the tendon's points between them, in order of station.
    pub(super) fn stops(&self, tendon: &Tendon, result: &TendonResult) -> Vec<Stop> {
        let [from_m, to_m] = self.stations_m;
        let last_m = tendon.path.length_m();
        let anchor = |end: usize| Stop {
            name: "joint",
            station_m: self.stations_m[end],
            jacking_kn: Some(if self.live(end) {
                self.forces.jack_kn
            } else {
                self.forces.least_jacking_kn
            }),
        };
        let held = |station_m: f64| {
            let after = self.order.is_none() || from_m <= 0.0 || station_m > from_m + SAME_PLACE_M;
            let before = self.order.is_none()
                || to_m >= last_m - SAME_PLACE_M
                || station_m < to_m - SAME_PLACE_M;
            after && before
        };
        let points = tendon.points.iter().zip(&result.points);
        let points = points.filter(|(point, _)| held(point.station_m));
        let points = points.map(|(point, worked)| Stop {
            name: super::drawn::kind(point.kind),
            station_m: point.station_m,
            jacking_kn: worked.forces_kn[0],
        });
        let first = (from_m > 0.0).then(|| anchor(0));
        let last = (to_m < last_m - SAME_PLACE_M).then(|| anchor(1));
        first.into_iter().chain(points).chain(last).collect()
    }
}
