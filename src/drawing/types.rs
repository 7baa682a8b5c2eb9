//! What a drawing holds, in metres.

use geo::Coord;

use crate::geometry::Path;

/// A drawing's model space: the entities on the layers that were asked for, in metres, world axes, blocks exploded.
#[derive(Debug, Clone, Default)]
pub struct Drawing {
    /// `$ACADVER`, such as `AC1027`.
    pub version: String,
    /// Metres in one drawing unit.
    pub unit_m: f64,
    /// Where the unit came from.
    pub unit_from: UnitFrom,
    /// Whether the office works in metric units, as `$MEASUREMENT` says: 1 metric, 0 imperial.
    pub metric: Option<bool>,
    /// Lower left and upper right of everything in the drawing, if its header says so sensibly; metres. It is as old as the
    /// last program that kept it.
    pub extent: Option<[Coord<f64>; 2]>,
    /// Names of linetypes as first written; [`Look::linetype`] numbers them.
    pub linetypes: Vec<String>,
    /// Every layer, in the table's order; layers that only entities name follow, in order of first use.
    pub layers: Vec<Layer>,
    /// Lines, polylines, arcs, circles, splines.
    pub shapes: Vec<Shape>,
    /// Texts, multi-line texts and attribute values.
    pub texts: Vec<Text>,
    /// Block inserts (also those that were exploded into shapes and texts).
    pub inserts: Vec<Insert>,
    /// Leaders of every layer: what they point out lies on the layers that were asked for.
    pub leaders: Vec<Leader>,
    /// POINT entities.
    pub dots: Vec<Dot>,
}

impl Drawing {
    /// The name of a look's linetype.
    pub fn linetype(&self, look: Look) -> &str {
        let name = self.linetypes.get(look.linetype as usize);
        name.map_or(CONTINUOUS, String::as_str)
    }
}

/// The linetype of what has none of its own.
pub(super) const CONTINUOUS: &str = "Continuous";

/// Where a drawing's unit came from.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum UnitFrom {
    /// The job file names it.
    Job,
    /// `$INSUNITS` of the drawing.
    Header,
    /// Neither: millimetres are assumed, and that is said.
    Assumed(Unsaid),
}

impl Default for UnitFrom {
    fn default() -> Self {
        Self::Assumed(Unsaid::Absent)
    }
}

/// Why the header does not say the unit.
#[derive(Debug, Clone, Copy, PartialEq, Eq, thiserror::Error)]
pub enum Unsaid {
    /// No such variable.
    #[error("the drawing has no $INSUNITS")]
    Absent,
    /// It may have been where the header is damaged.
    #[error("the header of the drawing is damaged, and its $INSUNITS was not found")]
    Lost,
    /// No whole number.
    #[error("$INSUNITS of the drawing is no whole number")]
    NoNumber,
    /// A number that stands for no unit.
    #[error("$INSUNITS of the drawing is {0}, which stands for no unit")]
    NoUnit(i64),
    /// A unit that no plan is drawn in.
    #[error("$INSUNITS of the drawing is {number} ({name}), in which no plan is drawn")]
    NoPlans {
        /// The number.
        number: i64,
        /// The unit's name.
        name: &'static str,
    },
}

/// A layer and how it stands in the drawing.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub struct Layer {
    /// Name as written in the layer table.
    pub name: String,
    /// Switched off (negative colour).
    pub off: bool,
    /// Frozen.
    pub frozen: bool,
    /// Model-space entities by DXF type name, sorted by name.
    pub counts: Vec<(String, usize)>,
}

/// How an entity is seen: its own colour and linetype, or its layer's, or those of the insert that brings it in.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq, PartialOrd, Ord)]
pub struct Look {
    /// Colour index, 1 to 255; `None` for a true colour that is written without one.
    pub colour: Option<u8>,
    /// Number of the linetype among [`Drawing::linetypes`].
    pub linetype: u32,
}

/// The entity that a shape came from.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq)]
pub enum ShapeKind {
    /// LINE.
    #[default]
    Line,
    /// LWPOLYLINE or POLYLINE.
    Polyline,
    /// ARC.
    Arc,
    /// CIRCLE.
    Circle,
    /// ELLIPSE, as arcs that leave it by as much.
    Ellipse,
    /// SPLINE, as arcs that leave it by no more than 1 mm, or a millionth of its size.
    Spline,
    /// SOLID or TRACE: a filled triangle or quadrangle, as its outline.
    Solid,
}

/// A plan line.
#[derive(Debug, Clone, Default)]
pub struct Shape {
    /// Handle, upper-case hexadecimal without leading zeros; for a shape inside a block, the outermost insert's;
    /// for a drawing without handles, `#` and the entity's number.
    pub handle: String,
    /// Layer (of the insert, where the block's entity lies on layer 0).
    pub layer: String,
    /// Colour and linetype.
    pub look: Look,
    /// Number of the insert among [`Drawing::inserts`] that brings it in, the innermost; `None` in model space.
    pub within: Option<usize>,
    /// Entity type.
    pub kind: ShapeKind,
    /// The line, in metres.
    pub path: Path,
    /// Whether the entity is closed (the path's end is its start).
    pub closed: bool,
}

/// A text.
#[derive(Debug, Clone, Default)]
pub struct Text {
    /// Handle as for [`Shape`].
    pub handle: String,
    /// Layer as for [`Shape`].
    pub layer: String,
    /// Colour and linetype.
    pub look: Look,
    /// Number of the insert that it belongs to as an attribute, or that brings it in, as for [`Shape`].
    pub within: Option<usize>,
    /// What a reader sees: codes decoded, lines separated by `\n`.
    pub content: String,
    /// The point that the drafter placed (insertion or alignment point), metres.
    pub place: Coord<f64>,
    /// Corners of the text's box in drawing order around it, metres; its width is estimated from the characters.
    pub corners: [Coord<f64>; 4],
    /// Height of capitals, metres.
    pub height_m: f64,
    /// Direction of the base line, radians from x.
    pub rotation_rad: f64,
    /// An attribute that the drawing does not show: it may name a tendon, but nobody need read it.
    pub hidden: bool,
}

/// A block insert.
#[derive(Debug, Clone, Default)]
pub struct Insert {
    /// Handle as for [`Shape`].
    pub handle: String,
    /// Layer as for [`Shape`].
    pub layer: String,
    /// Colour and linetype.
    pub look: Look,
    /// Number of the insert that brings it in, as for [`Shape`]; always lower than its own.
    pub within: Option<usize>,
    /// Block name.
    pub block: String,
    /// Insertion point, metres.
    pub place: Coord<f64>,
    /// Rotation, radians from x.
    pub rotation_rad: f64,
    /// Attribute tags and values, in order.
    pub attributes: Vec<(String, String)>,
}

/// A LEADER or MULTILEADER.
#[derive(Debug, Clone)]
pub struct Leader {
    /// Handle as for [`Shape`].
    pub handle: String,
    /// Layer as for [`Shape`].
    pub layer: String,
    /// How it is seen.
    pub look: Look,
    /// Arrow tips, metres.
    pub arrows: Vec<Coord<f64>>,
    /// Where its lines end away from the arrows, metres.
    pub tails: Vec<Coord<f64>>,
    /// Its texts, by their places in [`Drawing::texts`]; empty where the drawing ties none to it.
    pub texts: Vec<usize>,
}

/// A POINT.
#[derive(Debug, Clone)]
pub struct Dot {
    /// Handle as for [`Shape`].
    pub handle: String,
    /// Layer as for [`Shape`].
    pub layer: String,
    /// How it is seen.
    pub look: Look,
    /// Where it stands, metres.
    pub place: Coord<f64>,
}
