//! A plan line of straight and circular pieces, with stations in metres from its start.

use geo::{Coord, LineString};

use super::{Segment, distance_m, turn_rad};

/// A plan line: pieces that follow one another, and the station where each starts.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Path {
    segments: Vec<Segment>,
    /// Station of each piece's start, and of the last piece's end.
    stations_m: Vec<f64>,
}

/// A point's nearest place on a line.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Projection {
    /// Station of the nearest place, metres.
    pub station_m: f64,
    /// The nearest place.
    pub place: Coord<f64>,
    /// How far off the line the point lies, metres.
    pub distance_m: f64,
}

/// A bare vertex: the line turns without an arc.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Corner {
    /// Station, metres.
    pub station_m: f64,
    /// Angle turned, positive anticlockwise.
    pub turn_rad: f64,
    /// Radius of the largest fillet that fits: tangent length half the shorter adjoining piece.
    pub fillet_radius_m: f64,
}

/// Turns smaller than this are drafting noise, not corners.
const CORNER_RAD: f64 = 1e-6;

impl Path {
    /// A line from its pieces; pieces without length are dropped.
    pub fn new(pieces: impl IntoIterator<Item = Segment>) -> Self {
        let mut path = Self {
            segments: Vec::new(),
            stations_m: vec![0.0],
        };
        let mut station_m = 0.0;
        for piece in pieces {
            let length_m = piece.length_m();
            if length_m > 0.0 && length_m.is_finite() {
                station_m += length_m;
                path.segments.push(piece);
                path.stations_m.push(station_m);
            }
        }
        path
    }

    /// A line through points.
    pub fn through(points: &[Coord<f64>]) -> Self {
        Self::new(points.windows(2).map(|pair| Segment::Line {
            from: pair[0],
            to: pair[1],
        }))
    }

    /// The pieces in order.
    pub fn segments(&self) -> &[Segment] {
        &self.segments
    }

    /// The pieces with the stations of their starts.
    pub fn pieces(&self) -> impl Iterator<Item = (f64, &Segment)> {
        self.stations_m.iter().copied().zip(&self.segments)
    }

    /// Whether the line has no length.
    pub fn is_empty(&self) -> bool {
        self.segments.is_empty()
    }

    /// Length in plan, metres.
    pub fn length_m(&self) -> f64 {
        self.stations_m.last().copied().unwrap_or(0.0)
    }

    /// First point, if the line has any length.
    pub fn start(&self) -> Option<Coord<f64>> {
        self.segments.first().map(Segment::start)
    }

    /// Last point, if the line has any length.
    pub fn end(&self) -> Option<Coord<f64>> {
        self.segments.last().map(Segment::end)
    }

    /// The point at a station; stations outside the line are brought to its ends. The origin for an empty line.
    pub fn place_at(&self, station_m: f64) -> Coord<f64> {
        self.locate(station_m)
            .map_or(Coord { x: 0.0, y: 0.0 }, |(piece, along_m)| {
                piece.place_at(along_m)
            })
    }

    /// Direction of travel at a station, radians from x; at a corner, of the piece that follows.
    pub fn heading_at(&self, station_m: f64) -> f64 {
        self.locate(station_m)
            .map_or(0.0, |(piece, along_m)| piece.heading_at(along_m))
    }

    fn locate(&self, station_m: f64) -> Option<(&Segment, f64)> {
        let station_m = station_m.clamp(0.0, self.length_m());
        let after = self
            .stations_m
            .partition_point(|&start_m| start_m <= station_m);
        let index = after
            .saturating_sub(1)
            .min(self.segments.len().checked_sub(1)?);
        let piece = self.segments.get(index)?;
        Some((piece, station_m - self.stations_m.get(index)?))
    }

    /// The place on the line nearest to a point; `None` for an empty line. Of equals, the first along the line.
    pub fn project(&self, point: Coord<f64>) -> Option<Projection> {
        let mut best: Option<Projection> = None;
        for (start_m, piece) in self.pieces() {
            let along_m = piece.nearest_along_m(point);
            let place = piece.place_at(along_m);
            let found = Projection {
                station_m: start_m + along_m,
                place,
                distance_m: distance_m(place, point),
            };
            if best.is_none_or(|held| found.distance_m < held.distance_m) {
                best = Some(found);
            }
        }
        best
    }

    /// The part of the line between two stations; empty where they are not in order.
    #[must_use]
    pub fn between(&self, from_m: f64, to_m: f64) -> Self {
        let part = self.pieces().filter_map(|(start_m, segment)| {
            let from_m = (from_m - start_m).max(0.0);
            let to_m = (to_m - start_m).min(segment.length_m());
            (from_m < to_m).then(|| segment.between(from_m, to_m))
        });
        Self::new(part)
    }

    /// The same line travelled the other way.
    #[must_use]
    pub fn reversed(&self) -> Self {
        Self::new(self.segments.iter().rev().map(Segment::reversed))
    }

    /// Bare vertices, in order.
    pub fn corners(&self) -> Vec<Corner> {
        let mut corners = Vec::new();
        for (index, pair) in self.segments.windows(2).enumerate() {
            let turn = turn_rad(pair[1].heading_at(0.0) - pair[0].heading_at(pair[0].length_m()));
            if turn.abs() > CORNER_RAD {
                let tangent_m = 0.5 * pair[0].length_m().min(pair[1].length_m());
                corners.push(Corner {
                    station_m: self.stations_m[index + 1],
                    turn_rad: turn,
                    fillet_radius_m: tangent_m / (turn.abs() / 2.0).tan(),
                });
            }
        }
        corners
    }

    /// The line as chords that leave it by no more than `tolerance_m`.
    pub fn to_line_string(&self, tolerance_m: f64) -> LineString<f64> {
        let mut points: Vec<Coord<f64>> = self.start().into_iter().collect();
        for piece in &self.segments {
            let chords = match *piece {
                Segment::Line { .. } => 1,
                Segment::Arc {
                    radius_m,
                    sweep_rad,
                    ..
                } => chord_count(radius_m, sweep_rad, tolerance_m),
            };
            let length_m = piece.length_m();
            for chord in 1..chords {
                points.push(piece.place_at(length_m * f64::from(chord) / f64::from(chords)));
            }
            points.push(piece.end());
        }
        LineString::new(points)
    }
}

/// Chords so that the sagitta R(1 − cos(θ/2)) stays below the tolerance; at most 4096.
fn chord_count(radius_m: f64, sweep_rad: f64, tolerance_m: f64) -> u32 {
    let cosine = (1.0 - tolerance_m / radius_m).clamp(-1.0, 1.0);
    let step_rad = (2.0 * cosine.acos()).max(1e-6);
    let wanted = (sweep_rad.abs() / step_rad).ceil().clamp(1.0, 4096.0);
    #[expect(
        clippy::cast_possible_truncation,
        clippy::cast_sign_loss,
        reason = "clamped to 1..=4096"
    )]
    let count = wanted as u32;
    count
}

#[cfg(test)]
mod tests {
    use super::*;
    use std::f64::consts::{FRAC_PI_2, PI};

    fn at(x: f64, y: f64) -> Coord<f64> {
        Coord { x, y }
    }

    #[test]
    fn a_bulge_of_one_is_a_half_circle_to_the_right_hand_side_of_the_chord() {
        let path = Path::new([Segment::from_bulge(at(0.0, 0.0), at(2.0, 0.0), 1.0)]);
        assert!((path.length_m() - PI).abs() < 1e-12);
        assert!(distance_m(path.place_at(FRAC_PI_2), at(1.0, -1.0)) < 1e-12);
        assert!((path.heading_at(0.0) + FRAC_PI_2).abs() < 1e-12);
    }

    #[test]
    fn reversing_mirrors_stations() {
        let path = Path::new([
            Segment::from_bulge(at(0.0, 0.0), at(4.0, 0.0), 0.2),
            Segment::from_bulge(at(4.0, 0.0), at(9.0, 1.0), -0.1),
        ]);
        let back = path.reversed();
        for tenth in 0..=10 {
            let s = path.length_m() * f64::from(tenth) / 10.0;
            assert!(distance_m(path.place_at(s), back.place_at(path.length_m() - s)) < 1e-12);
        }
    }

    #[test]
    fn projecting_a_point_on_the_line_gives_its_station_back() {
        let path = Path::new([
            Segment::from_bulge(at(0.0, 0.0), at(4.0, 0.0), -0.3),
            Segment::Line {
                from: at(4.0, 0.0),
                to: at(9.0, 1.0),
            },
        ]);
        for tenth in 0..=10 {
            let s = path.length_m() * f64::from(tenth) / 10.0;
            let found = path.project(path.place_at(s)).map(|p| p.station_m);
            assert!(found.is_some_and(|f| (f - s).abs() < 1e-9));
        }
    }

    #[test]
    fn a_right_angle_leaves_room_for_a_fillet_of_half_the_shorter_leg() {
        let corners = Path::through(&[at(0.0, 0.0), at(6.0, 0.0), at(6.0, 4.0)]).corners();
        assert_eq!(corners.len(), 1);
        assert!((corners[0].fillet_radius_m - 2.0).abs() < 1e-12);
    }
}
