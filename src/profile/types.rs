//! A tendon's curve in space.

/// A tendon's curve: pieces over plan stations, on each of which the level is one parabola and the plan line is
/// straight or one arc.
#[derive(Debug, Clone, PartialEq)]
pub struct Profile {
    /// Pieces, in order, without gaps.
    pub spans: Vec<Span>,
    /// Angles turned at a point (bare plan vertices, breaks in slope), in order of station.
    pub bends: Vec<Bend>,
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
