//! One pass over a drawing's tags: what it holds, where its parts begin and end, which handles are taken.

mod gathered;
mod records;
mod recovery;
mod sections;
mod sight;
#[cfg(test)]
mod tests;

use super::Unsaid;
use super::caps::Caps;
use super::code_page::CodePage;
use super::counts::Counts;
use super::handles::{Handles, is_pointer, names_a_handle, parse_handle};
use super::names::{LayerNames, Types};
use super::refusal::Refusal;
use super::tags::{BadTag, Tag, Tags};
use gathered::{Gathered, Record, Section};
use recovery::recover;
use sight::refuse_at_sight;

pub(super) use recovery::PassedOver;

pub(super) use super::found::{BlockEntry, Entry, READ_TYPES, Scan};

/// Scans a drawing: strictly, and where that fails once more, passing over what makes no sense.
///
/// # Errors
/// A [`Refusal`] for what is no DXF, is cut short or damaged so that no entity of model space is left, or holds more names
/// than the caps have room for.
pub(super) fn scan(bytes: &[u8], caps: &Caps) -> Result<Scan, Refusal> {
    refuse_at_sight(bytes)?;
    strict(bytes, caps).or_else(|refusal| match refusal {
        Refusal::TooLarge { .. } => Err(refusal),
        _ => recover(bytes, caps, refusal),
    })
}

fn strict(bytes: &[u8], caps: &Caps) -> Result<Scan, Refusal> {
    let mut pass = Pass::new(bytes, caps);
    let mut tags = Tags::new(bytes);
    while let Some(tag) = tags.next() {
        tag.and_then(|tag| pass.take(&tag))
            .map_err(|bad| pass.refusal(&bad))?;
        pass.pass_over(&mut tags);
    }
    pass.finish()
}

#[expect(
    clippy::struct_excessive_bools,
    reason = "each is a state of its own of the pass"
)]
struct Pass<'a> {
    bytes: &'a [u8],
    caps: Caps,
    most_names: usize,
    scan: Scan,
    section: Section,
    record: Record,
    gathered: Gathered<'a>,
    /// A POLYLINE or an INSERT still waits for its SEQEND.
    sequence: Option<&'static [u8]>,
    attribute_layers: Vec<&'a [u8]>,
    in_group: bool,
    embedded: bool,
    variable: &'a [u8],
    code_page_name: Option<String>,
    in_layer_table: bool,
    /// End of the tag before the one at hand; comments may stand between.
    last_end: usize,
    section_start: usize,
    sections: usize,
    block_open: bool,
    owner_seen: Option<&'a [u8]>,
    number: u32,
    names: LayerNames<'a>,
    types: Types<'a>,
    block_names: Types<'a>,
    handles: Handles,
    counts: Counts,
    /// Whether what makes no sense is passed over.
    forgives: bool,
}

impl<'a> Pass<'a> {
    fn new(bytes: &'a [u8], caps: &Caps) -> Self {
        Self {
            bytes,
            caps: *caps,
            most_names: caps.most_names(bytes.len()),
            scan: Scan::new(bytes),
            section: Section::Outside,
            record: Record::None,
            gathered: Gathered::default(),
            sequence: None,
            attribute_layers: Vec::new(),
            in_group: false,
            embedded: false,
            variable: b"",
            code_page_name: None,
            in_layer_table: false,
            last_end: 0,
            section_start: 0,
            sections: 0,
            block_open: false,
            owner_seen: None,
            number: 0,
            names: LayerNames::default(),
            types: Types::default(),
            block_names: Types::default(),
            handles: Handles::default(),
            counts: Counts::default(),
            forgives: false,
        }
    }

    #[inline]
    fn take(&mut self, tag: &Tag<'a>) -> Result<(), BadTag> {
        self.last_end = self.scan.tags_end;
        self.scan.tags_end = tag.end;
        match tag.code {
            0 => {
                let begun = self.begin_record(tag);
                if begun.is_err() {
                    // What is set in behind the sound tags stands before one that makes no sense, not within it.
                    self.scan.tags_end = self.last_end;
                }
                return begun;
            }
            2 if self.section == Section::Named => self.name_section(tag.word()),
            _ if self.section == Section::Header => self.header_tag(tag),
            10..=61 | 210..=239 if !matches!(self.record, Record::Block | Record::Style) => {}
            _ => self.record_tag(tag),
        }
        Ok(())
    }

    /// Passes over what says nothing here: coordinates are nearly all of a file.
    #[inline]
    fn pass_over(&mut self, tags: &mut Tags<'a>) {
        if self.section == Section::Header || matches!(self.record, Record::Block | Record::Style) {
            return;
        }
        let of_use = |code| {
            matches!(code, 0 | 2 | 6 | 8 | 62 | 66 | 67 | 70 | 101 | 102 | 999)
                || names_a_handle(code)
        };
        if let Some(end) = tags.pass_over(|code| !of_use(code)) {
            self.scan.tags_end = end;
        }
    }

    fn header_tag(&mut self, tag: &Tag<'a>) {
        if tag.code == 9 {
            self.variable = tag.word();
            return;
        }
        match (self.variable, tag.code) {
            (b"$ACADVER", 1) => {
                self.scan.version = String::from_utf8_lossy(tag.word()).to_ascii_uppercase();
                self.settle_code_page();
            }
            (b"$DWGCODEPAGE", 3) => {
                self.code_page_name = Some(String::from_utf8_lossy(tag.word()).into_owned());
                self.settle_code_page();
            }
            (b"$EXTMIN", 10) => self.scan.extents[0][0] = tag.float(),
            (b"$EXTMIN", 20) => self.scan.extents[0][1] = tag.float(),
            (b"$EXTMAX", 10) => self.scan.extents[1][0] = tag.float(),
            (b"$EXTMAX", 20) => self.scan.extents[1][1] = tag.float(),
            (b"$INSUNITS", 70) => {
                self.scan.insunits = tag.integer().ok_or(Unsaid::NoNumber);
            }
            (b"$MEASUREMENT", 70) => self.scan.measurement = tag.integer(),
            (b"$HANDSEED", 5) => {
                // An unreadable seed stands for none, but its place is where a good one belongs.
                let seed = parse_handle(tag.word()).unwrap_or(0);
                self.scan.handseed = Some((tag.value_range(), seed));
                // A further group 5 is somebody else's handle.
                self.variable = b"";
            }
            _ => {}
        }
    }

    fn settle_code_page(&mut self) {
        self.scan.code_page = CodePage::of(&self.scan.version, self.code_page_name.as_deref());
    }

    #[inline]
    fn record_tag(&mut self, tag: &Tag<'a>) {
        match tag.code {
            5 if self.record != Record::Dimstyle => self.handles.own(tag.word()),
            105 => self.handles.own(tag.word()),
            101 => self.embedded = true,
            102 => self.in_group = tag.word().starts_with(b"{"),
            code if is_pointer(code) => self.handles.pointer(tag.word()),
            _ => {}
        }
        if self.record == Record::None || self.in_group || self.embedded || tag.code >= 1000 {
            return;
        }
        if self.record == Record::Follower {
            if tag.code == 8 && self.sequence == Some(b"INSERT") {
                self.attribute_layers.push(tag.word());
            }
            return;
        }
        let held = &mut self.gathered;
        match tag.code {
            2 if held.name.is_none() => {
                held.name = Some(tag.word());
                if self.record == Record::Table {
                    self.in_layer_table = tag.word() == b"LAYER";
                }
            }
            5 if held.handle.is_none() => held.handle = Some(tag.word()),
            6 if self.record == Record::Layer => held.linetype = Some(tag.word()),
            8 if held.layer.is_none() => held.layer = Some(tag.word()),
            10 | 20 => {
                let number = tag.float();
                held.bad_base |= number.is_none();
                held.base[usize::from(tag.code == 20)] = number;
            }
            41 => held.style.width_factor = tag.float().unwrap_or(1.0),
            50 => held.style.oblique_deg = tag.float().unwrap_or(0.0),
            62 => held.colour = tag.integer(),
            66 => held.followed = tag.integer().is_some_and(|n| n != 0),
            67 => held.paper = tag.integer() == Some(1),
            70 => held.flags = tag.integer().unwrap_or(0),
            330 if held.owner.is_none() => held.owner = Some(tag.word()),
            390 => held.pointers[0] = Some(tag.word()),
            347 => held.pointers[1] = Some(tag.word()),
            348 => held.pointers[2] = Some(tag.word()),
            _ => {}
        }
    }
}
