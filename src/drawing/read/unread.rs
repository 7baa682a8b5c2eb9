//! What lies on layers that are read and is not read: entities of other types, and references without their contents.

use std::collections::BTreeMap;

use super::reach::inserted;
use crate::drawing::explode::{Book, MOST_TOLD, and_more};
use crate::drawing::leaders::POINTING_TYPES;
use crate::drawing::rules::{ENTITY_UNREAD, REFERENCE_EMPTY};
use crate::drawing::scan::{BlockEntry, READ_TYPES};
use crate::drawing::source::Source;
use crate::finding::{Finding, Level};

/// Types that dress a plan up; all others may be what a floor is drawn with.
const DRESSING: [&str; 12] = [
    "HATCH",
    "DIMENSION",
    "ARC_DIMENSION",
    "LARGE_RADIAL_DIMENSION",
    "TOLERANCE",
    "VIEWPORT",
    "WIPEOUT",
    "IMAGE",
    "OLE2FRAME",
    "OLEFRAME",
    "LIGHT",
    "SUN",
];

/// A finding for each type that is not read and each layer that is, blocks with the layers that their contents name.
pub(super) fn unread_findings(source: &Source, book: &Book<'_>, needed: &[bool]) -> Vec<Finding> {
    let scan = &source.scan;
    let mut counts: BTreeMap<(usize, usize), usize> = BTreeMap::new();
    let rows = scan.counts.iter().enumerate();
    let in_space =
        rows.flat_map(|(layer, row)| row.iter().map(move |(kind, n)| (layer, *kind, *n)));
    let blocks = scan
        .blocks
        .iter()
        .zip(needed)
        .filter(|(_, needed)| **needed);
    let in_blocks = blocks.flat_map(|(block, _)| &block.unread);
    let in_blocks = in_blocks.map(|((layer, kind), n)| (*layer as usize, *kind, *n));
    for (layer, kind, count) in in_space.chain(in_blocks) {
        let name = scan.types.get(kind).map_or("", String::as_str);
        if book.wanted.get(layer) == Some(&true) && !is_read(name) {
            *counts.entry((layer, kind)).or_default() += count;
        }
    }
    let mut told: Vec<Finding> = Vec::new();
    let all = counts.len();
    for ((layer, kind), count) in counts.into_iter().take(MOST_TOLD) {
        let name = scan.types.get(kind).map_or("", String::as_str);
        let layer = scan.layers.get(layer).map_or("0", |l| l.name.as_str());
        let level = if DRESSING.contains(&name) {
            Level::Note
        } else {
            Level::Warning
        };
        let are = if count == 1 { "is" } else { "are" };
        told.push(Finding::new(
            &ENTITY_UNREAD,
            level,
            format!("{count} {name} on layer {layer} {are} not read"),
            "draw as lines, polylines, arcs or texts what belongs to the floor, such as by exploding it",
        ));
    }
    told.extend(and_more(&ENTITY_UNREAD, Level::Warning, all));
    told
}

fn is_read(name: &str) -> bool {
    let name = name.as_bytes();
    READ_TYPES.contains(&name) || POINTING_TYPES.contains(&name) || name == b"SEQEND"
}

/// A finding for references that the drawing inserts and does not hold.
pub(super) fn references_finding(source: &Source, book: &Book<'_>) -> Option<Finding> {
    let names = source.absent_references();
    if names.is_empty() {
        return None;
    }
    let wanted = source.scan.entries.iter().any(|entry| {
        let block = inserted(book, entry).and_then(|block| source.scan.blocks.get(block));
        block.is_some_and(BlockEntry::is_absent_reference)
            && book.wanted.get(entry.layer as usize) == Some(&true)
    });
    let level = if wanted { Level::Warning } else { Level::Note };
    Some(Finding::new(
        &REFERENCE_EMPTY,
        level,
        format!(
            "external references are inserted whose contents are not in the drawing: {}",
            listed(&names)
        ),
        "bind them if anything of the floor is drawn in them",
    ))
}

/// Names in one line, the first few of many.
fn listed(names: &[&str]) -> String {
    const SHOWN: usize = 8;
    const LONGEST: usize = 80;
    let short = |name: &&str| name.chars().take(LONGEST).collect();
    let mut words: Vec<String> = names.iter().take(SHOWN).map(short).collect();
    if let Some(more) = names.len().checked_sub(SHOWN).filter(|more| *more > 0) {
        words.push(format!("and {more} more"));
    }
    words.join(", ")
}
