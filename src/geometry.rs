//! Plan geometry: lines and arcs with stations along them, corners, crossings. Uses `geo`'s coordinates throughout.

mod path;
mod segment;

pub use geo::Coord;
pub use path::{Corner, Path, Projection};
pub use segment::Segment;

/// Distance between two points, metres.
pub fn distance_m(a: Coord<f64>, b: Coord<f64>) -> f64 {
    (b.x - a.x).hypot(b.y - a.y)
}

/// The point `along_m` from `from` in direction `heading_rad`.
pub fn step(from: Coord<f64>, heading_rad: f64, along_m: f64) -> Coord<f64> {
    let (sin, cos) = heading_rad.sin_cos();
    Coord {
        x: from.x + along_m * cos,
        y: from.y + along_m * sin,
    }
}

/// An angle brought into (−π, π].
pub fn turn_rad(angle_rad: f64) -> f64 {
    use std::f64::consts::{PI, TAU};
    let turned = angle_rad.rem_euclid(TAU);
    if turned > PI { turned - TAU } else { turned }
}
