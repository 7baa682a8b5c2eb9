//! Angles turned at one station: bare plan vertices and breaks in slope, as one vector where both are.

use super::{Bend, SAME_PLACE_M, Span};
use crate::geometry::Corner;

/// Angles smaller than this are rounding, not bends.
const BEND_RAD: f64 = 1e-9;

/// Angle in space between two unit tangents with these slopes, whose plan directions differ by `turn_rad`, radians.
pub(super) fn angle_between_rad(slope_before: f64, slope_after: f64, turn_rad: f64) -> f64 {
    let (sin, cos) = turn_rad.sin_cos();
    let before = [1.0, 0.0, slope_before];
    let after = [cos, sin, slope_after];
    let cross = [
        before[1] * after[2] - before[2] * after[1],
        before[2] * after[0] - before[0] * after[2],
        before[0] * after[1] - before[1] * after[0],
    ];
    let dot: f64 = before.iter().zip(after).map(|(b, a)| b * a).sum();
    let sine = cross.iter().map(|part| part * part).sum::<f64>().sqrt();
    sine.atan2(dot)
}

/// The bends of a curve, in order of station.
pub(super) fn turned_at(spans: &[Span], corners: &[Corner]) -> Vec<Bend> {
    let mut bends = Vec::new();
    let mut corners = corners.iter().peekable();
    for (index, span) in spans.iter().enumerate() {
        let end_m = span.end_m();
        while let Some(corner) = corners.next_if(|corner| corner.station_m < end_m - SAME_PLACE_M) {
            let slope = span.slope_at(corner.station_m - span.start_m);
            push(&mut bends, corner.station_m, slope, slope, corner.turn_rad);
        }
        let mut turn_rad = 0.0;
        while let Some(corner) = corners.next_if(|corner| corner.station_m <= end_m + SAME_PLACE_M)
        {
            turn_rad += corner.turn_rad;
        }
        if let Some(next) = spans.get(index + 1) {
            push(
                &mut bends,
                next.start_m,
                span.slope_at(span.length_m),
                next.slope,
                turn_rad,
            );
        }
    }
    bends
}

fn push(bends: &mut Vec<Bend>, station_m: f64, slope_before: f64, slope_after: f64, turn_rad: f64) {
    let angle_rad = angle_between_rad(slope_before, slope_after, turn_rad);
    if angle_rad > BEND_RAD {
        bends.push(Bend {
            station_m,
            angle_rad,
        });
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_level_strand_turns_by_the_corner_and_a_straight_plan_by_the_slopes() {
        assert!((angle_between_rad(0.0, 0.0, -0.3) - 0.3).abs() < 1e-15);
        let slopes = angle_between_rad(0.1, -0.2, 0.0);
        assert!((slopes - (0.1_f64.atan() + 0.2_f64.atan())).abs() < 1e-15);
    }

    #[test]
    fn small_angles_in_plan_and_height_add_as_vectors() {
        let both = angle_between_rad(0.0, 4e-4, 3e-4);
        assert!((both - 5e-4).abs() < 1e-9);
    }
}
