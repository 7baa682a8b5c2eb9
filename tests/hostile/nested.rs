//! Blocks that multiply: nested, in themselves, in arrays.

use std::time::{Duration, Instant};

use tautplan::drawing::{Caps, Wanted, open, read_within};

use crate::drawings::{everything, marks_without_loss, rules, with_blocks};

const LINE: &str = "0 LINE 8 0 10 0 20 0 11 1 21 0";

/// Blocks of which each holds a line and an insert of the next.
fn chain(count: usize, array: &str) -> String {
    let block = |n: usize| {
        format!(
            "0 BLOCK 8 0 2 B{n} 10 0 20 0 {LINE} 0 INSERT 8 0 2 B{} 10 0 20 0 {array} 0 ENDBLK ",
            n + 1
        )
    };
    (0..count).map(block).collect()
}

#[track_caller]
fn in_time<T>(work: impl FnOnce() -> T) -> T {
    let begun = Instant::now();
    let done = work();
    let limit_s = if cfg!(debug_assertions) { 20 } else { 2 };
    assert!(
        begun.elapsed() < Duration::from_secs(limit_s),
        "{:?}",
        begun.elapsed()
    );
    done
}

#[test]
fn a_nest_of_thousands_is_cut_and_said() {
    for count in [1000, 20_000] {
        let bytes = with_blocks(&chain(count, ""), "0 INSERT 8 0 2 B0 10 0 20 0");
        let (source, drawing, findings) = in_time(|| everything(bytes));
        assert_eq!(drawing.shapes.len(), 32);
        assert_eq!(rules(&findings), ["block-too-deep"]);
        marks_without_loss(&source, 0.001);
    }
}

#[test]
fn a_block_in_itself_is_cut_and_said() {
    let blocks = format!(
        "0 BLOCK 8 0 2 A 10 0 20 0 {LINE} 0 INSERT 8 0 2 a 10 1 20 1 70 500 71 500 0 ENDBLK"
    );
    let bytes = with_blocks(&blocks, "0 INSERT 8 0 2 A 10 0 20 0");
    let (_, drawing, findings) = in_time(|| everything(bytes));
    assert_eq!(drawing.shapes.len(), 1);
    assert_eq!(rules(&findings), ["block-in-itself"]);
}

#[test]
fn an_array_of_nine_hundred_million_is_cut_and_said() {
    let array = "70 30000 71 30000 44 1 45 1";
    let blocks = format!("0 BLOCK 8 0 2 A 10 0 20 0 {LINE} 0 ENDBLK");
    for name in ["A", "NONE"] {
        let bytes = with_blocks(
            &blocks,
            &format!("0 INSERT 8 0 2 {name} 10 0 20 0 {array} {LINE}"),
        );
        let (drawing, findings) = in_time(|| {
            let source = open(bytes).expect("a drawing");
            let caps = Caps {
                expanded_entities: 5000,
                ..Caps::default()
            };
            read_within(&source, &Wanted::everything(), None, &caps)
        });
        assert!(drawing.shapes.len() + drawing.inserts.len() <= 5001);
        // The line behind the array is no part of it and is read.
        assert!(drawing.shapes.iter().any(|shape| shape.handle == "#2"));
        let cut = findings
            .iter()
            .find(|f| f.rule.name == "block-too-many")
            .expect("said");
        assert!(cut.text.contains("5000 entities"), "{}", cut.text);
        assert!(
            cut.remedy.contains("limits.expanded_entities"),
            "{}",
            cut.remedy
        );
    }
}

#[test]
fn arrays_of_arrays_stay_within_the_default_caps() {
    let bytes = with_blocks(
        &chain(6, "70 30 71 30 44 1 45 1"),
        "0 INSERT 8 0 2 B0 10 0 20 0",
    );
    let (_, drawing, findings) = everything(bytes);
    assert!(drawing.shapes.len() + drawing.inserts.len() <= 1_000_000);
    assert_eq!(rules(&findings), ["block-missing", "block-too-many"]);
}

#[test]
fn heavy_entities_are_weighed_before_they_multiply() {
    let vertices: Vec<String> = (0..20_000)
        .map(|n| format!("10 {n} 20 {} ", n % 2))
        .collect();
    let blocks = format!(
        "0 BLOCK 8 0 2 A 10 0 20 0 0 LWPOLYLINE 8 0 90 20000 70 0 {} 0 ENDBLK",
        vertices.concat()
    );
    let bytes = with_blocks(
        &blocks,
        "0 INSERT 8 0 2 A 10 0 20 0 70 300 71 300 44 1 45 1",
    );
    let source = open(bytes).expect("a drawing");
    let caps = Caps {
        memory_mb: 100,
        ..Caps::default()
    };
    let (drawing, findings) = read_within(&source, &Wanted::everything(), None, &caps);
    assert!(
        (20..120).contains(&drawing.shapes.len()),
        "{}",
        drawing.shapes.len()
    );
    let cut = findings
        .iter()
        .find(|f| f.rule.name == "block-too-many")
        .expect("said");
    assert!(
        cut.remedy.contains("limits.memory_mb above 100"),
        "{}",
        cut.remedy
    );
}
