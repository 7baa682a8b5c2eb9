//! Sections and records, as they begin and end.

use super::super::release;
use super::super::tags::{Bad, BadTag, Tag, Tags, is_name, place_in_words, shown};
use super::super::text_decode::plain_name;
use super::records::text;
use super::{Pass, Record, Refusal, Scan, Section};

impl<'a> Pass<'a> {
    pub(super) fn name_section(&mut self, name: &[u8]) {
        let start = Some(self.section_start);
        self.section = match name {
            b"HEADER" => Section::Header,
            b"TABLES" => Section::Tables,
            b"BLOCKS" => {
                self.scan.blocks_start = self.scan.blocks_start.or(start);
                Section::Blocks
            }
            b"ENTITIES" => {
                self.scan.entities_start = self.scan.entities_start.or(start);
                Section::Entities
            }
            b"OBJECTS" => {
                self.scan.objects_start = self.scan.objects_start.or(start);
                Section::Other
            }
            _ => Section::Other,
        };
    }

    pub(super) fn begin_record(&mut self, tag: &Tag<'a>) -> Result<(), BadTag> {
        let name = tag.word();
        if !is_name(name) {
            return Err(BadTag {
                at: tag.start,
                kind: Bad::Name,
                found: shown(name),
            });
        }
        if self.names.len() + self.types.len() > self.most_names {
            return Err(BadTag {
                at: tag.start,
                kind: Bad::Names,
                found: self.most_names.to_string(),
            });
        }
        let in_entities = matches!(self.section, Section::Entities | Section::Blocks);
        if in_entities
            && let Some(head) = self.sequence
            && follows(head, name)
        {
            self.record = Record::Follower;
            self.in_group = false;
            self.embedded = false;
            if name == b"SEQEND" {
                self.sequence = None;
                // The tags of SEQEND itself still belong to the run: it ends at the next record.
            }
            return Ok(());
        }
        self.end_record(tag.start);
        self.variable = b"";
        self.in_group = false;
        self.embedded = false;
        self.record = Record::None;
        match name {
            b"SECTION" => {
                if self.section == Section::Entities {
                    let bad = BadTag {
                        at: tag.start,
                        kind: Bad::Unclosed,
                        found: "SECTION".to_owned(),
                    };
                    if !self.forgives {
                        return Err(bad);
                    }
                    self.note(bad.at, || bad.words());
                }
                if self.section == Section::Header {
                    // One that is not closed has no place for a variable of ours.
                    self.section = Section::Outside;
                }
                self.end_section(tag.start);
                self.sections += 1;
                self.section = Section::Named;
                self.section_start = tag.start;
            }
            b"ENDSEC" => {
                self.end_section(tag.start);
                self.section = Section::Outside;
            }
            b"EOF" => self.scan.eof_start = Some(tag.start),
            _ => match self.section {
                Section::Tables => self.begin_table_record(name, tag.start),
                Section::Blocks | Section::Entities => self.begin_entity(name, tag.start),
                _ => {}
            },
        }
        Ok(())
    }

    pub(super) fn end_section(&mut self, at: usize) {
        match self.section {
            // What is inserted behind something passed over would be passed over with it.
            Section::Header if self.gathered.broken => {}
            Section::Header => self.scan.header_end = self.scan.header_end.or(Some(at)),
            Section::Tables => self.scan.tables_end = self.scan.tables_end.or(Some(at)),
            Section::Entities => {
                self.scan.entities_end = Some(at);
                self.scan.open_sequence = match self.sequence {
                    Some(b"INSERT") => self.gathered.followed,
                    waiting => waiting.is_some(),
                };
            }
            _ => {}
        }
        self.sequence = None;
        self.gathered.broken = false;
        self.block_open = false;
        self.in_layer_table = false;
    }

    pub(super) fn finish(mut self) -> Result<Scan, Refusal> {
        if self.sections == 0 {
            return Err(Refusal::NotDxf {
                found: "no section at all".into(),
            });
        }
        let open = match self.section {
            Section::Outside => None,
            Section::Named => Some("a section without a name"),
            Section::Header => Some("section HEADER"),
            Section::Tables => Some("section TABLES"),
            Section::Blocks => Some("section BLOCKS"),
            Section::Entities => Some("section ENTITIES"),
            Section::Other => Some("a section"),
        };
        let early = self.scan.eof_start.is_none() && self.scan.entities_start.is_none();
        if let Some(inside) = open.or(early.then_some("a drawing without section ENTITIES")) {
            let at = self.scan.eof_start.unwrap_or(self.scan.tags_end);
            if !self.forgives {
                return Err(Refusal::Cut {
                    place: place_in_words(self.bytes, self.scan.form, at),
                    inside: inside.into(),
                });
            }
            self.end_early(at, inside);
        }
        self.end_record(self.scan.tags_end);
        let handles = &self.handles;
        self.scan.greatest_handle = handles.greatest;
        self.scan.own_handles = handles.own_range;
        self.scan.release = match release::number(&self.scan.version) {
            0 if shows_subclasses(self.bytes) => release::R2000,
            number => number,
        };
        self.scan.uses_handles = self.scan.release >= release::R13 || handles.in_use();
        if self.scan.model_space_record.is_none() {
            self.scan.model_space_record = text(self.owner_seen);
        }
        self.scan.names_are_guessed |= self.names.guessed;
        self.scan.layers = self.names.into_layers();
        self.scan.counts = self.counts.into_rows(self.scan.layers.len());
        self.scan.types = self.types.into_names();
        let raw = self.block_names.into_raw();
        for name in raw {
            let (name, guessed) = self.scan.code_page.decode(name);
            self.scan.names_are_guessed |= guessed;
            self.scan.block_names.push(plain_name(&name));
        }
        Ok(self.scan)
    }
}

/// Whether a drawing's records show subclass markers, as those of no release before R13 do.
fn shows_subclasses(bytes: &[u8]) -> bool {
    let mut tags = Tags::new(bytes).forgiving().map_while(Result::ok);
    tags.any(|tag| tag.code == 100 && tag.word().starts_with(b"AcDb"))
}

/// Whether a record continues the sequence that `head` began.
fn follows(head: &[u8], name: &[u8]) -> bool {
    match name {
        b"VERTEX" => head == b"POLYLINE",
        b"ATTRIB" => head == b"INSERT",
        b"SEQEND" => true,
        _ => false,
    }
}
