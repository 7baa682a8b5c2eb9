//! A tendon pull by pull: what is stressed by itself is judged by itself.

use super::Worked;
use super::words::long;
use crate::floor::EndKind;
use crate::losses::{EndForces, Forces};
use crate::units::Units;

/// One pull: the whole tendon, or a segment of it.
#[derive(Debug, Clone, Copy)]
pub(super) struct Pulled<'a> {
    /// Stations of its two anchors, metres.
    pub(super) stations_m: [f64; 2],
    pub(super) forces: &'a Forces,
    /// Lock-off force at its two anchors, kN, where it is known.
    pub(super) lock_off_kn: Option<[f64; 2]>,
    /// Whether the tendon has others.
    pub(super) of_several: bool,
}

impl<'a> Worked<'a> {
    /// The pulls in order of stressing; none where there are no forces.
    pub(super) fn pulls(&self) -> Vec<Pulled<'a>> {
        let Some(forces) = self.forces else {
            return Vec::new();
        };
        if forces.pulls.is_empty() {
            return vec![Pulled {
                stations_m: self.end_stations_m(),
                forces,
                lock_off_kn: self.lock_off_kn,
                of_several: false,
            }];
        }
        let each = forces.pulls.iter().map(|pull| Pulled {
            stations_m: pull.stations_m,
            forces: &pull.forces,
            lock_off_kn: Some(pull.lock_off_kn),
            of_several: true,
        });
        each.collect()
    }
}

impl Pulled<'_> {
    /// What the jack does where there is one, and which of the two anchors is the fixed one.
    pub(super) fn one_jack(&self) -> Option<(&EndForces, usize)> {
        let [start, end] = &self.forces.ends;
        match (start.kind, end.kind) {
            (EndKind::Live, EndKind::Dead) => Some((start, 1)),
            (EndKind::Dead, EndKind::Live) => Some((end, 0)),
            _ => None,
        }
    }

    /// Length, metres of plan line.
    pub(super) fn length_m(&self) -> f64 {
        self.stations_m[1] - self.stations_m[0]
    }

    /// ` of the segment from station 0.00 m to 12.00 m`; nothing for a tendon that is stressed in one.
    pub(super) fn of_segment(&self, units: Units) -> String {
        if !self.of_several {
            return String::new();
        }
        let [from, to] = self.stations_m.map(|station_m| long(station_m, units));
        format!(" of the segment from station {from} to {to}")
    }
}
