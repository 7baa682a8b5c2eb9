//! Colours and linetypes as they are seen: by layer, by block, in blocks on layer 0, true colours.

use tautplan::drawing::{Drawing, Wanted, open, read};
use tautplan::units::LengthUnit;

const LAYERS: &str = "0 SECTION 2 TABLES 0 TABLE 2 LAYER
    0 LAYER 2 0 70 0 62 7 6 CONTINUOUS
    0 LAYER 2 PT 70 0 62 -3 6 Dashed
    0 LAYER 2 TOP 70 0 62 5 6 DOT
    0 ENDTAB 0 ENDSEC";

fn drawing(blocks: &str, entities: &str) -> Drawing {
    let tags = format!(
        "{LAYERS} 0 SECTION 2 BLOCKS {blocks} 0 ENDSEC 0 SECTION 2 ENTITIES {entities} 0 ENDSEC 0 EOF"
    );
    let lines: Vec<&str> = tags.split_whitespace().collect();
    let source = open((lines.join("\n") + "\n").into_bytes()).expect("a drawing");
    read(&source, &Wanted::everything(), Some(LengthUnit::M)).0
}

fn seen(drawing: &Drawing) -> Vec<(Option<u8>, &str)> {
    let looks = drawing.shapes.iter().map(|shape| shape.look);
    looks
        .map(|look| (look.colour, drawing.linetype(look)))
        .collect()
}

const ENDS: &str = "10 0 20 0 11 1 21 0";

#[test]
fn an_entity_is_seen_as_it_says_or_as_its_layer() {
    let drawing = drawing(
        "",
        &format!(
            "0 LINE 8 PT {ENDS}
             0 LINE 8 pt 62 1 {ENDS}
             0 LINE 8 PT 62 256 6 BYLAYER {ENDS}
             0 LINE 8 PT 6 dot {ENDS}
             0 LINE 8 PT 62 0 6 ByBlock {ENDS}
             0 LINE 8 PT 420 16711680 {ENDS}
             0 LINE 8 PT 62 10 420 16711680 {ENDS}
             0 LINE 8 NEW {ENDS}
             0 POLYLINE 8 PT 62 2 66 1 0 VERTEX 8 PT 62 6 10 0 20 0 0 VERTEX 8 PT 10 1 20 0 0 SEQEND"
        ),
    );
    assert_eq!(
        seen(&drawing),
        [
            (Some(3), "Dashed"),
            (Some(1), "Dashed"),
            (Some(3), "Dashed"),
            (Some(3), "DOT"),
            (Some(7), "Continuous"),
            (None, "Dashed"),
            (Some(10), "Dashed"),
            (Some(7), "Continuous"),
            (Some(2), "Dashed"),
        ]
    );
}

#[test]
fn what_is_by_block_or_on_layer_0_of_a_block_is_seen_as_the_insert() {
    let drawing = drawing(
        &format!(
            "0 BLOCK 8 0 2 IN 10 0 20 0
             0 LINE 8 0 {ENDS} 0 LINE 8 0 62 0 6 BYBLOCK {ENDS} 0 LINE 8 PT {ENDS} 0 LINE 8 PT 62 4 {ENDS} 0 ENDBLK
             0 BLOCK 8 0 2 OUT 10 0 20 0 0 INSERT 8 0 2 IN 62 0 10 0 20 0 0 ENDBLK"
        ),
        "0 INSERT 8 TOP 2 IN 62 1 6 HIDDEN 10 0 20 0 0 INSERT 8 TOP 2 OUT 62 6 10 0 20 0
         0 INSERT 8 TOP 2 IN 66 1 10 0 20 0 0 ATTRIB 8 0 62 0 10 0 20 0 40 1 1 LE 2 KIND
         0 ATTRIB 8 PT 10 0 20 0 40 1 1 LE 2 KIND 0 SEQEND",
    );
    let shapes = seen(&drawing);
    assert_eq!(
        shapes[..4],
        [
            // Layer 0 takes the insert's layer, not the insert's own colour.
            (Some(5), "DOT"),
            (Some(1), "HIDDEN"),
            (Some(3), "Dashed"),
            (Some(4), "Dashed"),
        ]
    );
    assert_eq!(shapes[5], (Some(6), "DOT"));
    let within: Vec<Option<usize>> = drawing.shapes.iter().map(|s| s.within).collect();
    assert_eq!(within[0], Some(0));
    assert_eq!((within[4], drawing.inserts[2].within), (Some(2), Some(1)));
    let texts: Vec<_> = drawing
        .texts
        .iter()
        .map(|t| (t.look.colour, t.within))
        .collect();
    assert_eq!(texts, [(Some(5), Some(3)), (Some(3), Some(3))]);
}

#[test]
fn solids_and_traces_are_read_as_their_outlines() {
    let drawing = drawing(
        "",
        "0 SOLID 8 PT 10 0 20 0 11 1 21 0 12 0 22 1 13 0 23 1
         0 TRACE 8 PT 10 0 20 0 11 2 21 0 12 0 22 1 13 2 23 1",
    );
    let around: Vec<f64> = drawing.shapes.iter().map(|s| s.path.length_m()).collect();
    assert!(
        (around[0] - (2.0 + 2.0_f64.sqrt())).abs() < 1e-9,
        "{around:?}"
    );
    assert!((around[1] - 6.0).abs() < 1e-9, "{around:?}");
    assert!(drawing.shapes.iter().all(|shape| shape.closed));
}

#[test]
fn what_is_invisible_is_left_out_and_counted_and_a_blocks_other_states_are_not() {
    let tags = format!(
        "{LAYERS} 0 SECTION 2 BLOCKS 0 BLOCK 8 0 2 B 10 0 20 0
         0 LINE 8 PT {ENDS} 0 LINE 8 PT 60 1 {ENDS} 0 ENDBLK 0 ENDSEC
         0 SECTION 2 ENTITIES 0 LINE 8 PT 60 0 {ENDS} 0 LINE 8 PT 60 1 {ENDS}
         0 POINT 8 PT 60 1 10 0 20 0 0 INSERT 8 PT 2 B 10 0 20 0 0 ENDSEC 0 EOF"
    );
    let lines: Vec<&str> = tags.split_whitespace().collect();
    let source = open((lines.join("\n") + "\n").into_bytes()).expect("a drawing");
    let (drawing, findings) = read(&source, &Wanted::everything(), Some(LengthUnit::M));
    assert_eq!((drawing.shapes.len(), drawing.dots.len()), (2, 0));
    let said: Vec<&str> = findings
        .iter()
        .filter(|found| found.rule.name == "entity-invisible")
        .map(|found| found.text.as_str())
        .collect();
    assert!(
        matches!(said[..], [text] if text.starts_with("2 entities")),
        "{said:?}"
    );
}
