//! How much room each tendon has beside it, and so how wide its line and how tall its figures may be.

use geo::Coord;

use super::place::{Quad, Room};
use crate::floor::{Floor, Tendon};
use crate::geometry::{distance_m, turn_rad};

/// Usual width of a coloured length, metres: 0.7 mm on paper at 1:100.
const WIDTH_M: f64 = 0.07;
/// How far a neighbour is looked for, metres: one farther off leaves room enough for everything.
const REACH_M: f64 = 0.6;
/// Neighbours run parallel within this angle, radians.
const PARALLEL_RAD: f64 = 0.2;

/// The room beside one tendon.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Lane {
    /// Width of the coloured lengths, metres.
    pub(super) width_m: f64,
    /// Distance to the nearest parallel neighbour, metres; infinite where there is none near.
    pub(super) spacing_m: f64,
    /// Height of the figures, metres.
    pub(super) text_m: f64,
    /// Height of the extension at each end, metres.
    pub(super) end_text_m: [f64; 2],
    /// Whether the neighbours are so near that only the governing figures are written.
    pub(super) dense: bool,
}

/// The drawing's usual text height: the median of its texts, within what can be read and what can be placed, metres.
pub(super) fn text_height_m(occupied: &[Quad]) -> f64 {
    let mut heights: Vec<f64> = occupied
        .iter()
        .map(|[a, b, c, _]| distance_m(*a, *b).min(distance_m(*b, *c)))
        .filter(|height| height.is_finite() && *height > 0.0)
        .collect();
    heights.sort_by(f64::total_cmp);
    let median = heights.get(heights.len() / 2).copied().unwrap_or(0.15);
    median.clamp(0.08, 0.25)
}

/// One lane a tendon, in the floor's order.
pub(super) fn lanes(floor: &Floor, room: &Room, text_m: f64) -> Vec<Lane> {
    floor
        .tendons
        .iter()
        .enumerate()
        .map(|(index, tendon)| {
            let along = spacings_m(room, index, tendon);
            let spacing_m = along.iter().copied().fold(f64::INFINITY, f64::min);
            let end = |near: Option<&f64>| {
                text_m
                    .min(0.6 * near.copied().unwrap_or(f64::INFINITY))
                    .max(0.04)
            };
            let end_text_m = [end(along.first()), end(along.last())];
            Lane {
                spacing_m,
                width_m: WIDTH_M.min(0.3 * spacing_m).max(0.01),
                text_m: text_m.min(0.5 * spacing_m).max(0.06),
                end_text_m,
                dense: spacing_m < 0.2,
            }
        })
        .collect()
}

/// Distance to the nearest parallel neighbour at steps along a tendon, metres; infinite where there is none near.
fn spacings_m(room: &Room, index: usize, tendon: &Tendon) -> Vec<f64> {
    const STEPS: u32 = 16;
    let length_m = tendon.path.length_m();
    (0..=STEPS)
        .map(|step| {
            let station_m = length_m * f64::from(step) / f64::from(STEPS);
            spacing_at_m(room, index, tendon, station_m).unwrap_or(f64::INFINITY)
        })
        .collect()
}

/// Distance across to the nearest parallel neighbour at a station, metres. A line drawn over this one is no neighbour.
fn spacing_at_m(room: &Room, index: usize, tendon: &Tendon, station_m: f64) -> Option<f64> {
    let place = tendon.path.place_at(station_m);
    let heading = tendon.path.heading_at(station_m);
    let (sin, cos) = heading.sin_cos();
    let parallel = |other: usize, direction: f64| {
        let turn = turn_rad(direction - heading).abs();
        other != index && turn.min(std::f64::consts::PI - turn) < PARALLEL_RAD
    };
    room.pieces_near(place, REACH_M, parallel)
        .map(|[from, to]| {
            let point = nearest(from, to, place);
            ((point.y - place.y) * cos - (point.x - place.x) * sin).abs()
        })
        .filter(|&across| across > 0.02)
        .min_by(f64::total_cmp)
}

/// The point of a piece that is nearest to a place.
fn nearest(from: Coord<f64>, to: Coord<f64>, place: Coord<f64>) -> Coord<f64> {
    let run = to - from;
    let square = run.x * run.x + run.y * run.y;
    if square <= 0.0 {
        return from;
    }
    let away = place - from;
    let share = ((away.x * run.x + away.y * run.y) / square).clamp(0.0, 1.0);
    from + run * share
}

#[cfg(test)]
mod tests {
    use super::super::place::Spot;
    use super::*;

    #[test]
    fn the_median_text_sets_the_height_within_limits() {
        let box_of =
            |height_m: f64| Spot::upright(Coord { x: 0.0, y: 0.0 }, 1.0, height_m).quad(0.0);
        assert!((text_height_m(&[]) - 0.15).abs() < 1e-12);
        let texts = [box_of(0.12), box_of(0.12), box_of(0.9)];
        assert!((text_height_m(&texts) - 0.12).abs() < 1e-9);
        assert!((text_height_m(&[box_of(0.9)]) - 0.25).abs() < 1e-12);
    }
}
