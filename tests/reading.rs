//! Drawings as they are met: what is read of each, and what is said of the rest.

use std::path::Path;

use tautplan::drawing::{Drawing, Refusal, ShapeKind, Text, UnitFrom, Wanted, open, read};
use tautplan::finding::Finding;
use tautplan::geometry::{Coord, distance_m};

fn bytes(name: &str) -> Vec<u8> {
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/data");
    std::fs::read(path.join(name)).unwrap_or_else(|error| panic!("{name}: {error}"))
}

fn drawing(name: &str) -> (Drawing, Vec<Finding>) {
    let source = open(bytes(name)).unwrap_or_else(|refusal| panic!("{name}: {refusal}"));
    let (drawing, mut findings) = read(&source, &Wanted::everything(), None);
    findings.retain(|finding| finding.rule.name != "unit-assumed");
    (drawing, findings)
}

fn trigger(name: &str) -> (Drawing, Vec<Finding>) {
    drawing(&format!("dxf-triggers/{name}.dxf"))
}

fn refusal(name: &str) -> Refusal {
    open(bytes(&format!("dxf-triggers/{name}.dxf")))
        .map(|_| ())
        .expect_err(name)
}

fn at(x: f64, y: f64) -> Coord<f64> {
    Coord { x, y }
}

#[track_caller]
fn assert_near(found: Coord<f64>, expected: Coord<f64>) {
    assert!(
        distance_m(found, expected) < 1e-9,
        "{found:?} is not {expected:?}"
    );
}

#[test]
fn texts_keep_their_tails_and_characters() {
    for (name, content) in [
        ("text_bslash_tail", r"C:\dir"),
        ("mtext_P_end", "12\n34"),
        ("mtext_stack", "1/2 tail text"),
        ("text_gbk", "中文"),
        ("text_1251", "Жи"),
        ("text_caret_digit", "m^2"),
    ] {
        let (drawing, findings) = trigger(name);
        assert_eq!(drawing.texts.len(), 1, "{name}");
        assert_eq!(drawing.texts[0].content, content, "{name}");
        assert!(findings.is_empty(), "{name}: {findings:?}");
    }
    let (drawing, _) = trigger("mtext_chunk_split_U");
    assert!(drawing.texts[0].content.ends_with("AØ END tail"));
}

#[test]
fn guessed_characters_are_said() {
    let (drawing, findings) = trigger("text_latin1_in_r2007");
    assert_eq!(drawing.texts[0].content, "Ø15");
    assert_eq!(findings.len(), 1);
    assert_eq!(findings[0].rule.name, "text-code-page");
}

#[test]
fn an_mtext_of_r2018_stands_where_it_was_put() {
    let (drawing, _) = trigger("r2018_mtext");
    let text = &drawing.texts[0];
    assert_near(text.place, at(0.1, 0.2));
    assert!((text.height_m - 0.0025).abs() < 1e-12);
    assert!(text.rotation_rad.abs() < 1e-12);
}

#[test]
fn what_is_no_business_of_ours_does_no_harm() {
    for name in [
        "r12_dimblk5",
        "thumb_bad_hdr",
        "datatable_huge",
        "tdcreate_huge",
        "badint_in_unknown_ent",
        "type_trailing_space",
        "block_bad_text",
    ] {
        let (drawing, findings) = trigger(name);
        assert_eq!(drawing.shapes.len(), 1, "{name}");
        assert!(findings.is_empty(), "{name}: {findings:?}");
    }
    assert_eq!(trigger("two_entities_sections").0.shapes.len(), 2);
    assert_eq!(trigger("attdef_then_mtext").0.texts[0].content, "free text");
}

#[test]
fn layers_are_frozen_off_and_alike_in_any_letter_case() {
    let (drawing, _) = trigger("layer_flags");
    let layers: Vec<_> = drawing
        .layers
        .iter()
        .map(|l| (l.name.as_str(), l.off, l.frozen))
        .collect();
    assert_eq!(
        layers,
        [
            ("0", false, false),
            ("FROZ", false, true),
            ("OFF", true, false)
        ]
    );
    assert_eq!(drawing.layers[1].counts, [("LINE".to_owned(), 1)]);
    assert_eq!(drawing.shapes[0].layer, "FROZ");
}

#[test]
fn a_damaged_entity_is_left_out_and_said_even_as_the_last() {
    let (drawing, findings) = trigger("ent_bad_last_pair");
    assert_eq!(drawing.shapes.len(), 1);
    assert_eq!(findings.len(), 1);
    assert_eq!(findings[0].rule.name, "entity-damaged");
    for word in ["LINE A1", "layer 0", "line 49", "group 31", "\"bad\""] {
        assert!(findings[0].text.contains(word), "{}", findings[0].text);
    }
}

#[test]
fn what_cannot_be_read_whole_is_refused() {
    assert!(matches!(refusal("dwg"), Refusal::Dwg { version } if version == "AC1032"));
    assert!(matches!(refusal("bom_utf16"), Refusal::NotDxf { .. }));
    assert_eq!(open(Vec::new()).map(|_| ()), Err(Refusal::Empty));
}

const VERSIONS: [(&str, &str); 7] = [
    ("R12", "AC1009"),
    ("R2000", "AC1015"),
    ("R2004", "AC1018"),
    ("R2007", "AC1021"),
    ("R2010", "AC1024"),
    ("R2013", "AC1027"),
    ("R2018", "AC1032"),
];

#[test]
fn every_version_reads_alike_in_text_and_in_binary() {
    let (newest, _) = drawing("versions/plan-R2018-ascii.dxf");
    assert_eq!(newest.unit_from, UnitFrom::Header);
    assert_eq!(newest.shapes.len(), 24);
    for (release, version) in VERSIONS {
        for form in ["ascii", "binary"] {
            let name = format!("versions/plan-{release}-{form}.dxf");
            let (found, findings) = drawing(&name);
            assert_eq!(found.version, version);
            assert!(findings.is_empty(), "{name}: {findings:?}");
            assert!((found.unit_m - 0.001).abs() < 1e-15);
            let old = release == "R12";
            let shapes = newest.shapes.iter();
            let shapes: Vec<_> = shapes
                .filter(|shape| !old || shape.kind != ShapeKind::Spline)
                .collect();
            assert_eq!(found.shapes.len(), shapes.len(), "{name}");
            for (shape, expected) in found.shapes.iter().zip(shapes) {
                assert_eq!(shape.layer, expected.layer, "{name}");
                assert_eq!(shape.kind, expected.kind, "{name}");
                assert_eq!(shape.closed, expected.closed, "{name}");
                let (path, other) = (&shape.path, &expected.path);
                assert!((path.length_m() - other.length_m()).abs() < 1e-9, "{name}");
                for part in 0..=10 {
                    let station_m = path.length_m() * f64::from(part) / 10.0;
                    assert_near(path.place_at(station_m), other.place_at(station_m));
                }
            }
            let texts = newest.texts.iter();
            let texts: Vec<&Text> = texts
                .filter(|text| !old || !text.content.contains('\n'))
                .collect();
            assert_eq!(found.texts.len(), texts.len(), "{name}");
            for (text, expected) in found.texts.iter().zip(texts) {
                assert_eq!(text.content, expected.content, "{name}");
                assert_eq!(text.layer, expected.layer, "{name}");
                assert_near(text.place, expected.place);
                assert_near(text.corners[2], expected.corners[2]);
            }
            assert_eq!(found.inserts.len(), newest.inserts.len(), "{name}");
            for (insert, expected) in found.inserts.iter().zip(&newest.inserts) {
                assert_eq!(insert.block, expected.block, "{name}");
                assert_eq!(insert.layer, expected.layer, "{name}");
                assert_eq!(insert.attributes, expected.attributes, "{name}");
                assert_near(insert.place, expected.place);
                assert!((insert.rotation_rad - expected.rotation_rad).abs() < 1e-9);
            }
        }
    }
}

#[test]
fn only_wanted_layers_are_read_also_through_inserts_on_others() {
    let source = open(bytes("versions/plan-R2010-ascii.dxf")).expect("read");
    let wanted = Wanted::layers(["tendon-end", "SLAB*"]).expect("patterns");
    let (drawing, _) = read(&source, &wanted, None);
    assert!(
        drawing
            .shapes
            .iter()
            .all(|shape| shape.layer == "TENDON-END" || shape.layer == "SLAB-EDGE")
    );
    // Outline and column; an end of two shapes; two copies of a pair of ends; of the pair on a layer that is not
    // read, the two circles and the line that lie on the ends' layer.
    assert_eq!(drawing.shapes.len(), 2 + 2 + 8 + 3);
    assert_eq!(drawing.texts.len(), 1);
    assert_eq!(drawing.inserts.len(), 1 + 2 * 3 + 1);
    assert_eq!(drawing.layers.len(), source.layers().len());
}

#[test]
fn blocks_stand_where_their_inserts_put_them() {
    let (drawing, _) = drawing("versions/plan-R2013-binary.dxf");
    let end = |index: usize| &drawing.inserts[index];
    assert_eq!(
        end(0).attributes,
        [("JACK".to_owned(), "2-STAGE".to_owned())]
    );
    assert_near(end(0).place, at(12.0, 0.0));
    assert!((end(0).rotation_rad.to_degrees() - 30.0).abs() < 1e-9);
    // The second end of the second copy of the pair: 4 m along, 0.5 m × 2 within, mirrored.
    assert_eq!(
        (end(6).block.as_str(), end(6).handle.as_str()),
        ("LIVE-END", "57")
    );
    assert_near(end(6).place, at(5.0, 9.0));
    let circle = drawing
        .shapes
        .iter()
        .rfind(|shape| shape.handle == "57" && shape.kind == ShapeKind::Circle)
        .expect("a circle");
    assert!((circle.path.length_m() - 0.05 * std::f64::consts::TAU).abs() < 1e-12);
    assert!(circle.closed);
}
