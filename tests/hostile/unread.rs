//! What lies on layers that are read is read, or it is said that it is not.

use tautplan::drawing::{Drawing, ShapeKind, Wanted, insert, open, read};
use tautplan::finding::{Finding, Level};

use crate::drawings::{everything, marks_without_loss, of_tags, rules, sheet, with_blocks};
use crate::program::folder;

const LINE: &str = "0 LINE 5 A1 8 T 10 0 20 0 11 1 21 0";

fn chosen(bytes: Vec<u8>, layers: &str) -> (Drawing, Vec<Finding>) {
    let source = open(bytes).expect("a drawing");
    read(&source, &Wanted::layers([layers]).expect("a pattern"), None)
}

fn entities(tags: &str) -> Vec<u8> {
    of_tags(&format!("0 SECTION 2 ENTITIES {tags} 0 ENDSEC 0 EOF"))
}

#[test]
fn ellipses_are_read_as_what_they_look_like() {
    let ellipse = |tail: &str| {
        let tags = format!("0 ELLIPSE 8 T 10 1000 20 2000 30 0 11 0 21 4000 31 0 40 0.5 {tail}");
        let (_, mut drawing, findings) = everything(entities(&tags));
        assert!(rules(&findings).is_empty(), "{tail}: {findings:?}");
        let shape = drawing.shapes.remove(0);
        assert_eq!(shape.kind, ShapeKind::Ellipse);
        shape
    };
    let whole = ellipse("41 0 42 6.283185307179586");
    // Half axes 4 and 2: Ramanujan's second formula.
    let h = (2.0_f64 / 6.0).powi(2);
    let around = std::f64::consts::PI * 6.0 * (1.0 + 3.0 * h / (10.0 + (4.0 - 3.0 * h).sqrt()));
    assert!(whole.closed && (whole.path.length_m() - around).abs() < 2e-3);
    assert!(ellipse("").closed);
    // From the end of the major axis a quarter counterclockwise, to the end of the minor one at its left.
    let quarter = ellipse("41 0 42 1.5707963267948966 210 0 220 0 230 1");
    let end = |shape: &tautplan::drawing::Shape| {
        let end = shape.path.end().expect("an end");
        ((end.x * 1e6).round(), (end.y * 1e6).round())
    };
    assert!(!quarter.closed && (quarter.path.length_m() - around / 4.0).abs() < 1e-3);
    assert_eq!(end(&quarter), (-1e6, 2e6));
    // Seen from below, the minor axis is on the other side.
    let below = ellipse("41 0 42 1.5707963267948966 210 0 220 0 230 -1");
    assert_eq!(end(&below), (3e6, 2e6));
    // Through the start: from three quarters to one quarter.
    let through = ellipse("41 4.71238898038469 42 1.5707963267948966");
    assert!((through.path.length_m() - around / 2.0).abs() < 1e-3);
    let (_, drawing, findings) = everything(entities(&format!(
        "0 ELLIPSE 8 T 10 0 20 0 11 0 21 0 40 1 {LINE}"
    )));
    assert_eq!(
        (drawing.shapes.len(), rules(&findings)),
        (1, vec!["entity-damaged"])
    );
}

#[test]
fn each_type_that_is_not_read_is_said_for_each_layer_that_is() {
    let mline = "0 MLINE 8 T 70 1 0 MLINE 8 t 70 1 0 HATCH 8 T 70 1 0 MLINE 8 ELSE 70 1";
    let blocks = format!(
        "0 BLOCK 8 0 2 B 10 0 20 0 {LINE} 0 REGION 8 T 70 1 0 ENDBLK 8 0
        0 BLOCK 8 0 2 UNUSED 10 0 20 0 0 BODY 8 T 70 1 0 ENDBLK 8 0"
    );
    let bytes = with_blocks(
        &blocks,
        &format!("{mline} {LINE} 0 INSERT 8 ELSE 2 B 10 0 20 0"),
    );
    let (drawing, findings) = chosen(bytes.clone(), "T");
    assert_eq!(drawing.shapes.len(), 2);
    let said: Vec<(Level, String)> = findings
        .iter()
        .filter(|f| f.rule.name == "entity-unread")
        .map(|f| (f.level, f.text.as_str().to_owned()))
        .collect();
    for (level, text) in [
        (Level::Warning, "2 MLINE on layer T are not read"),
        (Level::Note, "1 HATCH on layer T is not read"),
        (Level::Warning, "1 REGION on layer T is not read"),
    ] {
        assert!(said.contains(&(level, text.to_owned())), "{text}: {said:?}");
    }
    assert_eq!(said.len(), 3, "{said:?}");
    // Where nothing is chosen, the list of layers says what lies on each.
    assert!(rules(&everything(bytes).2).is_empty());
}

#[test]
fn references_without_contents_are_named() {
    let blocks = "0 BLOCK 8 0 2 LEVEL-2 70 4 10 0 20 0 1 level-2.dwg 0 ENDBLK 8 0
        0 BLOCK 8 0 2 GRID 70 12 10 0 20 0 1 grid.dwg 0 ENDBLK 8 0
        0 BLOCK 8 0 2 UNUSED 70 4 10 0 20 0 1 unused.dwg 0 ENDBLK 8 0";
    let inserts = "0 INSERT 8 XREF 2 level-2 10 0 20 0 0 INSERT 8 XREF 2 GRID 10 0 20 0";
    let bytes = with_blocks(blocks, &format!("{inserts} {LINE}"));
    for (layer, level) in [("T", Level::Note), ("XREF", Level::Warning)] {
        let (_, findings) = chosen(bytes.clone(), layer);
        let said = findings.iter().find(|f| f.rule.name == "reference-empty");
        let said = said.expect("said");
        assert_eq!(said.level, level);
        assert!(
            said.text.as_str().ends_with(": GRID, LEVEL-2"),
            "{:?}",
            said.text
        );
    }
    // A drawing whose tendons are all drawn elsewhere.
    for tables in [
        "",
        "0 SECTION 2 TABLES 0 TABLE 2 LAYER 0 LAYER 2 LEVEL-2|TENDON-BANDED 70 0 62 1 0 ENDTAB 0 ENDSEC",
    ] {
        let plan = of_tags(&format!(
            "{tables} 0 SECTION 2 BLOCKS {blocks} 0 ENDSEC 0 SECTION 2 ENTITIES {inserts} {LINE} 0 ENDSEC 0 EOF"
        ));
        let ended = folder(&plan, "").run(&["mark", "plan.dxf"]);
        assert_eq!(ended.status, Some(2));
        assert!(
            ended.said.contains("GRID, LEVEL-2; bind them"),
            "{}",
            ended.said
        );
    }
}

#[test]
fn layers_merely_named_like_ours_are_the_users() {
    let own =
        "0 LINE 5 B1 8 Taut-Wire 10 0 20 0 11 1 21 0 0 LINE 5 B2 8 TAUT-FORCE 10 0 20 0 11 1 21 0
        0 LINE 5 B3 8 Taut-Table 10 0 20 0 11 1 21 0";
    let (source, drawing, _) = everything(entities(&format!("{LINE} {own}")));
    let layers: Vec<&str> = drawing.shapes.iter().map(|s| s.layer.as_str()).collect();
    assert_eq!(layers, ["T", "Taut-Wire", "TAUT-FORCE"]);
    let marked = insert(&source, drawing.unit_m, &sheet()).expect("marked");
    let marked = String::from_utf8(marked).expect("text");
    let stands = |layer: &str| marked.contains(&format!("\n{layer}\n"));
    assert!(stands("Taut-Wire") && stands("TAUT-FORCE") && !stands("Taut-Table"));
    let users = own.replace("Taut-Table", "T");
    let (source, drawing, _) = everything(entities(&users));
    marks_without_loss(&source, drawing.unit_m);
}

#[test]
fn splines_are_read_as_they_are_written_or_said_to_be_left_out() {
    let knots = "40 0 40 0 40 0 40 1 40 1 40 1";
    let points = "10 0 20 0 10 1000 20 1000 10 2000 20 0";
    let spline = |more: &str, points: &str| {
        let tags = format!("0 SPLINE 8 T 70 0 71 2 {knots} {more} {points}");
        let (_, drawing, findings) = everything(entities(&format!("{tags} {LINE}")));
        (drawing.shapes.len() - 1, rules(&findings))
    };
    // A plan needs no levels.
    assert_eq!(spline("", points), (1, vec![]));
    assert_eq!(
        spline("", "10 0 20 0 30 5 10 1000 20 1000 30 5 10 2000 20 0 30 5"),
        (1, vec![])
    );
    assert_eq!(spline("41 1 41 0.5 41 1", points), (1, vec![]));
    for weights in ["41 1 41 0 41 1", "41 1 41 1", "41 1 41 -1 41 1"] {
        assert_eq!(
            spline(weights, points),
            (0, vec!["entity-damaged"]),
            "{weights}"
        );
    }
    let ring = "0 SPLINE 8 T 70 11 71 3 72 0 73 0 74 4 11 0 21 0 11 1000 21 0 11 1000 21 1000 11 0 21 1000";
    let (_, drawing, findings) = everything(entities(ring));
    assert!(rules(&findings).is_empty() && drawing.shapes[0].closed);
    assert!(
        (4.2..4.6).contains(&drawing.shapes[0].path.length_m()),
        "{}",
        drawing.shapes[0].path.length_m()
    );
}

#[test]
fn a_polyline_with_fewer_vertices_than_it_announces_is_no_secret() {
    let line = |announced: i32| {
        let tags = format!("0 LWPOLYLINE 8 T 90 {announced} 70 0 10 0 20 0 10 1 20 1 {LINE}");
        let (_, drawing, findings) = everything(entities(&tags));
        let text = findings
            .iter()
            .map(|f| f.text.as_str())
            .collect::<Vec<_>>()
            .join(" ");
        (drawing.shapes.len(), text)
    };
    for sound in [2, 1, -1] {
        let (shapes, said) = line(sound);
        assert!(shapes == 2 && !said.contains("announces"), "{said}");
    }
    let (shapes, said) = line(3);
    assert_eq!(shapes, 2);
    assert!(said.contains("is read as it stands"), "{said}");
    assert!(
        said.contains("announces 3 vertices, and there are 2"),
        "{said}"
    );
}

#[test]
fn attributes_have_no_flag_that_hides_them() {
    let tags = "0 INSERT 8 T 2 B 10 0 20 0 66 1 0 ATTRIB 8 T 10 0 20 0 40 1 1 SHOWN 2 A 70 64
        0 ATTRIB 8 T 40 1 1 NOWHERE 2 B 70 0 0 SEQEND 8 T";
    let (_, drawing, _) = everything(entities(&format!("{tags} {LINE}")));
    let texts: Vec<&str> = drawing.texts.iter().map(|t| t.content.as_str()).collect();
    assert_eq!(texts, ["SHOWN"]);
    assert_eq!(drawing.inserts[0].attributes.len(), 2);
}

#[test]
fn what_a_finding_quotes_is_short() {
    let long = "9".repeat(300_000) + "x";
    for tags in [
        format!("0 POINT 8 T 10 {long} 20 0"),
        format!("0 LINE 8 T 10 {long} 20 0 11 1 21 1"),
    ] {
        let (_, _, findings) = everything(entities(&format!("{tags} {LINE}")));
        assert!(rules(&findings).contains(&"entity-damaged"));
        assert!(findings.iter().all(|f| f.text.as_str().len() < 500));
    }
}

#[test]
fn headers_and_names_without_end_cost_no_more_than_they_are_long() {
    let header = format!(
        "9 $DWGCODEPAGE 3 {} {}",
        "X".repeat(1_500_000),
        "40 1 ".repeat(150_000)
    );
    let begun = std::time::Instant::now();
    for tags in [
        format!("0 SECTION 2 HEADER {header} 0 ENDSEC 0 SECTION 2 ENTITIES {LINE} 0 ENDSEC 0 EOF"),
        format!(
            "0 SECTION 2 ENTITIES 0 LINE 8 {} 10 0 20 0 11 1 21 1 0 ENDSEC 0 EOF",
            "A|".repeat(100_000)
        ),
        format!(
            "0 SECTION 2 ENTITIES 0 LINE 8 {} 10 0 20 0 11 1 21 1 0 ENDSEC 0 EOF",
            "A$0$".repeat(40_000)
        ),
        format!(
            "0 SECTION 2 ENTITIES 0 MTEXT 8 T 10 0 20 0 40 1 1 {} {LINE} 0 ENDSEC 0 EOF",
            r"\f".repeat(500_000)
        ),
    ] {
        let (drawing, _) = chosen(of_tags(&tags), "T");
        assert!(drawing.shapes.len() <= 1);
    }
    let limit_s = if cfg!(debug_assertions) { 60 } else { 5 };
    assert!(begun.elapsed().as_secs() < limit_s, "{:?}", begun.elapsed());
}

#[test]
fn every_command_says_by_its_status_what_it_found() {
    let floor = "0 LINE 8 TENDON-BANDED 10 0 20 0 11 12 21 0
        0 TEXT 8 TENDON-MARK 10 3 20 0.1 40 0.2 1 B01 0 TEXT 8 TENDON-HEIGHT 10 0 20 0.1 40 0.2 1 100
        0 TEXT 8 TENDON-HEIGHT 10 6 20 0.1 40 0.2 1 30 0 TEXT 8 TENDON-HEIGHT 10 12 20 0.1 40 0.2 1 100";
    let job = "[drawing]\nunit = \"m\"\n[slab]\nthickness_mm = 200\n";
    let bad = "0 LINE 8 TENDON-BANDED 10 bad 20 5 11 12 21 5";
    for (tags, wanted) in [(floor.to_owned(), 0), (format!("{floor} {bad}"), 1)] {
        let place = folder(&entities(&tags), job);
        let ended = place.run(&["survey", "plan.dxf"]);
        assert_eq!(ended.status, Some(wanted), "{}", ended.said);
        let ended = place.run(&["survey", "plan.dxf", "--out", "new.toml"]);
        assert_eq!(ended.status, Some(wanted), "{}", ended.said);
        assert!(place.path("new.toml").exists());
    }
    let ended =
        folder(&entities(&format!("{floor} {bad}")), job).run(&["tendon", "plan.dxf", "B01"]);
    assert_eq!(ended.status, Some(1), "{}", ended.said);
    assert!(
        ended.said.contains("entity-damaged") && ended.printed.contains("B01"),
        "{}",
        ended.said
    );
}
