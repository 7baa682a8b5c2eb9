//! Inserts: their blocks in every row and column, and their attributes.

use dxf::entities::Insert as DxfInsert;
use geo::Coord;

use super::{Frame, Gatherer, Place};
use crate::drawing::Insert;
use crate::drawing::convert::{TOO_FAR, is_near};
use crate::drawing::lettering::{attribute_content, normal, of_attribute};
use crate::drawing::placing::Placing;
use crate::drawing::rules::{BLOCK_IN_ITSELF, BLOCK_MISSING, BLOCK_TOO_DEEP, ENTITY_DAMAGED};
use crate::drawing::windows::Record;
use crate::finding::Level;

/// Blocks inside blocks, at most.
const DEEPEST: usize = 32;

impl Gatherer<'_> {
    pub(super) fn insert(
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
            counted: false,
        };
        self.attributes(record, insert, seen, handle, frame);
        let holds = block.is_some_and(|block| self.book.holds_wanted.get(block) == Some(&true));
        if !wanted && !holds {
            return;
        }
        if wanted && block.is_none() {
            self.missing(record, handle);
        }
        let base = block.map_or(Some([0.0; 2]), |block| self.book.base(block));
        let Some([base_x, base_y]) = base else {
            self.baseless(record, layer, handle);
            return;
        };
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
            .sum::<usize>()
            .saturating_add(self.book.block_name(record.kept.block).len());
        for row in 0..insert.row_count.max(1) {
            for column in 0..insert.column_count.max(1) {
                if !self.spend(handle) {
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
                    if !self.afford(seen, handle, weight) {
                        return;
                    }
                    let along = cell.carry(Coord { x: 1.0, y: 0.0 });
                    self.drawing.inserts.push(Insert {
                        handle: handle.to_owned(),
                        layer: self.book.layer_name(layer).to_owned(),
                        look,
                        within: frame.within,
                        block: self.book.block_name(record.kept.block).to_owned(),
                        place: cell.place(Coord { x: 0.0, y: 0.0 }),
                        rotation_rad: along.y.atan2(along.x),
                        attributes: attributes.clone(),
                    });
                }
                let Some(block) = block else { continue };
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

    /// Says that an insert is left out, since nobody knows where its block's base point is.
    fn baseless(&mut self, record: &Record, layer: u32, handle: &str) {
        let (layer, name) = (
            self.book.layer_name(layer),
            self.book.block_name(record.kept.block),
        );
        self.say(&ENTITY_DAMAGED, Level::Error, || {
            (
                format!("insert {handle} on layer {layer} is left out: the record of its block {name} is damaged, or its base point is no finite number"),
                "define the block again, or export the drawing again".to_owned(),
            )
        });
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
            if !self.spend(handle) {
                break;
            }
            self.place(record, inside);
        }
        for pointing in book.pointing.get(block).into_iter().flatten() {
            if !self.spend(handle) {
                break;
            }
            self.point(pointing, inside);
        }
        self.open.pop();
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
            if own.nowhere || !self.book.wants(layer) {
                continue;
            }
            let place = Place {
                layer,
                look: self.looks.seen(&own.worn, layer, seen.look),
                within: seen.within,
                counted: false,
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
}
