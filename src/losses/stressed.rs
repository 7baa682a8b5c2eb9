//! A tendon, or a segment of one, jacked and locked off in one pull: its force at those two stages, anywhere.

use super::draw_in::{DrawnIn, from_both_ends, from_one_end};
use super::exponent::{At, Exponent, Side};
use super::extension::extension_mm;
use super::friction::Friction;
use super::{CannotStress, EndForces, Forces, LossTotals, Steel};
use crate::floor::EndKind;
use crate::job::Stressing;
use crate::profile::Profile;

/// Beyond this exponent less than 1e-8 of the jacking force is left: nothing to work with.
const MOST_EXPONENT: f64 = 20.0;

/// A tendon after jacking and lock-off.
#[derive(Debug, Clone)]
pub struct Stressed<'p> {
    along: Exponent<'p>,
    steel: Steel,
    jack_kn: f64,
    kinds: [EndKind; 2],
    /// Lock-off at each live end.
    drawn_in: [Option<DrawnIn>; 2],
    /// Place of least jacking force, seen from the start.
    least: At,
    /// φ from the start where the force is least there: on the side of least force of a bend, or within it where the curves
    /// of two jacks meet in it.
    least_exponent: f64,
}

impl<'p> Stressed<'p> {
    /// Jacks a tendon at its live ends and locks it off, as the job says.
    ///
    /// # Errors
    /// [`CannotStress`] says why not.
    pub fn new(
        profile: &'p Profile,
        steel: Steel,
        kinds: [EndKind; 2],
        job: &Stressing,
    ) -> Result<Self, CannotStress> {
        let jack_kn = steel.jacking_kn(job.jacking_ratio);
        let draw_in_m = [job.draw_in_m; 2];
        Self::jacked(profile, steel, jack_kn, kinds, Friction::of(job), draw_in_m)
    }

    /// The same with a jacking force, and a draw-in of its own at each end, metres (a dead end's is not used).
    ///
    /// # Errors
    /// [`CannotStress`] says why not.
    pub fn jacked(
        profile: &'p Profile,
        steel: Steel,
        jack_kn: f64,
        kinds: [EndKind; 2],
        friction: Friction,
        draw_in_m: [f64; 2],
    ) -> Result<Self, CannotStress> {
        let along = Exponent::new(profile, friction);
        let whole = along.whole();
        if !whole.exponent.is_finite() || whole.exponent > MOST_EXPONENT {
            return Err(CannotStress::FrictionTakesAll);
        }
        let [start_m, end_m] = draw_in_m.map(|slip_m| slip_m.max(0.0) * steel.stiffness_kn());
        let (least, drawn_in) = match kinds {
            [EndKind::Live, EndKind::Live] => {
                let middle = middle(&along);
                let [start, end] = from_both_ends(&along, &middle, jack_kn, [start_m, end_m])?;
                (middle, [Some(start), Some(end)])
            }
            [EndKind::Live, EndKind::Dead] => {
                let start = from_one_end(&along, Side::Start, jack_kn, start_m)?;
                (whole, [Some(start), None])
            }
            [EndKind::Dead, EndKind::Live] => {
                let end = from_one_end(&along, Side::End, jack_kn, end_m)?;
                (At::default(), [None, Some(end)])
            }
            [EndKind::Dead, EndKind::Dead] => return Err(CannotStress::NoLiveEnd),
        };
        let mut stressed = Self {
            along,
            steel,
            jack_kn,
            kinds,
            drawn_in,
            least,
            least_exponent: least.exponent,
        };
        let (before, after) = stressed.along.on_both_sides(least.station_m);
        stressed.least_exponent = [before, after]
            .into_iter()
            .chain(stressed.met_within(before, after))
            .min_by(|&a, &b| {
                let force_kn = |exponent| stressed.jacking_at_kn(exponent);
                force_kn(a).total_cmp(&force_kn(b))
            })
            .unwrap_or(before);
        Ok(stressed)
    }

    /// The curve.
    pub fn profile(&self) -> &'p Profile {
        self.along.profile()
    }

    /// The steel.
    pub fn steel(&self) -> Steel {
        self.steel
    }

    /// Force at the jack, kN.
    pub fn jack_kn(&self) -> f64 {
        self.jack_kn
    }

    /// Force while the jacks hold, kN; at a bend, the least in it.
    pub fn jacking_kn(&self, station_m: f64) -> f64 {
        self.both_kn(station_m)[0]
    }

    /// Force after lock-off, kN; at a bend, the least in it.
    pub fn lockoff_kn(&self, station_m: f64) -> f64 {
        self.both_kn(station_m)[1]
    }

    /// Force while the jacks hold and after lock-off, kN; at a bend, the least in it.
    pub fn both_kn(&self, station_m: f64) -> [f64; 2] {
        let (before, after) = self.along.on_both_sides(station_m);
        let [jacking_kn, lockoff_kn] = self.both_at_kn(before);
        if (after - before).abs() <= 0.0 {
            return [jacking_kn, lockoff_kn];
        }
        [after]
            .into_iter()
            .chain(self.met_within(before, after))
            .map(|exponent| self.both_at_kn(exponent))
            .fold([jacking_kn, lockoff_kn], |held, next| {
                [held[0].min(next[0]), held[1].min(next[1])]
            })
    }

    /// φ from the start where the curves of two jacks meet, if that is between these two sides of a bend: a bend is a turn
    /// within no length, and the strand in it has every force between.
    fn met_within(&self, before: f64, after: f64) -> Option<f64> {
        let half = 0.5 * self.along.whole().exponent;
        let two_jacks = self.kinds == [EndKind::Live; 2];
        (two_jacks && before < half && half < after).then_some(half)
    }

    /// Jacking force where φ from the start has this value: the larger of what each live end's jack gives, kN.
    fn jacking_at_kn(&self, exponent: f64) -> f64 {
        self.both_at_kn(exponent)[0]
    }

    /// Force after lock-off where φ from the start has this value, kN: the least of the jacking curve and of each live
    /// end's curve rising away from its anchor.
    fn lockoff_at_kn(&self, exponent: f64) -> f64 {
        self.both_at_kn(exponent)[1]
    }

    fn both_at_kn(&self, exponent: f64) -> [f64; 2] {
        let from_end = self.along.whole().exponent - exponent;
        let (mut jacking_kn, mut lockoff_kn) = (0.0_f64, f64::INFINITY);
        for (end, away) in self.drawn_in.iter().zip([exponent, from_end]) {
            if let Some(end) = end {
                let grown = away.exp();
                jacking_kn = jacking_kn.max(self.jack_kn / grown);
                lockoff_kn = lockoff_kn.min(end.anchor_kn * grown);
            }
        }
        [jacking_kn, lockoff_kn.min(jacking_kn)]
    }

    /// Least force while the jacks hold, kN, and its station.
    pub fn least_jacking(&self) -> (f64, f64) {
        (
            self.jacking_at_kn(self.least_exponent),
            self.least.station_m,
        )
    }

    /// Jacking force lost down to the point of least force: by angle alone, P0 (1 − exp(−μ α)), and the rest, kN. From the
    /// first live end: of two, both hold that place.
    pub fn friction_losses_kn(&self) -> [f64; 2] {
        let whole = self.along.whole();
        let jacked_from = if self.kinds[0] == EndKind::Live {
            At {
                exponent: self.least_exponent,
                ..self.least
            }
        } else {
            At {
                exponent: whole.exponent - self.least_exponent,
                arc_m: whole.arc_m - self.least.arc_m,
                ..self.least
            }
        };
        let curvature = self.along.angle_exponent(&jacked_from);
        let curvature_kn = super::friction::loss_kn(self.jack_kn, curvature);
        let all_kn = super::friction::loss_kn(self.jack_kn, jacked_from.exponent);
        [curvature_kn, all_kn - curvature_kn]
    }

    /// Angle turned from station 0 to the point of least force, radians; of a bend there, the share up to its least force.
    pub fn least_jacking_angle_rad(&self) -> f64 {
        let (profile, station_m) = (self.along.profile(), self.least.station_m);
        let before_rad = profile.angle_before_rad(station_m);
        let bend_rad = profile.angle_rad(station_m) - before_rad;
        let (before, after) = self.along.on_both_sides(station_m);
        let share = if after > before {
            (self.least_exponent - before) / (after - before)
        } else {
            1.0
        };
        before_rad + share * bend_rad
    }

    /// What is reported of the tendon as a whole, without the later losses.
    pub fn forces(&self) -> Forces {
        let [friction_curvature_kn, friction_wobble_kn] = self.friction_losses_kn();
        let (least_jacking_kn, least_jacking_station_m) = self.least_jacking();
        Forces {
            steel: self.steel,
            jack_kn: self.jack_kn,
            ends: self.ends(),
            totals: LossTotals {
                friction_curvature_kn,
                friction_wobble_kn,
                draw_in_kn: self.draw_in_kn(),
            },
            later: None,
            least_jacking_kn,
            least_jacking_station_m,
            least_jacking_angle_rad: self.least_jacking_angle_rad(),
            pulls: Vec::new(),
        }
    }

    /// ∫ P ds while the jacks hold, from each end to the point of least force, kN m.
    fn jacking_shares_kn_m(&self) -> [f64; 2] {
        let share = |side| self.jack_kn * self.along.seen_from(side, self.least).falling_m;
        [share(Side::Start), share(Side::End)]
    }

    /// The two ends: extension, net extension and reach of the draw-in.
    pub fn ends(&self) -> [EndForces; 2] {
        let stiffness_kn = self.steel.stiffness_kn();
        let shares = self.jacking_shares_kn_m();
        std::array::from_fn(|index| {
            let live = self.drawn_in[index];
            let share_kn_m = shares[index];
            EndForces {
                kind: self.kinds[index],
                extension_mm: live.map(|_| extension_mm(share_kn_m, stiffness_kn)),
                extension_net_mm: live
                    .map(|end| extension_mm(share_kn_m - end.area_kn_m, stiffness_kn)),
                draw_in_reach_m: live.map(|end| end.reach_m),
                draw_in_reaches_far: live.is_some_and(|end| end.far),
            }
        })
    }

    /// Drop at the first live anchor by draw-in, kN.
    pub fn draw_in_kn(&self) -> f64 {
        let start_live = self.kinds[0] == EndKind::Live;
        let anchor = if start_live {
            0.0
        } else {
            self.along.whole().exponent
        };
        self.jack_kn - self.lockoff_at_kn(anchor)
    }

    /// Mean force after lock-off along the tendon in space, kN.
    pub fn mean_lockoff_kn(&self) -> f64 {
        self.lockoff_area_kn_m() / self.length_m()
    }

    /// Length in space, metres.
    pub(super) fn length_m(&self) -> f64 {
        self.along.whole().arc_m
    }

    /// ∫ P ds after lock-off, kN m.
    pub(super) fn lockoff_area_kn_m(&self) -> f64 {
        let jacking_kn_m: f64 = self
            .jacking_shares_kn_m()
            .into_iter()
            .zip(&self.drawn_in)
            .filter_map(|(share_kn_m, live)| live.map(|_| share_kn_m))
            .sum();
        let drawn_in_kn_m: f64 = self
            .drawn_in
            .iter()
            .flatten()
            .map(|end| end.area_kn_m)
            .sum();
        jacking_kn_m - drawn_in_kn_m
    }

    /// Least force after lock-off, kN.
    pub fn least_lockoff_kn(&self) -> f64 {
        self.along
            .breaks()
            .chain([self.least_exponent])
            .map(|exponent| self.lockoff_at_kn(exponent))
            .fold(f64::INFINITY, f64::min)
    }
}

/// Where the jacking curves of both ends meet, seen from the start: φ is half of the whole there. Where friction leaves the
/// force level around that place, the middle of the level stretch.
fn middle(along: &Exponent<'_>) -> At {
    let whole = along.whole();
    let nearly_half = 0.5 * whole.exponent * (1.0 - 1e-12);
    let reached = |side| {
        along
            .first_not_below_zero(side, |at| at.exponent - nearly_half)
            .map(|at| at.station_m)
    };
    let (Some(from_start_m), Some(from_end_m)) = (reached(Side::Start), reached(Side::End)) else {
        return whole;
    };
    along.at(f64::midpoint(from_start_m, from_end_m))
}
