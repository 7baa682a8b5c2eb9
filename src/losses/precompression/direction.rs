//! Directions in which a floor's tendons run.

use std::f64::consts::PI;

use super::turned;
use crate::geometry::{Coord, Path, Segment, distance_m};

/// Tendons within this angle of a direction's longest tendon run in that direction.
const SAME_RAD: f64 = PI / 18.0;

/// A direction, without sense.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Direction {
    heading_rad: f64,
    unit: Coord<f64>,
}

impl Direction {
    fn new(heading_rad: f64) -> Self {
        let (y, x) = heading_rad.sin_cos();
        Self {
            heading_rad,
            unit: Coord { x, y },
        }
    }

    /// Radians from x.
    pub(super) fn heading_rad(self) -> f64 {
        self.heading_rad
    }

    /// How far along the direction a place lies, metres.
    pub(super) fn along_m(self, place: Coord<f64>) -> f64 {
        turned(place, self.unit).0
    }

    /// How far to its left a place lies, metres.
    pub(super) fn across_m(self, place: Coord<f64>) -> f64 {
        turned(place, self.unit).1
    }

    /// Least and most distance along the direction of a piece of plan line, metres.
    pub(super) fn extent_of(self, piece: &Segment) -> (f64, f64) {
        let (start_m, end_m) = (self.along_m(piece.start()), self.along_m(piece.end()));
        let (mut low_m, mut high_m) = (start_m.min(end_m), start_m.max(end_m));
        if let Segment::Arc {
            centre,
            radius_m,
            start_rad,
            sweep_rad,
        } = *piece
        {
            let holds = |seen_rad: f64| {
                let turned = (seen_rad - start_rad) * sweep_rad.signum();
                turned.rem_euclid(2.0 * PI) <= sweep_rad.abs()
            };
            if holds(self.heading_rad) {
                high_m = self.along_m(centre) + radius_m;
            }
            if holds(self.heading_rad + PI) {
                low_m = self.along_m(centre) - radius_m;
            }
        }
        (low_m, high_m)
    }
}

/// The directions of these lines, and which of them each runs in. The longest line that runs in no direction yet makes one,
/// with all others within 10 degrees of it; the direction is their mean, weighted by length.
pub(super) fn gather<'a>(paths: impl Iterator<Item = &'a Path>) -> (Vec<Direction>, Vec<usize>) {
    let chords: Vec<(f64, f64)> = paths.map(chord).collect();
    let mut longest: Vec<usize> = (0..chords.len()).collect();
    longest.sort_by(|&a, &b| chords[b].1.total_cmp(&chords[a].1));
    let mut seeds: Vec<f64> = Vec::new();
    let mut of_tendon = vec![0; chords.len()];
    for index in longest {
        let (heading_rad, _) = chords[index];
        let nearest = seeds
            .iter()
            .map(|&seed_rad| between_rad(seed_rad, heading_rad))
            .enumerate()
            .filter(|&(_, apart_rad)| apart_rad <= SAME_RAD)
            .min_by(|a, b| a.1.total_cmp(&b.1));
        of_tendon[index] = nearest.map_or_else(
            || {
                seeds.push(heading_rad);
                seeds.len() - 1
            },
            |(seed, _)| seed,
        );
    }
    // Doubled angles: a direction and its opposite are one.
    let mut sums = vec![(0.0, 0.0); seeds.len()];
    for (&(heading_rad, length_m), &direction) in chords.iter().zip(&of_tendon) {
        let (sin, cos) = (2.0 * heading_rad).sin_cos();
        sums[direction].0 += length_m * cos;
        sums[direction].1 += length_m * sin;
    }
    let directions = sums
        .into_iter()
        .map(|(cos, sin)| Direction::new(0.5 * f64::atan2(sin, cos)))
        .collect();
    (directions, of_tendon)
}

/// Heading of a line's chord, and its plan length; of a line that ends where it starts, the heading it starts with.
fn chord(path: &Path) -> (f64, f64) {
    let length_m = path.length_m();
    let (Some(start), Some(end)) = (path.start(), path.end()) else {
        return (0.0, 0.0);
    };
    let heading_rad = if distance_m(start, end) > 1e-3 * length_m {
        (end.y - start.y).atan2(end.x - start.x)
    } else {
        path.heading_at(0.0)
    };
    (heading_rad, length_m)
}

/// Angle between two directions without sense, radians.
fn between_rad(a_rad: f64, b_rad: f64) -> f64 {
    let apart = (a_rad - b_rad).rem_euclid(PI);
    apart.min(PI - apart)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn line(length_m: f64, degrees: f64) -> Path {
        let from = Coord { x: 3.0, y: -2.0 };
        let to = crate::geometry::step(from, degrees.to_radians(), length_m);
        Path::through(&[from, to])
    }

    #[test]
    fn a_line_and_its_opposite_run_in_one_direction() {
        let paths = [line(10.0, 2.0), line(9.0, 181.0), line(8.0, 90.0)];
        let (directions, of_tendon) = gather(paths.iter());
        assert_eq!(directions.len(), 2);
        assert_eq!(of_tendon, [0, 0, 1]);
        let expected = (10.0 * 2.0 + 9.0 * 1.0) / 19.0;
        assert!((directions[0].heading_rad().to_degrees() - expected).abs() < 1e-3);
    }

    #[test]
    fn a_line_within_reach_of_two_directions_runs_in_the_nearer() {
        let paths = [line(30.0, 0.0), line(20.0, 15.0), line(10.0, 9.0)];
        assert_eq!(gather(paths.iter()).1, [0, 1, 1]);
    }

    #[test]
    fn an_arc_reaches_beyond_its_ends() {
        let arc = Segment::from_bulge(Coord { x: -1.0, y: 0.0 }, Coord { x: 1.0, y: 0.0 }, -1.0);
        let (low_m, high_m) = Direction::new(PI / 2.0).extent_of(&arc);
        assert!(low_m.abs() < 1e-12 && (high_m - 1.0).abs() < 1e-12);
    }
}
