//! Heights to a curve in space: level, slope, angle turned, arc length and radii at any station, in closed form.
//!
//! Stations are plan distances from the line's first drawn vertex. A bend is an angle turned at one station; where a
//! method asks for the angle at a station, its name says whether a bend there counts.

mod bends;
mod build;
mod curve;
mod hogging;
mod segments;
mod span;
mod supports;
mod types;

pub use build::{Unknown, build};
pub use segments::Segment;
pub use supports::support_residuals;
pub use types::{Bend, Profile, Span, Tightest};

/// Stations closer than this are one place, metres.
pub const SAME_PLACE_M: f64 = 1e-6;
