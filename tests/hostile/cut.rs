//! Drawings cut off at any byte.

use tautplan::drawing::{Wanted, open, read};

use crate::drawings::{everything, file, marks_without_loss, of_tags, rules};

/// Cuts a file at these bytes. What is read of the rest is what the whole file has there, and nothing else.
fn cut_at(name: &str, cuts: impl Iterator<Item = usize>) -> (usize, usize) {
    let whole = file(name);
    let (_, complete, _) = everything(whole.clone());
    let described = |shapes: &[tautplan::drawing::Shape]| -> Vec<String> {
        shapes.iter().map(|shape| format!("{shape:?}")).collect()
    };
    let shapes = described(&complete.shapes);
    let (mut read_on, mut refused) = (0, 0);
    for cut in cuts {
        let bytes = whole.get(..cut).expect("within the file").to_vec();
        let source = match open(bytes) {
            Ok(source) => source,
            Err(refusal) => {
                assert!(!refusal.to_string().is_empty());
                refused += 1;
                continue;
            }
        };
        let (drawing, findings) = read(&source, &Wanted::everything(), None);
        let found = described(&drawing.shapes);
        assert!(
            shapes.starts_with(&found),
            "{name} cut at {cut} gives what is not in it"
        );
        assert!(drawing.texts.len() <= complete.texts.len());
        let lost = found.len() < shapes.len() || drawing.texts.len() < complete.texts.len();
        assert!(
            !lost || rules(&findings).contains(&"drawing-damaged"),
            "{name} cut at {cut}: {} of {} shapes, and nothing is said",
            found.len(),
            shapes.len()
        );
        read_on += 1;
        if cut % 5 == 0 {
            marks_without_loss(&source, drawing.unit_m);
        }
    }
    (read_on, refused)
}

#[test]
fn a_text_file_cut_at_any_byte_gives_what_it_holds_or_is_refused() {
    let length = file("tests/data/versions/plan-R12-ascii.dxf").len();
    let (read_on, refused) = cut_at("tests/data/versions/plan-R12-ascii.dxf", 0..length);
    assert!(read_on > 1000 && refused > 1000, "{read_on}, {refused}");
}

#[test]
fn a_binary_file_cut_at_any_byte_gives_what_it_holds_or_is_refused() {
    let length = file("tests/data/versions/plan-R12-binary.dxf").len();
    let (read_on, refused) = cut_at("tests/data/versions/plan-R12-binary.dxf", 0..length);
    assert!(read_on > 1000 && refused > 1000, "{read_on}, {refused}");
}

#[test]
fn newer_files_and_demos_are_cut_at_some_bytes() {
    for (name, step) in [
        ("tests/data/versions/plan-R2018-ascii.dxf", 97),
        ("tests/data/versions/plan-R2018-binary.dxf", 89),
        ("demo-drawings/small-floor.dxf", 1009),
        ("demo-drawings/harbour-level-2.dxf", 7919),
    ] {
        let length = file(name).len();
        let (read_on, _) = cut_at(name, (0..length).step_by(step));
        assert!(read_on > 10, "{name}: {read_on}");
    }
}

/// Found by fuzzing: a table set in between a record's missing name and its handle made that handle count.
#[test]
fn marks_stand_before_a_record_without_a_name() {
    let mut bytes = of_tags(
        "0 SECTION 2 ENTITIES 0 LINE 5 61 8 A 10 0 20 0 11 1 21 0 0 ENDSEC
         0 SECTION 2 TABLES 0 TABLE 2 VPORT 70 1",
    );
    bytes.extend(b"0\n\n5\nA1\n8\n0EOF\n");
    let (source, drawing, findings) = everything(bytes);
    assert_eq!(drawing.shapes.len(), 1);
    assert_eq!(rules(&findings), ["drawing-damaged"]);
    marks_without_loss(&source, 0.001);
}
