//! Ends that meet in one place, and which of them go on into one another.

use geo::Coord;

use crate::geometry::turn_rad;

/// How much less an end must turn into its partner than into any other, radians.
pub(super) const CLEARLY_RAD: f64 = 0.35;

/// The ends of one node by their headings, so that what goes on from an end is found without trying all others.
pub(super) struct Fan(pub(super) Vec<(f64, usize)>);

impl Fan {
    pub(super) fn of(node: &[usize], ends: &[Option<(Coord<f64>, f64)>]) -> Self {
        let headings = node.iter().filter_map(|&end| Some((ends[end]?.1, end)));
        let mut fan: Vec<(f64, usize)> = headings.map(|(out, end)| (turn_rad(out), end)).collect();
        fan.sort_by(|a, b| a.0.total_cmp(&b.0).then(a.1.cmp(&b.1)));
        Self(fan)
    }

    /// The place in the fan of the end that the one at a place goes on into with the least turn, and that turn, where
    /// every other turn is clearly greater.
    pub(super) fn clear_partner(
        &self,
        at: usize,
        turn: impl Fn(usize, usize) -> f64,
    ) -> Option<(usize, f64)> {
        let fan = &self.0;
        let count = fan.len();
        let onward = turn_rad(fan[at].0 + std::f64::consts::PI);
        let there = fan.partition_point(|(heading, _)| *heading < onward);
        // The end itself may be among the three on either side, and two must be left to be compared.
        let reach = 3.min(count);
        let mut near: Vec<(f64, usize)> = (0..2 * reach)
            .map(|step| (there + count + step - reach) % count)
            .filter(|&other| other != at)
            .map(|other| (turn(fan[at].1, fan[other].1), other))
            .collect();
        near.sort_by(|a, b| a.0.total_cmp(&b.0).then(a.1.cmp(&b.1)));
        near.dedup_by_key(|(_, other)| *other);
        let &(here, partner) = near.first()?;
        let next = near.get(1).map_or(f64::INFINITY, |(turn, _)| *turn);
        (next > here + CLEARLY_RAD).then_some((partner, here))
    }
}
