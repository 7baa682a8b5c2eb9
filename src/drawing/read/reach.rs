//! What of a drawing is wanted: entries of model space, and the blocks that they bring in.

use std::collections::BTreeMap;

use crate::drawing::explode::Book;
use crate::drawing::leaders::{Pointing, pointings};
use crate::drawing::scan::{Entry, Scan};
use crate::drawing::source::Source;
use crate::drawing::windows::{Losses, Record, read_records};
use crate::patterns::folded;

pub(super) fn layer_numbers(scan: &Scan) -> BTreeMap<String, u32> {
    let numbered = (0..).zip(&scan.layers);
    numbered
        .map(|(n, layer)| (folded(&layer.name), n))
        .collect()
}

pub(super) fn block_of_name(scan: &Scan) -> Vec<Option<usize>> {
    let mut blocks = BTreeMap::new();
    for (index, block) in scan.blocks.iter().enumerate() {
        blocks.entry(folded(&block.name)).or_insert(index);
    }
    let names = scan.block_names.iter();
    names
        .map(|name| blocks.get(&folded(name)).copied())
        .collect()
}

fn is_wanted(book: &Book<'_>, layer: u32) -> bool {
    book.wanted.get(layer as usize).copied().unwrap_or(false)
}

pub(super) fn inserted(book: &Book<'_>, entry: &Entry) -> Option<usize> {
    let named = book.block_of_name.get(entry.block as usize);
    named.copied().flatten().filter(|_| entry.is_insert)
}

/// By block: whether it holds entities on wanted layers, itself or through its inserts.
pub(super) fn holds_wanted(book: &Book<'_>) -> Vec<bool> {
    let blocks = &book.scan.blocks;
    let mut users: Vec<Vec<usize>> = vec![Vec::new(); blocks.len()];
    let mut holds = vec![false; blocks.len()];
    let mut news = Vec::new();
    for (index, block) in blocks.iter().enumerate() {
        for entry in &block.entries {
            if let Some(users) = inserted(book, entry).and_then(|inner| users.get_mut(inner)) {
                users.push(index);
            }
            holds[index] |= is_wanted(book, entry.layer);
        }
        let mut of_attributes = block.attribute_layers.iter();
        holds[index] |= of_attributes.any(|&layer| is_wanted(book, layer));
        let mut pointing = block.pointing.iter();
        holds[index] |= pointing.any(|entry| is_wanted(book, entry.layer));
        if holds[index] {
            news.push(index);
        }
    }
    while let Some(index) = news.pop() {
        for &user in users.get(index).into_iter().flatten() {
            if let Some(held) = holds.get_mut(user)
                && !*held
            {
                *held = true;
                news.push(user);
            }
        }
    }
    holds
}

/// The entries of model space that matter: on wanted layers, or inserts that bring in something wanted.
pub(super) fn top_entries<'s>(book: &Book<'s>) -> Vec<&'s Entry> {
    let scan = book.scan;
    let mut by_attribute = vec![];
    for &(entry, layer) in &scan.attribute_layers {
        if is_wanted(book, layer) {
            by_attribute.push(entry as usize);
        }
    }
    let brings = |entry: &Entry| {
        inserted(book, entry).is_some_and(|block| book.holds_wanted.get(block) == Some(&true))
    };
    let entries = scan.entries.iter().enumerate();
    entries
        .filter(|(index, entry)| {
            is_wanted(book, entry.layer)
                || brings(entry)
                || by_attribute.binary_search(index).is_ok()
        })
        .map(|(_, entry)| entry)
        .collect()
}

/// By block: whether the top entries bring it in.
pub(super) fn needed_blocks(book: &Book<'_>, top: &[&Entry]) -> Vec<bool> {
    let blocks = &book.scan.blocks;
    let mut needed = vec![false; blocks.len()];
    let mut open: Vec<usize> = top
        .iter()
        .filter_map(|entry| inserted(book, entry))
        .collect();
    while let Some(index) = open.pop() {
        if let (Some(needed), Some(block)) = (needed.get_mut(index), blocks.get(index))
            && !*needed
        {
            *needed = true;
            open.extend(
                block
                    .entries
                    .iter()
                    .filter_map(|entry| inserted(book, entry)),
            );
        }
    }
    needed
}

/// Leaders of every layer, and points that are wanted or may take a wanted layer from an insert.
pub(super) fn wanted_pointing<'e>(
    book: &'e Book<'_>,
    entries: &'e [Entry],
) -> impl Iterator<Item = &'e Entry> {
    let zero = book.layers.get("0").copied();
    entries.iter().filter(move |entry| {
        !entry.is_dot || Some(entry.layer) == zero || is_wanted(book, entry.layer)
    })
}

/// Leaders and points of every block that is needed.
pub(super) fn block_pointing(
    source: &Source,
    book: &Book<'_>,
    needed: &[bool],
    losses: &mut Losses,
) -> Vec<Vec<Pointing>> {
    let blocks = book.scan.blocks.iter().zip(needed);
    blocks
        .map(|(block, &needed)| {
            let entries = wanted_pointing(book, &block.pointing).filter(|_| needed);
            pointings(source, entries, losses)
        })
        .collect()
}

/// The records of every block that is needed.
pub(super) fn block_records(
    source: &Source,
    book: &Book<'_>,
    needed: &[bool],
    losses: &mut Losses,
) -> Vec<Vec<Record>> {
    let blocks = &book.scan.blocks;
    let zero = book.layers.get("0").copied();
    let mut entries = Vec::new();
    let mut homes = Vec::new();
    for (index, block) in blocks.iter().enumerate() {
        if !needed[index] {
            continue;
        }
        for entry in &block.entries {
            if entry.is_insert || Some(entry.layer) == zero || is_wanted(book, entry.layer) {
                entries.push(entry);
                homes.push((entry.start, index));
            }
        }
    }
    let mut records = vec![Vec::new(); blocks.len()];
    read_records(source, entries, losses, |record| {
        let home = homes.binary_search_by_key(&record.kept.start, |home| home.0);
        if let Some(home) = home.ok().and_then(|at| homes.get(at))
            && let Some(block) = records.get_mut(home.1)
        {
            block.push(record);
        }
    });
    records
}
