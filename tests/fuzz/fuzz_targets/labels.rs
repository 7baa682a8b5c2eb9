//! A job's patterns on arbitrary texts: the first lines are patterns, what follows stands on the plan as labels.
#![no_main]

use libfuzzer_sys::fuzz_target;
use tautplan::drawing::{Drawing, Shape, ShapeKind, Text};
use tautplan::geometry::{Coord, Path, Segment};
use tautplan::{floor, job};

fuzz_target!(|input: &str| {
    let mut parts = input.splitn(4, '\u{1F}');
    let mut next = || parts.next().unwrap_or_default();
    let (mark, height, unit) = (next(), next(), next());
    let unit = ["mm", "cm", "m", "in", "ft"][unit.len() % 5];
    let mut text = format!("[height]\nunit = \"{unit}\"\n");
    if !height.is_empty() {
        text += &format!("patterns = [{}]\n", quoted(height));
    }
    if !mark.is_empty() {
        text += &format!("[labels]\nmark_patterns = [{}]\n", quoted(mark));
    }
    let resolved = match job::read("fuzz.toml", &text) {
        Ok(resolved) => resolved,
        Err(problems) => return assert!(!problems.render(false).is_empty()),
    };
    let labels = next().split('\u{1E}').take(40).enumerate();
    let texts = labels.map(|(n, content)| label(n, content)).collect();
    let at = |x, y| Coord { x, y };
    let line = Segment::Line {
        from: at(0.0, 0.0),
        to: at(20.0, 0.0),
    };
    let drawing = Drawing {
        unit_m: 1.0,
        shapes: vec![Shape {
            handle: "1".to_owned(),
            layer: "TENDON-BANDED".to_owned(),
            kind: ShapeKind::Line,
            path: Path::new(vec![line]),
            closed: false,
        }],
        texts,
        ..Drawing::default()
    };
    let (floor, findings) = floor::read(&drawing, &resolved.job);
    assert_eq!(floor.tendons.len(), 1);
    for point in &floor.tendons[0].points {
        assert!(point.height_m.is_none_or(f64::is_finite));
    }
    assert!(findings.iter().all(|f| !f.text.is_empty()));
});

/// As a TOML string, whatever is in it.
fn quoted(text: &str) -> String {
    let mut out = String::from("\"");
    for letter in text.chars() {
        out += &format!("\\U{:08X}", u32::from(letter));
    }
    out + "\""
}

fn label(number: usize, content: &str) -> Text {
    let x = 0.5 * number as f64;
    let at = |dx: f64, y: f64| Coord { x: x + dx, y };
    Text {
        handle: format!("{:X}", number + 16),
        layer: ["TENDON-HEIGHT", "TENDON-MARK", "SLAB-ZONE"][number % 3].to_owned(),
        content: content.to_owned(),
        place: at(0.0, 0.1),
        corners: [at(0.0, 0.1), at(0.4, 0.1), at(0.4, 0.3), at(0.0, 0.3)],
        height_m: 0.2,
        rotation_rad: 0.0,
    }
}
