//! Blocks in blocks: layers, handles, scales, and what never ends.

use tautplan::drawing::{Drawing, UnitFrom, Wanted, open, read};
use tautplan::finding::Finding;
use tautplan::geometry::{Coord, distance_m};
use tautplan::units::LengthUnit;

/// A drawing from the tags of its blocks and entities: codes and values in turn, blanks between.
fn drawing(blocks: &str, entities: &str) -> (Drawing, Vec<Finding>) {
    read_layers(blocks, entities, &Wanted::everything())
}

fn read_layers(blocks: &str, entities: &str, wanted: &Wanted) -> (Drawing, Vec<Finding>) {
    let tags = format!(
        "0 SECTION 2 BLOCKS {blocks} 0 ENDSEC 0 SECTION 2 ENTITIES {entities} 0 ENDSEC 0 EOF"
    );
    let words: Vec<&str> = tags.split_whitespace().collect();
    let text = words.join("\n") + "\n";
    let source = open(text.into_bytes()).expect("a drawing");
    read(&source, wanted, Some(LengthUnit::M))
}

fn rules(findings: &[Finding]) -> Vec<&str> {
    findings.iter().map(|finding| finding.rule.name).collect()
}

fn at(x: f64, y: f64) -> Coord<f64> {
    Coord { x, y }
}

const UNIT_LINE: &str = "0 LINE 8 0 10 0 20 0 11 1 21 0";

#[test]
fn layer_0_of_a_block_takes_the_layer_of_the_insert_through_any_depth() {
    let (drawing, findings) = drawing(
        &format!(
            "0 BLOCK 8 0 2 IN 10 0 20 0 {UNIT_LINE} 0 LINE 8 OWN 10 0 20 0 11 1 21 0 0 ENDBLK
             0 BLOCK 8 0 2 OUT 10 0 20 0 0 INSERT 8 0 2 in 10 0 20 0 0 ENDBLK"
        ),
        "0 INSERT 5 1A 8 TOP 2 OUT 10 5 20 5",
    );
    assert!(findings.is_empty(), "{findings:?}");
    let shapes: Vec<_> = drawing
        .shapes
        .iter()
        .map(|s| (s.layer.as_str(), s.handle.as_str()))
        .collect();
    assert_eq!(shapes, [("TOP", "1A"), ("OWN", "1A")]);
    let inserts: Vec<_> = drawing.inserts.iter().map(|i| i.block.as_str()).collect();
    assert_eq!(inserts, ["OUT", "in"]);
    let within: Vec<_> = drawing.inserts.iter().map(|i| i.within).collect();
    assert_eq!(within, [None, Some(0)]);
    assert!(drawing.shapes.iter().all(|shape| shape.within == Some(1)));
    assert_eq!(drawing.unit_from, UnitFrom::Job);
}

#[test]
fn base_scale_turn_and_shift_follow_in_this_order() {
    let (drawing, _) = drawing(
        "0 BLOCK 8 0 2 B 10 1 20 2 0 LINE 8 0 10 1 20 2 11 2 21 3 0 ENDBLK",
        "0 INSERT 8 0 2 B 10 10 20 20 41 2 42 -3 50 90",
    );
    let path = &drawing.shapes[0].path;
    let ends = (path.start().expect("start"), path.end().expect("end"));
    assert!(distance_m(ends.0, at(10.0, 20.0)) < 1e-12);
    assert!(distance_m(ends.1, at(13.0, 22.0)) < 1e-12);
}

#[test]
fn an_arc_under_unequal_scales_stays_smooth() {
    let (drawing, _) = drawing(
        "0 BLOCK 8 0 2 B 10 0 20 0 0 ARC 8 0 10 0 20 0 40 2 50 0 51 180 0 ENDBLK",
        "0 INSERT 8 0 2 B 10 0 20 0 41 3 42 1",
    );
    let path = &drawing.shapes[0].path;
    assert!(path.corners().is_empty(), "{:?}", path.corners());
    for part in 0..=50 {
        let p = path.place_at(path.length_m() * f64::from(part) / 50.0);
        let off = ((p.x / 3.0).hypot(p.y) - 2.0).abs();
        assert!(off < 1e-3, "{off}");
    }
}

#[test]
fn a_block_in_itself_is_cut_and_said() {
    let (drawing, findings) = drawing(
        &format!(
            "0 BLOCK 8 0 2 A 10 0 20 0 {UNIT_LINE} 0 INSERT 8 0 2 B 10 1 20 0 0 ENDBLK
             0 BLOCK 8 0 2 B 10 0 20 0 {UNIT_LINE} 0 INSERT 8 0 2 A 10 1 20 0 0 ENDBLK"
        ),
        "0 INSERT 8 0 2 A 10 0 20 0",
    );
    assert_eq!(drawing.shapes.len(), 2);
    assert_eq!(rules(&findings), ["block-in-itself"]);
}

/// Blocks of which each holds `content` and an insert of the next.
fn blocks_in_turn(count: usize, name: char, content: &str, array: &str) -> String {
    let block = |n: usize| {
        let next = n + 1;
        format!(
            "0 BLOCK 8 0 2 {name}{n} 10 0 20 0 {content}
             0 INSERT 8 0 2 {name}{next} 10 0 20 0 {array} 0 ENDBLK "
        )
    };
    (0..count).map(block).collect()
}

#[test]
fn blocks_too_deep_and_too_many_are_cut_and_said() {
    let chain = blocks_in_turn(40, 'B', UNIT_LINE, "");
    let (deep, findings) = drawing(&chain, "0 INSERT 8 0 2 B0 10 0 20 0");
    assert_eq!(deep.shapes.len(), 32);
    assert_eq!(rules(&findings), ["block-too-deep"]);

    // Each block inserts the next a hundred times: 10^10 lines, were they drawn.
    let bomb = blocks_in_turn(5, 'C', "", "70 10 71 10 44 1 45 1");
    let (_, findings) = drawing(&bomb, "0 INSERT 8 0 2 C0 10 0 20 0");
    assert!(rules(&findings).contains(&"block-too-many"));
}

#[test]
fn an_insert_of_no_block_is_kept_and_said_once() {
    let (drawing, findings) = drawing("", "0 INSERT 8 0 2 X 10 0 20 0 0 INSERT 8 0 2 X 10 1 20 0");
    assert_eq!(drawing.inserts.len(), 2);
    assert_eq!(rules(&findings), ["block-missing"]);
    assert_eq!(drawing.inserts[0].handle, "#1");
    assert_eq!(drawing.inserts[1].handle, "#2");
}

#[test]
fn attributes_lie_on_their_own_layer_or_on_the_inserts() {
    let insert = "0 INSERT 5 A 8 ENDS 66 1 2 X 10 0 20 0
        0 ATTRIB 5 B 8 MARKS 10 1 20 2 40 0.5 2 MARK 1 D012
        0 ATTRIB 5 C 8 0 10 1 20 3 40 0.5 2 JACK 1 LIVE 72 1 11 4 21 4
        0 ATTRIB 5 D 8 MARKS 10 1 20 3 40 0.5 2 HIDDEN 1 h 70 1 0 SEQEND 8 ENDS";
    let (drawing, _) = drawing("", insert);
    let texts: Vec<_> = drawing
        .texts
        .iter()
        .map(|t| {
            (
                t.handle.as_str(),
                t.layer.as_str(),
                t.content.as_str(),
                t.hidden,
            )
        })
        .collect();
    assert_eq!(
        texts,
        [
            ("B", "MARKS", "D012", false),
            ("C", "ENDS", "LIVE", false),
            ("D", "MARKS", "h", true)
        ]
    );
    assert!(distance_m(drawing.texts[1].place, at(4.0, 4.0)) < 1e-12);
    assert_eq!(drawing.inserts[0].attributes.len(), 3);

    // An attribute without a place has a value, and is no text anywhere.
    let nowhere = "0 INSERT 5 A 8 ENDS 66 1 2 X 10 0 20 0
        0 ATTRIB 5 B 8 MARKS 40 0.5 2 MARK 1 D012 70 0 0 SEQEND 8 ENDS";
    let (drawing, _) = self::drawing("", nowhere);
    assert!(drawing.texts.is_empty());
    assert_eq!(drawing.inserts[0].attributes.len(), 1);

    let marks = Wanted::layers(["MARKS"]).expect("pattern");
    let (drawing, _) = read_layers("", insert, &marks);
    assert_eq!(drawing.texts.len(), 2);
    assert!(drawing.inserts.is_empty());
}

#[test]
fn our_own_layers_are_never_read() {
    let (drawing, _) = drawing(
        "",
        "0 LINE 8 taut-table 10 0 20 0 11 1 21 0 0 LINE 8 B 10 0 20 0 11 1 21 0",
    );
    assert_eq!(drawing.shapes.len(), 1);
    assert_eq!(drawing.shapes[0].handle, "#1");
    assert!(drawing.layers.iter().all(|layer| layer.name == "B"));
}

#[test]
fn a_polyline_closes_with_the_bulge_of_its_last_vertex() {
    let (drawing, _) = drawing(
        "",
        "0 LWPOLYLINE 8 0 90 2 70 1 10 0 20 0 42 1 10 2 20 0 42 1
         0 LWPOLYLINE 8 0 90 4 70 0 10 0 20 0 10 0 20 0 42 1 10 2 20 0 10 2 20 0
         0 LWPOLYLINE 8 0 90 1 70 0 10 0 20 0 0 LINE 8 0 10 1 20 1 11 1 21 1",
    );
    assert_eq!(drawing.shapes.len(), 2);
    assert!((drawing.shapes[0].path.length_m() - std::f64::consts::TAU).abs() < 1e-12);
    assert!(drawing.shapes[0].closed && drawing.shapes[0].path.corners().is_empty());
    assert!((drawing.shapes[1].path.length_m() - std::f64::consts::PI).abs() < 1e-12);
    assert!(!drawing.shapes[1].closed);
}

#[test]
fn a_plan_drawn_as_a_block_keeps_its_tendons_and_loses_its_end_symbols_lines() {
    let end = |name: &str| {
        format!("0 BLOCK 8 0 2 {name} 10 0 20 0 {UNIT_LINE} 0 INSERT 8 0 2 TIP 10 0 20 0 0 ENDBLK ")
    };
    let tip = "0 BLOCK 8 0 2 TIP 10 0 20 0 0 LINE 8 0 10 0 20 0 11 0 21 0.4 0 ENDBLK ";
    let at_ends = "0 INSERT 8 TENDON-BANDED 2 LIVE-END 10 0 20 0 0 INSERT 8 TENDON-BANDED 2 DEAD-END 10 20 20 0";
    let plan = format!(
        "0 BLOCK 8 0 2 PLAN 10 0 20 0 0 LINE 8 TENDON-BANDED 10 0 20 0 11 20 21 0 {at_ends} 0 ENDBLK "
    );
    let blocks = [tip.to_owned(), end("LIVE-END"), end("DEAD-END"), plan].concat();
    let (drawing, findings) = drawing(&blocks, "0 INSERT 5 2F 8 0 2 PLAN 10 100 20 50");
    assert!(findings.is_empty(), "{findings:?}");
    assert_eq!(drawing.shapes.len(), 5);
    let (floor, _) = tautplan::floor::read(&drawing, &tautplan::job::Job::default());
    assert_eq!(floor.tendons.len(), 1);
    let tendon = &floor.tendons[0];
    assert!((tendon.path.length_m() - 20.0).abs() < 1e-12);
    assert!(tendon.ends.iter().all(|end| end.kind.is_some()));
}

#[test]
fn an_attribute_inside_a_block_is_read_for_its_own_layer() {
    let blocks = "0 BLOCK 8 0 2 REF 10 0 20 0
        0 INSERT 8 SYM 66 1 2 TAG 10 5 20 5 0 ATTRIB 8 TENDON-HEIGHT 10 5 20 6 40 0.2 2 H 1 L30 0 SEQEND
        0 ENDBLK 0 BLOCK 8 0 2 TAG 10 0 20 0 0 ENDBLK";
    let heights = Wanted::layers(["TENDON-HEIGHT"]).expect("pattern");
    let (drawing, findings) = read_layers(blocks, "0 INSERT 8 0 2 REF 10 0 20 0", &heights);
    assert!(findings.is_empty(), "{findings:?}");
    let texts: Vec<_> = drawing.texts.iter().map(|t| t.content.as_str()).collect();
    assert_eq!(texts, ["L30"]);
}

#[test]
fn an_insert_that_names_no_block_is_damaged_and_brings_in_no_other() {
    let (drawing, findings) = drawing(
        &format!("0 BLOCK 8 0 2 B 10 0 20 0 {UNIT_LINE} 0 ENDBLK"),
        "0 INSERT 5 A 8 TENDONS 2 B 10 0 20 0 0 INSERT 5 C 8 TENDONS 10 9 20 9",
    );
    assert_eq!(drawing.shapes.len(), 1);
    assert_eq!(drawing.inserts.len(), 1);
    assert_eq!(rules(&findings), ["entity-damaged"]);
    assert!(findings[0].text.contains("INSERT C"), "{findings:?}");
}

#[test]
fn a_vertex_without_both_coordinates_is_damage() {
    for (damaged, lacks) in [
        (
            "0 LWPOLYLINE 8 T 90 3 70 0 10 0 20 0 10 5 10 9 20 9",
            "no group 20",
        ),
        (
            "0 LWPOLYLINE 8 T 90 3 70 0 10 0 20 0 20 5 10 9 20 9",
            "no group 10",
        ),
        ("0 LWPOLYLINE 8 T 90 2 70 0 10 0 20 0 10 9", "no group 20"),
        (
            "0 SPLINE 8 T 70 8 71 1 72 4 73 2 40 0 40 0 40 1 40 1 10 0 20 0 10 9",
            "no group 20",
        ),
    ] {
        let (drawing, findings) = drawing("", &format!("{damaged} {UNIT_LINE}"));
        assert_eq!(drawing.shapes.len(), 1, "{damaged}");
        assert_eq!(rules(&findings), ["entity-damaged"], "{damaged}");
        assert!(findings[0].text.contains(lacks), "{findings:?}");
    }
}

#[test]
fn geometry_without_a_finite_length_is_damage_wherever_it_stands() {
    let bulge = "0 LWPOLYLINE 8 T 90 3 70 0 10 0 20 0 42 1e200 10 5 20 0 10 9 20 0";
    let line = "0 LINE 8 T 10 -1e308 20 0 11 1e308 21 0";
    for damaged in [bulge, line] {
        let (found, findings) = drawing("", &format!("{damaged} {UNIT_LINE}"));
        assert_eq!(found.shapes.len(), 1, "{damaged}");
        assert_eq!(rules(&findings), ["entity-damaged"], "{damaged}");
        let block = format!("0 BLOCK 8 0 2 B 10 0 20 0 {damaged} 0 ENDBLK");
        let (found, findings) = drawing(&block, "0 INSERT 8 0 2 B 10 0 20 0");
        assert!(found.shapes.is_empty(), "{damaged}");
        assert_eq!(rules(&findings), ["entity-damaged"], "{damaged}");
    }
}
