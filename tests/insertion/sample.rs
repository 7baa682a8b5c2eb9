//! A small drawing in every version and form, whole or with pieces missing.

use crate::dxf_text::{Coding, Tag, Value};

pub(crate) const VERSIONS: [&str; 9] = [
    "AC1009", "AC1012", "AC1014", "AC1015", "AC1018", "AC1021", "AC1024", "AC1027", "AC1032",
];

/// What a drawing of ours has or lacks.
#[expect(
    clippy::struct_excessive_bools,
    reason = "every piece is there or not, independently of the others"
)]
#[derive(Debug, Clone, Copy)]
pub(crate) struct Pieces {
    pub(crate) header: bool,
    pub(crate) seed: bool,
    pub(crate) tables: bool,
    pub(crate) layer_table: bool,
    pub(crate) entities: bool,
    pub(crate) eof: bool,
    pub(crate) handles: bool,
}

pub(crate) const WHOLE: Pieces = Pieces {
    header: true,
    seed: true,
    tables: true,
    layer_table: true,
    entities: true,
    eof: true,
    handles: true,
};

/// Every combination of pieces that a drawing can have.
pub(crate) fn all_pieces() -> Vec<Pieces> {
    let mut all = Vec::new();
    for bits in 0..128_u8 {
        let has = |bit: u8| bits & (1 << bit) == 0;
        let pieces = Pieces {
            header: has(0),
            seed: has(1),
            tables: has(2),
            layer_table: has(3),
            entities: has(4),
            eof: has(5),
            handles: has(6),
        };
        // A seed needs a header, a layer table needs the tables; without EOF and ENTITIES a file was cut short.
        let possible = (pieces.header || !pieces.seed) && (pieces.tables || !pieces.layer_table);
        let something = pieces.entities || pieces.eof;
        if possible && something {
            all.push(pieces);
        }
    }
    all
}

pub(crate) fn text(code: i16, value: &str) -> Tag {
    (code, Value::Text(value.to_owned()))
}

/// A small drawing: layer "0", one tendon layer, a line and a circle.
pub(crate) fn drawing(version: &str, pieces: Pieces) -> Vec<Tag> {
    let modern = version >= "AC1012" && pieces.header;
    let since_2000 = version >= "AC1015" && pieces.header;
    let handles = pieces.handles;
    let mut tags = Vec::new();
    if pieces.header {
        tags.extend([text(0, "SECTION"), text(2, "HEADER")]);
        tags.extend([text(9, "$ACADVER"), text(1, version)]);
        if pieces.seed {
            tags.extend([text(9, "$HANDSEED"), text(5, "2f")]);
        }
        tags.extend([text(9, "$CLAYER"), text(8, "0"), text(0, "ENDSEC")]);
    }
    if pieces.tables {
        tags.extend([text(0, "SECTION"), text(2, "TABLES")]);
        if pieces.layer_table {
            tags.extend([text(0, "TABLE"), text(2, "LAYER")]);
            if modern && handles {
                tags.push(text(5, "2"));
            }
            if modern {
                tags.push(text(100, "AcDbSymbolTable"));
            }
            tags.push((70, Value::Short(2)));
            for (handle, name) in [("10", "0"), ("11", "TENDON-BANDED")] {
                tags.push(text(0, "LAYER"));
                if modern && handles {
                    tags.push(text(5, handle));
                }
                if modern {
                    tags.push(text(100, "AcDbSymbolTableRecord"));
                    tags.push(text(100, "AcDbLayerTableRecord"));
                }
                tags.extend([text(2, name), (70, Value::Short(0)), (62, Value::Short(7))]);
                tags.push(text(6, "CONTINUOUS"));
                if since_2000 {
                    tags.extend([(370, Value::Short(-3)), text(390, "F")]);
                }
            }
            tags.push(text(0, "ENDTAB"));
        }
        if modern {
            tags.extend([text(0, "TABLE"), text(2, "BLOCK_RECORD")]);
            tags.push(text(100, "AcDbSymbolTable"));
            tags.push((70, Value::Short(1)));
            tags.push(text(0, "BLOCK_RECORD"));
            if handles {
                tags.push(text(5, "1F"));
            }
            tags.push(text(100, "AcDbSymbolTableRecord"));
            tags.push(text(100, "AcDbBlockTableRecord"));
            tags.extend([text(2, "*Model_Space"), text(0, "ENDTAB")]);
        }
        tags.push(text(0, "ENDSEC"));
    }
    tags.extend([text(0, "SECTION"), text(2, "BLOCKS"), text(0, "ENDSEC")]);
    if pieces.entities {
        tags.extend([text(0, "SECTION"), text(2, "ENTITIES")]);
        for (kind, handle) in [("LINE", "2A"), ("CIRCLE", "2B")] {
            tags.push(text(0, kind));
            if handles {
                tags.push(text(5, handle));
            }
            if modern {
                tags.push(text(100, "AcDbEntity"));
            }
            tags.push(text(8, "TENDON-BANDED"));
            if modern {
                tags.push(text(
                    100,
                    if kind == "LINE" {
                        "AcDbLine"
                    } else {
                        "AcDbCircle"
                    },
                ));
            }
            for code in [10, 20, 30] {
                tags.push((code, Value::Real(1.5)));
            }
            if kind == "LINE" {
                for code in [11, 21, 31] {
                    tags.push((code, Value::Real(2500.0)));
                }
            } else {
                tags.push((40, Value::Real(10.0)));
            }
        }
        tags.push(text(0, "ENDSEC"));
    }
    if pieces.eof {
        tags.push(text(0, "EOF"));
    }
    tags
}

pub(crate) fn codings(version: &str, pieces: Pieces) -> [Coding; 4] {
    [
        Coding::ascii("\n", 0),
        Coding::ascii("\r\n", 3),
        Coding::Ascii {
            line_end: "\n",
            code_width: 3,
            last_line_end: false,
        },
        Coding::Binary {
            wide: version >= "AC1012" && pieces.header,
        },
    ]
}

pub(crate) const LF: Coding = Coding::Ascii {
    line_end: "\n",
    code_width: 3,
    last_line_end: true,
};

/// Puts tags in before the `occurrence`th tag like `before`.
pub(crate) fn with(
    mut tags: Vec<Tag>,
    before: &Tag,
    occurrence: usize,
    more: Vec<Tag>,
) -> Vec<Tag> {
    let mut like = tags.iter().enumerate().filter(|(_, tag)| *tag == before);
    let (at, _) = like.nth(occurrence).expect("a place");
    tags.splice(at..at, more);
    tags
}

/// Before the end of ENTITIES.
pub(crate) fn drawn(tags: Vec<Tag>, more: Vec<Tag>) -> Vec<Tag> {
    let last = tags.iter().filter(|tag| **tag == text(0, "ENDSEC")).count() - 1;
    with(tags, &text(0, "ENDSEC"), last, more)
}

pub(crate) fn line(handle: &str, layer: &str) -> Vec<Tag> {
    let mut tags = vec![text(0, "LINE"), text(5, handle), text(100, "AcDbEntity")];
    tags.extend([text(8, layer), text(100, "AcDbLine")]);
    tags.extend([10, 20, 30, 11, 21, 31].map(|code| (code, Value::Real(1.0))));
    tags
}
