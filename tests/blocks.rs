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
        "0 LINE 8 taut-force 10 0 20 0 11 1 21 0 0 LINE 8 B 10 0 20 0 11 1 21 0",
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
