//! The friction exponent φ along a tendon, with the integrals of exp φ and exp −φ that every closed form of the draw-in and
//! of the extension is made of. Between breaks φ is smooth; at a bend it jumps.

use super::friction::Friction;
use crate::numerics::{integrate, root};
use crate::profile::{Profile, SAME_PLACE_M};

/// One of the two ends of a tendon: at station 0 or at the plan line's end.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Side {
    Start,
    End,
}

/// A place along the tendon, as seen from one end.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub(super) struct At {
    /// Plan station, metres; from station 0, whichever end looks.
    pub(super) station_m: f64,
    /// Length in space from the end that looks, metres.
    pub(super) arc_m: f64,
    /// φ from the end that looks.
    pub(super) exponent: f64,
    /// ∫ exp(φ) ds from the end that looks, metres.
    pub(super) rising_m: f64,
    /// ∫ exp(−φ) ds from the end that looks, metres.
    pub(super) falling_m: f64,
}

/// A stretch without a break.
#[derive(Debug, Clone, Copy)]
struct Stretch {
    span: usize,
    /// Bends at or before its start.
    bends: usize,
    start: At,
    end: At,
}

/// φ along a tendon.
#[derive(Debug, Clone)]
pub(super) struct Exponent<'p> {
    profile: &'p Profile,
    friction: Friction,
    stretches: Vec<Stretch>,
}

/// Roots along the tendon are found to this fraction of its plan length.
const ROOT_OF_LENGTH: f64 = 1e-13;

impl<'p> Exponent<'p> {
    pub(super) fn new(profile: &'p Profile, friction: Friction) -> Self {
        let mut along = Self {
            profile,
            friction,
            stretches: Vec::with_capacity(profile.spans.len() + profile.bends.len()),
        };
        let mut bends = 0;
        let mut held = At::default();
        for (span, piece) in profile.spans.iter().enumerate() {
            let end_m = piece.end_m();
            let mut from_m = piece.start_m;
            loop {
                while profile
                    .bends
                    .get(bends)
                    .is_some_and(|bend| bend.station_m <= from_m + SAME_PLACE_M)
                {
                    bends += 1;
                }
                let to_m = profile
                    .bends
                    .get(bends)
                    .map_or(end_m, |bend| bend.station_m)
                    .min(end_m);
                let (arc_m, exponent) = along.measured(span, bends, from_m);
                let start = At {
                    station_m: from_m,
                    arc_m,
                    exponent,
                    ..held
                };
                let mut stretch = Stretch {
                    span,
                    bends,
                    start,
                    end: start,
                };
                stretch.end = along.at_in(&stretch, to_m);
                held = stretch.end;
                along.stretches.push(stretch);
                if to_m >= end_m - SAME_PLACE_M {
                    break;
                }
                from_m = to_m;
            }
        }
        along
    }

    pub(super) fn profile(&self) -> &'p Profile {
        self.profile
    }

    /// Length in space and φ at a station of a piece, with the first `bends` bends.
    fn measured(&self, span: usize, bends: usize, station_m: f64) -> (f64, f64) {
        let start_m = self
            .profile
            .spans
            .get(span)
            .map_or(0.0, |piece| piece.start_m);
        let (arc_m, smooth_rad) = self.profile.so_far(span, station_m - start_m);
        let angle_rad = smooth_rad + self.profile.bends_rad(bends);
        (arc_m, self.friction.exponent(angle_rad, arc_m))
    }

    /// A place on a stretch, seen from the start.
    fn at_in(&self, stretch: &Stretch, station_m: f64) -> At {
        let from = stretch.start;
        let (arc_m, exponent) = self.measured(stretch.span, stretch.bends, station_m);
        // Measured from the stretch's own start, so that exp stays near 1 while the rules are compared.
        let [rising_m, falling_m] = integrate(
            &|x| {
                let (_, exponent) = self.measured(stretch.span, stretch.bends, x);
                let slope = self
                    .profile
                    .spans
                    .get(stretch.span)
                    .map_or(0.0, |piece| piece.slope_at(x - piece.start_m));
                let (steep, grown) = (slope.hypot(1.0), (exponent - from.exponent).exp());
                [steep * grown, steep / grown]
            },
            from.station_m,
            station_m,
        );
        At {
            station_m,
            arc_m,
            exponent,
            rising_m: from.rising_m + rising_m * from.exponent.exp(),
            falling_m: from.falling_m + falling_m * (-from.exponent).exp(),
        }
    }

    /// The far end of the tendon, seen from the start.
    pub(super) fn whole(&self) -> At {
        self.stretches
            .last()
            .map_or_else(At::default, |stretch| stretch.end)
    }

    /// A place seen from the start, as this side sees it.
    pub(super) fn seen_from(&self, side: Side, at: At) -> At {
        match side {
            Side::Start => at,
            Side::End => {
                let whole = self.whole();
                At {
                    station_m: at.station_m,
                    arc_m: whole.arc_m - at.arc_m,
                    exponent: whole.exponent - at.exponent,
                    rising_m: whole.exponent.exp() * (whole.falling_m - at.falling_m),
                    falling_m: (-whole.exponent).exp() * (whole.rising_m - at.rising_m),
                }
            }
        }
    }

    /// φ from the start on both sides of a station: they differ at a bend only.
    pub(super) fn on_both_sides(&self, station_m: f64) -> (f64, f64) {
        let index = self.index(station_m);
        let Some(stretch) = self.stretches.get(index) else {
            return (0.0, 0.0);
        };
        let within_m = station_m.clamp(stretch.start.station_m, stretch.end.station_m);
        let next = self.stretches.get(index + 1);
        let before = index
            .checked_sub(1)
            .and_then(|held| self.stretches.get(held));
        match (before, next) {
            (Some(before), _) if within_m - stretch.start.station_m <= SAME_PLACE_M => {
                (before.end.exponent, stretch.start.exponent)
            }
            (_, Some(next)) if stretch.end.station_m - within_m <= SAME_PLACE_M => {
                (stretch.end.exponent, next.start.exponent)
            }
            _ => {
                let (_, exponent) = self.measured(stretch.span, stretch.bends, within_m);
                (exponent, exponent)
            }
        }
    }

    fn index(&self, station_m: f64) -> usize {
        self.stretches
            .partition_point(|stretch| stretch.start.station_m <= station_m)
            .saturating_sub(1)
    }

    /// A place seen from the start; at a bend, beyond it.
    pub(super) fn at(&self, station_m: f64) -> At {
        self.stretches
            .get(self.index(station_m))
            .map_or_else(At::default, |stretch| {
                let within_m = station_m.clamp(stretch.start.station_m, stretch.end.station_m);
                self.at_in(stretch, within_m)
            })
    }

    /// Going away from `side`, the first place where `measure` is no longer below zero; it must not fall on the way (but may
    /// jump at bends). `None` where it stays below zero. At a bend the integrals are those of both its sides; φ is then the
    /// one beyond it.
    pub(super) fn first_not_below_zero(
        &self,
        side: Side,
        measure: impl Fn(&At) -> f64,
    ) -> Option<At> {
        let tolerance_m = ROOT_OF_LENGTH * self.whole().station_m;
        let count = self.stretches.len();
        for step in 0..count {
            let index = match side {
                Side::Start => step,
                Side::End => count - 1 - step,
            };
            let stretch = self.stretches.get(index)?;
            let (near, far) = match side {
                Side::Start => (stretch.start, stretch.end),
                Side::End => (stretch.end, stretch.start),
            };
            let near = self.seen_from(side, near);
            if measure(&near) >= 0.0 {
                return Some(near);
            }
            let far = self.seen_from(side, far);
            if measure(&far) >= 0.0 {
                let on_stretch =
                    |station_m: f64| self.seen_from(side, self.at_in(stretch, station_m));
                let found_m = root(
                    |station_m| measure(&on_stretch(station_m)),
                    near.station_m,
                    far.station_m,
                    tolerance_m,
                );
                return Some(found_m.map_or(far, on_stretch));
            }
        }
        None
    }

    /// φ at all breaks, seen from the start.
    pub(super) fn breaks(&self) -> impl Iterator<Item = f64> {
        self.stretches
            .iter()
            .flat_map(|stretch| [stretch.start.exponent, stretch.end.exponent])
    }

    /// The part of φ at a place that comes from angle: μ α.
    pub(super) fn angle_exponent(&self, at: &At) -> f64 {
        (at.exponent - self.friction.per_m * at.arc_m).max(0.0)
    }
}
