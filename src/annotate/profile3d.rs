//! Tendons in space, at their true level.

use super::layers;
use crate::analysis::Analysis;
use crate::drawing::{Drawn, Mark};

/// One polyline a tendon whose curve is known: x, y and metres above the top of the slab, in the floor's order.
pub(super) fn curves(analysis: &Analysis) -> Vec<Mark> {
    analysis
        .results
        .iter()
        .filter(|result| result.profile.is_some())
        .filter_map(|result| {
            let mut points: Vec<[f64; 3]> = result
                .samples
                .iter()
                .map(|sample| [sample.place.x, sample.place.y, sample.level_m])
                .filter(|point| point.iter().all(|value| value.is_finite()))
                .collect();
            // An intermediate anchor has two samples.
            points.dedup();
            (points.len() > 1).then(|| layers::mark(layers::PROFILE, Drawn::Line3d { points }))
        })
        .collect()
}
