//! What can be drawn, and how each shape is written.

use super::tags::Tags;
use super::{Entity, Xy};

/// A shape in plan; lengths in millimetres, angles in radians.
#[derive(Clone)]
pub(crate) enum Shape {
    Line([Xy; 2]),
    Circle { centre: Xy, radius_mm: f64 },
    /// Counter-clockwise from the first angle to the second.
    Arc { centre: Xy, radius_mm: f64, angles_rad: [f64; 2] },
    /// LWPOLYLINE: corners with the bulge of the piece that follows each.
    Polyline { corners: Vec<(Xy, f64)>, closed: bool },
    /// The old POLYLINE with its VERTEX records.
    HeavyPolyline { corners: Vec<(Xy, f64)> },
    /// A cubic with clamped ends and even knots.
    Spline { controls: Vec<Xy> },
    Solid([Xy; 4]),
    Text(Text),
    /// Lines of text below one another, from the upper left corner.
    Paragraph { at: Xy, height_mm: f64, wide_mm: f64, content: String },
    /// One word as MTEXT, by the middle of its left edge.
    Word { at: Xy, height_mm: f64, content: String },
    Insert { block: String, at: Xy, scale: f64, rotation_rad: f64 },
    /// A hatched outline; `spacing_mm` none fills it.
    Hatch { outline: Vec<Xy>, spacing_mm: Option<f64> },
    Dimension(Measure),
    /// A window on the sheet (millimetres of paper) that looks at a middle and a height of the model.
    Viewport { id: u8, at: Xy, size: Xy, middle: Xy, high_mm: f64 },
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

/// An aligned dimension between two points.
#[derive(Clone)]
pub(crate) struct Measure {
    block: String,
    measured: [Xy; 2],
    line: [Xy; 2],
    height_mm: f64,
}

impl Measure {
    pub(super) fn new(block: String, from: Xy, to: Xy, shift_mm: f64, height_mm: f64) -> Self {
        let length = (to[0] - from[0]).hypot(to[1] - from[1]);
        let left = [-(to[1] - from[1]) / length * shift_mm, (to[0] - from[0]) / length * shift_mm];
        let line = [from, to].map(|end| [end[0] + left[0], end[1] + left[1]]);
        Self { block, measured: [from, to], line, height_mm }
    }

    fn length_mm(&self) -> f64 {
        let [from, to] = self.measured;
        (to[0] - from[0]).hypot(to[1] - from[1])
    }

    fn rotation_rad(&self) -> f64 {
        let [from, to] = self.measured;
        (to[1] - from[1]).atan2(to[0] - from[0])
    }

    fn text_at(&self) -> Xy {
        let [from, to] = self.line;
        let turn = self.rotation_rad();
        let rise = 0.9 * self.height_mm;
        [f64::midpoint(from[0], to[0]) - turn.sin() * rise, f64::midpoint(from[1], to[1]) + turn.cos() * rise]
    }

    /// The lines, ticks and figure that stand in the dimension's own block.
    pub(super) fn picture(&self) -> Vec<Shape> {
        let turn = self.rotation_rad();
        let tick = 0.5 * self.height_mm;
        let mut shapes = vec![Shape::Line(self.line)];
        for (end, foot) in self.line.into_iter().zip(self.measured) {
            let [along, across] = [turn.cos() * tick, turn.sin() * tick];
            shapes.push(Shape::Line([foot, end]));
            shapes.push(Shape::Line([
                [end[0] - along + across, end[1] - across - along],
                [end[0] + along - across, end[1] + across + along],
            ]));
        }
        shapes.push(Shape::Text(Text {
            at: self.text_at(),
            height_mm: self.height_mm,
            rotation_rad: turn,
            across: Across::Centre,
            up: Up::Middle,
            content: format!("{:.0}", self.length_mm()),
        }));
        shapes
    }
}

/// Writes one entity into the block (or space) named.
pub(super) fn write(tags: &mut Tags, entity: &Entity, owner: &str) {
    let head = |tags: &mut Tags, kind: &str, class: &str| {
        let [record, _, _] = tags.block_handles(owner);
        tags.put(0, kind);
        let handle = tags.fresh();
        tags.handle(330, record).put(100, "AcDbEntity");
        if owner == "*Paper_Space" {
            tags.put(67, 1);
        }
        tags.put(8, &entity.layer).put(100, class);
        handle
    };
    match &entity.shape {
        Shape::Line([from, to]) => {
            head(tags, "LINE", "AcDbLine");
            tags.xyz(10, *from).xyz(11, *to);
        }
        Shape::Circle { centre, radius_mm } => {
            head(tags, "CIRCLE", "AcDbCircle");
            tags.xyz(10, *centre).real(40, *radius_mm);
        }
        Shape::Arc { centre, radius_mm, angles_rad } => {
            head(tags, "ARC", "AcDbCircle");
            tags.xyz(10, *centre).real(40, *radius_mm).put(100, "AcDbArc");
            tags.fine(50, angles_rad[0].to_degrees()).fine(51, angles_rad[1].to_degrees());
        }
        Shape::Polyline { corners, closed } => {
            head(tags, "LWPOLYLINE", "AcDbPolyline");
            tags.put(90, corners.len()).put(70, i32::from(*closed)).real(43, 0.0);
            for (at, bulge) in corners {
                tags.xy(10, *at);
                if *bulge != 0.0 {
                    tags.fine(42, *bulge);
                }
            }
        }
        Shape::HeavyPolyline { corners } => heavy_polyline(tags, entity, owner, corners, head),
        Shape::Spline { controls } => {
            head(tags, "SPLINE", "AcDbSpline");
            spline(tags, controls);
        }
        Shape::Solid([a, b, c, d]) => {
            head(tags, "SOLID", "AcDbTrace");
            tags.xyz(10, *a).xyz(11, *b).xyz(12, *d).xyz(13, *c);
        }
        Shape::Text(line) => {
            head(tags, "TEXT", "AcDbText");
            text(tags, line);
        }
        Shape::Paragraph { at, height_mm, wide_mm, content } => {
            head(tags, "MTEXT", "AcDbMText");
            tags.xyz(10, *at).real(40, *height_mm).real(41, *wide_mm).put(71, 1).put(72, 1);
            tags.put(1, content).put(7, "Standard");
        }
        Shape::Word { at, height_mm, content } => {
            head(tags, "MTEXT", "AcDbMText");
            tags.xyz(10, *at).real(40, *height_mm).real(41, 0.0).put(71, 4).put(72, 1);
            tags.put(1, content).put(7, "Standard");
        }
        Shape::Insert { block, at, scale, rotation_rad } => {
            head(tags, "INSERT", "AcDbBlockReference");
            tags.put(2, block).xyz(10, *at).real(41, *scale).real(42, *scale).real(43, *scale);
            tags.fine(50, rotation_rad.to_degrees());
        }
        Shape::Hatch { outline, spacing_mm } => {
            head(tags, "HATCH", "AcDbHatch");
            hatch(tags, outline, *spacing_mm);
        }
        Shape::Dimension(measure) => {
            head(tags, "DIMENSION", "AcDbDimension");
            tags.put(2, &measure.block).xyz(10, measure.line[1]).xyz(11, measure.text_at());
            tags.put(70, 33).put(71, 5).real(42, measure.length_mm()).put(1, "").put(3, "Standard");
            tags.put(100, "AcDbAlignedDimension").xyz(13, measure.measured[0]).xyz(14, measure.measured[1]);
        }
        Shape::Viewport { id, at, size, middle, high_mm } => {
            head(tags, "VIEWPORT", "AcDbViewport");
            viewport(tags, *id, *at, *size, *middle, *high_mm);
        }
    }
}

fn heavy_polyline(
    tags: &mut Tags,
    entity: &Entity,
    owner: &str,
    corners: &[(Xy, f64)],
    head: impl Fn(&mut Tags, &str, &str) -> u64,
) {
    let [record, _, _] = tags.block_handles(owner);
    let whole = head(tags, "POLYLINE", "AcDb2dPolyline");
    tags.put(66, 1).xyz(10, [0.0, 0.0]).put(70, 0);
    for (at, bulge) in corners {
        tags.put(0, "VERTEX");
        tags.fresh();
        tags.handle(330, whole).put(100, "AcDbEntity").put(8, &entity.layer);
        tags.put(100, "AcDbVertex").put(100, "AcDb2dVertex").xyz(10, *at).fine(42, *bulge).put(70, 0);
    }
    tags.put(0, "SEQEND");
    tags.fresh();
    tags.handle(330, if corners.is_empty() { record } else { whole }).put(100, "AcDbEntity").put(8, &entity.layer);
}

fn spline(tags: &mut Tags, controls: &[Xy]) {
    let knots = crate::path::clamped_knots(controls.len());
    tags.real(210, 0.0).real(220, 0.0).real(230, 1.0).put(70, 8).put(71, 3);
    tags.put(72, knots.len()).put(73, controls.len()).put(74, 0);
    tags.real(42, 1e-4).real(43, 1e-4);
    for knot in knots {
        tags.real(40, knot);
    }
    for control in controls {
        tags.xyz(10, *control);
    }
}

fn text(tags: &mut Tags, line: &Text) {
    let plain = line.across == Across::Left && line.up == Up::Baseline;
    // Readers that align for themselves ignore this corner; the others find the text near enough.
    let wide = 0.9 * line.height_mm * f64::from(u32::try_from(line.content.len()).unwrap_or(u32::MAX));
    let along = match line.across {
        Across::Left => 0.0,
        Across::Centre => -0.5 * wide,
        Across::Right => -wide,
    };
    let up = match line.up {
        Up::Baseline => 0.0,
        Up::Middle => -0.5 * line.height_mm,
        Up::Top => -line.height_mm,
    };
    let (sin, cos) = line.rotation_rad.sin_cos();
    tags.xyz(10, [line.at[0] + along * cos - up * sin, line.at[1] + along * sin + up * cos]);
    tags.real(40, line.height_mm).put(1, &line.content).fine(50, line.rotation_rad.to_degrees()).put(7, "Standard");
    if !plain {
        tags.put(72, line.across as u8).xyz(11, line.at);
    }
    tags.put(100, "AcDbText");
    if !plain && line.up != Up::Baseline {
        tags.put(73, line.up as u8);
    }
}

fn hatch(tags: &mut Tags, outline: &[Xy], spacing_mm: Option<f64>) {
    tags.xyz(10, [0.0, 0.0]).real(210, 0.0).real(220, 0.0).real(230, 1.0);
    tags.put(2, if spacing_mm.is_some() { "ANSI31" } else { "SOLID" });
    tags.put(70, i32::from(spacing_mm.is_none())).put(71, 0).put(91, 1);
    tags.put(92, 3).put(72, 0).put(73, 1).put(93, outline.len());
    for at in outline {
        tags.xy(10, *at);
    }
    tags.put(97, 0).put(75, 1).put(76, 1);
    if let Some(spacing_mm) = spacing_mm {
        let step = spacing_mm * std::f64::consts::FRAC_1_SQRT_2;
        tags.real(52, 0.0).real(41, spacing_mm / 3.175).put(77, 0).put(78, 1);
        tags.real(53, 45.0).real(43, 0.0).real(44, 0.0).real(45, -step).real(46, step).put(79, 0);
    }
    tags.put(98, 1).xy(10, outline.first().copied().unwrap_or_default());
}

fn viewport(tags: &mut Tags, id: u8, at: Xy, size: Xy, middle: Xy, high_mm: f64) {
    tags.xyz(10, at).real(40, size[0]).real(41, size[1]).put(68, id).put(69, id);
    tags.xy(12, middle).xy(13, [0.0, 0.0]).xy(14, [10.0, 10.0]).xy(15, [10.0, 10.0]);
    tags.xy(16, [0.0, 0.0]).real(36, 1.0).xyz(17, [0.0, 0.0]).real(42, 50.0).real(43, 0.0).real(44, 0.0);
    tags.real(45, high_mm).real(50, 0.0).real(51, 0.0).put(72, 1000).put(90, 32864).put(1, "");
    tags.put(281, 0).put(71, 1).put(74, 0).xyz(110, [0.0, 0.0]).xyz(111, [1.0, 0.0]).xyz(112, [0.0, 1.0]);
    tags.put(79, 0).real(146, 0.0).put(170, 0);
}
