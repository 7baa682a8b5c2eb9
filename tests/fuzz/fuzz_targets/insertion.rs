//! Marks inserted into whatever opens: every byte stays in its order, and marking again changes nothing.
#![no_main]

use libfuzzer_sys::fuzz_target;
use tautplan::drawing::{Align, Drawn, Ink, Mark, Sheet, SheetLayer, insert, open};
use tautplan::geometry::Coord;

fuzz_target!(|bytes: &[u8]| {
    let Ok(source) = open(bytes.to_vec()) else {
        return;
    };
    let marked = insert(&source, 0.001, &sheet()).expect("a sound sheet");
    let named = |word: &[u8]| {
        bytes
            .windows(word.len())
            .any(|w| w.eq_ignore_ascii_case(word))
    };
    // The seed's value and marks of an earlier run are replaced.
    if !named(b"$HANDSEED") && !named(b"TAUT-") && !named(b"TAUT\\") {
        let mut rest = marked.iter();
        assert!(
            bytes.iter().all(|byte| rest.any(|other| other == byte)),
            "bytes are lost"
        );
    }
    let again = open(marked.clone()).expect("the marked drawing opens");
    let twice = insert(&again, 0.001, &sheet()).expect("a sound sheet");
    assert!(twice == marked, "marking twice gives other bytes");
});

fn sheet() -> Sheet {
    let ink = Ink {
        index: 1,
        rgb: Some([255, 0, 0]),
    };
    let layer = |name: &str| SheetLayer {
        name: name.to_owned(),
        ink,
        on: true,
    };
    let at = |x, y| Coord { x, y };
    let mark = |drawn| Mark {
        layer: "TAUT-TABLE".to_owned(),
        ink: None,
        drawn,
    };
    Sheet {
        layers: vec![layer("TAUT-TABLE"), layer("TAUT-FINDING")],
        marks: vec![
            mark(Drawn::Text {
                place: at(1.0, 2.0),
                height_m: 0.1,
                rotation_rad: 0.0,
                align: Align::Middle,
                content: "5 % ±2°".to_owned(),
            }),
            mark(Drawn::Line {
                points: vec![at(0.0, 0.0), at(1.0, 0.0)],
                width_m: 0.02,
                closed: false,
            }),
        ],
    }
}
