//! The second reading, for a drawing whose tags do not hold together: what makes no sense is passed over and counted.

use std::ops::Range;

use super::super::caps::Caps;
use super::super::resume::{handles_in, resume, resume_in_header};
use super::super::tags::{Bad, BadTag, Tags, place_in_words};
use super::{Pass, Record, Refusal, Scan, Section};

/// What was passed over.
#[derive(Debug, Clone)]
pub(in crate::drawing) struct PassedOver {
    /// How many places make no sense.
    pub(in crate::drawing) places: usize,
    /// Where the first is: line or byte.
    pub(in crate::drawing) first: String,
    /// What stands there and what was expected.
    pub(in crate::drawing) what: String,
    /// Entities of model space and of blocks that are left out for it.
    pub(in crate::drawing) left_out: usize,
    /// Whether variables of the header may be among it.
    pub(in crate::drawing) in_header: bool,
    /// Whether records of tables, such as layers and text styles, may be among it.
    pub(in crate::drawing) in_tables: bool,
    /// What may be handles of records that are passed over.
    pub(in crate::drawing) handles: Vec<u64>,
    /// Past the last of it.
    end: usize,
}

/// Reads what can be read of a drawing that was refused; the refusal stands if there is no entity of model space in it.
pub(super) fn recover(bytes: &[u8], caps: &Caps, refusal: Refusal) -> Result<Scan, Refusal> {
    let mut pass = Pass::new(bytes, caps);
    pass.forgives = true;
    let mut tags = Tags::new(bytes);
    while let Some(tag) = tags.next() {
        let bad = match tag {
            Ok(tag) => match pass.take(&tag) {
                Ok(()) => continue,
                Err(bad) => bad,
            },
            Err(bad) => bad,
        };
        if bad.kind == Bad::Names {
            return Err(pass.refusal(&bad));
        }
        if bad.kind == Bad::Cut {
            // The end of the file, which is found to be in the wrong place when the pass is finished.
            break;
        }
        pass.note(bad.at, || bad.words());
        let found = match pass.section {
            Section::Outside | Section::Named | Section::Header => {
                resume_in_header(bytes, pass.scan.form, bad.at)
            }
            _ => resume(bytes, pass.scan.form, bad.at),
        };
        let Some(found) = found else {
            break;
        };
        if !found.whole {
            pass.lose(bad.at..found.at);
        }
        tags = Tags::within(bytes, pass.scan.form, found.at..bytes.len());
        let next = tags.clone().next();
        let variable = next.is_some_and(|tag| tag.is_ok_and(|tag| tag.code == 9));
        if variable && !found.whole && pass.section != Section::Header {
            // The damage took the header's beginning.
            pass.sections += 1;
            pass.section = Section::Header;
            pass.lose_header();
        }
    }
    match pass.finish() {
        Ok(scan) if scan.entity_count() > 0 => Ok(scan),
        _ => Err(refusal),
    }
}

impl Pass<'_> {
    /// Counts a place that makes no sense.
    pub(super) fn note(&mut self, at: usize, what: impl FnOnce() -> String) {
        match &mut self.scan.passed_over {
            Some(held) => held.places += 1,
            none => {
                *none = Some(PassedOver {
                    places: 1,
                    first: place_in_words(self.bytes, self.scan.form, at),
                    what: what(),
                    left_out: 0,
                    in_header: false,
                    in_tables: false,
                    handles: Vec::new(),
                    end: 0,
                });
            }
        }
    }

    /// Marks what a stretch that is passed over may have belonged to.
    fn lose(&mut self, stretch: Range<usize>) {
        self.gathered.broken = true;
        let in_header = self.section == Section::Header;
        // What comes next is no value of the variable at hand.
        self.variable = b"";
        if in_header {
            self.lose_header();
        }
        if let Some(over) = &mut self.scan.passed_over {
            over.in_tables |= self.section == Section::Tables;
            if in_header {
                // No record is there, and the seed is raised with what is drawn.
                return;
            }
            // Codes and values may have been out of step before that was seen.
            let start = match self.record {
                Record::None => stretch.start,
                _ => self.gathered.start.min(stretch.start).max(over.end),
            };
            over.end = stretch.end;
            let first = over.handles.len();
            let part = self.bytes.get(start..stretch.end).unwrap_or_default();
            handles_in(part, self.scan.form, &mut over.handles);
            self.handles.passed_over(&over.handles[first..]);
        }
    }

    fn lose_header(&mut self) {
        if let Some(over) = &mut self.scan.passed_over {
            over.in_header = true;
        }
    }

    /// Ends a file that stops inside a section: the entity at hand may lack its end, and marks belong before it.
    pub(super) fn end_early(&mut self, at: usize, inside: &str) {
        self.note(at, || {
            format!("the file ends inside {inside}, and ENDSEC and EOF were expected")
        });
        let at_hand = matches!(self.record, Record::Entity | Record::Follower);
        let mut end = self.scan.eof_start.unwrap_or(self.scan.tags_end);
        if at_hand && self.scan.eof_start.is_none() {
            self.gathered.broken = true;
            if self.section == Section::Entities {
                end = self.before_the_cut();
                self.sequence = None;
            }
        }
        if !at_hand && self.section == Section::Entities && self.scan.eof_start.is_none() {
            // Nothing of this section is left to stand behind; an earlier one may be.
            self.section = Section::Other;
        }
        let tags_end = self.scan.tags_end;
        self.end_record(tags_end);
        self.end_section(end);
        self.section = Section::Outside;
    }

    /// Where the last whole entity ends. A sequence whose SEQEND did not come before the record at hand is not whole
    /// either: what is cut may be one of its vertices.
    fn before_the_cut(&mut self) -> usize {
        let start = self.gathered.start;
        let open = self.gathered.after_open;
        match self.scan.entries.last() {
            Some(entry) if open && entry.end == start => {
                let start = entry.start;
                self.scan.entries.pop();
                self.left_out();
                start
            }
            _ => start,
        }
    }

    /// Counts an entity that is left out.
    pub(super) fn left_out(&mut self) {
        if let Some(over) = &mut self.scan.passed_over {
            over.left_out += 1;
        }
    }

    /// Why the drawing is refused.
    pub(super) fn refusal(&self, bad: &BadTag) -> Refusal {
        let place = place_in_words(self.bytes, self.scan.form, bad.at);
        match bad.kind {
            Bad::Unclosed => Refusal::Unclosed { place },
            Bad::Names => self.caps.names_refused(self.bytes.len(), bad.at),
            _ if self.sections == 0 => Refusal::NotDxf {
                found: bad.found.clone(),
            },
            Bad::Cut => Refusal::Cut {
                place,
                inside: bad.found.clone(),
            },
            Bad::Code | Bad::Name => Refusal::Garbled {
                place,
                what: bad.words(),
            },
        }
    }
}
