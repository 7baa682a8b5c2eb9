//! Leaders and points, read from their tags: the library drops MULTILEADER, and of LEADER little is wanted.

use dxf::entities::MText;
use dxf::enums::AttachmentPoint;
use dxf::{Point, Vector};
use geo::Coord;

use super::clean::{Damage, Kept, Worn, expected};
use super::handles::parse_handle;
use super::scan::Entry;
use super::source::Source;
use super::tags::{Tag, Tags};
use super::windows::Losses;

/// Entity types that point, as the scan keeps them apart.
pub(super) const POINTING_TYPES: [&[u8]; 4] = [b"LEADER", b"MULTILEADER", b"MLEADER", b"POINT"];

/// An entity that points, drawing units, in its own block's axes.
#[derive(Debug, Clone)]
pub(super) struct Pointing {
    /// Number of its layer.
    pub(super) layer: u32,
    /// Handle, or `#` and its number.
    pub(super) handle: String,
    /// Colour and linetype as written.
    pub(super) worn: Worn,
    /// What it is.
    pub(super) what: What,
}

impl Pointing {
    /// Bytes that a copy of it may take beyond what any entity does: its arrows and tails, the characters of its text.
    pub(super) fn weight(&self) -> usize {
        let What::Leader(lines) = &self.what else {
            return 0;
        };
        let text = lines.text.as_ref().map_or(0, |text| text.text.len());
        size_of::<Coord<f64>>() * (lines.arrows.len() + lines.tails.len()) + text
    }
}

/// What an entity that points is.
#[derive(Debug, Clone)]
pub(super) enum What {
    /// POINT.
    Dot(Coord<f64>),
    /// LEADER or MULTILEADER.
    Leader(Lines),
}

/// Lines of a leader and what they carry.
#[derive(Debug, Clone, Default)]
pub(super) struct Lines {
    /// Arrow tips.
    pub(super) arrows: Vec<Coord<f64>>,
    /// Ends away from the arrows.
    pub(super) tails: Vec<Coord<f64>>,
    /// Handle of the text, or of the insert whose attributes are the text, that a LEADER names.
    pub(super) annotation: Option<String>,
    /// Text that a MULTILEADER holds itself.
    pub(super) text: Option<Box<MText>>,
}

/// Reads entities that point, in order; damaged ones go to `losses`.
pub(super) fn pointings<'e>(
    source: &Source,
    entries: impl IntoIterator<Item = &'e Entry>,
    losses: &mut Losses,
) -> Vec<Pointing> {
    let mut found = Vec::new();
    for entry in entries {
        match pointing(source, entry, losses) {
            Ok(pointing) => found.extend(pointing),
            Err(damage) => losses.damaged.push(*damage),
        }
    }
    found
}

fn pointing(
    source: &Source,
    entry: &Entry,
    losses: &mut Losses,
) -> Result<Option<Pointing>, Box<Damage>> {
    let scan = &source.scan;
    let mut record = Reader::default();
    let mut handle = None;
    let mut worn = Worn::default();
    let mut in_group = false;
    for tag in Tags::within(&source.bytes, scan.form, entry.start..entry.end).forgiving() {
        let Ok(tag) = tag else { break };
        match tag.code {
            0 if record.type_name.is_empty() => record.type_name = tag.word(),
            0 => break,
            102 => in_group = tag.word().starts_with(b"{"),
            _ if in_group || tag.code >= 1000 => {}
            5 if handle.is_none() => handle = parse_handle(tag.word()),
            6 | 60 | 62 | 420 => worn.note(&tag),
            _ => {
                let mut decode = |value: &[u8]| {
                    let (text, guessed) = scan.code_page.decode(value);
                    losses.guessed += usize::from(guessed);
                    text.into_owned()
                };
                if record.take(&tag, &mut decode).is_none() {
                    return Err(Box::new(Damage {
                        kept: Kept {
                            layer: entry.layer,
                            number: entry.number,
                            handle: handle.map(|handle| format!("{handle:X}")),
                            start: entry.start,
                            ..Kept::default()
                        },
                        type_name: String::from_utf8_lossy(record.type_name).into_owned(),
                        at: tag.start,
                        found: expected(&tag, "a finite number"),
                    }));
                }
            }
        }
    }
    Ok(record.done().map(|what| Pointing {
        layer: entry.layer,
        handle: handle.map_or_else(
            || format!("#{}", entry.number),
            |handle| format!("{handle:X}"),
        ),
        worn,
        what,
    }))
}

/// Which braces of a MULTILEADER stand open.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq)]
enum Inside {
    /// None yet; so all of a LEADER or POINT.
    #[default]
    Nothing,
    Context,
    Leader,
    Line,
    /// None any more.
    Past,
}

/// What is gathered of one record.
#[derive(Debug, Default)]
struct Reader<'a> {
    type_name: &'a [u8],
    inside: Inside,
    /// Vertices of the line at hand.
    line: Vec<[f64; 2]>,
    /// Where the lines of the leader at hand end.
    landing: Option<[f64; 2]>,
    lines: Lines,
    content: String,
    /// Values of the block's attributes, where the content is a block.
    values: Vec<String>,
    place: [f64; 2],
    block_place: Option<[f64; 2]>,
    text: MText,
}

impl<'a> Reader<'a> {
    /// Takes a group; `None` for a number that is none.
    fn take(&mut self, tag: &Tag<'a>, decode: &mut impl FnMut(&[u8]) -> String) -> Option<()> {
        match self.type_name {
            b"MULTILEADER" | b"MLEADER" => self.multi(tag, decode)?,
            _ => match tag.code {
                10 => self.line.push([tag.float()?, 0.0]),
                20 => set_y(self.line.last_mut(), tag.float()?),
                340 => {
                    let handle = parse_handle(tag.word()).filter(|&handle| handle != 0);
                    self.lines.annotation = handle.map(|handle| format!("{handle:X}"));
                }
                _ => {}
            },
        }
        Some(())
    }

    fn multi(&mut self, tag: &Tag<'a>, decode: &mut impl FnMut(&[u8]) -> String) -> Option<()> {
        match (self.inside, tag.code) {
            (Inside::Nothing, 300) if opens(tag) => self.inside = Inside::Context,
            (Inside::Context, 301) => self.inside = Inside::Past,
            (Inside::Context, 302) if opens(tag) => {
                self.inside = Inside::Leader;
                self.landing = None;
            }
            (Inside::Leader, 303) => self.inside = Inside::Context,
            (Inside::Leader, 304) if opens(tag) => {
                self.inside = Inside::Line;
                self.line.clear();
            }
            (Inside::Line, 305) => {
                self.end_line();
                self.inside = Inside::Leader;
            }
            (Inside::Line, 10) => self.line.push([tag.float()?, 0.0]),
            (Inside::Line, 20) => set_y(self.line.last_mut(), tag.float()?),
            (Inside::Leader, 10) => self.landing = Some([tag.float()?, 0.0]),
            (Inside::Leader, 20) => set_y(self.landing.as_mut(), tag.float()?),
            (Inside::Context, 304) => self.content.push_str(&decode(tag.value)),
            (Inside::Past, 302) => self.values.push(decode(tag.value)),
            (Inside::Context, code) => self.context(tag, code)?,
            _ => {}
        }
        Some(())
    }

    /// Where the text stands and how it is written (`CONTEXT_DATA` of the DXF reference).
    fn context(&mut self, tag: &Tag<'a>, code: i32) -> Option<()> {
        let text = &mut self.text;
        match code {
            41 => text.initial_text_height = tag.float()?,
            12 => self.place[0] = tag.float()?,
            22 => self.place[1] = tag.float()?,
            11 => text.extrusion_direction.x = tag.float()?,
            21 => text.extrusion_direction.y = tag.float()?,
            31 => text.extrusion_direction.z = tag.float()?,
            13 => text.x_axis_direction.x = tag.float()?,
            23 => text.x_axis_direction.y = tag.float()?,
            43 => text.reference_rectangle_width = tag.float()?,
            45 => text.line_spacing_factor = tag.float()?,
            171 => {
                text.attachment_point = match tag.integer()? {
                    2 => AttachmentPoint::TopCenter,
                    3 => AttachmentPoint::TopRight,
                    _ => AttachmentPoint::TopLeft,
                };
            }
            15 => self.block_place = Some([tag.float()?, 0.0]),
            25 => set_y(self.block_place.as_mut(), tag.float()?),
            _ => {}
        }
        Some(())
    }

    /// A leader's line is over: its first vertex is the arrow.
    fn end_line(&mut self) {
        let Some(&arrow) = self.line.first() else {
            return;
        };
        self.lines.arrows.push(coord(arrow));
        let last = self.line.last().copied().filter(|_| self.line.len() > 1);
        self.lines.tails.extend(self.landing.or(last).map(coord));
        self.line.clear();
    }

    fn done(mut self) -> Option<What> {
        if self.type_name == b"POINT" {
            return self.line.first().map(|&place| What::Dot(coord(place)));
        }
        if self.type_name == b"LEADER" {
            if self.line.len() < 2 {
                return None;
            }
            self.end_line();
            return Some(What::Leader(self.lines));
        }
        let place = if self.content.trim().is_empty() {
            self.content = self.values.join("\\P");
            self.text.attachment_point = AttachmentPoint::MiddleCenter;
            self.block_place.unwrap_or(self.place)
        } else {
            self.place
        };
        if !self.content.trim().is_empty() {
            let [x, y] = place;
            self.text.insertion_point = Point::new(x, y, 0.0);
            if self.text.extrusion_direction == Vector::new(0.0, 0.0, 0.0) {
                self.text.extrusion_direction = Vector::z_axis();
            }
            self.text.text = self.content;
            self.lines.text = Some(Box::new(self.text));
        }
        (!self.lines.arrows.is_empty() || self.lines.text.is_some())
            .then_some(What::Leader(self.lines))
    }
}

fn opens(tag: &Tag<'_>) -> bool {
    tag.word().ends_with(b"{")
}

fn set_y(place: Option<&mut [f64; 2]>, y: f64) {
    if let Some(place) = place {
        place[1] = y;
    }
}

fn coord([x, y]: [f64; 2]) -> Coord<f64> {
    Coord { x, y }
}
