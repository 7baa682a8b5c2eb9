//! Wedge draw-in at the live ends.
//!
//! After draw-in Δ the force at an anchor is PA and rises away from it as PA exp(φ), until it meets the jacking curve (or the
//! other end's lock-off curve, or the far anchor). PA is such that the area between the curves, along the tendon in space, is
//! Δ E A: the strand that slips in is the strand that shortens. The unknown is the place where the curves meet; the area up to
//! there is a closed form of ∫ exp φ and ∫ exp −φ, and it jumps where the tendon bends at one point, which a bracketed root
//! finder does not mind.

use super::CannotStress;
use super::exponent::{At, Exponent, Side};

/// What draw-in does at one live end.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct DrawnIn {
    /// Force at the anchor after draw-in, kN.
    pub(super) anchor_kn: f64,
    /// Length over which it is felt, metres in space.
    pub(super) reach_m: f64,
    /// Whether it is felt as far as the other end, or as the other end's draw-in.
    pub(super) far: bool,
    /// Area between the curves from this end on, as the forces found give it, kN m.
    pub(super) area_kn_m: f64,
}

/// A tendon jacked from one end.
///
/// # Errors
/// [`CannotStress::DrawInTakesAll`].
pub(super) fn from_one_end(
    along: &Exponent<'_>,
    side: Side,
    jack_kn: f64,
    demand_kn_m: f64,
) -> Result<DrawnIn, CannotStress> {
    let whole = along.seen_from(side, at_far_end(along, side));
    let met = along.first_not_below_zero(side, |at| area_to(at, jack_kn) - demand_kn_m);
    let (at, far) = met.map_or((whole, true), |at| (at, false));
    let end = meeting_at(&at, jack_kn * at.falling_m, jack_kn, demand_kn_m, far);
    if end.anchor_kn > 0.0 {
        Ok(end)
    } else {
        Err(CannotStress::DrawInTakesAll)
    }
}

/// A tendon jacked from both ends: the start's end first. `middle` is the place of least jacking force, seen from the start;
/// the draw-ins may differ.
///
/// # Errors
/// [`CannotStress::DrawInTakesAll`].
pub(super) fn from_both_ends(
    along: &Exponent<'_>,
    middle: &At,
    jack_kn: f64,
    demands_kn_m: [f64; 2],
) -> Result<[DrawnIn; 2], CannotStress> {
    let whole = along.whole();
    let at_most = |side| {
        let at = along.seen_from(side, *middle);
        jack_kn * (at.falling_m - (-whole.exponent).exp() * at.rising_m)
    };
    // Each within its own half: they do not feel each other.
    if demands_kn_m[0] <= at_most(Side::Start) && demands_kn_m[1] <= at_most(Side::End) {
        let alone = |side, demand_kn_m: f64| {
            let at = along
                .first_not_below_zero(side, |at| area_to(at, jack_kn) - demand_kn_m)
                .unwrap_or_else(|| along.seen_from(side, *middle));
            meeting_at(&at, jack_kn * at.falling_m, jack_kn, demand_kn_m, false)
        };
        return Ok([
            alone(Side::Start, demands_kn_m[0]),
            alone(Side::End, demands_kn_m[1]),
        ]);
    }

    // One passes the middle, so that it meets the other's lock-off curve. At the place of meeting both curves have one force;
    // both anchors follow from the areas on either side of it.
    let jacking = Jacking {
        jack_kn,
        middle: *middle,
        whole,
    };
    if jacking.area_to(&whole) <= demands_kn_m[0] + demands_kn_m[1] {
        return Err(CannotStress::DrawInTakesAll);
    }
    let anchors = |at: &At| {
        let other = along.seen_from(Side::End, *at);
        let held = jacking.area_to(at);
        [
            anchor_kn(held, demands_kn_m[0], at.rising_m, jack_kn),
            anchor_kn(
                jacking.area_to(&whole) - held,
                demands_kn_m[1],
                other.rising_m,
                jack_kn,
            ),
        ]
    };
    let start_over_end = |at: &At| {
        let [start_kn, end_kn] = anchors(at);
        start_kn * at.exponent.exp() - end_kn * (whole.exponent - at.exponent).exp()
    };
    let met = along
        .first_not_below_zero(Side::Start, start_over_end)
        .unwrap_or(whole);
    let other = along.seen_from(Side::End, met);
    let held = jacking.area_to(&met);
    let mut ends = [
        meeting_at(&met, held, jack_kn, demands_kn_m[0], true),
        meeting_at(
            &other,
            jacking.area_to(&whole) - held,
            jack_kn,
            demands_kn_m[1],
            true,
        ),
    ];
    // Where all of the tendon moves towards one end, the other anchor has that end's curve.
    let through = whole.exponent.exp();
    if met.arc_m <= 0.0 {
        ends[0].anchor_kn = ends[1].anchor_kn * through;
    } else if other.arc_m <= 0.0 {
        ends[1].anchor_kn = ends[0].anchor_kn * through;
    }
    if ends.iter().all(|end| end.anchor_kn > 0.0) {
        Ok(ends)
    } else {
        Err(CannotStress::DrawInTakesAll)
    }
}

fn at_far_end(along: &Exponent<'_>, side: Side) -> At {
    match side {
        Side::Start => along.whole(),
        Side::End => At::default(),
    }
}

/// Area between the jacking curve of one end and the lock-off curve that meets it here, kN m:
/// P0 (∫ exp(−φ) ds − exp(−2 φ here) ∫ exp(φ) ds).
fn area_to(at: &At, jack_kn: f64) -> f64 {
    jack_kn * (at.falling_m - (-2.0 * at.exponent).exp() * at.rising_m)
}

/// Force at an anchor from the area below the lock-off curve: PA ∫ exp(φ) ds = ∫ P ds − Δ E A.
fn anchor_kn(jacking_kn_m: f64, demand_kn_m: f64, rising_m: f64, jack_kn: f64) -> f64 {
    if rising_m > 0.0 {
        (jacking_kn_m - demand_kn_m) / rising_m
    } else if demand_kn_m > 0.0 {
        f64::NEG_INFINITY
    } else {
        jack_kn
    }
}

fn meeting_at(at: &At, jacking_kn_m: f64, jack_kn: f64, demand_kn_m: f64, far: bool) -> DrawnIn {
    let anchor_kn = anchor_kn(jacking_kn_m, demand_kn_m, at.rising_m, jack_kn);
    DrawnIn {
        anchor_kn,
        reach_m: at.arc_m,
        far,
        area_kn_m: if at.rising_m > 0.0 {
            jacking_kn_m - anchor_kn * at.rising_m
        } else {
            0.0
        },
    }
}

/// The jacking curve of a tendon jacked from both ends.
struct Jacking {
    jack_kn: f64,
    middle: At,
    whole: At,
}

impl Jacking {
    /// ∫ P ds from the start to a place seen from the start, kN m.
    fn area_to(&self, at: &At) -> f64 {
        if at.station_m <= self.middle.station_m {
            self.jack_kn * at.falling_m
        } else {
            let beyond_m = at.rising_m - self.middle.rising_m;
            self.jack_kn * (self.middle.falling_m + (-self.whole.exponent).exp() * beyond_m)
        }
    }
}
