//! What can be drawn.

use super::Xy;
use super::measure::Measure;

/// A shape in plan; lengths in millimetres, angles in radians.
#[derive(Clone)]
pub(crate) enum Shape {
    Line([Xy; 2]),
    Circle {
        centre: Xy,
        radius_mm: f64,
    },
    /// Counter-clockwise from the first angle to the second.
    Arc {
        centre: Xy,
        radius_mm: f64,
        angles_rad: [f64; 2],
    },
    /// LWPOLYLINE: corners with the bulge of the piece that follows each.
    Polyline {
        corners: Vec<(Xy, f64)>,
        closed: bool,
    },
    /// The old POLYLINE with its VERTEX records.
    HeavyPolyline {
        corners: Vec<(Xy, f64)>,
    },
    /// A cubic with clamped ends and even knots.
    Spline {
        controls: Vec<Xy>,
    },
    Solid([Xy; 4]),
    Text(Text),
    /// Lines of text below one another, from the upper left corner.
    Paragraph {
        at: Xy,
        height_mm: f64,
        wide_mm: f64,
        content: String,
    },
    /// One word as MTEXT, by the middle of its left edge.
    Word {
        at: Xy,
        height_mm: f64,
        content: String,
    },
    Insert {
        block: String,
        at: Xy,
        scale: f64,
        rotation_rad: f64,
    },
    /// A hatched outline; `spacing_mm` none fills it.
    Hatch {
        outline: Vec<Xy>,
        spacing_mm: Option<f64>,
    },
    Dimension(Measure),
    /// A window on the sheet (millimetres of paper) that looks at a middle and a height of the model.
    Viewport {
        id: u8,
        at: Xy,
        size: Xy,
        middle: Xy,
        high_mm: f64,
    },
}

/// A line of text by its alignment point.
#[derive(Clone)]
pub(crate) struct Text {
    pub(crate) at: Xy,
    pub(crate) height_mm: f64,
    pub(crate) rotation_rad: f64,
    pub(crate) across: Across,
    pub(crate) up: Up,
    pub(crate) content: String,
}

/// Where the alignment point lies along the text.
#[derive(Clone, Copy, PartialEq, Eq)]
pub(crate) enum Across {
    Left = 0,
    Centre = 1,
    Right = 2,
}

/// Where the alignment point lies across the text.
#[derive(Clone, Copy, PartialEq, Eq)]
pub(crate) enum Up {
    Baseline = 0,
    Middle = 2,
    Top = 3,
}
