//! A tendon's plan line as short chords with true stations.

use geo::{Coord, Line};

use crate::geometry::{Path, Segment};

/// How far a chord may leave its arc, metres.
const SAGITTA_M: f64 = 0.001;

/// Longest chord, metres: keeps each look into the slab's index local, also on a slanting tendon.
const LONGEST_M: f64 = 4.0;

/// One chord.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Chord {
    /// Station of the start, metres.
    pub(super) start_m: f64,
    /// Length of plan line between the ends, metres.
    pub(super) length_m: f64,
    /// The chord.
    pub(super) line: Line<f64>,
}

/// A plan line as chords, in order, without gaps.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Chords(pub(super) Vec<Chord>);

impl Chords {
    /// Chords that leave the line by no more than 1 mm and are no longer than 4 m.
    pub(super) fn of(path: &Path) -> Self {
        let mut chords = Vec::new();
        for (start_m, piece) in path.pieces() {
            let length_m = piece.length_m();
            let corners = match piece {
                Segment::Line { .. } => 1,
                Segment::Arc { .. } => Path::new([*piece])
                    .to_line_string(SAGITTA_M)
                    .0
                    .len()
                    .saturating_sub(1)
                    .max(1),
            };
            #[expect(
                clippy::cast_possible_truncation,
                clippy::cast_sign_loss,
                reason = "a length over 4 m, clamped"
            )]
            let steps = (length_m / LONGEST_M).ceil().clamp(1.0, 65_536.0) as usize;
            let count = corners.max(steps);
            #[expect(clippy::cast_precision_loss, reason = "counts far below 2^52")]
            let step_m = length_m / count as f64;
            let mut from: Coord<f64> = piece.start();
            for index in 0..count {
                #[expect(clippy::cast_precision_loss, reason = "counts far below 2^52")]
                let before_m = index as f64 * step_m;
                let to = if index + 1 == count {
                    piece.end()
                } else {
                    piece.place_at(before_m + step_m)
                };
                chords.push(Chord {
                    start_m: start_m + before_m,
                    length_m: step_m,
                    line: Line::new(from, to),
                });
                from = to;
            }
        }
        Self(chords)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn chords_follow_one_another_and_lie_on_the_line() {
        let path = Path::new([
            Segment::from_bulge(Coord { x: 0.0, y: 0.0 }, Coord { x: 4.0, y: 0.0 }, 0.2),
            Segment::Line {
                from: Coord { x: 4.0, y: 0.0 },
                to: Coord { x: 24.0, y: 3.0 },
            },
        ]);
        let chords = Chords::of(&path).0;
        let total_m: f64 = chords.iter().map(|chord| chord.length_m).sum();
        assert!((total_m - path.length_m()).abs() < 1e-9);
        for chord in &chords {
            assert!(chord.length_m <= LONGEST_M + 1e-9);
            let start = path.place_at(chord.start_m);
            assert!((start.x - chord.line.start.x).hypot(start.y - chord.line.start.y) < 1e-9);
        }
        for pair in chords.windows(2) {
            assert!(crate::geometry::distance_m(pair[0].line.end, pair[1].line.start) < 1e-9);
        }
    }
}
