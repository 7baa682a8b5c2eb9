//! Records in their places: shapes and texts of model space, and of blocks wherever they are inserted.

use std::collections::{BTreeMap, BTreeSet};

use dxf::entities::{EntityType, Insert as DxfInsert};
use geo::Coord;

use super::answers::Answers;
use super::caps::Expansion;
use super::clean::NOWHERE;
use super::convert::{TOO_FAR, is_near, line_of};
use super::leaders::{Pointing, What};
use super::lettering::{Style, attribute_content, normal, of_attribute, of_mtext, of_text};
use super::looks::Looks;
use super::placing::Placing;
use super::rules::{
    BLOCK_IN_ITSELF, BLOCK_MISSING, BLOCK_TOO_DEEP, BLOCK_TOO_MANY, ENTITY_DAMAGED,
    ENTITY_INVISIBLE,
};
use super::scan::Scan;
use super::windows::Record;
use super::{Dot, Drawing, Insert, Leader, Look, Shape, Text};
use crate::finding::{Finding, Level, Rule};
use crate::patterns::folded;

/// Blocks inside blocks, at most.
const DEEPEST: usize = 32;
/// Findings of one rule that are told one by one; of the rest only the number is.
pub(super) const MOST_TOLD: usize = 20;

/// What is known of blocks and layers before any record is placed.
#[derive(Debug)]
pub(super) struct Book<'s> {
    pub(super) scan: &'s Scan,
    /// By layer number: whether it is read.
    pub(super) wanted: Vec<bool>,
    /// By number of a block's name: the block's number.
    pub(super) block_of_name: Vec<Option<usize>>,
    /// By block number: whether it holds entities on layers that are read, itself or through its inserts.
    pub(super) holds_wanted: Vec<bool>,
    /// By block number: its records.
    pub(super) records: Vec<Vec<Record>>,
    /// By block number: its leaders and points.
    pub(super) pointing: Vec<Vec<Pointing>>,
    /// Layer numbers by folded name.
    pub(super) layers: BTreeMap<String, u32>,
}

impl Book<'_> {
    fn wants(&self, layer: u32) -> bool {
        self.wanted.get(layer as usize).copied().unwrap_or(false)
    }

    fn layer_name(&self, layer: u32) -> String {
        let layer = self.scan.layers.get(layer as usize);
        layer.map_or_else(|| "0".to_owned(), |layer| layer.name.clone())
    }

    fn block_name(&self, name: u32) -> &str {
        let name = self.scan.block_names.get(name as usize);
        name.map_or("", String::as_str)
    }

    fn block(&self, name: u32) -> Option<usize> {
        self.block_of_name.get(name as usize).copied().flatten()
    }

    fn style(&self, name: &str) -> Style {
        let name = folded(&super::text_decode::plain_name(name));
        self.scan.styles.get(&name).copied().unwrap_or_default()
    }

    /// The number of a layer by its bytes.
    fn layer_id(&self, raw: &[u8]) -> Option<u32> {
        let (name, _) = self.scan.code_page.decode(raw);
        let name = super::text_decode::plain_name(&name);
        self.layers.get(&folded(&name)).copied()
    }
}

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
                Ok(Some(line)) => self.drawing.shapes.push(Shape {
                    handle: handle.to_owned(),
                    layer: self.book.layer_name(layer),
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

    /// Leaves out what is not shown. Blocks keep the parts of their other states so, which nobody misses.
    fn invisible(&mut self, layer: u32, frame: &Frame<'_>) {
        if frame.handle.is_none() && self.book.wants(layer) {
            self.unseen += 1;
        }
    }

    fn damaged(&mut self, layer: u32, handle: &str, reason: &str) {
        let layer = self.book.layer_name(layer);
        self.say(&ENTITY_DAMAGED, Level::Error, || {
            (
                format!("entity {handle} on layer {layer} is left out: {reason}"),
                "redraw the entity, or export the drawing again".to_owned(),
            )
        });
    }

    fn layer_in(&self, layer: u32, inherited: Option<u32>) -> u32 {
        if Some(layer) == self.zero_layer {
            inherited.unwrap_or(layer)
        } else {
            layer
        }
    }

    fn text(
        &mut self,
        lettering: super::lettering::Lettering,
        place: Place,
        handle: &str,
        hidden: bool,
    ) {
        if lettering.content.trim().is_empty() {
            return;
        }
        let sound = lettering.height_m.is_finite() && lettering.rotation_rad.is_finite();
        if !sound || !is_near(lettering.corners.into_iter().chain([lettering.place])) {
            self.damaged(place.layer, handle, TOO_FAR);
            return;
        }
        self.drawing.texts.push(Text {
            handle: handle.to_owned(),
            layer: self.book.layer_name(place.layer),
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

    fn insert(
        &mut self,
        record: &Record,
        insert: &DxfInsert,
        layer: u32,
        handle: &str,
        frame: &Frame<'_>,
    ) {
        let block = self.book.block(record.kept.block);
        let wanted = self.book.wants(layer);
        let look = self.looks.seen(&record.kept.worn, layer, frame.look);
        let seen = Place {
            layer,
            look,
            // The insert itself, if it is kept, is the next one.
            within: wanted
                .then_some(self.drawing.inserts.len())
                .or(frame.within),
        };
        self.attributes(record, insert, seen, handle, frame);
        let holds = block.is_some_and(|block| self.book.holds_wanted.get(block) == Some(&true));
        if !wanted && !holds {
            return;
        }
        if wanted && block.is_none() {
            self.missing(record, handle);
        }
        let plane = Placing::extruded(normal(&insert.extrusion_direction), insert.location.z);
        let plane = frame.placing.after(&plane);
        let rotation_rad = insert.rotation.to_radians();
        let attributes: Vec<(String, String)> = insert
            .attributes()
            .map(|a| {
                (
                    a.attribute_tag.trim().to_owned(),
                    attribute_content(&a.value),
                )
            })
            .collect();
        let weight: usize = attributes
            .iter()
            .map(|(tag, value)| 64 + tag.len() + value.len())
            .sum();
        for row in 0..insert.row_count.max(1) {
            for column in 0..insert.column_count.max(1) {
                if !self.spend(handle, weight) {
                    return;
                }
                let step = Coord {
                    x: f64::from(column) * insert.column_spacing,
                    y: f64::from(row) * insert.row_spacing,
                };
                let cell = plane
                    .after(&Placing::shifted(insert.location.x, insert.location.y))
                    .after(&Placing::turned(rotation_rad))
                    .after(&Placing::shifted(step.x, step.y));
                if !is_near([cell.place(Coord { x: 0.0, y: 0.0 })]) {
                    self.damaged(layer, handle, TOO_FAR);
                    return;
                }
                if wanted {
                    let along = cell.carry(Coord { x: 1.0, y: 0.0 });
                    self.drawing.inserts.push(Insert {
                        handle: handle.to_owned(),
                        layer: self.book.layer_name(layer),
                        look,
                        within: frame.within,
                        block: self.book.block_name(record.kept.block).to_owned(),
                        place: cell.place(Coord { x: 0.0, y: 0.0 }),
                        rotation_rad: along.y.atan2(along.x),
                        attributes: attributes.clone(),
                    });
                }
                let Some(block) = block else { continue };
                let [base_x, base_y] = self
                    .book
                    .scan
                    .blocks
                    .get(block)
                    .map_or([0.0; 2], |b| b.base);
                let placing = cell
                    .after(&Placing::stretched(
                        insert.x_scale_factor,
                        insert.y_scale_factor,
                    ))
                    .after(&Placing::shifted(-base_x, -base_y));
                self.expansions += 1;
                let inside = Frame {
                    placing,
                    handle: Some(handle),
                    layer: Some(layer),
                    look,
                    within: if wanted {
                        self.drawing.inserts.len().checked_sub(1)
                    } else {
                        frame.within
                    },
                    expansion: self.expansions,
                };
                self.block(block, &inside, handle);
            }
        }
    }

    /// Says that an insert's block is not there.
    fn missing(&mut self, record: &Record, handle: &str) {
        let number = record.kept.block;
        let name = self.book.block_name(number);
        let text = format!("insert {handle} names block {name}, which the drawing does not define");
        self.tell(&BLOCK_MISSING, Level::Note, number as usize, || {
            (
                text,
                "bind or purge the reference, unless only its place matters".to_owned(),
            )
        });
    }

    /// Places a block's records.
    fn block(&mut self, block: usize, inside: &Frame<'_>, handle: &str) {
        let book = self.book;
        let name = book.scan.blocks.get(block).map_or("", |b| b.name.as_str());
        if self.open.contains(&block) {
            self.tell(&BLOCK_IN_ITSELF, Level::Warning, block, || {
                (
                    format!("block {name} inserts itself (insert {handle}); the inner insert is left out"),
                    "redefine the block without the insert of itself".to_owned(),
                )
            });
            return;
        }
        if self.open.len() >= DEEPEST {
            self.tell(&BLOCK_TOO_DEEP, Level::Warning, 0, || {
                (
                    format!("insert {handle} holds blocks more than {DEEPEST} deep (at block {name}); what lies deeper is left out"),
                    "explode the innermost blocks".to_owned(),
                )
            });
            return;
        }
        let Some(records) = book.records.get(block) else {
            return;
        };
        self.open.push(block);
        for record in records {
            if !self.spend(handle, record.weight()) {
                break;
            }
            self.place(record, inside);
        }
        for pointing in book.pointing.get(block).into_iter().flatten() {
            if !self.spend(handle, pointing.weight()) {
                break;
            }
            self.point(pointing, inside);
        }
        self.open.pop();
    }

    fn point(&mut self, pointing: &Pointing, frame: &Frame<'_>) {
        let layer = self.layer_in(pointing.layer, frame.layer);
        let handle = frame.handle.unwrap_or(&pointing.handle);
        let wanted = self.book.wants(layer);
        if pointing.worn.invisible {
            self.invisible(layer, frame);
            return;
        }
        let seen = Place {
            layer,
            look: self.looks.seen(&pointing.worn, layer, frame.look),
            within: frame.within,
        };
        match &pointing.what {
            What::Dot(place) if wanted => self.drawing.dots.push(Dot {
                handle: handle.to_owned(),
                layer: self.book.layer_name(layer),
                look: seen.look,
                place: frame.placing.place(*place),
            }),
            What::Dot(_) => {}
            What::Leader(lines) => {
                let named = lines.annotation.as_deref();
                let mut texts: Vec<usize> = self.answers.of(frame.expansion, named).collect();
                if let Some(text) = &lines.text {
                    if !wanted {
                        return;
                    }
                    texts.push(self.drawing.texts.len());
                    let lettering = of_mtext(text, Style::default(), &frame.placing);
                    self.text(lettering, seen, handle, false);
                    texts.retain(|&text| text < self.drawing.texts.len());
                }
                let placed = |places: &[Coord<f64>]| {
                    let places = places.iter().map(|&place| frame.placing.place(place));
                    places.collect()
                };
                self.drawing.leaders.push(Leader {
                    handle: handle.to_owned(),
                    layer: self.book.layer_name(layer),
                    look: seen.look,
                    arrows: placed(&lines.arrows),
                    tails: placed(&lines.tails),
                    texts,
                });
            }
        }
    }

    /// An insert's attributes as texts, also those that it does not show.
    fn attributes(
        &mut self,
        record: &Record,
        insert: &DxfInsert,
        seen: Place,
        handle: &str,
        frame: &Frame<'_>,
    ) {
        for (attribute, own) in insert.attributes().zip(&record.kept.attributes) {
            let named = own.layer.as_deref().and_then(|raw| self.book.layer_id(raw));
            let layer = self.layer_in(named.unwrap_or(seen.layer), Some(seen.layer));
            if attribute.flags & NOWHERE != 0 || !self.book.wants(layer) {
                continue;
            }
            let place = Place {
                layer,
                look: self.looks.seen(&own.worn, layer, seen.look),
                within: seen.within,
            };
            let handle = match &own.handle {
                Some(own) if frame.handle.is_none() => own,
                _ => handle,
            };
            let lettering = of_attribute(attribute, &frame.placing);
            self.text(
                lettering,
                place,
                handle,
                attribute.flags & 1 != 0 || own.worn.invisible,
            );
        }
    }

    /// Takes one entity, with what weighs beyond it, from what may still be expanded.
    fn spend(&mut self, handle: &str, weight: usize) -> bool {
        let room = self.expansion.spend(weight);
        if !room {
            let (cap, remedy) = self.expansion.words();
            self.tell(&BLOCK_TOO_MANY, Level::Error, 0, || {
                (
                    format!(
                        "block inserts expand to {cap} (at insert {handle}); the rest is left out"
                    ),
                    remedy,
                )
            });
        }
        room
    }

    /// Says something once for each `about`.
    fn tell(
        &mut self,
        rule: &'static Rule,
        level: Level,
        about: usize,
        words: impl FnOnce() -> (String, String),
    ) {
        if self.told.insert((rule.name, about)) {
            self.say(rule, level, words);
        }
    }

    /// Says something, or counts it once that rule has spoken often enough.
    fn say(&mut self, rule: &'static Rule, level: Level, words: impl FnOnce() -> (String, String)) {
        let (.., count) = self.spoken.entry(rule.name).or_insert((rule, level, 0));
        *count += 1;
        if *count <= MOST_TOLD {
            let (text, remedy) = words();
            self.findings.push(Finding::new(rule, level, text, remedy));
        }
    }
}

fn unseen(count: usize) -> Option<Finding> {
    let (them, are) = match count {
        0 => return None,
        1 => ("entity", "is"),
        _ => ("entities", "are"),
    };
    Some(Finding::new(
        &ENTITY_INVISIBLE,
        Level::Warning,
        format!(
            "{count} {them} on layers that are read {are} invisible (group 60 of the entity) and left out"
        ),
        "make what is current visible (in most programs: end object isolation) and save the drawing again; delete the rest",
    ))
}

/// A finding for what is not told one by one.
pub(super) fn and_more(rule: &'static Rule, level: Level, count: usize) -> Option<Finding> {
    let more = count.checked_sub(MOST_TOLD).filter(|more| *more > 0)?;
    Some(Finding::new(
        rule,
        level,
        format!("and {more} more like the {MOST_TOLD} before, {count} in all"),
        "mend the first ones and run again",
    ))
}

/// A record's handle, or `#` and its number.
fn own_handle(record: &Record) -> String {
    let kept = &record.kept;
    kept.handle
        .clone()
        .unwrap_or_else(|| format!("#{}", kept.number))
}
