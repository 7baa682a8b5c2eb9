//! Any bytes as a drawing: read, read in part, or refused in words.
#![no_main]

use libfuzzer_sys::fuzz_target;
use tautplan::drawing::{Caps, Wanted, open, read_within};

fuzz_target!(|bytes: &[u8]| {
    let source = match open(bytes.to_vec()) {
        Ok(source) => source,
        Err(refusal) => return assert!(!refusal.to_string().is_empty()),
    };
    // Small caps, or expansion takes all the time there is.
    let caps = Caps {
        expanded_entities: 1000,
        ..Caps::default()
    };
    let (drawing, findings) = read_within(&source, &Wanted::everything(), None, &caps);
    assert!(drawing.shapes.iter().all(|s| s.path.length_m().is_finite()));
    assert!(
        drawing
            .texts
            .iter()
            .all(|t| t.place.x.is_finite() && t.height_m.is_finite())
    );
    assert!(
        drawing
            .inserts
            .iter()
            .all(|i| i.place.x.is_finite() && i.place.y.is_finite())
    );
    assert!(
        findings
            .iter()
            .all(|f| !f.text.is_empty() && !f.remedy.is_empty())
    );
});
