//! One straight or circular piece of a plan line.

use std::f64::consts::TAU;

use geo::Coord;

use super::{distance_m, step, turn_rad};

/// A straight or circular piece of a plan line, metres and radians.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Segment {
    /// A straight piece.
    Line {
        /// First point.
        from: Coord<f64>,
        /// Last point.
        to: Coord<f64>,
    },
    /// A circular piece.
    Arc {
        /// Centre.
        centre: Coord<f64>,
        /// Radius, positive.
        radius_m: f64,
        /// Angle of the first point seen from the centre.
        start_rad: f64,
        /// Angle swept; positive anticlockwise.
        sweep_rad: f64,
    },
}

impl Segment {
    /// The piece between two vertices with a DXF bulge: tan of a quarter of the swept angle, positive anticlockwise.
    pub fn from_bulge(from: Coord<f64>, to: Coord<f64>, bulge: f64) -> Self {
        let chord_m = distance_m(from, to);
        if bulge.abs() < 1e-9 || chord_m <= 0.0 || !bulge.is_finite() {
            return Self::Line { from, to };
        }
        let sweep_rad = 4.0 * bulge.atan();
        let radius_m = chord_m * (1.0 + bulge * bulge) / (4.0 * bulge.abs());
        // The centre lies on the chord's normal; `offset` is signed to the left of the chord.
        let offset = chord_m * (1.0 - bulge * bulge) / (4.0 * bulge);
        let (ux, uy) = ((to.x - from.x) / chord_m, (to.y - from.y) / chord_m);
        let centre = Coord {
            x: f64::midpoint(from.x, to.x) - uy * offset,
            y: f64::midpoint(from.y, to.y) + ux * offset,
        };
        let start_rad = (from.y - centre.y).atan2(from.x - centre.x);
        Self::Arc {
            centre,
            radius_m,
            start_rad,
            sweep_rad,
        }
    }

    /// Length, metres.
    pub fn length_m(&self) -> f64 {
        match *self {
            Self::Line { from, to } => distance_m(from, to),
            Self::Arc {
                radius_m,
                sweep_rad,
                ..
            } => radius_m * sweep_rad.abs(),
        }
    }

    /// The point `along_m` from the piece's start.
    pub fn place_at(&self, along_m: f64) -> Coord<f64> {
        match *self {
            Self::Line { from, to } => {
                let length_m = distance_m(from, to);
                let t = if length_m > 0.0 {
                    along_m / length_m
                } else {
                    0.0
                };
                Coord {
                    x: from.x + t * (to.x - from.x),
                    y: from.y + t * (to.y - from.y),
                }
            }
            Self::Arc {
                centre,
                radius_m,
                start_rad,
                sweep_rad,
            } => step(
                centre,
                start_rad + along_m / radius_m * sweep_rad.signum(),
                radius_m,
            ),
        }
    }

    /// Direction of travel `along_m` from the start, radians from x.
    pub fn heading_at(&self, along_m: f64) -> f64 {
        match *self {
            Self::Line { from, to } => (to.y - from.y).atan2(to.x - from.x),
            Self::Arc {
                radius_m,
                start_rad,
                sweep_rad,
                ..
            } => turn_rad(
                start_rad + sweep_rad.signum() * (along_m / radius_m + std::f64::consts::FRAC_PI_2),
            ),
        }
    }

    /// First point.
    pub fn start(&self) -> Coord<f64> {
        match *self {
            Self::Line { from, .. } => from,
            Self::Arc { .. } => self.place_at(0.0),
        }
    }

    /// Last point.
    pub fn end(&self) -> Coord<f64> {
        match *self {
            Self::Line { to, .. } => to,
            Self::Arc { .. } => self.place_at(self.length_m()),
        }
    }

    /// The part between two distances along the piece, both on it.
    #[must_use]
    pub fn between(&self, from_m: f64, to_m: f64) -> Self {
        match *self {
            Self::Line { .. } => Self::Line {
                from: self.place_at(from_m),
                to: self.place_at(to_m),
            },
            Self::Arc {
                centre,
                radius_m,
                start_rad,
                sweep_rad,
            } => {
                let per_m = sweep_rad / self.length_m();
                Self::Arc {
                    centre,
                    radius_m,
                    start_rad: start_rad + per_m * from_m,
                    sweep_rad: per_m * (to_m - from_m),
                }
            }
        }
    }

    /// The same piece travelled the other way.
    #[must_use]
    pub fn reversed(&self) -> Self {
        match *self {
            Self::Line { from, to } => Self::Line { from: to, to: from },
            Self::Arc {
                centre,
                radius_m,
                start_rad,
                sweep_rad,
            } => Self::Arc {
                centre,
                radius_m,
                start_rad: start_rad + sweep_rad,
                sweep_rad: -sweep_rad,
            },
        }
    }

    /// The same piece between two other points: straight, or turning by the same angle.
    #[must_use]
    pub fn carried(&self, from: Coord<f64>, to: Coord<f64>) -> Self {
        match *self {
            Self::Line { .. } => Self::Line { from, to },
            Self::Arc { .. } if from == self.start() && to == self.end() => *self,
            Self::Arc { sweep_rad, .. } => Self::from_bulge(from, to, (sweep_rad / 4.0).tan()),
        }
    }

    /// Curvature, 1/m, positive where the piece turns anticlockwise.
    pub fn curvature_per_m(&self) -> f64 {
        match *self {
            Self::Line { .. } => 0.0,
            Self::Arc {
                radius_m,
                sweep_rad,
                ..
            } => sweep_rad.signum() / radius_m,
        }
    }

    /// Distance along the piece of its point nearest to `place`.
    pub fn nearest_along_m(&self, place: Coord<f64>) -> f64 {
        match *self {
            Self::Line { from, to } => {
                let length_m = distance_m(from, to);
                if length_m <= 0.0 {
                    return 0.0;
                }
                let dot =
                    (place.x - from.x) * (to.x - from.x) + (place.y - from.y) * (to.y - from.y);
                (dot / length_m).clamp(0.0, length_m)
            }
            Self::Arc {
                centre,
                radius_m,
                start_rad,
                sweep_rad,
            } => {
                let seen_rad = (place.y - centre.y).atan2(place.x - centre.x);
                let along_rad = ((seen_rad - start_rad) * sweep_rad.signum()).rem_euclid(TAU);
                let over_rad = along_rad - sweep_rad.abs();
                if over_rad <= 0.0 {
                    radius_m * along_rad
                } else if over_rad < TAU - along_rad {
                    self.length_m()
                } else {
                    0.0
                }
            }
        }
    }
}
