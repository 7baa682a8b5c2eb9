//! How each shape is written.

use super::measure::Measure;
use super::shapes::{Across, Shape, Text, Up};
use super::tags::Tags;
use super::{Entity, Xy};

/// Writes one entity into the block (or space) named.
pub(super) fn write(tags: &mut Tags, entity: &Entity, owner: &str) {
    let handle = head(tags, entity, owner);
    match &entity.shape {
        Shape::Line([from, to]) => {
            tags.xyz(10, *from).xyz(11, *to);
        }
        Shape::Circle { centre, radius_mm } => {
            tags.xyz(10, *centre).real(40, *radius_mm);
        }
        Shape::Arc {
            centre,
            radius_mm,
            angles_rad: [from, to],
        } => {
            tags.xyz(10, *centre)
                .real(40, *radius_mm)
                .put(100, "AcDbArc");
            tags.fine(50, from.to_degrees()).fine(51, to.to_degrees());
        }
        Shape::Polyline { corners, closed } => polyline(tags, corners, *closed),
        Shape::HeavyPolyline { corners } => vertices(tags, &entity.layer, handle, corners),
        Shape::Spline { controls } => spline(tags, controls),
        Shape::Solid([a, b, c, d]) => {
            // Corners go in the order of a Z.
            tags.xyz(10, *a).xyz(11, *b).xyz(12, *d).xyz(13, *c);
        }
        Shape::Text(line) => text(tags, line),
        Shape::Paragraph {
            at,
            height_mm,
            wide_mm,
            content,
        } => {
            paragraphs(tags, *at, [*height_mm, *wide_mm], 1, content);
        }
        Shape::Word {
            at,
            height_mm,
            content,
        } => {
            paragraphs(tags, *at, [*height_mm, 0.0], 4, content);
        }
        Shape::Insert {
            block,
            at,
            scale,
            rotation_rad,
        } => {
            tags.put(2, block)
                .xyz(10, *at)
                .real(41, *scale)
                .real(42, *scale)
                .real(43, *scale);
            tags.fine(50, rotation_rad.to_degrees());
        }
        Shape::Hatch {
            outline,
            spacing_mm,
        } => hatch(tags, outline, *spacing_mm),
        Shape::Dimension(measure) => dimension(tags, measure),
        Shape::Viewport {
            id,
            at,
            size,
            middle,
            high_mm,
        } => {
            viewport(tags, *id, *at, *size, *middle, *high_mm);
        }
    }
}

/// What every entity begins with; returns its handle.
fn head(tags: &mut Tags, entity: &Entity, owner: &str) -> u64 {
    let (kind, class) = match &entity.shape {
        Shape::Line(_) => ("LINE", "AcDbLine"),
        Shape::Circle { .. } => ("CIRCLE", "AcDbCircle"),
        Shape::Arc { .. } => ("ARC", "AcDbCircle"),
        Shape::Polyline { .. } => ("LWPOLYLINE", "AcDbPolyline"),
        Shape::HeavyPolyline { .. } => ("POLYLINE", "AcDb2dPolyline"),
        Shape::Spline { .. } => ("SPLINE", "AcDbSpline"),
        Shape::Solid(_) => ("SOLID", "AcDbTrace"),
        Shape::Text(_) => ("TEXT", "AcDbText"),
        Shape::Paragraph { .. } | Shape::Word { .. } => ("MTEXT", "AcDbMText"),
        Shape::Insert { .. } => ("INSERT", "AcDbBlockReference"),
        Shape::Hatch { .. } => ("HATCH", "AcDbHatch"),
        Shape::Dimension(_) => ("DIMENSION", "AcDbDimension"),
        Shape::Viewport { .. } => ("VIEWPORT", "AcDbViewport"),
    };
    let [record, _, _] = tags.block_handles(owner);
    tags.put(0, kind);
    let handle = tags.fresh();
    tags.handle(330, record).put(100, "AcDbEntity");
    if owner == "*Paper_Space" {
        tags.put(67, 1);
    }
    tags.put(8, &entity.layer).put(100, class);
    handle
}

fn vertices(tags: &mut Tags, layer: &str, whole: u64, corners: &[(Xy, f64)]) {
    tags.put(66, 1).xyz(10, [0.0, 0.0]).put(70, 0);
    for (at, bulge) in corners {
        tags.put(0, "VERTEX");
        tags.fresh();
        tags.handle(330, whole).put(100, "AcDbEntity").put(8, layer);
        tags.put(100, "AcDbVertex")
            .put(100, "AcDb2dVertex")
            .xyz(10, *at)
            .fine(42, *bulge)
            .put(70, 0);
    }
    tags.put(0, "SEQEND");
    tags.fresh();
    tags.handle(330, whole).put(100, "AcDbEntity").put(8, layer);
}

fn polyline(tags: &mut Tags, corners: &[(Xy, f64)], closed: bool) {
    tags.put(90, corners.len())
        .put(70, i32::from(closed))
        .real(43, 0.0);
    for (at, bulge) in corners {
        tags.xy(10, *at);
        if *bulge != 0.0 {
            tags.fine(42, *bulge);
        }
    }
}

fn spline(tags: &mut Tags, controls: &[Xy]) {
    let knots = crate::path::clamped_knots(controls.len());
    tags.real(210, 0.0)
        .real(220, 0.0)
        .real(230, 1.0)
        .put(70, 8)
        .put(71, 3);
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
    let wide =
        0.9 * line.height_mm * f64::from(u32::try_from(line.content.len()).unwrap_or(u32::MAX));
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
    tags.xyz(
        10,
        [
            line.at[0] + along * cos - up * sin,
            line.at[1] + along * sin + up * cos,
        ],
    );
    tags.real(40, line.height_mm)
        .put(1, &line.content)
        .fine(50, line.rotation_rad.to_degrees())
        .put(7, "Standard");
    if !plain {
        tags.put(72, line.across as u8).xyz(11, line.at);
    }
    tags.put(100, "AcDbText");
    if !plain && line.up != Up::Baseline {
        tags.put(73, line.up as u8);
    }
}

fn hatch(tags: &mut Tags, outline: &[Xy], spacing_mm: Option<f64>) {
    tags.xyz(10, [0.0, 0.0])
        .real(210, 0.0)
        .real(220, 0.0)
        .real(230, 1.0);
    tags.put(
        2,
        if spacing_mm.is_some() {
            "ANSI31"
        } else {
            "SOLID"
        },
    );
    tags.put(70, i32::from(spacing_mm.is_none()))
        .put(71, 0)
        .put(91, 1);
    tags.put(92, 3).put(72, 0).put(73, 1).put(93, outline.len());
    for at in outline {
        tags.xy(10, *at);
    }
    tags.put(97, 0).put(75, 1).put(76, 1);
    if let Some(spacing_mm) = spacing_mm {
        let step = spacing_mm * std::f64::consts::FRAC_1_SQRT_2;
        tags.real(52, 0.0)
            .real(41, spacing_mm / 3.175)
            .put(77, 0)
            .put(78, 1);
        tags.real(53, 45.0)
            .real(43, 0.0)
            .real(44, 0.0)
            .real(45, -step)
            .real(46, step)
            .put(79, 0);
    }
    tags.put(98, 1)
        .xy(10, outline.first().copied().unwrap_or_default());
}

fn viewport(tags: &mut Tags, id: u8, at: Xy, size: Xy, middle: Xy, high_mm: f64) {
    tags.xyz(10, at)
        .real(40, size[0])
        .real(41, size[1])
        .put(68, id)
        .put(69, id);
    tags.xy(12, middle)
        .xy(13, [0.0, 0.0])
        .xy(14, [10.0, 10.0])
        .xy(15, [10.0, 10.0]);
    tags.xy(16, [0.0, 0.0])
        .real(36, 1.0)
        .xyz(17, [0.0, 0.0])
        .real(42, 50.0)
        .real(43, 0.0)
        .real(44, 0.0);
    tags.real(45, high_mm)
        .real(50, 0.0)
        .real(51, 0.0)
        .put(72, 1000)
        .put(90, 32864)
        .put(1, "");
    tags.put(281, 0)
        .put(71, 1)
        .put(74, 0)
        .xyz(110, [0.0, 0.0])
        .xyz(111, [1.0, 0.0])
        .xyz(112, [0.0, 1.0]);
    tags.put(79, 0).real(146, 0.0).put(170, 0);
}

/// Text in paragraphs; `corner` says which corner or side `at` is, 1 upper left, 4 middle left.
fn paragraphs(tags: &mut Tags, at: Xy, [height_mm, wide_mm]: [f64; 2], corner: u8, content: &str) {
    tags.xyz(10, at)
        .real(40, height_mm)
        .real(41, wide_mm)
        .put(71, corner)
        .put(72, 1);
    tags.put(1, content).put(7, "Standard");
}

fn dimension(tags: &mut Tags, measure: &Measure) {
    let [from, to] = measure.measured;
    tags.put(2, &measure.block)
        .xyz(10, measure.line[1])
        .xyz(11, measure.text_at());
    tags.put(70, 33)
        .put(71, 5)
        .real(42, measure.length_mm())
        .put(1, "")
        .put(3, "Standard");
    tags.put(100, "AcDbAlignedDimension")
        .xyz(13, from)
        .xyz(14, to);
}
