//! One pass over a drawing's tags: what it holds, where its parts begin and end, which handles are taken.

mod records;
mod recovery;

use super::code_page::CodePage;
use super::counts::Counts;
use super::handles::{Handles, parse_handle};
use super::lettering::Style;
use super::names::{LayerNames, Types};
use super::refusal::Refusal;
use super::tags::{Bad, BadTag, Tag, Tags, is_name, place_in_words, shown};
use records::text;
use recovery::recover;

pub(super) use recovery::PassedOver;

pub(super) use super::found::{BlockEntry, Entry, OWN_LAYER, READ_TYPES, Scan};

/// Scans a drawing: strictly, and where that fails once more, passing over what makes no sense.
///
/// # Errors
/// A [`Refusal`] for what is no DXF, or is cut short or damaged so that no entity of model space is left.
pub(super) fn scan(bytes: &[u8]) -> Result<Scan, Refusal> {
    refuse_at_sight(bytes)?;
    strict(bytes).or_else(|refusal| recover(bytes, refusal))
}

fn strict(bytes: &[u8]) -> Result<Scan, Refusal> {
    let mut pass = Pass::new(bytes);
    for tag in Tags::new(bytes) {
        tag.and_then(|tag| pass.take(&tag))
            .map_err(|bad| pass.refusal(&bad))?;
    }
    pass.finish()
}

fn refuse_at_sight(bytes: &[u8]) -> Result<(), Refusal> {
    if bytes.iter().all(u8::is_ascii_whitespace) {
        return Err(Refusal::Empty);
    }
    let head = bytes.get(..32).unwrap_or(bytes);
    if head.starts_with(b"AC") && head.contains(&0) {
        let version = String::from_utf8_lossy(head.get(..6).unwrap_or(head)).into_owned();
        return Err(Refusal::Dwg { version });
    }
    let found = if head.starts_with(b"\xFF\xFE") || head.starts_with(b"\xFE\xFF") {
        "UTF-16 text"
    } else if head.contains(&b'\r') && memchr::memchr(b'\n', bytes).is_none() {
        "lines that end in a carriage return alone"
    } else {
        return Ok(());
    };
    Err(Refusal::NotDxf {
        found: found.into(),
    })
}

#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Section {
    Outside,
    Named,
    Header,
    Tables,
    Blocks,
    Entities,
    Other,
}

/// What is being gathered of the record at hand.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Record {
    /// `0 SECTION`, `0 ENDSEC`, a record of no interest.
    None,
    Table,
    Layer,
    BlockHome,
    Dimstyle,
    Style,
    Block,
    Entity,
    /// VERTEX, ATTRIB or SEQEND of the entity before it.
    Follower,
}

/// The tags of one entity or table record that matter here.
#[derive(Default)]
#[expect(
    clippy::struct_excessive_bools,
    reason = "each is a fact of its own about the record"
)]
struct Gathered<'a> {
    start: usize,
    type_id: usize,
    name: Option<&'a [u8]>,
    handle: Option<&'a [u8]>,
    owner: Option<&'a [u8]>,
    layer: Option<&'a [u8]>,
    paper: bool,
    followed: bool,
    linetype: Option<&'a [u8]>,
    colour: Option<i64>,
    flags: i64,
    base: [f64; 2],
    pointers: [Option<&'a [u8]>; 3],
    style: Style,
    /// Something in it makes no sense and was passed over.
    broken: bool,
    /// The entity before it still waited for its SEQEND.
    after_open: bool,
}

#[expect(
    clippy::struct_excessive_bools,
    reason = "each is a state of its own of the pass"
)]
struct Pass<'a> {
    bytes: &'a [u8],
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
    fn new(bytes: &'a [u8]) -> Self {
        Self {
            bytes,
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
            // Coordinates are nearly all of a file and say nothing here.
            10..=61 | 210..=239 if !matches!(self.record, Record::Block | Record::Style) => {}
            _ => self.record_tag(tag),
        }
        Ok(())
    }

    fn header_tag(&mut self, tag: &Tag<'a>) {
        if tag.code == 9 {
            self.variable = tag.word();
            return;
        }
        match (self.variable, tag.code) {
            (b"$ACADVER", 1) => {
                self.scan.version = String::from_utf8_lossy(tag.word()).to_ascii_uppercase();
            }
            (b"$DWGCODEPAGE", 3) => {
                self.code_page_name = Some(String::from_utf8_lossy(tag.word()).into_owned());
            }
            (b"$EXTMIN", 10) => self.scan.extents[0][0] = tag.float(),
            (b"$EXTMIN", 20) => self.scan.extents[0][1] = tag.float(),
            (b"$EXTMAX", 10) => self.scan.extents[1][0] = tag.float(),
            (b"$EXTMAX", 20) => self.scan.extents[1][1] = tag.float(),
            (b"$INSUNITS", 70) => self.scan.insunits = tag.integer(),
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
        self.scan.code_page = CodePage::of(&self.scan.version, self.code_page_name.as_deref());
    }

    #[inline]
    fn record_tag(&mut self, tag: &Tag<'a>) {
        match tag.code {
            5 if self.record != Record::Dimstyle => self.handles.own(tag.word()),
            105 => self.handles.own(tag.word()),
            320..=369 | 390..=399 | 480 | 481 | 1005 => self.handles.pointer(tag.word()),
            101 => self.embedded = true,
            102 => self.in_group = tag.word().starts_with(b"{"),
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
            10 => held.base[0] = tag.float().unwrap_or(0.0),
            20 => held.base[1] = tag.float().unwrap_or(0.0),
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

    fn name_section(&mut self, name: &[u8]) {
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

    fn begin_record(&mut self, tag: &Tag<'a>) -> Result<(), BadTag> {
        let name = tag.word();
        if !is_name(name) {
            return Err(BadTag {
                at: tag.start,
                kind: Bad::Name,
                found: shown(name),
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

    fn end_section(&mut self, at: usize) {
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

    fn finish(mut self) -> Result<Scan, Refusal> {
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
        let number = self.scan.version.strip_prefix("AC");
        let with_handles = number
            .and_then(|digits| digits.parse::<u32>().ok())
            .is_some_and(|number| number >= 1012);
        self.scan.uses_handles = with_handles || handles.in_use();
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
            self.scan
                .block_names
                .push(super::text_decode::plain_name(&name));
        }
        Ok(self.scan)
    }
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

#[cfg(test)]
mod tests {
    use super::*;

    /// A drawing from its tags: codes and values in turn, blanks between.
    fn dxf(tags: &str) -> Vec<u8> {
        let words: Vec<&str> = tags.split_whitespace().collect();
        let lines = words.chunks(2).flat_map(|pair| {
            let code = pair.first().copied().unwrap_or_default();
            let value = pair.get(1).copied().unwrap_or_default();
            [format!("{code:>3}\r\n"), format!("{value}\r\n")]
        });
        lines.collect::<String>().into_bytes()
    }

    const HEADER: &str =
        "0 SECTION 2 HEADER 9 $ACADVER 1 AC1015 9 $HANDSEED 5 1F0 9 $INSUNITS 70 6 0 ENDSEC ";
    const TABLES: &str = "0 SECTION 2 TABLES 0 TABLE 2 LAYER 5 2 70 2
        0 LAYER 5 10 2 0 70 0 62 7 390 F 0 LAYER 5 11 2 Slab 70 1 62 -3 0 ENDTAB
        0 TABLE 2 BLOCK_RECORD 5 1 0 BLOCK_RECORD 5 1C 2 *MODEL_SPACE 0 ENDTAB 0 ENDSEC ";

    fn at(bytes: &[u8], offset: Option<usize>) -> String {
        let rest = offset.and_then(|at| bytes.get(at..)).unwrap_or_default();
        let lines = rest.split(|b| *b == b'\n').take(4);
        let words = lines.map(|line| String::from_utf8_lossy(line.trim_ascii()).into_owned());
        words.collect::<Vec<_>>().join(" ")
    }

    #[test]
    fn one_pass_finds_layers_sections_and_handles() {
        let bytes = dxf(&format!(
            "{HEADER}{TABLES}0 SECTION 2 ENTITIES
             0 LINE 5 A0 330 1C 8 slab 10 1.0 20 2.0 11 3.0 21 4.0
             0 TEXT 5 2a1 102 {{ACAD 330 9999 102 }} 8 New 67 1 1 x
             0 POLYLINE 5 A2 8 taut-x 66 1 0 VERTEX 5 300 8 0 0 SEQEND 5 301 8 0
             0 LINE 5 A3 8 New 0 ENDSEC 0 EOF"
        ));
        let scan = scan(&bytes).expect("read");
        assert_eq!((scan.version.as_str(), scan.insunits), ("AC1015", Some(6)));
        assert_eq!((scan.line_end, scan.code_width), ("\r\n", 3));
        let names: Vec<_> = scan.layers.iter().map(|l| l.name.as_str()).collect();
        assert_eq!(names, ["0", "Slab", "New", "taut-x"]);
        assert!(scan.layers[1].off() && scan.layers[1].frozen());
        assert_eq!(scan.zero_layer_pointers[0].as_deref(), Some("F"));
        assert!(scan.layers_have_handles && scan.uses_handles);
        assert_eq!(scan.greatest_handle, 0x9999);
        assert_eq!(scan.own_handles, Some((0xA2, 0x301)));
        assert_eq!(scan.own_marks.len(), 1);
        let own = &bytes[scan.own_marks[0].clone()];
        assert!(
            own.starts_with(b"  0\r\nPOLYLINE")
                && own.ends_with(b"SEQEND\r\n  5\r\n301\r\n  8\r\n0\r\n")
        );
        assert_eq!(scan.model_space_record.as_deref(), Some("1C"));
        assert_eq!(scan.layer_table_handle.as_deref(), Some("2"));
        let (seed, number) = scan.handseed.clone().expect("seed");
        assert_eq!((&bytes[seed], number), (&b"1F0"[..], 0x1F0));
        assert_eq!(at(&bytes, scan.header_end), "0 ENDSEC 0 SECTION");
        assert_eq!(at(&bytes, scan.layer_table_end), "0 ENDTAB 0 TABLE");
        assert_eq!(at(&bytes, scan.tables_end), "0 ENDSEC 0 SECTION");
        assert_eq!(at(&bytes, scan.entities_start), "0 SECTION 2 ENTITIES");
        assert_eq!(at(&bytes, scan.entities_end), "0 ENDSEC 0 EOF");
        assert_eq!(at(&bytes, scan.eof_start), "0 EOF ");
        assert_eq!(scan.entries.len(), 2);
        assert_eq!(scan.counts[1], [(0, 1)]);
        assert!(!scan.open_sequence);
    }

    #[test]
    fn a_sequence_without_its_end_is_open() {
        let open = |entities: &str| {
            let bytes = dxf(&format!("0 SECTION 2 ENTITIES {entities} 0 ENDSEC 0 EOF"));
            scan(&bytes).expect("read").open_sequence
        };
        assert!(open("0 POLYLINE 8 0 66 1 0 VERTEX 8 0"));
        assert!(open("0 INSERT 8 0 66 1 2 B 0 ATTRIB 8 0"));
        assert!(!open("0 INSERT 8 0 2 B"));
        assert!(!open("0 POLYLINE 8 0 0 VERTEX 8 0 0 SEQEND 8 0"));
    }

    #[test]
    fn old_drawings_use_handles_where_their_entities_do() {
        let uses = |tags: &str| {
            let bytes = dxf(&format!(
                "0 SECTION 2 TABLES 0 TABLE 2 LAYER 0 LAYER {tags} 0 ENDSEC 0 EOF"
            ));
            scan(&bytes).expect("read").uses_handles
        };
        let to_entities = "2 0 0 ENDTAB 0 ENDSEC 0 SECTION 2 ENTITIES 0 LINE";
        assert!(uses(&format!("{to_entities} 5 A1 8 0")));
        assert!(!uses(&format!("{to_entities} 8 0")));
        assert!(!uses(&format!("5 2 {to_entities} 5 GG 8 0")));
        assert!(uses(&format!("5 2 {to_entities} 8 0")));
    }

    #[test]
    fn what_is_no_drawing_is_refused_in_words() {
        let refused = |bytes: &[u8]| scan(bytes).map(|_| ()).expect_err("refused").to_string();
        assert!(refused(b" \n").contains("empty"));
        assert!(refused(b"AC1032\0\0\0\0").contains("DWG (AC1032)"));
        assert!(refused(b"%PDF-1.7\n").contains("\"%PDF-1.7\""));
        assert!(refused(b"0\rSECTION\r").contains("carriage return"));
        assert!(refused(&dxf("0 EOF")).contains("no section"));
        assert!(
            refused(b"0\nSECTION\n2\nENTITIES\n0\nLINE\n8\n").contains("line 7: the file ends")
        );
        assert!(
            refused(&dxf("0 SECTION 2 ENTITIES 0 LINE 8 0"))
                .contains("ends inside section ENTITIES")
        );
        assert!(refused(&dxf("0 SECTION 2 HEADER 0 ENDSEC")).contains("without section ENTITIES"));
        assert!(
            refused(&dxf("0 SECTION 2 ENTITIES oops 8 0 ENDSEC"))
                .contains("line 5: found \"oops\"")
        );
        assert!(scan(&dxf("0 SECTION 2 HEADER 0 ENDSEC 0 EOF")).is_ok());
    }
}
