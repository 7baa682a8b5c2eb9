//! How far drawn support heights lie off the curve.

use super::Profile;
use crate::floor::{PointKind, Tendon};

/// Drawn level minus the curve's at each support whose level is known: index of the point, metres.
pub fn support_residuals(profile: &Profile, tendon: &Tendon) -> Vec<(usize, f64)> {
    tendon
        .points
        .iter()
        .enumerate()
        .filter(|(_, point)| point.kind == PointKind::Support)
        .filter_map(|(index, point)| {
            Some((index, point.level_m()? - profile.level_m(point.station_m)))
        })
        .collect()
}
