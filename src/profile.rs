//! Heights to a curve in space: level, slope, angle turned, arc length and radii at any station, in closed form.

mod types;

pub use types::{Bend, Profile, Span};
