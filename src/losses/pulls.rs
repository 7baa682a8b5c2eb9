//! A tendon stressed pull by pull: one from end to end, or one for each segment between two neighbouring anchors.

use super::sequence::{Step, steps};
use super::{CannotStress, Forces, Pull, Steel, Stressed, Unstressed};
use crate::floor::EndKind;
use crate::job::Stressing;
use crate::profile::{Profile, SAME_PLACE_M, Segment};

/// A tendon after all its pulls. Each segment has the friction, draw-in and extension of its own pull; at an intermediate
/// anchor two forces meet, one of either segment.
#[derive(Debug, Clone)]
pub struct Pulls<'p> {
    profile: &'p Profile,
    first: Pulled<'p>,
    /// The segments beyond the first, in order along the tendon.
    others: Vec<Pulled<'p>>,
}

/// A segment after its pull.
#[derive(Debug, Clone)]
struct Pulled<'p> {
    /// Stations of its two anchors on the tendon, metres.
    stations_m: [f64; 2],
    /// When its turn comes, from 0.
    turn: usize,
    stressed: Stressed<'p>,
}

impl<'p> Pulls<'p> {
    /// Jacks a tendon and locks it off, segment by segment. `first_end`: of two live ends, the one whose pour comes first.
    ///
    /// # Errors
    /// [`Unstressed`] says why not, and of several segments which.
    pub fn new(
        profile: &'p Profile,
        steel: Steel,
        kinds: [EndKind; 2],
        first_end: usize,
        job: &Stressing,
    ) -> Result<Self, Unstressed> {
        let segments = profile.segments();
        let steps = steps(kinds, segments.len(), first_end);
        let pulled = |index: usize, segment: &'p Segment, step: Step| {
            let (from_m, curve) = (segment.from_m, &segment.curve);
            let refused = |reason| Unstressed {
                segment: Some(index),
                reason,
            };
            Ok(Pulled {
                stations_m: [from_m, from_m + curve.plan_length_m()],
                turn: step.turn,
                stressed: Stressed::new(curve, steel, step.kinds, job).map_err(refused)?,
            })
        };
        let all: Result<Vec<Pulled<'p>>, Unstressed> = if kinds == [EndKind::Dead; 2] {
            Err(CannotStress::NoLiveEnd.into())
        } else {
            let each = segments.iter().enumerate().zip(steps);
            each.map(|((index, segment), step)| pulled(index, segment, step))
                .collect()
        };
        let mut all = all?.into_iter();
        let first = match all.next() {
            Some(first) => first,
            None => Pulled {
                stations_m: [0.0, profile.plan_length_m()],
                turn: 0,
                stressed: Stressed::new(profile, steel, kinds, job)?,
            },
        };
        Ok(Self {
            profile,
            first,
            others: all.collect(),
        })
    }

    fn each(&self) -> impl Iterator<Item = &Pulled<'p>> {
        std::iter::once(&self.first).chain(&self.others)
    }

    /// The curve, from end to end.
    pub fn profile(&self) -> &'p Profile {
        self.profile
    }

    /// The steel.
    pub fn steel(&self) -> Steel {
        self.first.stressed.steel()
    }

    /// Stations of the intermediate anchors, metres.
    pub(super) fn anchors_m(&self) -> impl Iterator<Item = f64> {
        self.others.iter().map(|one| one.stations_m[0])
    }

    /// The segments that hold a station: one, or the two that meet at an intermediate anchor, in order along the tendon.
    fn holding(&self, station_m: f64) -> impl Iterator<Item = &Pulled<'p>> {
        let last = self.others.len();
        let held = self.each().enumerate().filter(move |(index, one)| {
            let [from_m, to_m] = one.stations_m;
            (*index == 0 || station_m >= from_m - SAME_PLACE_M)
                && (*index == last || station_m <= to_m + SAME_PLACE_M)
        });
        held.map(|(_, one)| one)
    }

    /// Force while the jacks hold and after lock-off, kN, of each segment that holds a station; at a bend, the least in it.
    pub fn sides_kn(&self, station_m: f64) -> impl Iterator<Item = [f64; 2]> {
        self.holding(station_m)
            .map(move |one| one.stressed.both_kn(station_m - one.stations_m[0]))
    }

    /// Force while the jacks hold and after lock-off, kN: the least at the station.
    pub fn both_kn(&self, station_m: f64) -> [f64; 2] {
        least(self.sides_kn(station_m))
    }

    /// Force after lock-off, kN: the least at the station.
    pub fn lockoff_kn(&self, station_m: f64) -> f64 {
        self.both_kn(station_m)[1]
    }

    /// Mean force after lock-off along the tendon in space, kN.
    pub fn mean_lockoff_kn(&self) -> f64 {
        let sum = |of: fn(&Stressed<'p>) -> f64| -> f64 {
            self.each().map(|one| of(&one.stressed)).sum()
        };
        sum(Stressed::lockoff_area_kn_m) / sum(Stressed::length_m)
    }

    /// Least force after lock-off, kN.
    pub fn least_lockoff_kn(&self) -> f64 {
        let each = self.each().map(|one| one.stressed.least_lockoff_kn());
        each.fold(f64::INFINITY, f64::min)
    }

    /// What is reported of the tendon as a whole, without the later losses: of several pulls, losses and least force are those
    /// of the pull that leaves least while it is jacked.
    pub fn forces(&self) -> Forces {
        let Some(last) = self.others.last() else {
            return self.first.stressed.forces();
        };
        let mut in_turn: Vec<&Pulled<'p>> = self.each().collect();
        in_turn.sort_by_key(|one| one.turn);
        let pulls: Vec<Pull> = in_turn.into_iter().map(Pulled::reported).collect();
        let governing = Pull::governing(&pulls)
            .map_or_else(|| self.first.reported().forces, |pull| pull.forces.clone());
        Forces {
            ends: [self.first.stressed.ends()[0], last.stressed.ends()[1]],
            pulls,
            ..governing
        }
    }
}

impl Pulled<'_> {
    fn reported(&self) -> Pull {
        let own = self.stressed.forces();
        let [from_m, to_m] = self.stations_m;
        Pull {
            stations_m: self.stations_m,
            lock_off_kn: [from_m, to_m]
                .map(|station_m| self.stressed.lockoff_kn(station_m - from_m)),
            forces: Forces {
                least_jacking_station_m: from_m + own.least_jacking_station_m,
                ..own
            },
        }
    }
}

/// The least of several forces at one place, stage by stage, kN.
pub(super) fn least<const N: usize>(sides_kn: impl Iterator<Item = [f64; N]>) -> [f64; N] {
    sides_kn.fold([f64::INFINITY; N], |held, side| {
        std::array::from_fn(|stage| held[stage].min(side[stage]))
    })
}
