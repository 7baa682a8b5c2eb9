//! How each mark is said as entities.

use geo::Coord;

use super::handles::Supply;
use super::records::{Edition, Records};
use super::words::text_value;
use crate::drawing::{Align, Drawn, Ink, Mark};

/// Metres to the drawing's units.
#[derive(Debug, Clone, Copy)]
pub(super) struct Scale {
    /// Metres in one drawing unit.
    pub(super) unit_m: f64,
}

impl Scale {
    /// A length or coordinate in drawing units, rounded to a millionth of a unit, but never more coarsely than a
    /// micrometre: figures that only swell the file are left out.
    fn units(self, metres: f64) -> f64 {
        let per_unit = if self.unit_m > 1.0 { 1e9 } else { 1e6 };
        rounded(metres / self.unit_m, per_unit)
    }
}

fn rounded(value: f64, steps: f64) -> f64 {
    let scaled = value * steps;
    // Beyond this, a number has no digits left to round off.
    if scaled.abs() < 9e15 {
        scaled.round() / steps
    } else {
        value
    }
}

/// Writes entities one after another.
#[derive(Debug)]
pub(super) struct Entities<'a> {
    /// What was written so far.
    pub(super) records: Records,
    /// Where handles come from.
    pub(super) supply: &'a mut Supply,
    /// Owner of what stands in model space, where the drawing says it.
    pub(super) model_space: Option<u64>,
    /// Metres to drawing units.
    pub(super) scale: Scale,
}

impl Entities<'_> {
    /// One mark.
    pub(super) fn mark(&mut self, mark: &Mark) {
        match &mark.drawn {
            Drawn::Line {
                points,
                width_m,
                closed,
            } => {
                if self.records.style.edition >= Edition::R14 {
                    self.light_line(mark, points, *width_m, *closed);
                } else {
                    self.heavy_line(mark, points, *width_m, *closed);
                }
            }
            Drawn::Line3d { points } => self.line_in_space(mark, points),
            Drawn::Text {
                place,
                height_m,
                rotation_rad,
                align,
                content,
            } => {
                self.head("TEXT", mark, "AcDbText");
                self.point(10, *place, 0.0);
                self.length(40, *height_m);
                let value = text_value(content, self.records.style.edition);
                self.records.text(1, &value);
                let degrees = rounded(rotation_rad.to_degrees(), 1e6);
                if degrees != 0.0 {
                    self.records.real(50, degrees);
                }
                self.alignment(*place, *align);
            }
            Drawn::Circle { centre, radius_m } => {
                self.head("CIRCLE", mark, "AcDbCircle");
                self.point(10, *centre, 0.0);
                self.length(40, *radius_m);
            }
            Drawn::Solid {
                corners: [a, b, c, d],
            } => {
                self.head("SOLID", mark, "AcDbTrace");
                // DXF names the corners across: the third stands opposite the second's neighbour.
                for (code, corner) in (10..).zip([a, b, d, c]) {
                    self.point(code, *corner, 0.0);
                }
            }
        }
    }

    /// The end of a sequence that the drawing left open, so that the marks after it are no part of it.
    pub(super) fn end_open_sequence(&mut self) {
        let handle = self.supply.take();
        self.common("SEQEND", handle, self.model_space, "0", None);
    }

    fn light_line(&mut self, mark: &Mark, points: &[Coord<f64>], width_m: f64, closed: bool) {
        self.head("LWPOLYLINE", mark, "AcDbPolyline");
        self.records
            .long(90, i32::try_from(points.len()).unwrap_or(i32::MAX));
        self.records.short(70, i16::from(closed));
        if width_m > 0.0 {
            self.length(43, width_m);
        }
        for point in points {
            self.length(10, point.x);
            self.length(20, point.y);
        }
    }

    fn heavy_line(&mut self, mark: &Mark, points: &[Coord<f64>], width_m: f64, closed: bool) {
        let owner = self.head("POLYLINE", mark, "AcDb2dPolyline");
        self.records.short(66, 1);
        self.point(10, Coord::zero(), 0.0);
        self.records.short(70, i16::from(closed));
        if width_m > 0.0 {
            self.length(40, width_m);
            self.length(41, width_m);
        }
        for point in points {
            self.vertex(mark, owner, "AcDb2dVertex");
            self.point(10, *point, 0.0);
            if width_m > 0.0 {
                self.length(40, width_m);
                self.length(41, width_m);
            }
        }
        self.sequence_end(mark, owner);
    }

    fn line_in_space(&mut self, mark: &Mark, points: &[[f64; 3]]) {
        let owner = self.head("POLYLINE", mark, "AcDb3dPolyline");
        self.records.short(66, 1);
        self.point(10, Coord::zero(), 0.0);
        self.records.short(70, 8);
        for &[x, y, level] in points {
            self.vertex(mark, owner, "AcDb3dPolylineVertex");
            self.point(10, Coord { x, y }, level);
            self.records.short(70, 32);
        }
        self.sequence_end(mark, owner);
    }

    fn vertex(&mut self, mark: &Mark, owner: Option<u64>, kind: &str) {
        let handle = self.supply.take();
        self.common("VERTEX", handle, owner, &mark.layer, None);
        self.marker("AcDbVertex");
        self.marker(kind);
    }

    fn sequence_end(&mut self, mark: &Mark, owner: Option<u64>) {
        let handle = self.supply.take();
        self.common("SEQEND", handle, owner, &mark.layer, None);
    }

    fn alignment(&mut self, place: Coord<f64>, align: Align) {
        let across = match align {
            Align::Left => {
                self.marker("AcDbText");
                return;
            }
            Align::MiddleLeft => 0,
            Align::Middle => 1,
            Align::MiddleRight => 2,
        };
        self.records.short(72, across);
        self.point(11, place, 0.0);
        self.marker("AcDbText");
        self.records.short(73, 2);
    }

    fn head(&mut self, name: &str, mark: &Mark, subclass: &str) -> Option<u64> {
        let handle = self.supply.take();
        self.common(name, handle, self.model_space, &mark.layer, mark.ink);
        self.marker(subclass);
        handle
    }

    fn common(
        &mut self,
        name: &str,
        handle: Option<u64>,
        owner: Option<u64>,
        layer: &str,
        ink: Option<Ink>,
    ) {
        self.records.text(0, name);
        self.records.handle(5, handle);
        if self.records.style.edition >= Edition::R2000 {
            self.records.handle(330, owner);
        }
        self.marker("AcDbEntity");
        self.records.text(8, layer);
        if let Some(ink) = ink {
            colour(&mut self.records, ink, true);
        }
    }

    fn marker(&mut self, subclass: &str) {
        if self.records.style.edition >= Edition::R13 {
            self.records.text(100, subclass);
        }
    }

    fn length(&mut self, code: i16, metres: f64) {
        let value = self.scale.units(metres);
        self.records.real(code, value);
    }

    fn point(&mut self, code: i16, place: Coord<f64>, level_m: f64) {
        self.length(code, place.x);
        self.length(code + 10, place.y);
        self.length(code + 20, level_m);
    }
}

/// A colour's tags: the index, negative for a layer that is off, and the true colour where the edition has it.
pub(super) fn colour(records: &mut Records, ink: Ink, on: bool) {
    let index = i16::from(ink.index.max(1));
    records.short(62, if on { index } else { -index });
    if let Some([red, green, blue]) = ink.rgb
        && records.style.edition >= Edition::R2004
    {
        records.long(420, i32::from_be_bytes([0, red, green, blue]));
    }
}

/// Whether a mark shows anything.
pub(super) fn shows(drawn: &Drawn) -> bool {
    match drawn {
        Drawn::Line { points, .. } => points.len() > 1,
        Drawn::Line3d { points } => points.len() > 1,
        Drawn::Text {
            height_m, content, ..
        } => *height_m > 0.0 && !content.trim().is_empty(),
        Drawn::Circle { radius_m, .. } => *radius_m > 0.0,
        Drawn::Solid { .. } => true,
    }
}

/// Whether every number of a mark is one.
pub(super) fn is_finite(drawn: &Drawn) -> bool {
    let placed = |at: &Coord<f64>| at.x.is_finite() && at.y.is_finite();
    match drawn {
        Drawn::Line {
            points, width_m, ..
        } => points.iter().all(placed) && width_m.is_finite(),
        Drawn::Line3d { points } => points.iter().flatten().all(|number| number.is_finite()),
        Drawn::Text {
            place,
            height_m,
            rotation_rad,
            ..
        } => placed(place) && height_m.is_finite() && rotation_rad.is_finite(),
        Drawn::Circle { centre, radius_m } => placed(centre) && radius_m.is_finite(),
        Drawn::Solid { corners } => corners.iter().all(placed),
    }
}

/// How many handles a mark takes up.
pub(super) fn handles_of(drawn: &Drawn, edition: Edition) -> u64 {
    let with_vertices = |count: usize| u64::try_from(count).unwrap_or(u64::MAX).saturating_add(2);
    if !shows(drawn) {
        return 0;
    }
    match drawn {
        Drawn::Line { points, .. } if edition < Edition::R14 => with_vertices(points.len()),
        Drawn::Line3d { points } => with_vertices(points.len()),
        _ => 1,
    }
}
