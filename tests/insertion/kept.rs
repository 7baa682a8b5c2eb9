//! What stays of a drawing of any version and form, and that a second marking changes nothing.

use tautplan::drawing::{Sheet, insert, open};

use crate::dxf_text::{Coding, Tag, Value, decode, encode};
use crate::sample::{Pieces, VERSIONS, all_pieces, codings, drawing, text};
use crate::sheets::{no_marks, sheet, smaller_sheet};

pub(crate) fn mark(bytes: &[u8], sheet: &Sheet) -> Vec<u8> {
    let source = open(bytes.to_vec()).expect("a drawing that can be read");
    insert(&source, 0.001, sheet).expect("a sheet that can be inserted")
}

/// Panics unless `original` stands in `marked` tag by tag, in order and byte for byte, the seed's value aside.
pub(crate) fn assert_kept(original: &[Tag], coding: Coding, marked: &[u8], what: &str) {
    let marked = decode(marked, coding);
    let mut rest = marked.iter();
    let mut seed_next = false;
    for tag in original {
        let found = rest.any(|candidate| candidate == tag || (seed_next && candidate.0 == 5));
        assert!(found, "{what}: {tag:?} is lost or has moved");
        seed_next = *tag == text(9, "$HANDSEED");
    }
}

fn version_of(tags: &[Tag]) -> &str {
    let variable = text(9, "$ACADVER");
    let mut pairs = tags.windows(2).filter(|pair| pair[0] == variable);
    match pairs.next().map(|pair| &pair[1].1) {
        Some(Value::Text(version)) => version,
        _ => "",
    }
}

/// The handles of all records, in the order of the file.
pub(crate) fn handles(tags: &[Tag]) -> Vec<u64> {
    let seed = text(9, "$HANDSEED");
    tags.windows(2)
        .filter(|pair| pair[0] != seed)
        .filter_map(|pair| match &pair[1] {
            (5, Value::Text(handle)) => Some(u64::from_str_radix(handle, 16).expect("a handle")),
            _ => None,
        })
        .collect()
}

pub(crate) fn seed(tags: &[Tag]) -> Option<u64> {
    let seed = text(9, "$HANDSEED");
    tags.windows(2)
        .find(|pair| pair[0] == seed)
        .and_then(|pair| match &pair[1].1 {
            Value::Text(handle) => u64::from_str_radix(handle, 16).ok(),
            _ => None,
        })
}

fn every_case(mut check: impl FnMut(&[Tag], Coding, &[u8], Pieces, &str)) {
    let mut count = 0;
    for version in VERSIONS {
        for pieces in all_pieces() {
            for coding in codings(version, pieces) {
                let tags = drawing(version, pieces);
                let bytes = encode(&tags, coding);
                let what = format!("{version} {coding:?} {pieces:?}");
                check(&tags, coding, &bytes, pieces, &what);
                count += 1;
            }
        }
    }
    assert_eq!(count, 9 * 54 * 4, "cases were lost");
}

#[test]
fn all_of_the_original_stays_in_every_version_and_form() {
    every_case(|tags, coding, bytes, pieces, what| {
        let marked = mark(bytes, &sheet());
        assert_kept(tags, coding, &marked, what);
        let after = decode(&marked, coding);
        for layer in sheet().layers {
            let records = after.iter().filter(|tag| **tag == text(2, &layer.name));
            assert_eq!(records.count(), 1, "{what}: {}", layer.name);
        }
        let used = handles(&after);
        let mut distinct = used.clone();
        distinct.sort_unstable();
        distinct.dedup();
        assert_eq!(used.len(), distinct.len(), "{what}: a handle is used twice");
        let old_without = version_of(tags) < "AC1012" && !(pieces.handles && pieces.entities);
        assert_eq!(used.is_empty(), old_without, "{what}: handles");
        if pieces.header && !used.is_empty() {
            assert!(seed(&after) > distinct.last().copied(), "{what}: seed");
        }
    });
}

#[test]
fn marking_a_marked_drawing_gives_the_same_bytes() {
    every_case(|_, _, bytes, _, what| {
        let once = mark(bytes, &sheet());
        assert!(
            mark(&once, &sheet()) == once,
            "{what}: a second time differs"
        );
        let fewer = mark(&once, &smaller_sheet());
        assert!(
            fewer == mark(bytes, &smaller_sheet()),
            "{what}: a smaller sheet later differs"
        );
        assert!(
            mark(&fewer, &sheet()) == once,
            "{what}: the first sheet again differs"
        );
        let none = mark(&once, &no_marks());
        assert!(mark(&none, &no_marks()) == none, "{what}: no marks, twice");
        assert!(mark(&none, &sheet()) == once, "{what}: marks after none");
    });
}

#[test]
fn a_sheet_without_anything_changes_nothing() {
    every_case(|_, _, bytes, _, what| {
        assert!(mark(bytes, &Sheet::default()) == bytes, "{what}");
    });
}
