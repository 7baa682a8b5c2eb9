//! What the scan keeps of each record, settled when the next one begins.

use super::super::handles::parse_handle;
use super::super::text_decode::plain_name;
use super::{BlockEntry, Entry, Gathered, Pass, Record, Section};
use crate::patterns::folded;

impl<'a> Pass<'a> {
    pub(super) fn begin_table_record(&mut self, name: &[u8], start: usize) {
        if name == b"ENDTAB" {
            if self.in_layer_table {
                self.scan.layer_table_end = self.scan.layer_table_end.or(Some(start));
            }
            self.in_layer_table = false;
            return;
        }
        self.record = match name {
            b"TABLE" => Record::Table,
            b"LAYER" => Record::Layer,
            b"BLOCK_RECORD" => Record::BlockHome,
            b"DIMSTYLE" => Record::Dimstyle,
            b"STYLE" => Record::Style,
            _ => Record::None,
        };
        self.gathered = Gathered {
            start,
            ..Gathered::default()
        };
    }

    pub(super) fn begin_entity(&mut self, name: &'a [u8], start: usize) {
        let after_open = match self.sequence {
            Some(b"INSERT") => self.gathered.followed,
            waiting => waiting.is_some(),
        };
        self.sequence = None;
        self.gathered = Gathered {
            start,
            after_open,
            ..Gathered::default()
        };
        if self.section == Section::Blocks {
            match name {
                b"BLOCK" => {
                    self.record = Record::Block;
                    return;
                }
                b"ENDBLK" => {
                    self.block_open = false;
                    return;
                }
                _ => {}
            }
        }
        self.record = Record::Entity;
        self.gathered.type_id = self.types.id(name);
        self.sequence = match name {
            b"POLYLINE" => Some(b"POLYLINE"),
            b"INSERT" => Some(b"INSERT"),
            _ => None,
        };
    }

    /// Settles the record at hand; the next one begins at `end`.
    pub(super) fn end_record(&mut self, end: usize) {
        match self.record {
            Record::None | Record::Dimstyle => self.handles.settle(false),
            Record::Table => {
                if self.in_layer_table && self.scan.layer_table_handle.is_none() {
                    self.scan.layer_table_handle = text(self.gathered.handle);
                }
                self.handles.settle(false);
            }
            Record::Layer => self.end_layer(),
            Record::Style => {
                let raw = self.gathered.name.unwrap_or_default();
                let (name, _) = self.scan.code_page.decode(raw);
                let name = folded(&plain_name(&name));
                self.scan.styles.entry(name).or_insert(self.gathered.style);
                self.handles.settle(false);
            }
            Record::BlockHome => {
                let held = &self.gathered;
                if held
                    .name
                    .is_some_and(|name| name.eq_ignore_ascii_case(b"*Model_Space"))
                {
                    self.scan.model_space_record = text(held.handle);
                }
                self.handles.settle(false);
            }
            Record::Block => {
                let (name, guessed) = self
                    .scan
                    .code_page
                    .decode(self.gathered.name.unwrap_or_default());
                self.scan.names_are_guessed |= guessed;
                self.scan.blocks.push(BlockEntry {
                    name: plain_name(&name),
                    base: base_of(&self.gathered),
                    // 4: attached, 8: laid over.
                    is_reference: self.gathered.flags & (4 | 8) != 0,
                    ..BlockEntry::default()
                });
                self.block_open = true;
                self.handles.settle(false);
            }
            Record::Entity | Record::Follower => self.end_entity(end),
        }
        self.attribute_layers.clear();
        self.record = Record::None;
    }

    fn end_layer(&mut self) {
        let held = &self.gathered;
        self.scan.layers_have_handles |= held.handle.and_then(parse_handle).is_some();
        if held.name == Some(b"0") {
            self.scan.zero_layer_pointers = held.pointers.map(text);
        }
        if let Some(name) = held.name {
            let id = self.names.id(name, &self.scan.code_page);
            self.names.describe(id, |layer| {
                layer.in_table = true;
                layer.handle = text(held.handle);
                layer.linetype = held.linetype.map(<[u8]>::to_vec);
                layer.colour = held.colour;
                layer.flags = held.flags;
            });
        }
        self.handles.settle(false);
    }

    fn end_entity(&mut self, end: usize) {
        let held = &self.gathered;
        let layer = self
            .names
            .id(held.layer.unwrap_or(b"0"), &self.scan.code_page);
        // A mark that is cut or garbled stays: where it ends is not known.
        let own = self.section == Section::Entities && self.names.is_own(layer) && !held.broken;
        self.handles.settle_entity(own, held.handle);
        if own {
            // A comment behind it is not ours.
            self.scan.own_marks.push(held.start..self.last_end);
            return;
        }
        let in_block = self.section == Section::Blocks;
        if in_block != self.block_open || held.paper {
            return;
        }
        let is_insert = self.types.is(held.type_id, b"INSERT");
        let block = match held.name {
            Some(name) if is_insert && !name.is_empty() => to_u32(self.block_names.id(name)),
            // No block has this number.
            _ => u32::MAX,
        };
        let points = self.types.points(held.type_id);
        let mut entry = Entry {
            start: held.start,
            end,
            layer,
            number: 0,
            block,
            is_insert,
            is_dot: points && self.types.is(held.type_id, b"POINT"),
        };
        // A constant attribute is written nowhere but in its block's definition; any other is a form to fill in.
        let is_form = self.types.is(held.type_id, b"ATTDEF") && (!in_block || held.flags & 2 == 0);
        let broken = held.broken;
        let reads = self.types.is_read(held.type_id) && !is_form && !broken;
        let points = points && !broken;
        if broken {
            self.left_out();
        }
        let held = &self.gathered;
        if in_block {
            if let Some(block) = self.scan.blocks.last_mut()
                && reads
            {
                entry.number = to_u32(block.entries.len()) + 1;
                block.entries.push(entry);
                for name in self.attribute_layers.drain(..) {
                    let own_layer = self.names.id(name, &self.scan.code_page);
                    if own_layer != layer && block.attribute_layers.last() != Some(&own_layer) {
                        block.attribute_layers.push(own_layer);
                    }
                }
            } else if let Some(block) = self.scan.blocks.last_mut()
                && points
            {
                entry.number = to_u32(block.pointing.len()) + 1;
                block.pointing.push(entry);
            } else if let Some(block) = self.scan.blocks.last_mut()
                && !broken
                && !is_form
            {
                *block.unread.entry((layer, held.type_id)).or_default() += 1;
            }
            return;
        }
        self.number += 1;
        entry.number = self.number;
        self.owner_seen = self.owner_seen.or(held.owner);
        if !broken {
            self.counts.add(layer, held.type_id);
        }
        if reads {
            let index = to_u32(self.scan.entries.len());
            for name in self.attribute_layers.drain(..) {
                let own_layer = self.names.id(name, &self.scan.code_page);
                if own_layer != layer {
                    self.scan.attribute_layers.push((index, own_layer));
                }
            }
            self.scan.entries.push(entry);
        } else if points {
            self.scan.pointing.push(entry);
        }
    }
}

/// A block's base point, unless its record is damaged.
fn base_of(held: &Gathered<'_>) -> Option<[f64; 2]> {
    match held.base {
        _ if held.broken || held.bad_base => None,
        [Some(x), Some(y)] => Some([x, y]),
        [None, None] => Some([0.0; 2]),
        _ => None,
    }
}

pub(super) fn text(value: Option<&[u8]>) -> Option<String> {
    value
        .filter(|value| !value.is_empty())
        .map(|value| String::from_utf8_lossy(value).into_owned())
}

fn to_u32(number: usize) -> u32 {
    u32::try_from(number).unwrap_or(u32::MAX)
}
