//! Drawings whose parts are missing, doubled or out of order.

use crate::drawings::{everything, file, marks_without_loss, of_tags, rules};

/// A drawing's sections by name, with their tags as lines.
fn sections(text: &str) -> Vec<(String, String)> {
    let mut found = Vec::new();
    let parts = text.split("  0\nSECTION\n  2\n").skip(1);
    for part in parts {
        let name = part.lines().next().unwrap_or_default().to_owned();
        let body = part.split("  0\nENDSEC\n").next().unwrap_or_default();
        found.push((name, format!("  0\nSECTION\n  2\n{body}  0\nENDSEC\n")));
    }
    found
}

fn small() -> String {
    String::from_utf8(file("demo-drawings/small-floor.dxf"))
        .expect("text")
        .replace("\r\n", "\n")
}

#[test]
fn each_section_may_be_missing() {
    let text = small();
    let (_, whole, _) = everything(text.clone().into_bytes());
    let parts = sections(&text);
    assert!(parts.len() >= 5, "{}", parts.len());
    for (missing, _) in &parts {
        let rest = parts.iter().filter(|(name, _)| name != missing);
        let bytes: String = rest.map(|(_, body)| body.as_str()).collect();
        let (source, drawing, findings) = everything((bytes + "  0\nEOF\n").into_bytes());
        match missing.as_str() {
            "ENTITIES" => assert!(drawing.shapes.is_empty()),
            "BLOCKS" => assert!(!drawing.shapes.is_empty()),
            _ => assert_eq!(
                drawing.shapes.len(),
                whole.shapes.len(),
                "without {missing}"
            ),
        }
        assert!(
            !rules(&findings).contains(&"drawing-damaged"),
            "without {missing}"
        );
        marks_without_loss(&source, drawing.unit_m);
    }
}

#[test]
fn sections_may_stand_in_any_order_and_twice() {
    let text = small();
    let (_, whole, _) = everything(text.clone().into_bytes());
    let mut parts = sections(&text);
    parts.reverse();
    let bytes: String = parts.iter().map(|(_, body)| body.as_str()).collect();
    let (source, drawing, _) = everything((bytes.clone() + "  0\nEOF\n").into_bytes());
    assert_eq!(drawing.shapes.len(), whole.shapes.len());
    marks_without_loss(&source, drawing.unit_m);
    let (source, _, _) = everything((bytes.clone() + &bytes + "  0\nEOF\n").into_bytes());
    marks_without_loss(&source, drawing.unit_m);
}

#[test]
fn one_handle_for_all_is_no_trouble() {
    let (source, drawing, findings) = everything(of_tags(
        "0 SECTION 2 ENTITIES
         0 LINE 5 A1 8 A 10 0 20 0 11 1 21 0 0 LINE 5 A1 8 A 10 0 20 1 11 1 21 1
         0 INSERT 5 A1 8 A 2 B 10 0 20 0 66 1 0 ATTRIB 5 A1 8 A 2 T 1 V 10 0 20 0 40 1 0 SEQEND 5 A1 8 A
         0 ENDSEC 0 EOF",
    ));
    assert_eq!((drawing.shapes.len(), drawing.texts.len()), (2, 1));
    assert_eq!(rules(&findings), ["block-missing"]);
    marks_without_loss(&source, 0.001);
}

#[test]
fn codes_and_values_out_of_step_lose_one_entity_and_not_the_rest() {
    let line = "0 LINE 8 A 10 0 20 0 11 1 21 0";
    // A value is missing: the codes behind it are taken for values until something makes no sense.
    let (_, drawing, findings) = everything(of_tags(&format!(
        "0 SECTION 2 ENTITIES {line} 0 LINE 8 A 10 20 0 11 1 21 0 {line} {line} 0 ENDSEC 0 EOF"
    )));
    assert!(
        (2..=3).contains(&drawing.shapes.len()),
        "{}",
        drawing.shapes.len()
    );
    assert_eq!(rules(&findings), ["drawing-damaged"]);
    assert!(findings.iter().any(|f| f.text.contains("left out")));
}

#[test]
fn a_text_broken_over_two_lines_is_left_out_and_said() {
    let bytes = b"0\nSECTION\n2\nENTITIES\n0\nTEXT\n8\nA\n10\n0\n20\n0\n40\n1\n1\nD012\nby hand\n0\nTEXT\n8\nA\n10\n0\n20\n0\n40\n1\n1\nD013\n0\nENDSEC\n0\nEOF\n";
    let (_, drawing, findings) = everything(bytes.to_vec());
    let texts: Vec<&str> = drawing.texts.iter().map(|t| t.content.as_str()).collect();
    assert_eq!(texts, ["D013"]);
    assert_eq!(rules(&findings), ["drawing-damaged"]);
    assert!(
        findings
            .iter()
            .any(|f| f.text.contains("line 17, found \"by hand\""))
    );
}

#[test]
fn an_unclosed_section_is_read_and_said() {
    let (source, drawing, findings) = everything(of_tags(
        "0 SECTION 2 ENTITIES 0 LINE 8 A 10 0 20 0 11 1 21 0 0 SECTION 2 OBJECTS 0 ENDSEC 0 EOF",
    ));
    assert_eq!(drawing.shapes.len(), 1);
    assert_eq!(rules(&findings), ["drawing-damaged"]);
    marks_without_loss(&source, 0.001);
}

#[test]
fn an_unclosed_header_takes_no_variable() {
    let (source, drawing, _) = everything(of_tags(
        "0 SECTION 2 HEADER 9 $ACADVER 1 AC1015 0 SECTION 2 ENTITIES
         0 LINE 5 A1 8 A 10 0 20 0 11 1 21 0 0 ENDSEC 0 EOF",
    ));
    assert_eq!(drawing.shapes.len(), 1);
    marks_without_loss(&source, 0.001);
}

#[test]
fn a_section_of_nothing_but_garbage_takes_no_marks() {
    let (source, drawing, findings) = everything(of_tags(
        "0 SECTION 2 ENTITIES 0 LINE 5 A1 8 A 10 0 20 0 11 1 21 0 0 ENDSEC
         0 SECTION 2 ENTITIES oops 5 A1",
    ));
    assert_eq!(drawing.shapes.len(), 1);
    assert_eq!(rules(&findings), ["drawing-damaged"]);
    marks_without_loss(&source, 0.001);
}

#[test]
fn no_other_group_5_of_a_header_is_taken_for_the_seed() {
    let (source, _, _) = everything(of_tags(
        "0 SECTION 2 HEADER 9 $ACADVER 1 AC1015 9 $HANDSEED 5 1 5 77 0 ENDSEC
         0 SECTION 2 HEADER 5 88 0 LINE 5 99 0 ENDSEC
         0 SECTION 2 ENTITIES 0 LINE 5 A1 8 A 10 0 20 0 11 1 21 0 0 ENDSEC 0 EOF",
    ));
    marks_without_loss(&source, 0.001);
}
