//! A tendon's curve in space.

use super::Segment;

/// A tendon's curve: pieces over plan stations, on each of which the level is one parabola and the plan line is
/// straight or one arc. Made by [`crate::profile::build()`] or [`Profile::new`].
#[derive(Debug, Clone, PartialEq)]
pub struct Profile {
    /// Pieces, in order, without gaps.
    pub spans: Vec<Span>,
    /// Angles turned at a point (bare plan vertices, breaks in slope), in order of station.
    pub bends: Vec<Bend>,
    /// At each piece's start, and at the end of the last: length in space and angle turned so far, without bends.
    pub(super) starts: Vec<SoFar>,
    /// Sum of the bends before each bend, and of all, radians.
    pub(super) bends_before_rad: Vec<f64>,
    /// What lies between each two neighbouring anchors, in order; none where there are only the two at the ends.
    pub(super) segments: Vec<Segment>,
}

/// Length and smooth angle from station 0.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub(super) struct SoFar {
    pub(super) arc_m: f64,
    pub(super) angle_rad: f64,
}

/// One piece: z(x) = level + slope x + curvature x²/2, x the plan distance from its start.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Span {
    /// Plan station of the start, metres.
    pub start_m: f64,
    /// Plan length, metres.
    pub length_m: f64,
    /// Level at the start, metres above the top of the slab.
    pub level_m: f64,
    /// dz/dx at the start.
    pub slope: f64,
    /// d²z/dx², 1/m; negative hogging, positive sagging.
    pub curvature_per_m: f64,
    /// Curvature of the plan line, 1/m, positive anticlockwise.
    pub plan_curvature_per_m: f64,
}

/// An angle turned at one station.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Bend {
    /// Plan station, metres.
    pub station_m: f64,
    /// Angle in space, radians, positive.
    pub angle_rad: f64,
}

/// The tightest place of a curve.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Tightest {
    /// Radius there, metres.
    pub radius_m: f64,
    /// Plan station, metres.
    pub station_m: f64,
}
