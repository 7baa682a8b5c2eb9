//! Damage that takes more than the line it stands on: what may be lost with it is found again, or said.

use tautplan::drawing::{Drawing, UnitFrom, insert, open};
use tautplan::finding::{Finding, Level};

use crate::drawings::{everything, file, marks_without_loss, of_tags, rules, sheet};

const LINE: &str = "0 LINE 5 A1 8 A 10 0 20 0 11 2 21 0";

fn said<'f>(findings: &'f [Finding], rule: &str) -> Option<&'f Finding> {
    findings.iter().find(|finding| finding.rule.name == rule)
}

fn length_m(drawing: &Drawing) -> f64 {
    drawing.shapes[0].path.length_m()
}

#[test]
fn a_header_is_read_on_at_its_next_variable() {
    for header in [
        "0 SECTION 2 HEADER oops 9 $ACADVER 1 AC1015 9 $INSUNITS 70 5 0 ENDSEC",
        "0 SECTION 2 HEADER 9 $LTSCALE 40 1 oops 70 9 9 9 $INSUNITS 70 5 0 ENDSEC",
        "0 SECTION oops 9 $ACADVER 1 AC1015 9 $INSUNITS 70 5 0 ENDSEC",
        "oops SECTION 2 HEADER 9 $ACADVER 1 AC1015 9 $INSUNITS 70 5 0 ENDSEC",
    ] {
        let tags = format!("{header} 0 SECTION 2 ENTITIES {LINE} 0 ENDSEC 0 EOF");
        let (source, drawing, findings) = everything(of_tags(&tags));
        assert!((length_m(&drawing) - 0.02).abs() < 1e-12, "{header}");
        assert_eq!(drawing.unit_from, UnitFrom::Header);
        assert_eq!(rules(&findings), ["drawing-damaged"]);
        assert!(
            findings[0]
                .text
                .contains("variables of the header may be lost"),
            "{}",
            findings[0].text
        );
        marks_without_loss(&source, drawing.unit_m);
    }
}

#[test]
fn a_unit_lost_with_a_header_is_an_error() {
    let tags = format!(
        "0 SECTION 2 HEADER 9 $INSUNITS oops 5 0 ENDSEC 0 SECTION 2 ENTITIES {LINE} 0 ENDSEC 0 EOF"
    );
    let (_, _, findings) = everything(of_tags(&tags));
    let unit = said(&findings, "unit-assumed").expect("said");
    assert_eq!(unit.level, Level::Error);
    assert!(
        unit.text.contains("header of the drawing is damaged"),
        "{}",
        unit.text
    );
}

#[test]
fn a_drawing_with_subclass_markers_gets_them_even_where_its_version_is_lost() {
    let text = String::from_utf8(file("demo-drawings/small-floor.dxf")).expect("text");
    let line_end = if text.contains("\r\n") { "\r\n" } else { "\n" };
    for (from, to) in [
        (
            format!("$ACADVER{line_end}"),
            format!("$ACADVER{line_end}oops{line_end}"),
        ),
        (
            format!("$ACADVER{line_end}"),
            format!("$WHATEVER{line_end}"),
        ),
    ] {
        let harmed = text.replacen(&from, &to, 1).into_bytes();
        let source = open(harmed).expect("read");
        assert_eq!(source.version(), "");
        let marked = insert(&source, 0.001, &sheet()).expect("marked");
        let added = String::from_utf8_lossy(&marked).replace("\r\n", "\n");
        let mark = added.rfind("688 kN").expect("a mark");
        let record = &added[added[..mark].rfind("\nTEXT\n").expect("its record")..mark];
        assert!(
            record.contains("AcDbText") && record.contains("\n330\n"),
            "{record}"
        );
        marks_without_loss(&source, 0.001);
    }
}

#[test]
fn the_seed_behind_a_fault_of_the_header_is_raised() {
    let (source, drawing, _) = everything(of_tags(&format!(
        "0 SECTION 2 HEADER oops 9 $ACADVER 1 AC1015 9 $HANDSEED 5 F0 0 ENDSEC
         0 SECTION 2 ENTITIES {LINE} 0 ENDSEC 0 EOF"
    )));
    let marked = insert(&source, drawing.unit_m, &sheet()).expect("marked");
    let text = String::from_utf8(marked).expect("text");
    let seed = text
        .split("$HANDSEED\n5\n")
        .nth(1)
        .and_then(|rest| rest.lines().next());
    let seed = u64::from_str_radix(seed.expect("a seed"), 16).expect("a number");
    assert!(seed > 0xF0, "{seed:X}");
}

#[test]
fn handles_of_what_is_passed_over_are_not_given_again() {
    for header in ["", "0 SECTION 2 HEADER 9 $ACADVER 1 AC1015 0 ENDSEC"] {
        // Garbled ahead of the handle, behind it, and with codes and values out of step.
        for harmed in [
            "0 LINE oops 5 20 8 A 10 0 20 0 11 1 21 0",
            "0 LINE 5 20 oops 8 A 10 0 20 0 11 1 21 0",
            "0 LINE 62 5 20 8 A 10 north 20 0 11 1 21 0 oops",
            "0 LINE oops 330 1F 5 20 8 A",
        ] {
            let (source, drawing, findings) = everything(of_tags(&format!(
                "{header} 0 SECTION 2 ENTITIES 0 LINE 5 1E 8 A 10 0 20 0 11 2 21 0 {harmed} 0 ENDSEC 0 EOF"
            )));
            assert_eq!(rules(&findings), ["drawing-damaged"]);
            let marked = insert(&source, drawing.unit_m, &sheet()).expect("marked");
            let text = String::from_utf8(marked).expect("text");
            let lines: Vec<&str> = text.lines().collect();
            let given = lines
                .windows(2)
                .filter(|pair| pair[0].trim() == "5" && pair[1] == "20");
            assert_eq!(given.count(), 1, "{harmed}\n{text}");
            marks_without_loss(&source, drawing.unit_m);
        }
    }
}

/// A block of one line at its base point (5000, 0), inserted at (1000, 0), from what its record holds.
fn placed(record: &str) -> (Drawing, Vec<Finding>) {
    let tags = format!(
        "0 SECTION 2 BLOCKS 0 BLOCK 8 0 {record} 0 LINE 8 A 10 5000 20 0 11 7000 21 0 0 ENDBLK 8 0
         0 ENDSEC 0 SECTION 2 ENTITIES 0 INSERT 5 B1 8 A 2 T 10 1000 20 0 {LINE} 0 ENDSEC 0 EOF"
    );
    let (source, drawing, findings) = everything(of_tags(&tags));
    marks_without_loss(&source, drawing.unit_m);
    (drawing, findings)
}

#[test]
fn a_block_without_a_sound_base_point_is_left_out_and_said() {
    let (drawing, findings) = placed("2 T 10 5000 20 0");
    assert!(rules(&findings).is_empty());
    let start = drawing.shapes[0].path.start().expect("a start");
    assert!((start.x - 1.0).abs() < 1e-12, "{start:?}");
    for record in [
        "2 T 10 5,000.0 20 0",
        "2 T 10 nan 20 0",
        "2 T 10 5000 20 1e999",
        "2 T 10 5000",
        "2 T oops 10 5000 20 0",
        "2 T 10 5000 20 0 oops",
    ] {
        let (drawing, findings) = placed(record);
        assert_eq!(drawing.shapes.len(), 1, "{record}");
        assert!(drawing.inserts.is_empty());
        let said = said(&findings, "entity-damaged").expect(record);
        assert_eq!(said.level, Level::Error);
        assert!(
            said.text.contains("insert B1") && said.text.contains("block T"),
            "{}",
            said.text
        );
    }
    // Nothing written at all is the origin.
    assert_eq!(rules(&placed("2 T").1), [""; 0]);
}

#[test]
fn an_empty_line_costs_a_leader_nothing_and_garbage_is_counted() {
    let leader = |harm: &str| {
        let text = format!(
            "0\nSECTION\n2\nENTITIES\n0\nLEADER\n5\nB1\n8\nA\n76\n2\n10\n0\n20\n0\n{harm}10\n5\n20\n5\n0\nPOINT\n8\nA\n10\n0\n{harm}20\n3000\n0\nLINE\n8\nA\n10\n0\n20\n0\n11\n1\n21\n1\n0\nENDSEC\n0\nEOF\n"
        );
        let (_, drawing, findings) = everything(text.into_bytes());
        let damage = said(&findings, "drawing-damaged").map(|finding| finding.text.to_string());
        (
            drawing.leaders.len(),
            drawing.dots,
            damage.unwrap_or_default(),
        )
    };
    let (leaders, dots, said) = leader("");
    assert_eq!((leaders, dots.len(), said.as_str()), (1, 1, ""));
    let (leaders, dots, said) = leader("\n");
    assert_eq!((leaders, dots.len()), (1, 1), "{said}");
    assert!((dots[0].place.y - 3.0).abs() < 1e-12);
    assert!(said.contains("no entity is left out"), "{said}");
    let (leaders, dots, said) = leader("oops\n");
    assert_eq!((leaders, dots.len()), (0, 0));
    assert!(said.contains("2 entities are left out"), "{said}");
}
