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

    /// Stations where a draw-in ends, metres: the force after lock-off is greatest at one of them.
    pub fn peaks_m(&self) -> impl Iterator<Item = f64> {
        self.each().flat_map(|one| {
            let [from_m, to_m] = one.stations_m;
            let [start, end] = one.stressed.ends().map(|end| end.draw_in_reach_m);
            let peaks = [
                start.map(|reach_m| from_m + reach_m),
                end.map(|reach_m| to_m - reach_m),
            ];
            peaks
                .into_iter()
                .flatten()
                .map(move |peak_m| peak_m.clamp(from_m, to_m))
        })
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

#[cfg(test)]
mod tests {
    use super::*;
    use crate::job::{Job, Wobble};
    use crate::profile::Span;
    use EndKind::{Dead, Live};

    const STEEL: Steel = Steel {
        area_mm2: 493.5,
        strength_mpa: 1860.0,
        modulus_mpa: 195_000.0,
    };
    const PER_M: f64 = 0.002;
    const SLIP_M: f64 = 0.004;

    fn job() -> Stressing {
        let mut job = Job::default().stressing;
        (job.wobble, job.draw_in_m) = (Wobble::PerM(PER_M), SLIP_M);
        job
    }

    /// A level tendon of 30 m, divided at these stations.
    fn level(anchors_m: &[f64]) -> Profile {
        let span = Span {
            start_m: 0.0,
            length_m: 30.0,
            level_m: -0.1,
            slope: 0.0,
            curvature_per_m: 0.0,
            plan_curvature_per_m: 0.0,
        };
        Profile::new(vec![span], Vec::new()).divided(anchors_m)
    }

    fn near(a: f64, b: f64) -> bool {
        (a - b).abs() < 1e-9 * b.abs()
    }

    #[test]
    fn a_level_tendon_in_two_pours_by_hand() {
        let curve = level(&[12.0]);
        let pulls = Pulls::new(&curve, STEEL, [Dead, Live], 0, &job()).expect("a force");
        let jack_kn = 0.75 * 1860.0 * 0.4935;
        let stiffness_kn = 195.0 * 493.5;
        // P = P0 exp(-K s), s from the jack: at 12 m in the first pull, at 30 m in the second.
        for (station_m, s_m) in [(0.0, 12.0), (5.0, 7.0), (20.0, 10.0), (30.0, 0.0)] {
            assert!(near(
                pulls.both_kn(station_m)[0],
                jack_kn * (-PER_M * s_m).exp()
            ));
        }
        let sides: Vec<[f64; 2]> = pulls.sides_kn(12.0).collect();
        assert!(near(sides[0][0], jack_kn) && near(sides[1][0], jack_kn * (-PER_M * 18.0).exp()));
        assert!(near(pulls.both_kn(12.0)[0], sides[1][0]));
        let forces = pulls.forces();
        assert_eq!(forces.pulls.len(), 2);
        for (pull, length_m) in forces.pulls.iter().zip([12.0, 18.0]) {
            let (_, end) = pull.jacks().next().expect("a jack");
            // Gross: P0 (1 - exp(-K l))/(K E A).
            let stretched_m = jack_kn * (1.0 - (-PER_M * length_m).exp()) / (PER_M * stiffness_kn);
            assert!(near(end.extension_mm.expect("live"), 1e3 * stretched_m));
            assert!(near(
                end.extension_net_mm.expect("live"),
                1e3 * (stretched_m - SLIP_M)
            ));
            // P0/K (1 - exp(-K x))^2 = draw-in E A, where that is within the segment.
            let root = (SLIP_M * stiffness_kn * PER_M / jack_kn).sqrt();
            let reach_m = -(1.0 - root).ln() / PER_M;
            let locked_kn = if reach_m < length_m {
                jack_kn * (-2.0 * PER_M * reach_m).exp()
            } else {
                let rising_m = ((PER_M * length_m).exp() - 1.0) / PER_M;
                (stretched_m - SLIP_M) * stiffness_kn / rising_m
            };
            assert!(near(
                end.draw_in_reach_m.expect("live"),
                reach_m.min(length_m)
            ));
            assert!(near(pull.lock_off_kn[1], locked_kn));
        }
        // The second leaves least; the ends are each pull's own.
        assert!(near(
            forces.least_jacking_kn,
            jack_kn * (-PER_M * 18.0).exp()
        ));
        assert!((forces.least_jacking_station_m - 12.0).abs() < 1e-9);
        assert_eq!(forces.ends[0].kind, Dead);
        assert_eq!(forces.ends[1], forces.pulls[1].forces.ends[1]);
    }

    #[test]
    fn without_intermediate_anchors_a_tendon_is_stressed_in_one() {
        let curve = level(&[]);
        for kinds in [[Live, Dead], [Dead, Live], [Live, Live]] {
            let pulls = Pulls::new(&curve, STEEL, kinds, 0, &job()).expect("a force");
            let one = Stressed::new(&curve, STEEL, kinds, &job()).expect("a force");
            assert_eq!(pulls.forces(), one.forces());
            for station_m in [0.0, 7.3, 15.0, 30.0] {
                let bits = |[a, b]: [f64; 2]| [a.to_bits(), b.to_bits()];
                assert_eq!(bits(pulls.both_kn(station_m)), bits(one.both_kn(station_m)));
            }
            assert_eq!(
                pulls.mean_lockoff_kn().to_bits(),
                one.mean_lockoff_kn().to_bits()
            );
        }
    }

    #[test]
    fn a_segment_too_short_for_its_draw_in_is_named() {
        let curve = level(&[0.3, 12.0]);
        let refused = Pulls::new(&curve, STEEL, [Live, Dead], 0, &job()).err();
        let shortest = Unstressed {
            segment: Some(0),
            reason: CannotStress::DrawInTakesAll,
        };
        assert_eq!(refused, Some(shortest));
        let dead = Pulls::new(&curve, STEEL, [Dead, Dead], 0, &job()).err();
        assert_eq!(dead, Some(CannotStress::NoLiveEnd.into()));
    }
}
