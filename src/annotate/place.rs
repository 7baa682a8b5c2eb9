//! Where something may stand: the room that texts and tendons take up, and the extent of what is drawn.

mod boxes;
mod extent;

use geo::Coord;

use crate::floor::Floor;
use crate::geometry::{distance_m, step, turn_rad};

pub(super) use boxes::{Boxes, Quad};
#[cfg(test)]
pub(super) use extent::corners;
pub(super) use extent::{Block, Extent};

/// Clear distance between two texts, in text heights.
const TEXT_GAP: f64 = 0.2;
/// Longest piece of a tendon that is looked up as a whole, metres.
const PIECE_M: f64 = 2.0;

/// What the sheet is already full of.
#[derive(Debug)]
pub(super) struct Room {
    /// Texts: the drawing's own and those placed so far.
    texts: Boxes,
    /// The drawn tendon lines, in short pieces.
    lines: Boxes,
    /// What is known of each of them.
    pieces: Vec<Piece>,
}

/// A piece of a tendon line.
#[derive(Debug, Clone, Copy)]
struct Piece {
    /// Index of the tendon in the floor.
    tendon: usize,
    /// Direction, radians.
    heading_rad: f64,
}

impl Room {
    /// The drawing's own texts and tendon lines.
    pub(super) fn new(floor: &Floor, occupied: &[Quad]) -> Self {
        let mut texts = Boxes::new(1.0);
        for quad in occupied {
            texts.insert(*quad);
        }
        let mut lines = Boxes::new(1.0);
        let mut pieces = Vec::new();
        for (index, tendon) in floor.tendons.iter().enumerate() {
            // A line drawn in another unit must not turn into millions of pieces.
            let piece_m = PIECE_M.max(tendon.path.length_m() / 2000.0);
            for line in tendon.path.to_line_string(0.02).lines() {
                let length_m = distance_m(line.start, line.end);
                let heading = (line.end.y - line.start.y).atan2(line.end.x - line.start.x);
                let mut along_m = 0.0;
                while along_m < length_m {
                    let next_m = (along_m + piece_m).min(length_m);
                    let from = step(line.start, heading, along_m);
                    let to = step(line.start, heading, next_m);
                    if lines.insert([from, to, to, from]) {
                        pieces.push(Piece {
                            tendon: index,
                            heading_rad: (to.y - from.y).atan2(to.x - from.x),
                        });
                    }
                    along_m = next_m;
                }
            }
        }
        Self {
            texts,
            lines,
            pieces,
        }
    }

    /// Texts that this box would touch, kept clear by part of a text height.
    pub(super) fn texts_hit(&self, spot: &Spot) -> usize {
        self.texts.count(&spot.quad(TEXT_GAP * spot.height_m))
    }

    /// Whether this box would touch no text.
    pub(super) fn clear_of_texts(&self, spot: &Spot) -> bool {
        self.texts.is_clear(&spot.quad(TEXT_GAP * spot.height_m))
    }

    /// Pieces of tendon lines that this box would touch.
    pub(super) fn lines_hit(&self, spot: &Spot) -> usize {
        self.lines.count(&spot.quad(0.0))
    }

    /// Takes the place for a text.
    pub(super) fn take(&mut self, spot: &Spot) {
        self.texts.insert(spot.quad(0.0));
    }

    /// Whether a thin line would touch no text.
    pub(super) fn line_clear_of_texts(&self, from: Coord<f64>, to: Coord<f64>) -> bool {
        self.texts.is_clear(&[from, to, to, from])
    }

    /// Takes the place for a thin line, which later texts keep clear of.
    pub(super) fn take_line(&mut self, from: Coord<f64>, to: Coord<f64>) {
        self.texts.insert([from, to, to, from]);
    }

    /// Ends of the pieces of tendon lines within reach of a place whose tendon and direction are asked for, some of them
    /// more than once.
    pub(super) fn pieces_near(
        &self,
        place: Coord<f64>,
        reach_m: f64,
        asked: impl Fn(usize, f64) -> bool,
    ) -> impl Iterator<Item = [Coord<f64>; 2]> {
        let quad = Spot::upright(place, 2.0 * reach_m, 2.0 * reach_m).quad(0.0);
        let pieces = move |index| {
            let piece = self.pieces.get(index);
            piece.is_some_and(|piece: &Piece| asked(piece.tendon, piece.heading_rad))
        };
        self.lines.touching(quad, pieces).filter_map(|index| {
            let [from, to, ..] = *self.lines.quad(index)?;
            Some([from, to])
        })
    }
}

/// A box for one text: its centre, size and the direction of its base line.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Spot {
    /// Centre.
    pub(super) centre: Coord<f64>,
    /// Along the base line, metres.
    pub(super) width_m: f64,
    /// Height of the text, metres.
    pub(super) height_m: f64,
    /// Direction of the base line, radians.
    pub(super) rotation_rad: f64,
}

impl Spot {
    /// A box whose base line runs along x.
    pub(super) fn upright(centre: Coord<f64>, width_m: f64, height_m: f64) -> Self {
        Self {
            centre,
            width_m,
            height_m,
            rotation_rad: 0.0,
        }
    }

    /// Its corners, grown on all sides.
    pub(super) fn quad(&self, grow_m: f64) -> Quad {
        let (across, along) = (self.height_m / 2.0 + grow_m, self.width_m / 2.0 + grow_m);
        let (sin, cos) = self.rotation_rad.sin_cos();
        let (sin_up, cos_up) = (self.rotation_rad + std::f64::consts::FRAC_PI_2).sin_cos();
        let corner = |a: f64, b: f64| Coord {
            x: self.centre.x + a * cos + b * cos_up,
            y: self.centre.y + a * sin + b * sin_up,
        };
        [
            corner(-along, -across),
            corner(along, -across),
            corner(along, across),
            corner(-along, across),
        ]
    }
}

/// The direction in which a text along a line is read from below or from the right, never upside down:
/// more than −90° and at most 90°. Just short of upright counts as upright, so that rounding turns no text over.
pub(super) fn readable_rad(heading_rad: f64) -> f64 {
    use std::f64::consts::{FRAC_PI_2, PI};
    const SLACK: f64 = 1e-3;
    let turned = turn_rad(heading_rad);
    if turned > FRAC_PI_2 + SLACK {
        turned - PI
    } else if turned <= SLACK - FRAC_PI_2 {
        turned + PI
    } else {
        turned
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use std::f64::consts::{FRAC_PI_2, PI};

    #[test]
    fn no_direction_reads_upside_down() {
        for degree in -720..=720 {
            let heading = f64::from(degree).to_radians();
            let read = readable_rad(heading);
            assert!(
                read > -FRAC_PI_2 + 1e-4 && read < FRAC_PI_2 + 2e-3,
                "{degree}"
            );
            assert!((heading - read).sin().abs() < 1e-9, "{degree}");
        }
        assert!((readable_rad(-FRAC_PI_2) - FRAC_PI_2).abs() < 1e-12);
        assert!((readable_rad(FRAC_PI_2 + 1e-9) - FRAC_PI_2).abs() < 1e-6);
        assert!(readable_rad(PI).abs() < 1e-12);
    }
}
