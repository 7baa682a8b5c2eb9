//! Insertion into drawings of every version and form, whole and with pieces missing.

mod dxf_text;

use dxf_text::{Coding, Tag, Value, decode, encode};
use tautplan::drawing::{Align, Drawn, Ink, Mark, Sheet, SheetLayer, Source, insert};

type Coord = geo::Coord<f64>;

const VERSIONS: [&str; 9] = [
    "AC1009", "AC1012", "AC1014", "AC1015", "AC1018", "AC1021", "AC1024", "AC1027", "AC1032",
];

/// What a drawing of ours has or lacks.
#[derive(Debug, Clone, Copy)]
struct Pieces {
    header: bool,
    seed: bool,
    tables: bool,
    layer_table: bool,
    entities: bool,
    eof: bool,
    handles: bool,
}

const WHOLE: Pieces = Pieces {
    header: true,
    seed: true,
    tables: true,
    layer_table: true,
    entities: true,
    eof: true,
    handles: true,
};

/// Every combination of pieces that a drawing can have.
fn all_pieces() -> Vec<Pieces> {
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

fn text(code: i16, value: &str) -> Tag {
    (code, Value::Text(value.to_owned()))
}

/// A small drawing: layer "0", one tendon layer, a line and a circle.
fn drawing(version: &str, pieces: Pieces) -> Vec<Tag> {
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
                tags.push(text(100, if kind == "LINE" { "AcDbLine" } else { "AcDbCircle" }));
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

fn codings(version: &str, pieces: Pieces) -> [Coding; 4] {
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

fn sheet() -> Sheet {
    let layer = |name: &str, rgb, on| SheetLayer {
        name: name.to_owned(),
        ink: Ink { index: 3, rgb },
        on,
    };
    let at = |x: f64, y: f64| Coord { x, y };
    let mark = |name: &str, ink, drawn| Mark {
        layer: name.to_owned(),
        ink,
        drawn,
    };
    let red = Some(Ink {
        index: 1,
        rgb: Some([250, 10, 20]),
    });
    let line = |closed, width_m| Drawn::Line {
        points: vec![at(0.0, 0.0), at(1.0 / 3.0, 2.0), at(4.0, 1.0)],
        width_m,
        closed,
    };
    Sheet {
        layers: vec![
            layer("TAUT-FORCE-SERVICE", Some([1, 2, 3]), true),
            layer("TAUT-FORCE-JACKING", None, false),
            layer("TAUT-TABLE", None, true),
        ],
        marks: vec![
            mark("TAUT-FORCE-SERVICE", red, line(false, 0.05)),
            mark("TAUT-FORCE-JACKING", None, line(true, 0.0)),
            mark(
                "TAUT-TABLE",
                None,
                Drawn::Line3d {
                    points: vec![[0.0, 0.0, -0.1], [5.0, 0.0, -0.25]],
                },
            ),
            mark(
                "TAUT-TABLE",
                red,
                Drawn::Text {
                    place: at(1.0, 2.0),
                    height_m: 0.2,
                    rotation_rad: 0.5,
                    align: Align::Middle,
                    content: "540 kN ±2 ²".to_owned(),
                },
            ),
            mark(
                "TAUT-TABLE",
                None,
                Drawn::Circle {
                    centre: at(3.0, 3.0),
                    radius_m: 0.4,
                },
            ),
            mark(
                "TAUT-TABLE",
                None,
                Drawn::Solid {
                    corners: [at(0.0, 0.0), at(1.0, 0.0), at(1.0, 1.0), at(0.0, 1.0)],
                },
            ),
        ],
    }
}

/// The same layers with fewer marks.
fn smaller_sheet() -> Sheet {
    let mut sheet = sheet();
    sheet.marks.truncate(2);
    sheet
}

fn no_marks() -> Sheet {
    Sheet {
        marks: Vec::new(),
        ..sheet()
    }
}

fn mark(bytes: &[u8], sheet: &Sheet) -> Vec<u8> {
    let source = Source::read(bytes.to_vec()).expect("a drawing that can be read");
    insert(&source, 0.001, sheet).expect("a sheet that can be inserted")
}

/// Panics unless `original` stands in `marked` tag by tag, in order and byte for byte, the seed's value aside.
fn assert_kept(original: &[Tag], coding: Coding, marked: &[u8], what: &str) {
    let marked = decode(marked, coding);
    let mut rest = marked.iter();
    let mut seed_next = false;
    for tag in original {
        let found = rest.any(|candidate| candidate == tag || (seed_next && candidate.0 == 5));
        assert!(found, "{what}: {tag:?} is lost or has moved");
        seed_next = *tag == text(9, "$HANDSEED");
    }
}

/// The handles of all records, in the order of the file.
fn handles(tags: &[Tag]) -> Vec<u64> {
    let seed = text(9, "$HANDSEED");
    tags.windows(2)
        .filter(|pair| pair[0] != seed)
        .filter_map(|pair| match &pair[1] {
            (5, Value::Text(handle)) => Some(u64::from_str_radix(handle, 16).expect("a handle")),
            _ => None,
        })
        .collect()
}

fn seed(tags: &[Tag]) -> Option<u64> {
    let seed = text(9, "$HANDSEED");
    tags.windows(2)
        .find(|pair| pair[0] == seed)
        .and_then(|pair| match &pair[1].1 {
            Value::Text(handle) => u64::from_str_radix(handle, 16).ok(),
            _ => None,
        })
}

fn every_case(mut check: impl FnMut(&[Tag], Coding, &[u8], Pieces, &str)) {
    let mut count = 0;
    for version in VERSIONS {
        for pieces in all_pieces() {
            for coding in codings(version, pieces) {
                let tags = drawing(version, pieces);
                let bytes = encode(&tags, coding);
                let what = format!("{version} {coding:?} {pieces:?}");
                check(&tags, coding, &bytes, pieces, &what);
                count += 1;
            }
        }
    }
    assert_eq!(count, 9 * 68 * 4, "cases were lost");
}

#[test]
fn all_of_the_original_stays_in_every_version_and_form() {
    every_case(|tags, coding, bytes, pieces, what| {
        let marked = mark(bytes, &sheet());
        assert_kept(tags, coding, &marked, what);
        let after = decode(&marked, coding);
        for layer in sheet().layers {
            let records = after.iter().filter(|tag| **tag == text(2, &layer.name));
            assert_eq!(records.count(), 1, "{what}: {}", layer.name);
        }
        let used = handles(&after);
        let mut distinct = used.clone();
        distinct.sort_unstable();
        distinct.dedup();
        assert_eq!(used.len(), distinct.len(), "{what}: a handle is used twice");
        if !pieces.handles {
            assert!(!pieces.header || seed(&after) == pieces.seed.then_some(0x2F) || !used.is_empty(), "{what}");
        } else if pieces.header && !used.is_empty() {
            assert!(seed(&after) > distinct.last().copied(), "{what}: seed {:?}", seed(&after));
        }
    });
}

#[test]
fn marking_a_marked_drawing_gives_the_same_bytes() {
    every_case(|_, _, bytes, _, what| {
        let once = mark(bytes, &sheet());
        assert!(mark(&once, &sheet()) == once, "{what}: a second time differs");
        let fewer = mark(&once, &smaller_sheet());
        assert!(fewer == mark(bytes, &smaller_sheet()), "{what}: a smaller sheet later differs");
        assert!(mark(&fewer, &sheet()) == once, "{what}: the first sheet again differs");
        let none = mark(&once, &no_marks());
        assert!(mark(&none, &no_marks()) == none, "{what}: no marks, twice");
        assert!(mark(&none, &sheet()) == once, "{what}: marks after none");
    });
}
