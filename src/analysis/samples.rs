//! Stations along a tendon, close enough to draw.

use crate::floor::Tendon;
use crate::geometry::Segment;
use crate::profile::SAME_PLACE_M;

/// Stations stand about this close, metres.
const STEP_M: f64 = 0.5;

/// At most this many regular steps; a long tendon's are longer.
const MOST_STEPS: f64 = 48.0;

/// A plan arc is followed with chords that turn no more than this, radians.
const CHORD_RAD: f64 = 0.1;

/// Stations in order, from end to end: the tendon's points and intermediate anchors, the ends of its plan pieces, and regular steps between them.
/// About 60 for a tendon with straight pieces.
pub(super) fn stations(tendon: &Tendon) -> Vec<f64> {
    let length_m = tendon.path.length_m();
    let step_m = STEP_M.max(length_m / MOST_STEPS);
    let mut marked: Vec<(f64, f64)> = vec![(0.0, step_m)];
    for (start_m, piece) in tendon.path.pieces() {
        let finest_m = match *piece {
            Segment::Line { .. } => step_m,
            Segment::Arc { radius_m, .. } => step_m.min(CHORD_RAD * radius_m),
        };
        marked.push((start_m, finest_m));
    }
    let within = |station_m: f64| station_m > 0.0 && station_m < length_m;
    let points = tendon.points.iter().map(|point| point.station_m);
    let anchors = tendon.joints.iter().map(|joint| joint.station_m);
    for fixed_m in points.chain(anchors).filter(|&fixed_m| within(fixed_m)) {
        let before = marked
            .iter()
            .rev()
            .find(|&&(station_m, _)| station_m <= fixed_m);
        marked.push((fixed_m, before.map_or(step_m, |&(_, finest_m)| finest_m)));
    }
    marked.push((length_m, step_m));
    marked.sort_by(|a, b| a.0.total_cmp(&b.0));

    let mut stations = Vec::new();
    for pair in marked.windows(2) {
        let [(from_m, finest_m), (to_m, _)] = [pair[0], pair[1]];
        let gap_m = to_m - from_m;
        if gap_m <= SAME_PLACE_M && to_m < length_m {
            continue;
        }
        #[expect(
            clippy::cast_possible_truncation,
            clippy::cast_sign_loss,
            reason = "clamped to 1..=4096"
        )]
        let steps = (gap_m / finest_m).round().clamp(1.0, 4096.0) as u32;
        for step in 0..steps {
            stations.push(from_m + gap_m * f64::from(step) / f64::from(steps));
        }
    }
    stations.push(length_m);
    stations
}
