//! Records in their places: shapes and texts of model space, and of blocks wherever they are inserted.

mod book;
mod inserts;
mod pointing;
mod telling;

use std::collections::{BTreeMap, BTreeSet};

use dxf::entities::EntityType;

use super::answers::Answers;
use super::caps::Expansion;
use super::convert::{TOO_FAR, is_near, line_of};
use super::leaders::Pointing;
use super::lettering::{Lettering, of_mtext, of_text};
use super::looks::Looks;
use super::placing::Placing;
use super::windows::Record;
use super::{Drawing, Look, Shape, Text};
use crate::finding::{Finding, Level, Rule};
use crate::geometry::Segment;

pub(super) use book::Book;
use telling::unseen;
pub(super) use telling::{MOST_TOLD, and_more};

/// Bytes of a plan line's piece.
const PIECE: usize = size_of::<Segment>();

/// Where a record is placed.
#[derive(Debug, Clone, Copy)]
struct Frame<'f> {
    placing: Placing,
    /// Handle of the outermost insert; `None` in model space.
    handle: Option<&'f str>,
    /// Layer of the insert, which layer 0 of its block takes.
    layer: Option<u32>,
    /// How the insert is seen, which what is by block takes.
    look: Look,
    /// The innermost insert among those of the drawing.
    within: Option<usize>,
    /// Number of the placed block, 0 for model space: handles hold within it.
    expansion: usize,
}

/// What a shape, text or insert belongs to, and how it is seen.
#[derive(Debug, Clone, Copy)]
struct Place {
    layer: u32,
    look: Look,
    within: Option<usize>,
    /// Whether room was taken for it when the layers were counted.
    counted: bool,
}

/// Gathers what the records hold.
#[derive(Debug)]
pub(super) struct Gatherer<'b> {
    book: &'b Book<'b>,
    /// Colours and linetypes.
    looks: Looks<'b>,
    unit: Placing,
    zero_layer: Option<u32>,
    drawing: Drawing,
    findings: Vec<Finding>,
    /// Entities of model space that are not shown.
    unseen: usize,
    expansion: Expansion,
    open: Vec<usize>,
    told: BTreeSet<(&'static str, usize)>,
    /// By rule: how grave it is, and how often it speaks.
    spoken: BTreeMap<&'static str, (&'static Rule, Level, usize)>,
    answers: Answers,
    expansions: usize,
}

impl<'b> Gatherer<'b> {
    /// An empty drawing with this unit.
    pub(super) fn new(
        book: &'b Book<'b>,
        looks: Looks<'b>,
        answers: Answers,
        unit_m: f64,
        expansion: Expansion,
    ) -> Self {
        Self {
            book,
            looks,
            unit: Placing::scaled(unit_m),
            zero_layer: book.layers.get("0").copied(),
            drawing: Drawing::default(),
            findings: Vec::new(),
            unseen: 0,
            expansion,
            open: Vec::new(),
            told: BTreeSet::new(),
            spoken: BTreeMap::new(),
            answers,
            expansions: 0,
        }
    }

    /// What was gathered, and what was left out.
    pub(super) fn finish(self) -> (Drawing, Vec<Finding>) {
        let mut drawing = self.drawing;
        drawing.linetypes = self.looks.linetypes;
        let mut findings = self.findings;
        let spoken = self.spoken.into_values();
        findings.extend(spoken.filter_map(|(rule, level, count)| and_more(rule, level, count)));
        findings.extend(unseen(self.unseen));
        (drawing, findings)
    }

    /// Takes a record of model space.
    pub(super) fn take(&mut self, record: &Record) {
        self.place(record, &self.model_space());
    }

    /// Takes a leader or point of model space; the texts that leaders name come before.
    pub(super) fn take_pointing(&mut self, pointing: &Pointing) {
        self.point(pointing, &self.model_space());
    }

    fn model_space(&self) -> Frame<'static> {
        Frame {
            placing: self.unit,
            handle: None,
            layer: None,
            look: Looks::outermost(),
            within: None,
            expansion: 0,
        }
    }

    fn place(&mut self, record: &Record, frame: &Frame<'_>) {
        let before = self.drawing.texts.len();
        self.place_alone(record, frame);
        let texts = before..self.drawing.texts.len();
        self.answers
            .note(frame.expansion, record.kept.handle.as_deref(), texts);
    }

    fn place_alone(&mut self, record: &Record, frame: &Frame<'_>) {
        let own = own_handle(record);
        let handle = frame.handle.unwrap_or(&own);
        let layer = self.layer_in(record.kept.layer, frame.layer);
        if record.kept.worn.invisible {
            self.invisible(layer, frame);
            return;
        }
        if let EntityType::Insert(insert) = &record.entity {
            self.insert(record, insert, layer, handle, frame);
            return;
        }
        if !self.book.wants(layer) {
            return;
        }
        let worn = Place {
            layer,
            look: self.looks.seen(&record.kept.worn, layer, frame.look),
            within: frame.within,
            counted: frame.handle.is_none(),
        };
        match &record.entity {
            EntityType::Text(text) => {
                self.text(of_text(text, &frame.placing), worn, handle, false);
            }
            EntityType::MText(text) => {
                let style = self.book.style(&text.text_style_name);
                let lettering = of_mtext(text, style, &frame.placing);
                self.text(lettering, worn, handle, false);
            }
            _ => match line_of(record, &frame.placing) {
                Ok(Some(line))
                    if !self.afford(worn, handle, line.path.segments().len() * PIECE) => {}
                Ok(Some(line)) => self.drawing.shapes.push(Shape {
                    handle: handle.to_owned(),
                    layer: self.book.layer_name(layer).to_owned(),
                    look: worn.look,
                    within: worn.within,
                    kind: line.kind,
                    path: line.path,
                    closed: line.closed,
                }),
                Ok(None) => {}
                Err(reason) => self.damaged(layer, handle, reason),
            },
        }
    }

    fn layer_in(&self, layer: u32, inherited: Option<u32>) -> u32 {
        if Some(layer) == self.zero_layer {
            inherited.unwrap_or(layer)
        } else {
            layer
        }
    }

    fn text(&mut self, lettering: Lettering, place: Place, handle: &str, hidden: bool) {
        if lettering.content.trim().is_empty() {
            return;
        }
        let sound = lettering.height_m.is_finite() && lettering.rotation_rad.is_finite();
        if !sound || !is_near(lettering.corners.into_iter().chain([lettering.place])) {
            self.damaged(place.layer, handle, TOO_FAR);
            return;
        }
        if !self.afford(place, handle, lettering.content.len()) {
            return;
        }
        self.drawing.texts.push(Text {
            handle: handle.to_owned(),
            layer: self.book.layer_name(place.layer).to_owned(),
            look: place.look,
            within: place.within,
            content: lettering.content,
            place: lettering.place,
            corners: lettering.corners,
            height_m: lettering.height_m,
            rotation_rad: lettering.rotation_rad,
            hidden,
        });
    }
}

/// A record's handle, or `#` and its number.
fn own_handle(record: &Record) -> String {
    let kept = &record.kept;
    kept.handle
        .clone()
        .unwrap_or_else(|| format!("#{}", kept.number))
}
