//! Words, no numbers and numbers beyond reason where coordinates belong.

use tautplan::drawing::{Wanted, open, read};

use crate::drawings::{everything, file, marks_without_loss, of_tags, rules};

/// Puts a word in the place of each number in turn: what is then not read is said.
fn nothing_vanishes_silently(word: &str) {
    let whole = file("tests/data/versions/plan-R2010-ascii.dxf");
    let text = String::from_utf8(whole.clone()).expect("text");
    let (_, complete, _) = everything(whole);
    let entities = text.rfind("ENTITIES").expect("a section");
    let lines: Vec<&str> = text.lines().collect();
    let first = text[..entities].lines().count() + 1;
    let mut harmed = 0;
    for index in (first..lines.len() - 1).step_by(2) {
        let code = lines[index].trim().parse().unwrap_or(0);
        if !(10..60).contains(&code) {
            continue;
        }
        let mut harm = lines.clone();
        harm[index + 1] = word;
        let bytes = (harm.join("\n") + "\n").into_bytes();
        let source = open(bytes).expect("the tags are sound");
        let (drawing, findings) = read(&source, &Wanted::everything(), None);
        let all_there = drawing.shapes.len() == complete.shapes.len()
            && drawing.texts.len() == complete.texts.len()
            && drawing.inserts.len() == complete.inserts.len();
        assert!(
            all_there || rules(&findings).contains(&"entity-damaged"),
            "line {}: group {code} holds {word:?}, and nothing is said",
            index + 2
        );
        for shape in &drawing.shapes {
            assert!(shape.path.length_m().is_finite(), "{code} {word}");
        }
        for text in &drawing.texts {
            assert!(text.place.x.is_finite() && text.height_m.is_finite());
        }
        harmed += usize::from(!findings.is_empty());
        if harmed % 10 == 0 {
            marks_without_loss(&source, drawing.unit_m);
        }
    }
    assert!(harmed > 20, "{word}: {harmed}");
}

#[test]
fn words_in_the_place_of_numbers_are_said() {
    for word in ["north", "1,5", "", "--", "1.5D3"] {
        nothing_vanishes_silently(word);
    }
}

#[test]
fn no_numbers_and_numbers_beyond_reason_are_said() {
    for word in [
        "nan",
        "-inf",
        "1e308",
        "-1e308",
        "1e999",
        "1.7976931348623157e308",
    ] {
        nothing_vanishes_silently(word);
    }
}

#[test]
fn numbers_next_to_nothing_do_no_harm() {
    for word in ["1e-308", "-0", "4.9e-324", "1e-400"] {
        let (_, drawing, _) = everything(of_tags(&format!(
            "0 SECTION 2 ENTITIES
             0 ARC 8 A 10 0 20 0 40 {word} 50 0 51 90
             0 LWPOLYLINE 8 A 90 3 70 1 10 0 20 0 42 {word} 10 {word} 20 1 42 1e300 10 5 20 {word}
             0 SPLINE 8 A 70 0 71 3 72 8 73 4 40 0 40 0 40 0 40 0 40 {word} 40 {word} 40 {word} 40 {word}
               10 0 20 0 10 {word} 20 1 10 2 20 {word} 10 3 20 0
             0 CIRCLE 8 A 10 1e8 20 1e8 40 {word} 210 {word} 220 0 230 {word}
             0 TEXT 8 A 10 0 20 0 40 {word} 50 1e300 1 X
             0 INSERT 8 A 2 B 10 0 20 0 41 {word} 42 1e300 50 {word}
             0 ENDSEC 0 EOF"
        )));
        assert!(drawing.shapes.iter().all(|s| s.path.length_m().is_finite()));
    }
}

#[test]
fn a_hundred_thousand_damaged_entities_make_few_findings() {
    let line = "0 LINE 8 A 10 no 20 0 11 1 21 0 ";
    let far = "0 LINE 8 A 10 1e300 20 0 11 1 21 0 ";
    let tags = format!(
        "0 SECTION 2 ENTITIES {}{} 0 LINE 8 A 10 0 20 0 11 1 21 0 0 ENDSEC 0 EOF",
        line.repeat(100_000),
        far.repeat(100_000)
    );
    let (_, drawing, findings) = everything(of_tags(&tags));
    assert_eq!(drawing.shapes.len(), 1);
    let rules = rules(&findings);
    assert_eq!(rules.len(), 2 * 21);
    let said = |words: &str| findings.iter().any(|finding| finding.text.contains(words));
    assert!(said("line 8") && said("99980 more like the 20 before, 100000 in all"));
}
