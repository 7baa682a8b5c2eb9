//! Marks that the drawing does not give, written beside their tendons: whoever reads table and findings must find the
//! line that is meant.

use std::f64::consts::FRAC_PI_2;

use super::lanes::Lane;
use super::place::{Room, Spot, readable_rad};
use super::{layers, words};
use crate::analysis::Analysis;
use crate::drawing::{Align, Drawn, Mark};
use crate::floor::Tendon;
use crate::geometry::step;

/// Where along its tendon a mark is tried, as shares of the length: off the middle, where highs and lows often are.
const SHARES: [f64; 7] = [0.37, 0.63, 0.3, 0.7, 0.2, 0.8, 0.5];

/// One text a tendon without a mark, in the floor's order; each is needed, so it is written in any case.
pub(super) fn given(analysis: &Analysis, lanes: &[Lane], room: &mut Room) -> Vec<Mark> {
    let tendons = analysis.floor.tendons.iter().zip(lanes);
    tendons
        .filter(|(tendon, _)| !tendon.mark_drawn)
        .filter_map(|(tendon, lane)| {
            let content = words::name(&tendon.mark);
            let spot = clearest(tendon, lane, &content, room)?;
            room.take(&spot);
            let drawn = Drawn::Text {
                place: spot.centre,
                height_m: spot.height_m,
                rotation_rad: spot.rotation_rad,
                align: Align::Middle,
                content,
            };
            Some(layers::mark(layers::TABLE, drawn))
        })
        .collect()
}

/// Beside the tendon, where fewest texts, and then fewest lines, are in the way.
fn clearest(tendon: &Tendon, lane: &Lane, content: &str, room: &Room) -> Option<Spot> {
    let height_m = lane.text_m;
    let spots = [1.0, -1.0].into_iter().flat_map(|side| {
        SHARES.map(|share| {
            let station_m = share * tendon.path.length_m();
            let rotation_rad = readable_rad(tendon.path.heading_at(station_m));
            let across_m = lane.width_m / 2.0 + 0.8 * height_m;
            let on_line = tendon.path.place_at(station_m);
            Spot {
                centre: step(on_line, rotation_rad + FRAC_PI_2, side * across_m),
                width_m: words::width_m(content, height_m),
                height_m,
                rotation_rad,
            }
        })
    });
    spots.min_by_key(|spot| (room.texts_hit(spot), room.lines_hit(spot)))
}
