//! What texts alone bring into a proposal.

use super::*;
use crate::commands::job_file::JobFile;
use crate::drawing::{Layer, Text};

/// What a drawing with these texts gets proposed; layers named for their role, metres in a drawing unit.
fn proposed(texts: &[(&str, &[&str])], unit_m: f64) -> BTreeMap<String, Proposal> {
    let mut drawing = Drawing {
        unit_m,
        ..Drawing::default()
    };
    for (layer, contents) in texts {
        drawing.layers.push(Layer {
            name: (*layer).to_owned(),
            counts: vec![("TEXT".to_owned(), contents.len())],
            ..Layer::default()
        });
        drawing.texts.extend(contents.iter().map(|content| Text {
            handle: "1".to_owned(),
            layer: (*layer).to_owned(),
            content: (*content).to_owned(),
            height_m: 0.1,
            ..Text::default()
        }));
    }
    let job_file = JobFile::default();
    let contents = Contents::of(&drawing, &job_file.resolved.job);
    super::super::proposals::proposals(&drawing, &contents, &job_file)
}

fn value(found: &BTreeMap<String, Proposal>, key: &str) -> Value {
    found.get(key).map_or(Value::Null, |p| p.value.clone())
}

#[test]
fn texts_of_known_families_bring_their_patterns() {
    let found = proposed(&[("QTY", &["12T", "7T", "2T @ 28\" O.C."])], 0.0254);
    assert_eq!(value(&found, "layers.marks"), json!(["QTY"]));
    let patterns = value(&found, "labels.mark_patterns");
    let patterns = patterns.as_array().expect("a list");
    assert_eq!(
        patterns.len(),
        Job::default().conventions.mark_patterns.len() + 2
    );
    for pattern in patterns.iter().rev().take(2) {
        assert_eq!(
            (&pattern["strands"], &pattern["strand"]),
            (&json!(1), &json!("12.7"))
        );
    }
    let why = &found["labels.mark_patterns"].why;
    assert!(
        why.contains("Added for 2 texts: count of single-strand tendons"),
        "{why}"
    );
}

#[test]
fn inch_signs_and_fractions_tell_the_unit_and_are_no_marks() {
    let heights = &["H 6 1/2\"", "L 1\"", "1 1/4\"", "6\""][..];
    let found = proposed(&[("ELEV", heights), ("THK", &["T=8\""])], 0.0254);
    assert_eq!(value(&found, "layers.heights"), json!(["ELEV"]));
    assert_eq!(value(&found, "layers.slab_zone"), json!(["THK"]));
    assert_eq!(value(&found, "height.unit"), json!("in"));
    assert_eq!(value(&found, "slab.text_unit"), json!("in"));
    assert_eq!(value(&found, "labels.mark_patterns"), Value::Null);
}

#[test]
fn numbers_too_small_for_millimetres_tell_the_unit_by_the_drawings_own() {
    for (heights, thickness, unit_m, unit) in [
        (&["H0.165", "L0.03", "L0.03"], "T0.2", 1.0, "m"),
        (&["H16.5", "L3", "L3"], "T20", 0.01, "cm"),
        (&["H6.5", "L1.25", "L1.25"], "T8", 0.0254, "in"),
    ] {
        let found = proposed(&[("ELEV", heights), ("THK", &[thickness])], unit_m);
        assert_eq!(value(&found, "height.unit"), json!(unit));
        assert_eq!(value(&found, "slab.text_unit"), json!(unit));
    }
    let found = proposed(
        &[("ELEV", &["H165", "L30", "L30"]), ("THK", &["T200"])],
        0.001,
    );
    assert_eq!(value(&found, "height.unit"), Value::Null);
    assert_eq!(value(&found, "slab.text_unit"), Value::Null);
}

#[test]
fn two_unknown_words_are_told_by_their_numbers() {
    let heights = &["В=165", "В=160", "В=155", "Н=30", "Н=35", "Н=40"][..];
    let found = proposed(&[("ОТМЕТКИ", heights)], 0.001);
    assert_eq!(value(&found, "layers.heights"), json!(["ОТМЕТКИ"]));
    let words = ["height.high_words", "height.low_words"].map(|key| value(&found, key));
    assert_eq!(
        words,
        [
            json!(["H", "HP", "HIGH", "В"]),
            json!(["L", "LP", "LOW", "Н"])
        ]
    );
    let mixed = &["В=165", "В=30", "В=155", "Н=30", "Н=165", "Н=40"][..];
    let found = proposed(&[("ОТМЕТКИ", mixed)], 0.001);
    assert_eq!(value(&found, "height.high_words"), Value::Null);
}

#[test]
fn a_top_beside_a_bottom_is_no_thickness() {
    let found = proposed(&[("ELEV", &["T165", "B30", "B35", "T170"])], 0.001);
    assert_eq!(value(&found, "layers.heights"), json!(["ELEV"]));
    assert_eq!(value(&found, "layers.slab_zone"), Value::Null);
    assert_eq!(
        value(&found, "height.high_words"),
        json!(["H", "HP", "HIGH", "T"])
    );
    assert_eq!(
        value(&found, "height.low_words"),
        json!(["L", "LP", "LOW", "B"])
    );
}
