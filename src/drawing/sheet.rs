//! What is to be drawn onto a drawing, said without DXF: layers and marks, in metres.

use geo::Coord;

/// Layers of this tool's own: all that marks lie on, now or in any earlier version. They are never read, and what lies on
/// them in model space is replaced. A user's layer that is merely named alike is none of them.
pub const OWN_LAYERS: [&str; 12] = [
    "TAUT-FORCE-JACKING",
    "TAUT-FORCE-JACKING-TEXT",
    "TAUT-FORCE-LOCKOFF",
    "TAUT-FORCE-LOCKOFF-TEXT",
    "TAUT-FORCE-TRANSFER",
    "TAUT-FORCE-TRANSFER-TEXT",
    "TAUT-FORCE-SERVICE",
    "TAUT-FORCE-SERVICE-TEXT",
    "TAUT-EXTENSION",
    "TAUT-PROFILE",
    "TAUT-FINDING",
    "TAUT-TABLE",
];

/// Everything to insert into one drawing.
#[derive(Debug, Clone, Default, PartialEq)]
pub struct Sheet {
    /// Layers, in the order of the layer table; every one of them is written even if it is empty.
    pub layers: Vec<SheetLayer>,
    /// Marks, in the order they are written.
    pub marks: Vec<Mark>,
}

/// A layer to insert.
#[derive(Debug, Clone, PartialEq)]
pub struct SheetLayer {
    /// Name, one of [`OWN_LAYERS`]: at most 31 characters of `A-Z 0-9 - _ $`, as R12 demands.
    pub name: String,
    /// Colour of what has no colour of its own.
    pub ink: Ink,
    /// Whether the layer comes switched on.
    pub on: bool,
}

/// A colour: true colour where the drawing's version can hold it, the nearest index elsewhere.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Ink {
    /// Colour index, 1 to 255.
    pub index: u8,
    /// Red, green, blue; `None` leaves the index alone to say it (7: black or white, whichever reads).
    pub rgb: Option<[u8; 3]>,
}

/// One thing drawn.
#[derive(Debug, Clone, PartialEq)]
pub struct Mark {
    /// Name of one of the sheet's layers.
    pub layer: String,
    /// Colour, if not the layer's.
    pub ink: Option<Ink>,
    /// What is drawn.
    pub drawn: Drawn,
}

/// Shapes that every DXF version can hold.
#[derive(Debug, Clone, PartialEq)]
pub enum Drawn {
    /// A polyline in plan.
    Line {
        /// Vertices, metres.
        points: Vec<Coord<f64>>,
        /// Drawn width, metres; zero for a hairline.
        width_m: f64,
        /// Whether the last vertex joins the first.
        closed: bool,
    },
    /// A polyline in space: x, y, level, metres.
    Line3d {
        /// Vertices.
        points: Vec<[f64; 3]>,
    },
    /// One line of text.
    Text {
        /// Alignment point, metres.
        place: Coord<f64>,
        /// Height of capitals, metres.
        height_m: f64,
        /// Direction of the base line, radians from x.
        rotation_rad: f64,
        /// Which part of the text stands on `place`.
        align: Align,
        /// The text; plain characters, escaped for DXF by the writer.
        content: String,
    },
    /// A circle.
    Circle {
        /// Centre, metres.
        centre: Coord<f64>,
        /// Radius, metres.
        radius_m: f64,
    },
    /// A filled quadrangle, corners in order around it.
    Solid {
        /// Corners, metres.
        corners: [Coord<f64>; 4],
    },
}

/// Which part of a text stands on its place; vertically always the middle, except `Left`, which is the base line.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Align {
    /// Left end of the base line.
    Left,
    /// Middle of the left edge.
    MiddleLeft,
    /// Centre.
    Middle,
    /// Middle of the right edge.
    MiddleRight,
}
