//! What one pass over a drawing finds.

use std::collections::BTreeMap;
use std::ops::Range;

use super::Unsaid;
use super::code_page::CodePage;
use super::lettering::Style;
use super::names::ScannedLayer;
use super::scan::PassedOver;
use super::tags::{Form, form_of};

/// What one pass over a drawing finds. Offsets are of the file's bytes; those called `_start` and `_end` point at the
/// first byte of a `0` code line, where something can be inserted.
#[derive(Debug, Clone)]
#[expect(
    clippy::struct_excessive_bools,
    reason = "each is a fact of its own about the drawing"
)]
pub(super) struct Scan {
    /// `$ACADVER`, such as `AC1027`; empty if the header has none.
    pub(super) version: String,
    /// Number of the release; where the header names none, R2000 for a drawing with subclass markers, else 0.
    pub(super) release: u32,
    /// ASCII or binary.
    pub(super) form: Form,
    /// Line end of the first line: `\n` or `\r\n`.
    pub(super) line_end: &'static str,
    /// Width to which codes are padded with blanks: 3 as a rule, 0 where they are not.
    pub(super) code_width: usize,
    /// How strings turn into characters.
    pub(super) code_page: CodePage,
    /// `$INSUNITS`, or why there is none.
    pub(super) insunits: Result<i64, Unsaid>,
    /// `$MEASUREMENT`.
    pub(super) measurement: Option<i64>,
    /// `$EXTMIN` and `$EXTMAX`: x and y as the last program to save the drawing left them, drawing units.
    pub(super) extents: [[Option<f64>; 2]; 2],
    /// Layers of the table in its order, then those that only entities name, in order of first use.
    pub(super) layers: Vec<ScannedLayer>,
    /// Text styles by folded name.
    pub(super) styles: BTreeMap<String, Style>,
    /// Pointers of the record of layer `0` under 390, 347 and 348, as written.
    pub(super) zero_layer_pointers: [Option<String>; 3],
    /// Whether the table's layer records carry handles.
    pub(super) layers_have_handles: bool,
    /// Entity type names; [`Scan::counts`] indexes them.
    pub(super) types: Vec<String>,
    /// Model-space entities by layer: number of the type, count.
    pub(super) counts: Vec<Vec<(usize, usize)>>,
    /// Model-space entities that can be read, in file order.
    pub(super) entries: Vec<Entry>,
    /// Model-space leaders and points, in file order.
    pub(super) pointing: Vec<Entry>,
    /// Blocks, in file order.
    pub(super) blocks: Vec<BlockEntry>,
    /// Block names that inserts speak of; [`Entry::block`] indexes them.
    pub(super) block_names: Vec<String>,
    /// Layers of attributes that lie on another layer than their insert's, by number of the insert's entry.
    pub(super) attribute_layers: Vec<(u32, u32)>,
    /// Whether some string of the pass could not be decoded with certainty.
    pub(super) names_are_guessed: bool,

    /// `0 SECTION` of BLOCKS.
    pub(super) blocks_start: Option<usize>,
    /// `0 SECTION` of the first ENTITIES section.
    pub(super) entities_start: Option<usize>,
    /// `0 SECTION` of OBJECTS.
    pub(super) objects_start: Option<usize>,
    /// `0 EOF`.
    pub(super) eof_start: Option<usize>,
    /// End of the last tag.
    pub(super) tags_end: usize,
    /// `0 ENDSEC` of HEADER.
    pub(super) header_end: Option<usize>,
    /// `0 ENDSEC` of TABLES.
    pub(super) tables_end: Option<usize>,
    /// `0 ENDTAB` of the LAYER table.
    pub(super) layer_table_end: Option<usize>,
    /// Handle of the LAYER table, as written.
    pub(super) layer_table_handle: Option<String>,
    /// `0 ENDSEC` of the last ENTITIES section.
    pub(super) entities_end: Option<usize>,
    /// The value of `$HANDSEED`: where it stands and what it says.
    pub(super) handseed: Option<(Range<usize>, u64)>,
    /// Handle of the block record of model space, as written; else the owner that a model-space entity names.
    pub(super) model_space_record: Option<String>,
    /// Greatest handle or pointer outside the header and outside entities of this tool's own layers.
    pub(super) greatest_handle: u64,
    /// Whether new records must carry handles.
    pub(super) uses_handles: bool,
    /// Entities on this tool's own layers, each with what follows it up to its SEQEND, without comments behind it.
    pub(super) own_marks: Vec<Range<usize>>,
    /// Least and greatest handle of those.
    pub(super) own_handles: Option<(u64, u64)>,
    /// ENTITIES ends inside a POLYLINE or INSERT sequence without SEQEND.
    pub(super) open_sequence: bool,
    /// What makes no sense and was passed over; `None` for a sound drawing.
    pub(super) passed_over: Option<PassedOver>,
}

/// An entity with what follows it up to its SEQEND.
#[derive(Debug, Clone, Copy)]
pub(super) struct Entry {
    /// Offset of its `0` code line.
    pub(super) start: usize,
    /// Offset past it.
    pub(super) end: usize,
    /// Number of its layer.
    pub(super) layer: u32,
    /// Its number among the model-space entities, from 1, or within its block.
    pub(super) number: u32,
    /// Number of the block's name, for an insert that gives one; else `u32::MAX`.
    pub(super) block: u32,
    /// Whether it is an insert.
    pub(super) is_insert: bool,
    /// Whether it is a POINT.
    pub(super) is_dot: bool,
}

/// A block's definition.
#[derive(Debug, Clone, Default)]
pub(super) struct BlockEntry {
    /// Name, decoded.
    pub(super) name: String,
    /// Base point, drawing units; the origin where none is written. `None` where its record is damaged: what the block
    /// holds then lies nowhere.
    pub(super) base: Option<[f64; 2]>,
    /// Entities that can be read.
    pub(super) entries: Vec<Entry>,
    /// Layers of its inserts' attributes, where they are not the insert's.
    pub(super) attribute_layers: Vec<u32>,
    /// Leaders and points.
    pub(super) pointing: Vec<Entry>,
    /// Whether it stands for another drawing.
    pub(super) is_reference: bool,
    /// What is of types that are not read: how many by number of the layer and of the type.
    pub(super) unread: BTreeMap<(u32, usize), usize>,
}

impl BlockEntry {
    /// Whether it stands for another drawing of which nothing is here.
    pub(super) fn is_absent_reference(&self) -> bool {
        self.is_reference
            && self.entries.is_empty()
            && self.pointing.is_empty()
            && self.unread.is_empty()
    }
}

/// Entity types that are read; of ATTDEF, those of blocks that are constant, since these alone are seen.
pub(super) const READ_TYPES: [&[u8]; 13] = [
    b"LINE",
    b"LWPOLYLINE",
    b"POLYLINE",
    b"ARC",
    b"CIRCLE",
    b"ELLIPSE",
    b"SPLINE",
    b"SOLID",
    b"TRACE",
    b"TEXT",
    b"MTEXT",
    b"INSERT",
    b"ATTDEF",
];

/// Columns that programs write codes in, at most and as a rule.
const WIDEST: usize = 6;
const USUAL_WIDTH: usize = 3;

impl Scan {
    /// Whole entities of model space, of whatever type.
    pub(super) fn entity_count(&self) -> usize {
        let kinds = self.counts.iter().flatten();
        kinds.map(|(_, count)| count).sum::<usize>() + self.own_marks.len()
    }

    /// Nothing found yet; how the file is written is seen at its first line.
    pub(super) fn new(bytes: &[u8]) -> Self {
        let (form, first) = form_of(bytes);
        let rest = bytes.get(first..).unwrap_or_default();
        let line = memchr::memchr(b'\n', rest).map_or(rest, |length| &rest[..length]);
        let code = line.strip_suffix(b"\r").unwrap_or(line);
        let padded = code.first().is_some_and(|b| *b == b' ');
        let width = code.trim_ascii_end().len();
        Self {
            version: String::new(),
            release: 0,
            form,
            line_end: if line.len() == code.len() {
                "\n"
            } else {
                "\r\n"
            },
            code_width: match width {
                _ if !padded => 0,
                0..=WIDEST => width,
                _ => USUAL_WIDTH,
            },
            code_page: CodePage::of("", None),
            insunits: Err(Unsaid::Absent),
            measurement: None,
            extents: [[None; 2]; 2],
            layers: Vec::new(),
            styles: BTreeMap::new(),
            zero_layer_pointers: [None, None, None],
            layers_have_handles: false,
            types: Vec::new(),
            counts: Vec::new(),
            entries: Vec::new(),
            pointing: Vec::new(),
            blocks: Vec::new(),
            block_names: Vec::new(),
            attribute_layers: Vec::new(),
            names_are_guessed: false,
            blocks_start: None,
            entities_start: None,
            objects_start: None,
            eof_start: None,
            tags_end: first,
            header_end: None,
            tables_end: None,
            layer_table_end: None,
            layer_table_handle: None,
            entities_end: None,
            handseed: None,
            model_space_record: None,
            greatest_handle: 0,
            uses_handles: false,
            own_marks: Vec::new(),
            own_handles: None,
            open_sequence: false,
            passed_over: None,
        }
    }
}
