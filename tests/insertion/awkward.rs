//! Drawings that make insertion awkward.

use tautplan::drawing::{Drawn, insert, open};

use crate::dxf_text::{Value, encode};
use crate::kept::{assert_kept, handles, mark, seed};
use crate::sample::{LF, WHOLE, drawing, drawn, line, text, with};
use crate::shapes::marked_tags;
use crate::sheets::{no_marks, sheet, smaller_sheet};

#[test]
fn handles_and_seed_give_way_to_what_others_added_after_a_marking() {
    let original = drawing("AC1027", WHOLE);
    let once = marked_tags(&original, &sheet());
    let free = seed(&once).expect("a seed");
    assert_eq!(free, 0x2F + 3 + 9, "layers and marks follow the old seed");

    // A line drawn since, with the next handle, and the seed raised for it.
    let mut later = drawn(once.clone(), line(&format!("{free:X}"), "SLAB-EDGE"));
    for tag in &mut later {
        if *tag == text(5, &format!("{free:X}")) {
            *tag = text(5, &format!("{:X}", free + 0x10));
            break;
        }
    }
    let again = marked_tags(&later, &smaller_sheet());
    assert_kept(&original, LF, &encode(&again, LF), "drawn since");
    assert!(again.contains(&text(8, "SLAB-EDGE")));
    let new: Vec<u64> = handles(&again)
        .into_iter()
        .filter(|handle| *handle > free)
        .collect();
    assert_eq!(new, [free + 1, free + 2]);
    assert_eq!(
        seed(&again),
        Some(free + 0x10),
        "a seed raised by others is not lowered"
    );
    assert_eq!(marked_tags(&again, &smaller_sheet()), again);
}

#[test]
fn handles_at_the_end_of_the_numbers_leave_a_gap_to_use() {
    let original = drawn(drawing("AC1027", WHOLE), line("FFFFFFFFFFFFFFFE", "0"));
    let once = marked_tags(&original, &sheet());
    assert_kept(&original, LF, &encode(&once, LF), "full");
    assert_eq!(seed(&once), Some(0x2F), "the seed stays");
    let mut used = handles(&once);
    used.sort_unstable();
    used.dedup();
    assert_eq!(used.len(), handles(&once).len());
    assert_eq!(marked_tags(&once, &sheet()), once);
    let fewer = marked_tags(&once, &smaller_sheet());
    assert_eq!(marked_tags(&fewer, &sheet()), once);
}

#[test]
fn a_sequence_left_open_is_ended_before_the_marks() {
    let polyline = vec![
        text(0, "POLYLINE"),
        text(5, "2C"),
        text(8, "TENDON-BANDED"),
        (66, Value::Short(1)),
        text(0, "VERTEX"),
        text(5, "2D"),
        text(8, "TENDON-BANDED"),
        (10, Value::Real(1.0)),
        (20, Value::Real(1.0)),
    ];
    let original = drawn(drawing("AC1009", WHOLE), polyline);
    let once = marked_tags(&original, &sheet());
    let end = once.iter().position(|tag| *tag == text(0, "SEQEND"));
    assert_eq!(
        once[end.expect("an end") + 1..][..2],
        [text(5, "2F"), text(8, "0")]
    );
    assert_eq!(marked_tags(&once, &sheet()), once);
    assert_eq!(
        marked_tags(&original, &no_marks()).len(),
        original.len() + 3 * 5
    );
}

#[test]
fn a_layer_that_is_there_in_any_letter_case_keeps_its_record() {
    let frozen = vec![
        text(0, "LAYER"),
        text(5, "12"),
        text(100, "AcDbSymbolTableRecord"),
        text(100, "AcDbLayerTableRecord"),
        text(2, "taut-Table"),
        (70, Value::Short(1)),
        (62, Value::Short(5)),
        text(6, "Continuous"),
    ];
    let original = with(drawing("AC1032", WHOLE), &text(0, "ENDTAB"), 0, frozen);
    let once = marked_tags(&original, &sheet());
    assert_kept(&original, LF, &encode(&once, LF), "frozen");
    assert!(!once.contains(&text(2, "TAUT-TABLE")));
    assert_eq!(marked_tags(&once, &sheet()), once);
}

#[test]
fn comments_strange_tails_and_several_entities_sections_stay() {
    let original = with(
        drawing("AC1015", WHOLE),
        &text(0, "EOF"),
        0,
        vec![
            text(0, "SECTION"),
            text(2, "ENTITIES"),
            text(999, "0"),
            text(0, "ENDSEC"),
            text(999, "a comment"),
        ],
    );
    let mut bytes = encode(&original, LF);
    bytes.extend(b"\n\n\x1a");
    let once = mark(&bytes, &sheet());
    let body = once.strip_suffix(b"\n\n\x1a").expect("the tail");
    assert_kept(&original, LF, body, "several");
    assert!(mark(&once, &sheet()) == once);
}

#[test]
fn a_comment_behind_our_marks_stays() {
    let once = mark(&encode(&drawing("AC1015", WHOLE), LF), &sheet());
    let (comment, end) = (b"999\nseen by the checker\n", b"  0\nENDSEC\n");
    let at = memchr::memmem::rfind(&once, end).expect("the end of ENTITIES");
    let noted = [&once[..at], comment, &once[at..]].concat();
    for sheet in [sheet(), smaller_sheet(), no_marks()] {
        let again = mark(&noted, &sheet);
        assert!(
            memchr::memmem::find(&again, comment).is_some(),
            "the comment is lost"
        );
        assert!(mark(&again, &sheet) == again);
    }
}

#[test]
fn places_that_are_no_numbers_are_refused() {
    let bytes = encode(&drawing("AC1027", WHOLE), LF);
    let source = open(bytes).expect("a drawing");
    for unit_m in [0.0, -1.0, f64::NAN] {
        assert!(insert(&source, unit_m, &sheet()).is_err());
    }
    let mut sheet = sheet();
    sheet.marks[4].drawn = Drawn::Circle {
        centre: geo::Coord {
            x: f64::NAN,
            y: 0.0,
        },
        radius_m: 1.0,
    };
    let refusal = insert(&source, 0.001, &sheet).expect_err("no place");
    assert!(refusal.to_string().contains("TAUT-TABLE"), "{refusal}");
}
