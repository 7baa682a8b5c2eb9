//! Insertion into drawings of every version and form, whole and with pieces missing.

mod dxf_text;

use dxf_text::{Coding, Tag, Value, decode, encode};
use tautplan::drawing::{Align, Drawn, Ink, Mark, Sheet, SheetLayer, insert, open};

type Coord = geo::Coord<f64>;

const VERSIONS: [&str; 9] = [
    "AC1009", "AC1012", "AC1014", "AC1015", "AC1018", "AC1021", "AC1024", "AC1027", "AC1032",
];

/// What a drawing of ours has or lacks.
#[expect(
    clippy::struct_excessive_bools,
    reason = "every piece is there or not, independently of the others"
)]
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
    let source = open(bytes.to_vec()).expect("a drawing that can be read");
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

fn version_of(tags: &[Tag]) -> &str {
    let variable = text(9, "$ACADVER");
    let mut pairs = tags.windows(2).filter(|pair| pair[0] == variable);
    match pairs.next().map(|pair| &pair[1].1) {
        Some(Value::Text(version)) => version,
        _ => "",
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
    assert_eq!(count, 9 * 54 * 4, "cases were lost");
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
        let old_without = version_of(tags) < "AC1012" && !(pieces.handles && pieces.entities);
        assert_eq!(used.is_empty(), old_without, "{what}: handles");
        if pieces.header && !used.is_empty() {
            assert!(seed(&after) > distinct.last().copied(), "{what}: seed");
        }
    });
}

#[test]
fn marking_a_marked_drawing_gives_the_same_bytes() {
    every_case(|_, _, bytes, _, what| {
        let once = mark(bytes, &sheet());
        assert!(
            mark(&once, &sheet()) == once,
            "{what}: a second time differs"
        );
        let fewer = mark(&once, &smaller_sheet());
        assert!(
            fewer == mark(bytes, &smaller_sheet()),
            "{what}: a smaller sheet later differs"
        );
        assert!(
            mark(&fewer, &sheet()) == once,
            "{what}: the first sheet again differs"
        );
        let none = mark(&once, &no_marks());
        assert!(mark(&none, &no_marks()) == none, "{what}: no marks, twice");
        assert!(mark(&none, &sheet()) == once, "{what}: marks after none");
    });
}

/// The tags of a drawing that was marked in ASCII form.
fn marked_tags(tags: &[Tag], sheet: &Sheet) -> Vec<Tag> {
    let coding = Coding::ascii("\n", 3);
    decode(&mark(&encode(tags, coding), sheet), coding)
}

/// The group codes of the first record of that name on that layer, markers and line types with their words.
fn shape(tags: &[Tag], name: &str, layer: &str) -> String {
    let records = tags.chunk_by(|_, next| next.0 != 0);
    let mut on_layer = records.filter(|record| {
        record[0] == text(0, name)
            && (record.contains(&text(8, layer)) || record.contains(&text(2, layer)))
    });
    let record = on_layer.next().expect("a record");
    let words = record.iter().map(|(code, value)| match value {
        Value::Text(word) if [6, 100].contains(code) => format!("{code} {word}"),
        _ => code.to_string(),
    });
    words.collect::<Vec<_>>().join(",")
}

#[test]
fn layer_records_have_the_tags_of_their_version_in_order() {
    for (version, expected) in [
        ("AC1009", "0,2,70,62,6 CONTINUOUS"),
        ("AC1014", "0,5,330,M,2,70,62,6 Continuous"),
        ("AC1015", "0,5,330,M,2,70,62,6 Continuous,370,390"),
        ("AC1018", "0,5,330,M,2,70,62,420,6 Continuous,370,390"),
        ("AC1032", "0,5,330,M,2,70,62,420,6 Continuous,370,390"),
    ] {
        let after = marked_tags(&drawing(version, WHOLE), &sheet());
        let markers = "100 AcDbSymbolTableRecord,100 AcDbLayerTableRecord";
        let expected = expected.replace('M', markers);
        assert_eq!(
            shape(&after, "LAYER", "TAUT-FORCE-SERVICE"),
            expected,
            "{version}"
        );
        let off = after
            .iter()
            .position(|tag| *tag == text(2, "TAUT-FORCE-JACKING"));
        assert_eq!(
            after[off.expect("a layer") + 2],
            (62, Value::Short(-3)),
            "{version}"
        );
    }
}

#[test]
fn entities_have_the_tags_of_their_version_in_order() {
    let head = "0,5,330,100 AcDbEntity,8";
    let cases = [
        (
            "AC1009",
            "POLYLINE",
            "TAUT-FORCE-SERVICE",
            "0,5,8,62,66,10,20,30,70,40,41".to_owned(),
        ),
        (
            "AC1009",
            "VERTEX",
            "TAUT-FORCE-SERVICE",
            "0,5,8,10,20,30,40,41".to_owned(),
        ),
        (
            "AC1009",
            "TEXT",
            "TAUT-TABLE",
            "0,5,8,62,10,20,30,40,1,50,72,11,21,31,73".to_owned(),
        ),
        (
            "AC1012",
            "POLYLINE",
            "TAUT-FORCE-SERVICE",
            "0,5,100 AcDbEntity,8,62,100 AcDb2dPolyline,66,10,20,30,70,40,41".to_owned(),
        ),
        (
            "AC1012",
            "VERTEX",
            "TAUT-FORCE-SERVICE",
            "0,5,100 AcDbEntity,8,100 AcDbVertex,100 AcDb2dVertex,10,20,30,40,41".to_owned(),
        ),
        (
            "AC1014",
            "LWPOLYLINE",
            "TAUT-FORCE-SERVICE",
            "0,5,100 AcDbEntity,8,62,100 AcDbPolyline,90,70,43,10,20,10,20,10,20".to_owned(),
        ),
        (
            "AC1015",
            "LWPOLYLINE",
            "TAUT-FORCE-SERVICE",
            format!("{head},62,100 AcDbPolyline,90,70,43,10,20,10,20,10,20"),
        ),
        (
            "AC1018",
            "LWPOLYLINE",
            "TAUT-FORCE-SERVICE",
            format!("{head},62,420,100 AcDbPolyline,90,70,43,10,20,10,20,10,20"),
        ),
        (
            "AC1032",
            "LWPOLYLINE",
            "TAUT-FORCE-JACKING",
            format!("{head},100 AcDbPolyline,90,70,10,20,10,20,10,20"),
        ),
        (
            "AC1032",
            "POLYLINE",
            "TAUT-TABLE",
            format!("{head},100 AcDb3dPolyline,66,10,20,30,70"),
        ),
        (
            "AC1032",
            "VERTEX",
            "TAUT-TABLE",
            format!("{head},100 AcDbVertex,100 AcDb3dPolylineVertex,10,20,30,70"),
        ),
        ("AC1032", "SEQEND", "TAUT-TABLE", head.to_owned()),
        (
            "AC1032",
            "TEXT",
            "TAUT-TABLE",
            format!("{head},62,420,100 AcDbText,10,20,30,40,1,50,72,11,21,31,100 AcDbText,73"),
        ),
        (
            "AC1032",
            "CIRCLE",
            "TAUT-TABLE",
            format!("{head},100 AcDbCircle,10,20,30,40"),
        ),
        (
            "AC1032",
            "SOLID",
            "TAUT-TABLE",
            format!("{head},100 AcDbTrace,10,20,30,11,21,31,12,22,32,13,23,33"),
        ),
    ];
    for (version, name, layer, expected) in cases {
        let after = marked_tags(&drawing(version, WHOLE), &sheet());
        assert_eq!(shape(&after, name, layer), expected, "{version} {name}");
    }
}

#[test]
fn values_are_in_drawing_units_and_said_as_the_version_can() {
    let after = marked_tags(&drawing("AC1015", WHOLE), &sheet());
    assert!(after.contains(&text(1, "540 kN %%p2 \\U+00B2")));
    let newer = marked_tags(&drawing("AC1021", WHOLE), &sheet());
    assert!(newer.contains(&text(1, "540 kN %%p2 ²")));
    assert!(newer.contains(&(420, Value::Long(0xFA_0A_14))));
    // A third of a metre in millimetres, to a millionth; half a radian in degrees.
    assert!(newer.contains(&(10, Value::Real(333.333_333))));
    assert!(newer.contains(&(50, Value::Real(28.647_89))));
    let corners = newer.iter().position(|tag| *tag == text(100, "AcDbTrace"));
    let solid = &newer[corners.expect("a solid") + 1..][..12];
    let x: Vec<_> = solid
        .iter()
        .step_by(3)
        .map(|(_, value)| value.clone())
        .collect();
    assert_eq!(x, [0.0, 1000.0, 0.0, 1000.0].map(Value::Real));
}

/// Puts tags in before the `occurrence`th tag like `before`.
fn with(mut tags: Vec<Tag>, before: &Tag, occurrence: usize, more: Vec<Tag>) -> Vec<Tag> {
    let mut like = tags.iter().enumerate().filter(|(_, tag)| *tag == before);
    let (at, _) = like.nth(occurrence).expect("a place");
    tags.splice(at..at, more);
    tags
}

/// Before the end of ENTITIES.
fn drawn(tags: Vec<Tag>, more: Vec<Tag>) -> Vec<Tag> {
    let last = tags.iter().filter(|tag| **tag == text(0, "ENDSEC")).count() - 1;
    with(tags, &text(0, "ENDSEC"), last, more)
}

fn line(handle: &str, layer: &str) -> Vec<Tag> {
    let mut tags = vec![text(0, "LINE"), text(5, handle), text(100, "AcDbEntity")];
    tags.extend([text(8, layer), text(100, "AcDbLine")]);
    tags.extend([10, 20, 30, 11, 21, 31].map(|code| (code, Value::Real(1.0))));
    tags
}

const LF: Coding = Coding::Ascii {
    line_end: "\n",
    code_width: 3,
    last_line_end: true,
};

#[test]
fn handles_and_seed_give_way_to_what_others_added_after_a_marking() {
    let original = drawing("AC1027", WHOLE);
    let once = marked_tags(&original, &sheet());
    let free = seed(&once).expect("a seed");
    assert_eq!(free, 0x2F + 3 + 9, "layers and marks follow the old seed");

    // A line drawn since, with the next handle, and the seed raised for it.
    let mut later = drawn(once.clone(), line(&format!("{free:X}"), "SLAB-EDGE"));
    for tag in &mut later {
        if *tag == text(5, &format!("{free:X}")) {
            *tag = text(5, &format!("{:X}", free + 0x10));
            break;
        }
    }
    let again = marked_tags(&later, &smaller_sheet());
    assert_kept(&original, LF, &encode(&again, LF), "drawn since");
    assert!(again.contains(&text(8, "SLAB-EDGE")));
    let new: Vec<u64> = handles(&again)
        .into_iter()
        .filter(|handle| *handle > free)
        .collect();
    assert_eq!(new, [free + 1, free + 2]);
    assert_eq!(
        seed(&again),
        Some(free + 0x10),
        "a seed raised by others is not lowered"
    );
    assert_eq!(marked_tags(&again, &smaller_sheet()), again);
}

#[test]
fn handles_at_the_end_of_the_numbers_leave_a_gap_to_use() {
    let original = drawn(drawing("AC1027", WHOLE), line("FFFFFFFFFFFFFFFE", "0"));
    let once = marked_tags(&original, &sheet());
    assert_kept(&original, LF, &encode(&once, LF), "full");
    assert_eq!(seed(&once), Some(0x2F), "the seed stays");
    let mut used = handles(&once);
    used.sort_unstable();
    used.dedup();
    assert_eq!(used.len(), handles(&once).len());
    assert_eq!(marked_tags(&once, &sheet()), once);
    let fewer = marked_tags(&once, &smaller_sheet());
    assert_eq!(marked_tags(&fewer, &sheet()), once);
}

#[test]
fn a_sequence_left_open_is_ended_before_the_marks() {
    let polyline = vec![
        text(0, "POLYLINE"),
        text(5, "2C"),
        text(8, "TENDON-BANDED"),
        (66, Value::Short(1)),
        text(0, "VERTEX"),
        text(5, "2D"),
        text(8, "TENDON-BANDED"),
        (10, Value::Real(1.0)),
        (20, Value::Real(1.0)),
    ];
    let original = drawn(drawing("AC1009", WHOLE), polyline);
    let once = marked_tags(&original, &sheet());
    let end = once.iter().position(|tag| *tag == text(0, "SEQEND"));
    assert_eq!(
        once[end.expect("an end") + 1..][..2],
        [text(5, "2F"), text(8, "0")]
    );
    assert_eq!(marked_tags(&once, &sheet()), once);
    assert_eq!(
        marked_tags(&original, &no_marks()).len(),
        original.len() + 3 * 5
    );
}

#[test]
fn a_layer_that_is_there_in_any_letter_case_keeps_its_record() {
    let frozen = vec![
        text(0, "LAYER"),
        text(5, "12"),
        text(100, "AcDbSymbolTableRecord"),
        text(100, "AcDbLayerTableRecord"),
        text(2, "taut-Table"),
        (70, Value::Short(1)),
        (62, Value::Short(5)),
        text(6, "Continuous"),
    ];
    let original = with(drawing("AC1032", WHOLE), &text(0, "ENDTAB"), 0, frozen);
    let once = marked_tags(&original, &sheet());
    assert_kept(&original, LF, &encode(&once, LF), "frozen");
    assert!(!once.contains(&text(2, "TAUT-TABLE")));
    assert_eq!(marked_tags(&once, &sheet()), once);
}

#[test]
fn comments_strange_tails_and_several_entities_sections_stay() {
    let original = with(
        drawing("AC1015", WHOLE),
        &text(0, "EOF"),
        0,
        vec![
            text(0, "SECTION"),
            text(2, "ENTITIES"),
            text(999, "0"),
            text(0, "ENDSEC"),
            text(999, "a comment"),
        ],
    );
    let mut bytes = encode(&original, LF);
    bytes.extend(b"\n\n\x1a");
    let once = mark(&bytes, &sheet());
    let body = once.strip_suffix(b"\n\n\x1a").expect("the tail");
    assert_kept(&original, LF, body, "several");
    assert!(mark(&once, &sheet()) == once);
}

#[test]
fn a_sheet_without_anything_changes_nothing() {
    every_case(|_, _, bytes, _, what| {
        assert!(mark(bytes, &Sheet::default()) == bytes, "{what}");
    });
}

#[test]
fn places_that_are_no_numbers_are_refused() {
    let bytes = encode(&drawing("AC1027", WHOLE), LF);
    let source = open(bytes).expect("a drawing");
    for unit_m in [0.0, -1.0, f64::NAN] {
        assert!(insert(&source, unit_m, &sheet()).is_err());
    }
    let mut sheet = sheet();
    sheet.marks[4].drawn = Drawn::Circle {
        centre: Coord {
            x: f64::NAN,
            y: 0.0,
        },
        radius_m: 1.0,
    };
    let refusal = insert(&source, 0.001, &sheet).expect_err("no place");
    assert!(refusal.to_string().contains("TAUT-TABLE"), "{refusal}");
}

/// Marks every drawing of the folder `DRAWINGS` into the folder `MARKED`, for checks from outside (such as
/// `tests/python/check_lossless.py`); a drawing that is refused is named in `refused.txt` there.
#[test]
#[ignore = "needs folders: DRAWINGS=from MARKED=to cargo test --test insertion -- --ignored"]
fn mark_a_folder() {
    let folder = |name: &str| std::path::PathBuf::from(std::env::var_os(name).expect("a folder"));
    let mut paths: Vec<_> = std::fs::read_dir(folder("DRAWINGS"))
        .expect("a folder")
        .map(|entry| entry.expect("an entry").path())
        .collect();
    paths.sort();
    let mut refused = String::new();
    for path in paths {
        let name = path.file_name().expect("a name");
        match open(std::fs::read(&path).expect("a file")) {
            Ok(source) => {
                let marked = insert(&source, 0.001, &sheet()).expect("a sheet");
                let again = mark(&marked, &sheet());
                assert!(again == marked, "{path:?}: a second time differs");
                std::fs::write(folder("MARKED").join(name), marked).expect("written");
            }
            Err(refusal) => {
                refused += &path.display().to_string();
                refused += &format!(": {refusal}\n");
            }
        }
    }
    std::fs::write(folder("MARKED").join("refused.txt"), refused).expect("written");
}
