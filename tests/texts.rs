//! Text as CAD writes it: what is read of it, and the room that it takes.

use tautplan::drawing::{Drawing, Text, Wanted, open, read};
use tautplan::geometry::Coord;

/// A drawing in metres from its tags, `code value` each on a line.
fn drawing(styles: &str, blocks: &str, entities: &str) -> Drawing {
    let tags = format!(
        "0 SECTION\n2 HEADER\n9 $ACADVER\n1 AC1027\n9 $INSUNITS\n70 6\n0 ENDSEC\n\
         0 SECTION\n2 TABLES\n0 TABLE\n2 STYLE\n{styles}\n0 ENDTAB\n0 ENDSEC\n\
         0 SECTION\n2 BLOCKS\n{blocks}\n0 ENDSEC\n0 SECTION\n2 ENTITIES\n{entities}\n0 ENDSEC\n0 EOF\n"
    );
    let lines = tags.lines().filter(|line| !line.trim().is_empty());
    let pairs = lines.map(|line| line.trim_start().split_once(' ').expect("code and value"));
    let dxf: Vec<String> = pairs
        .map(|(code, value)| format!("{code}\n{value}\n"))
        .collect();
    let source = open(dxf.concat().into_bytes()).expect("a drawing");
    let (drawing, findings) = read(&source, &Wanted::everything(), None);
    assert!(findings.is_empty(), "{findings:?}");
    drawing
}

fn entities(entities: &str) -> Vec<Text> {
    drawing("", "", entities).texts
}

/// Least and greatest x and y of a text's box, relative to its place.
fn room(text: &Text) -> [f64; 4] {
    let off = |pick: fn(&Coord<f64>) -> f64| {
        let all = text
            .corners
            .iter()
            .map(move |corner| pick(corner) - pick(&text.place));
        let (low, high) = all.fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), off| {
            (low.min(off), high.max(off))
        });
        [low, high]
    };
    let ([west, east], [south, north]) = (off(|c| c.x), off(|c| c.y));
    [west, east, south, north]
}

#[track_caller]
fn assert_room(text: &Text, expected: [f64; 4]) {
    let found = room(text);
    let near = found
        .iter()
        .zip(expected)
        .all(|(a, b)| (a - b).abs() < 1e-9);
    assert!(near, "{found:?} is not {expected:?}");
}

const TEXT: &str = "0 TEXT\n8 M\n10 2\n20 3\n40 0.2\n1 H165\n";

#[test]
fn a_text_may_lean_or_run_backward_or_stand_on_its_head() {
    // Four characters of 0.62 heights: 0.496 m.
    let texts = entities(&format!(
        "{TEXT}{TEXT}71 2\n{TEXT}71 4\n{TEXT}51 45\n{TEXT}41 0.5\n{TEXT}50 90\n{TEXT}73 2\n11 2\n21 3"
    ));
    assert_eq!(texts.len(), 7);
    assert!(texts.iter().all(|text| text.content == "H165"));
    assert_room(&texts[0], [0.0, 0.496, 0.0, 0.2]);
    assert_room(&texts[1], [-0.496, 0.0, 0.0, 0.2]);
    assert_room(&texts[2], [0.0, 0.496, -0.2, 0.0]);
    assert_room(&texts[3], [0.0, 0.696, 0.0, 0.2]);
    assert_room(&texts[4], [0.0, 0.248, 0.0, 0.2]);
    assert_room(&texts[5], [-0.2, 0.0, 0.0, 0.496]);
    assert_room(&texts[6], [0.0, 0.496, -0.1, 0.1]);
}

#[test]
fn an_mtext_has_the_width_and_the_lean_of_its_style() {
    let mtext = "0 MTEXT\n8 M\n10 0\n20 0\n40 0.2\n71 7\n1 H165";
    let styles = "0 STYLE\n2 Narrow\n70 0\n40 0\n41 0.5\n50 0\n0 STYLE\n2 LEANING\n41 1\n50 45";
    let texts = drawing(
        styles,
        "",
        &format!("{mtext}\n7 NARROW\n{mtext}\n7 leaning\n{mtext}\n7 none"),
    )
    .texts;
    assert_room(&texts[0], [0.0, 0.248, 0.0, 0.2]);
    assert_room(&texts[1], [0.0, 0.696, 0.0, 0.2]);
    assert_room(&texts[2], [0.0, 0.496, 0.0, 0.2]);
}

#[test]
fn a_background_mask_is_no_part_of_the_text() {
    let texts = entities(
        "0 MTEXT\n8 M\n10 0\n20 0\n40 0.2\n1 {\\fArial|b1;\\C1;D012}\\P5-0.5\"\\PH 6\\S1/4;\"\n90 1\n63 2\n45 1.5\n441 0",
    );
    assert_eq!(texts[0].content, "D012\n5-0.5\"\nH 6 1/4\"");
}

const BLOCK: &str = "0 BLOCK\n8 0\n2 TAG\n70 2\n10 0\n20 0\n\
    0 ATTDEF\n8 0\n10 1\n20 0\n40 0.2\n1 L30\n3 Height?\n2 HEIGHT\n70 2\n73 0\n\
    0 ATTDEF\n8 0\n10 1\n20 1\n40 0.2\n1 XXX\n3 Mark?\n2 MARK\n70 0\n\
    0 ENDBLK\n8 0";

#[test]
fn attributes_are_read_constant_and_invisible_ones_too() {
    let insert = "0 INSERT\n8 MARKS\n66 1\n2 TAG\n10 10\n20 0\n41 -1\n\
        0 ATTRIB\n8 MARKS\n10 9\n20 1\n40 0.2\n1 D012\n2 MARK\n70 0\n72 0\n74 2\n11 9\n21 1\n\
        0 ATTRIB\n8 MARKS\n10 9\n20 2\n40 0.2\n1 5-12.7\n2 STRANDS\n70 1\n0 SEQEND\n8 0";
    let texts = drawing("", BLOCK, insert).texts;
    let said: Vec<(&str, &str, bool)> = texts
        .iter()
        .map(|text| (text.content.as_str(), text.layer.as_str(), text.hidden))
        .collect();
    assert_eq!(
        said,
        [
            ("D012", "MARKS", false),
            ("5-12.7", "MARKS", true),
            ("L30", "MARKS", false)
        ]
    );
    // In the middle of its height, and mirrored with its block.
    assert_room(&texts[0], [0.0, 0.496, -0.1, 0.1]);
    assert_eq!(texts[2].place, Coord { x: 9.0, y: 0.0 });
    assert_room(&texts[2], [-0.372, 0.0, 0.0, 0.2]);
}

#[test]
fn a_form_to_fill_in_says_nothing() {
    let form = "0 ATTDEF\n8 M\n10 1\n20 1\n40 0.2\n1 L30\n3 Height?\n2 HEIGHT\n70 2";
    assert!(entities(form).is_empty());
    let texts = drawing("", BLOCK, "0 INSERT\n8 M\n2 TAG\n10 0\n20 0").texts;
    assert_eq!(texts.len(), 1);
}

/// What a reader sees of each string, through the whole reading: TEXT, then MTEXT.
#[test]
fn codes_are_decoded_in_every_kind_of_text() {
    let mut rows = 0;
    for (raw, seen) in [
        ("%%uH165%%u", "H165"),
        ("5-%%c12.7", "5-Ø12.7"),
        ("%%p5 45%%d", "±5 45°"),
        ("%%072165", "H165"),
        ("5-\\U+00D812.7", "5-Ø12.7"),
        ("H^I165", "H 165"),
        ("1\\U+00BC\"", "1¼\""),
    ] {
        let text = format!("0 TEXT\n8 M\n10 0\n20 0\n40 0.2\n1 {raw}");
        assert_eq!(entities(&text)[0].content, seen, "{raw}");
        rows += 1;
    }
    for (raw, seen) in [
        ("\\A1;H 1\\S1/4;\"", "H 1 1/4\""),
        ("{\\H0.7x;\\S7#8;}\"", "7/8\""),
        ("1-\\S1^4;", "1-1/4"),
        (
            "\\pxqc;{\\W0.8;\\T1.1;\\Q15;D012}\\P\\LH165\\l",
            "D012\nH165",
        ),
        ("5-%%c12.7\\~L30", "5-Ø12.7 L30"),
        ("D012^J5-12.7", "D012\n5-12.7"),
        ("\\{H\\}165 {\\C3;L}30", "{H}165 L30"),
        ("\\f宋体|b0|i0|c134|p2;H165", "H165"),
    ] {
        let text = format!("0 MTEXT\n8 M\n10 0\n20 0\n40 0.2\n1 {raw}");
        assert_eq!(entities(&text)[0].content, seen, "{raw}");
        rows += 1;
    }
    assert_eq!(rows, 15);
}
