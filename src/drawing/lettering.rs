//! Where a text stands and how much room it takes; widths are estimated, since fonts are not in the drawing.

use dxf::entities::{Attribute, MText, Text as DxfText};
use dxf::enums::{AttachmentPoint, HorizontalTextJustification, VerticalTextJustification};
use dxf::{Point, Vector};
use geo::Coord;

use super::placing::Placing;
use super::text_decode::{text_line, text_lines};

/// Width of a character in heights of a capital: common practice for estimates of drafting fonts.
const CHARACTER_WIDTH: f64 = 0.62;
/// Distance of MTEXT lines in heights, at a spacing factor of one (5/3 by the DXF reference, less the usual gap).
const LINE_DISTANCE: f64 = 1.6;

/// A text in the plan, metres.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Lettering {
    pub(super) content: String,
    pub(super) place: Coord<f64>,
    pub(super) corners: [Coord<f64>; 4],
    pub(super) height_m: f64,
    pub(super) rotation_rad: f64,
}

/// Box of a text in its own frame: along the base line, and up from it, from the place.
struct Box4 {
    left: f64,
    right: f64,
    bottom: f64,
    top: f64,
}

/// The frame a text is written in.
struct Frame {
    place: Coord<f64>,
    along: Coord<f64>,
    up: Coord<f64>,
    height: f64,
    /// How far the letters lean along the line for each unit up.
    slant: f64,
}

impl Frame {
    fn letter(&self, content: String, room: &Box4, placing: &Placing) -> Lettering {
        let corner = |u: f64, v: f64| {
            placing.place(self.place + self.along * (u + self.slant * v) + self.up * v)
        };
        let along = placing.carry(self.along);
        let up = placing.carry(self.up);
        Lettering {
            content,
            place: placing.place(self.place),
            corners: [
                corner(room.left, room.bottom),
                corner(room.right, room.bottom),
                corner(room.right, room.top),
                corner(room.left, room.top),
            ],
            height_m: self.height * up.x.hypot(up.y),
            rotation_rad: along.y.atan2(along.x),
        }
    }
}

/// The groups that TEXT and attributes share.
struct OneLine<'a> {
    content: String,
    insertion: &'a Point,
    alignment: &'a Point,
    height: f64,
    width_factor: f64,
    rotation_deg: f64,
    oblique_deg: f64,
    /// 2: written backward, 4: upside down.
    generation: i32,
    horizontal: HorizontalTextJustification,
    vertical: VerticalTextJustification,
    normal: &'a Vector,
}

/// A TEXT in the plan.
pub(super) fn of_text(text: &DxfText, placing: &Placing) -> Lettering {
    one_line(
        OneLine {
            content: text_line(&text.value),
            insertion: &text.location,
            alignment: &text.second_alignment_point,
            height: text.text_height,
            width_factor: text.relative_x_scale_factor,
            rotation_deg: text.rotation,
            oblique_deg: text.oblique_angle,
            generation: text.text_generation_flags,
            horizontal: text.horizontal_text_justification,
            vertical: text.vertical_text_justification,
            normal: &text.normal,
        },
        placing,
    )
}

/// An attribute's value in the plan.
pub(super) fn of_attribute(attribute: &Attribute, placing: &Placing) -> Lettering {
    one_line(
        OneLine {
            content: attribute_content(&attribute.value),
            insertion: &attribute.location,
            alignment: &attribute.second_alignment_point,
            height: attribute.text_height,
            width_factor: attribute.relative_x_scale_factor,
            rotation_deg: attribute.rotation,
            oblique_deg: attribute.oblique_angle,
            generation: attribute.text_generation_flags,
            horizontal: attribute.horizontal_text_justification,
            vertical: attribute.vertical_text_justification,
            normal: &attribute.normal,
        },
        placing,
    )
}

/// What an attribute says: a line, or lines where it was written as such.
pub(super) fn attribute_content(raw: &str) -> String {
    // Attributes of several lines, and those that were typed in an editor of such, are written as MTEXT.
    if ["\\P", "{\\", "\\S", "\\A"]
        .iter()
        .any(|code| raw.contains(code))
    {
        text_lines(raw)
    } else {
        text_line(raw)
    }
}

fn one_line(text: OneLine<'_>, placing: &Placing) -> Lettering {
    use HorizontalTextJustification as H;
    use VerticalTextJustification as V;
    let content = text.content;
    let height = text.height;
    let factor = if text.width_factor > 0.0 {
        text.width_factor
    } else {
        1.0
    };
    let mut width = CHARACTER_WIDTH * height * factor * characters(&content);
    let mut rotation_rad = text.rotation_deg.to_radians();
    let insertion = flat(text.insertion);
    let alignment = flat(text.alignment);
    let stretched = matches!(text.horizontal, H::Aligned | H::Fit);
    if stretched {
        let across = alignment - insertion;
        let length = across.x.hypot(across.y);
        if length > 0.0 {
            (width, rotation_rad) = (length, across.y.atan2(across.x));
        }
    }
    let plain = text.horizontal == H::Left && text.vertical == V::Baseline;
    let place = if plain || stretched {
        insertion
    } else {
        alignment
    };
    let left = match text.horizontal {
        H::Left | H::Aligned | H::Fit => 0.0,
        H::Center | H::Middle => -width / 2.0,
        H::Right => -width,
    };
    let bottom = match (text.horizontal, text.vertical) {
        (H::Middle, _) | (_, V::Middle) => -height / 2.0,
        (_, V::Top) => -height,
        _ => 0.0,
    };
    let (sin, cos) = rotation_rad.sin_cos();
    let mirrored = |flag: i32| {
        if text.generation & flag == 0 {
            1.0
        } else {
            -1.0
        }
    };
    let frame = Frame {
        place,
        along: Coord { x: cos, y: sin } * mirrored(2),
        up: Coord { x: -sin, y: cos } * mirrored(4),
        height,
        slant: slant(text.oblique_deg),
    };
    let room = Box4 {
        left,
        right: left + width,
        bottom,
        top: bottom + height,
    };
    let plane = Placing::extruded(normal(text.normal), text.insertion.z);
    frame.letter(content, &room, &placing.after(&plane))
}

/// How a text style shapes its letters.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Style {
    /// Width of a letter over its usual width.
    pub(super) width_factor: f64,
    /// How far letters lean from upright, degrees.
    pub(super) oblique_deg: f64,
}

impl Default for Style {
    fn default() -> Self {
        Self {
            width_factor: 1.0,
            oblique_deg: 0.0,
        }
    }
}

/// Letters lean by 85 degrees at most, as the DXF reference allows.
fn slant(oblique_deg: f64) -> f64 {
    let turned = (oblique_deg + 180.0).rem_euclid(360.0) - 180.0;
    turned.clamp(-85.0, 85.0).to_radians().tan()
}

/// An MTEXT in the plan, in a text style; TEXT carries its style's width and lean itself. Its place and direction are in world axes already.
pub(super) fn of_mtext(text: &MText, style: Style, placing: &Placing) -> Lettering {
    use AttachmentPoint as A;
    let mut raw: String = text.extended_text.concat();
    raw.push_str(&text.text);
    let content = text_lines(&raw);
    let height = text.initial_text_height;
    let factor = if style.width_factor > 0.0 {
        style.width_factor
    } else {
        1.0
    };
    let width_of = |text: &str| characters(text) * CHARACTER_WIDTH * height * factor;
    let natural = content.lines().map(width_of).fold(0.0, f64::max);
    let longest_word = content.split_whitespace().map(width_of).fold(0.0, f64::max);
    let column = text.reference_rectangle_width;
    let width = if column > 0.0 {
        natural.min(column.max(longest_word))
    } else {
        natural
    };
    let lines_of = |line: &str| (width_of(line) / width).ceil().clamp(1.0, 1000.0);
    let lines: f64 = content.lines().map(lines_of).sum();
    let spacing = if text.line_spacing_factor > 0.0 {
        text.line_spacing_factor
    } else {
        1.0
    };
    let depth = height * (1.0 + (lines - 1.0).max(0.0) * LINE_DISTANCE * spacing);
    let left = match text.attachment_point {
        A::TopLeft | A::MiddleLeft | A::BottomLeft => 0.0,
        A::TopCenter | A::MiddleCenter | A::BottomCenter => -width / 2.0,
        A::TopRight | A::MiddleRight | A::BottomRight => -width,
    };
    let bottom = match text.attachment_point {
        A::TopLeft | A::TopCenter | A::TopRight => -depth,
        A::MiddleLeft | A::MiddleCenter | A::MiddleRight => -depth / 2.0,
        A::BottomLeft | A::BottomCenter | A::BottomRight => 0.0,
    };
    let normal = normal(&text.extrusion_direction);
    let given = Coord {
        x: text.x_axis_direction.x,
        y: text.x_axis_direction.y,
    };
    let length = given.x.hypot(given.y);
    let along = if text.rotation_angle == 0.0 && length > 0.0 {
        given / length
    } else {
        let (sin, cos) = text.rotation_angle.to_radians().sin_cos();
        Placing::extruded(normal, 0.0).carry(Coord { x: cos, y: sin })
    };
    let side = if normal[2] < 0.0 { -1.0 } else { 1.0 };
    let frame = Frame {
        place: flat(&text.insertion_point),
        along,
        up: Coord {
            x: -along.y * side,
            y: along.x * side,
        },
        height,
        slant: slant(style.oblique_deg),
    };
    let room = Box4 {
        left,
        right: left + width,
        bottom,
        top: bottom + depth,
    };
    frame.letter(content, &room, placing)
}

#[expect(clippy::cast_precision_loss, reason = "characters of one line")]
fn characters(line: &str) -> f64 {
    line.chars().count() as f64
}

fn flat(point: &Point) -> Coord<f64> {
    Coord {
        x: point.x,
        y: point.y,
    }
}

pub(super) fn normal(vector: &Vector) -> [f64; 3] {
    [vector.x, vector.y, vector.z]
}
