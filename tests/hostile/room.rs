//! Room that small files ask for: taken from `limits.memory_mb` where it is taken, however it is asked for.

use tautplan::drawing::{Caps, Drawing, Purpose, Wanted, open, open_within, read_within};
use tautplan::finding::Finding;

use crate::drawings::with_blocks;
use crate::program::folder;

const CAPS: Caps = Caps {
    memory_mb: 50,
    expanded_entities: 1_000_000,
};
const LINE: &str = "0 LINE 8 0 10 0 20 0 11 1 21 1";
const ARRAY: &str = "70 300 71 300 44 1 45 1";

fn read(bytes: Vec<u8>) -> (Drawing, Vec<Finding>) {
    let source = open(bytes).expect("a drawing");
    read_within(&source, &Wanted::everything(), None, &CAPS)
}

/// Bytes that the drawing holds, at least.
fn held(drawing: &Drawing) -> usize {
    let shapes = drawing.shapes.iter();
    let shapes = shapes.map(|s| 400 + s.layer.len() + 48 * s.path.segments().len());
    let texts = drawing.texts.iter();
    let texts = texts.map(|t| 400 + t.layer.len() + t.content.len());
    let inserts = drawing.inserts.iter();
    let inserts = inserts.map(|i| 300 + i.layer.len() + i.block.len());
    let leaders = drawing.leaders.iter();
    let leaders = leaders.map(|l| 300 + l.layer.len() + 16 * (l.arrows.len() + l.tails.len()));
    shapes.chain(texts).chain(inserts).chain(leaders).sum()
}

fn each_of(count: u32, tags: impl Fn(u32) -> String) -> String {
    (0..count).map(tags).collect::<Vec<_>>().concat()
}

#[test]
fn whatever_multiplies_is_cut_where_the_room_ends_and_said() {
    let long = "X".repeat(20_000);
    let attribute = format!("0 ATTRIB 8 T 10 0 20 0 40 1 1 {long} 2 TAG 0 SEQEND 8 0");
    let arrows = "10 0 20 0 ".repeat(2000);
    for (what, blocks, insert) in [
        (
            "a layer's name",
            LINE.to_owned(),
            format!("8 LAYER{long} 2 A"),
        ),
        (
            "an attribute of a missing block",
            format!("0 INSERT 8 ELSE 2 NONE 10 0 20 0 66 1 {attribute}"),
            "8 ELSE 2 A".to_owned(),
        ),
        (
            "a stretched circle",
            "0 CIRCLE 8 0 10 0 20 0 40 1e6".to_owned(),
            "8 T 2 A 41 1 42 0.5".to_owned(),
        ),
        (
            "a text",
            format!("0 TEXT 8 0 10 0 20 0 40 1 1 {long}"),
            "8 T 2 A".to_owned(),
        ),
        (
            "a leader",
            format!("0 LEADER 8 0 76 2000 {arrows}"),
            "8 T 2 A".to_owned(),
        ),
    ] {
        let bytes = with_blocks(
            &format!("0 BLOCK 8 0 2 A 10 0 20 0 {blocks} 0 ENDBLK 8 0"),
            &format!("0 INSERT {insert} 10 0 20 0 {ARRAY} {LINE}"),
        );
        let (drawing, findings) = read(bytes);
        let room = held(&drawing);
        assert!(room < 50_000_000, "{what}: {room} bytes");
        let cut = findings.iter().find(|f| f.rule.name == "block-too-many");
        let cut = cut.unwrap_or_else(|| panic!("{what}: {room} bytes, and nothing is said"));
        assert!(
            cut.remedy.contains("limits.memory_mb above 50"),
            "{what}: {}",
            cut.remedy
        );
        // The line behind the array is no part of it and is read.
        assert!(
            drawing.shapes.iter().any(|shape| shape.handle == "#2"),
            "{what}"
        );
    }
}

#[test]
fn curves_of_model_space_are_weighed_too() {
    let tilted = "0 CIRCLE 8 A 10 0 20 0 40 1e6 210 0.5 220 0 230 0.8 ".repeat(20_000);
    let (drawing, findings) = read(with_blocks("", &tilted));
    assert!(held(&drawing) < 60_000_000, "{}", held(&drawing));
    assert!(findings.iter().any(|f| f.rule.name == "block-too-many"));
}

#[test]
fn records_of_blocks_and_names_are_counted_before_they_are_read() {
    let many = format!(
        "0 BLOCK 8 0 2 A 10 0 20 0 {} 0 ENDBLK 8 0",
        format!("{LINE} ").repeat(40_000)
    );
    let layers = each_of(100_000, |n| format!("0 LINE 8 L{n} "));
    for (what, bytes, words) in [
        (
            "records",
            with_blocks(&many, "0 INSERT 8 T 2 A 10 0 20 0"),
            "40000 in blocks",
        ),
        ("layers", with_blocks("", &layers), "100001 names"),
    ] {
        let source = open(bytes).expect("a drawing");
        let wanted = Wanted::layers(["T"]).expect("a pattern");
        let refusal = CAPS
            .admit_layers(&source, &wanted, Purpose::Work)
            .expect_err(what)
            .to_string();
        assert!(refusal.contains(words), "{what}: {refusal}");
    }
}

#[test]
fn names_without_end_are_refused_while_they_are_met() {
    let layers = each_of(100_000, |n| format!("0 LINE 8 L{n} "));
    let types = each_of(100_000, |n| format!("0 T{n} 8 L "));
    for tags in [layers, types] {
        let bytes = with_blocks("", &tags);
        assert!(open(bytes.clone()).is_ok());
        for bytes in [bytes.clone(), [b"oops\n", &bytes[..]].concat()] {
            let refusal = open_within(bytes, &CAPS).map(|_| ()).expect_err("refused");
            let said = refusal.to_string();
            assert!(said.contains("names of layers and types"), "{said}");
            assert!(said.contains("limits.memory_mb allows 50"), "{said}");
        }
    }
}

#[test]
fn blanks_ahead_of_the_first_code_are_not_written_with_every_other() {
    for ahead in [1, 10_000, 1_000_000] {
        let mut plan = vec![b' '; ahead];
        plan.extend(crate::drawings::file("demo-drawings/small-floor.dxf").trim_ascii_start());
        let length = plan.len();
        let place = folder(&plan, "");
        let ended = place.run(&["mark", "plan.dxf"]);
        assert!(matches!(ended.status, Some(0 | 1)), "{}", ended.said);
        let marked = std::fs::metadata(place.path("plan-marked.dxf")).expect("marked");
        assert!(marked.len() < length as u64 + 2_000_000, "{}", marked.len());
    }
    for (first, width) in [
        ("  0", 3),
        ("0", 0),
        ("     0", 6),
        ("          0", 3),
        (" 0  ", 2),
    ] {
        let text = format!(
            "{first}\nSECTION\n2\nENTITIES\n0\nLINE\n8\nA\n10\n0\n20\n0\n11\n1\n21\n1\n0\nENDSEC\n0\nEOF\n"
        );
        let (source, drawing, _) = crate::drawings::everything(text.into_bytes());
        let marked = tautplan::drawing::insert(&source, drawing.unit_m, &crate::drawings::sheet());
        let marked = String::from_utf8(marked.expect("marked")).expect("text");
        let lines: Vec<&str> = marked.lines().collect();
        let value = lines.iter().position(|line| *line == "688 kN");
        let code = value.and_then(|at| lines.get(at - 1)).copied();
        assert_eq!(code, Some(format!("{:>width$}", 1).as_str()), "{first:?}");
    }
}
