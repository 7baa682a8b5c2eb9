//! Keys of `[ends]` that the drawing suggests: what stands at line ends and says, or a legend says, what it is.

use std::collections::{BTreeMap, BTreeSet};

use serde_json::json;

use super::contents::Contents;
use super::pairs::{Pairs, opposite};
use super::trade_words::{Trade, hinted, named};
use crate::floor::{EndKind, EndWords};
use crate::job::{Job, Proposal};
use crate::patterns::{Names, pattern_of};

/// What to set below `[ends]`, by path of the key.
pub(super) fn proposals(contents: &Contents, job: &Job) -> BTreeMap<String, Proposal> {
    let mut proposals = BTreeMap::new();
    blocks(contents, job, &mut proposals);
    between(contents, job, &mut proposals);
    attributes(contents, job, &mut proposals);
    words(contents, job, &mut proposals);
    shapes(contents, job, &mut proposals);
    proposals
}

const KINDS: [(EndKind, &str); 2] = [(EndKind::Live, "live"), (EndKind::Dead, "dead")];

fn put(
    proposals: &mut BTreeMap<String, Proposal>,
    key: &str,
    values: &BTreeSet<String>,
    why: &str,
) {
    if !values.is_empty() {
        let proposal = Proposal {
            value: json!(values),
            why: why.to_owned(),
        };
        proposals.insert(format!("ends.{key}"), proposal);
    }
}

fn names(patterns: &[String]) -> Names {
    Names::new(patterns).unwrap_or_default()
}

fn known_words(job: &Job, kind: EndKind) -> &[String] {
    match kind {
        EndKind::Live => &job.conventions.live_end_words,
        EndKind::Dead => &job.conventions.dead_end_words,
    }
}

/// Blocks at line ends whose names, a legend, or the other of two say what they are, where none fits the job.
fn blocks(contents: &Contents, job: &Job, proposals: &mut BTreeMap<String, Proposal>) {
    let read = &job.conventions;
    let found = &contents.at_ends;
    let counts = found
        .blocks
        .iter()
        .filter(|(block, _)| !found.between.contains(*block))
        .map(|(block, count)| (block.as_str(), *count));
    let known = [&read.live_end_blocks, &read.dead_end_blocks].map(|blocks| names(blocks));
    let told = |block: &str| {
        let [live, dead] = [0, 1].map(|kind| known.get(kind).is_some_and(|names| names.has(block)));
        let by_job = KINDS
            .into_iter()
            .zip([live, dead])
            .find(|(_, has)| *has)
            .map(|((kind, _), _)| kind);
        by_job
            .or_else(|| hinted(block))
            .or_else(|| found.legend_blocks.get(block).copied())
    };
    let pairs = Pairs::of(&counts.collect(), told);
    for ((kind, word), known) in KINDS.into_iter().zip(&known) {
        if found.blocks.keys().any(|block| known.has(block)) {
            continue;
        }
        let caution = pairs.caution(kind);
        put(
            proposals,
            &format!("{word}_blocks"),
            &pairs.names(kind).map(pattern_of).collect(),
            &format!(
                "No block at a line end fits the default; the name or the legend says so.{caution}"
            ),
        );
    }
}

/// Blocks on lines that are intermediate anchors by their names or a legend, where none fits the job.
fn between(contents: &Contents, job: &Job, proposals: &mut BTreeMap<String, Proposal>) {
    let found = &contents.at_ends.between;
    let known = names(&job.conventions.intermediate_blocks);
    if found.iter().any(|block| known.has(block)) {
        return;
    }
    let blocks = found.iter().map(|block| pattern_of(block)).collect();
    let why =
        "No block fits the default; the name or the legend says that tendons go on through these.";
    put(proposals, "intermediate_blocks", &blocks, why);
}

/// Blocks at line ends that an attribute tells apart.
fn attributes(contents: &Contents, job: &Job, proposals: &mut BTreeMap<String, Proposal>) {
    let read = &job.conventions;
    let known = names(
        &[
            read.live_end_blocks.as_slice(),
            &read.dead_end_blocks,
            &read.end_blocks,
        ]
        .concat(),
    );
    let said = EndWords::new(read);
    let (mut blocks, mut tags) = (BTreeSet::new(), BTreeSet::new());
    let mut new_words =
        BTreeMap::from(KINDS.map(|(kind, _)| (kind == EndKind::Live, BTreeSet::new())));
    let other = by_elimination(contents, &said);
    for (block, tag, value) in contents.at_ends.attributes.keys() {
        let place = (block.as_str(), tag.as_str(), value.as_str());
        let told = said.kind(value).or_else(|| hinted(value));
        let Some(kind) = told.or_else(|| other.get(&place).copied()) else {
            continue;
        };
        if known.has(block) || hinted(block).is_some() {
            continue;
        }
        blocks.insert(pattern_of(block));
        tags.insert(pattern_of(tag));
        if said.kind(value).is_none()
            && let Some(words) = new_words.get_mut(&(kind == EndKind::Live))
        {
            words.insert(value.clone());
        }
    }
    put(
        proposals,
        "blocks",
        &blocks,
        "Blocks at line ends whose attribute says what they are.",
    );
    put(
        proposals,
        "attributes",
        &tags,
        "The attributes that say it.",
    );
    let guessed = if other.is_empty() {
        "Values of those attributes, and the defaults."
    } else {
        "Values of those attributes, and the defaults. Of two values one is known; the other is taken for the other end: a \
         guess, look at the legend."
    };
    for (kind, word) in KINDS {
        let mut words = new_words
            .remove(&(kind == EndKind::Live))
            .unwrap_or_default();
        if !words.is_empty() {
            words.extend(known_words(job, kind).iter().cloned());
        }
        put(proposals, &format!("{word}_words"), &words, guessed);
    }
}

/// Where an attribute has two values at line ends, each at several, and one is known, what the other must be: block, tag
/// and value.
fn by_elimination<'c>(
    contents: &'c Contents,
    said: &EndWords,
) -> BTreeMap<(&'c str, &'c str, &'c str), EndKind> {
    let mut values: BTreeMap<(&str, &str), Vec<(&str, usize)>> = BTreeMap::new();
    for ((block, tag, value), count) in &contents.at_ends.attributes {
        values
            .entry((block, tag))
            .or_default()
            .push((value, *count));
    }
    let kind = |value: &str| said.kind(value).or_else(|| hinted(value));
    let mut found = BTreeMap::new();
    for ((block, tag), values) in values {
        let [(one, ones), (two, twos)] = values[..] else {
            continue;
        };
        let (known, unknown) = match (kind(one), kind(two)) {
            (Some(known), None) => (known, two),
            (None, Some(known)) => (known, one),
            _ => continue,
        };
        if ones.min(twos) > 1 {
            found.insert((block, tag, unknown), opposite(known));
        }
    }
    found
}

/// Texts at line ends that say what they are in words the job does not know.
fn words(contents: &Contents, job: &Job, proposals: &mut BTreeMap<String, Proposal>) {
    let known = EndWords::new(&job.conventions);
    let mut counts: BTreeMap<&str, usize> = BTreeMap::new();
    for ((_, text), count) in &contents.at_ends.words {
        *counts.entry(text).or_default() += count;
    }
    let pairs = Pairs::of(&counts, |text| known.kind(text));
    for (kind, word) in KINDS {
        let mut new: BTreeSet<String> = pairs
            .names(kind)
            .filter(|text| known.kind(text).is_none())
            .flat_map(|text| text.lines().map(str::trim).map(str::to_owned))
            .collect();
        let key = format!("ends.{word}_words");
        if new.is_empty() || proposals.contains_key(&key) {
            continue;
        }
        new.extend(known_words(job, kind).iter().cloned());
        let why = format!(
            "Texts at line ends, and the defaults.{}",
            pairs.caution(kind)
        );
        put(proposals, &format!("{word}_words"), &new, &why);
    }
}

/// Shapes at line ends: as the legend says, else a triangle or a solid beside another shape is the live end.
fn shapes(contents: &Contents, job: &Job, proposals: &mut BTreeMap<String, Proposal>) {
    let read = &job.conventions;
    if !(read.live_end_shapes.is_empty() && read.dead_end_shapes.is_empty()) {
        return;
    }
    let blocks = [read.live_end_blocks.as_slice(), &read.dead_end_blocks].concat();
    let by_block = names(&blocks);
    let told = |key: &str| proposals.contains_key(key);
    if contents
        .at_ends
        .blocks
        .keys()
        .any(|block| by_block.has(block))
        || ["ends.live_blocks", "ends.dead_blocks", "ends.blocks"]
            .into_iter()
            .any(told)
    {
        return;
    }
    let drawn = contents.at_ends.shapes.iter();
    let drawn = drawn.filter(|((layer, _), _)| !named(Trade::Grid, layer));
    let most = drawn.clone().map(|(_, count)| *count).max().unwrap_or(0);
    let found: BTreeSet<&str> = drawn
        .filter(|(_, count)| 5 * **count >= most)
        .map(|((_, word), _)| *word)
        .collect();
    let legend = &contents.at_ends.legend_shapes;
    let mut legend: BTreeMap<&str, EndKind> =
        legend.iter().map(|(word, kind)| (*word, *kind)).collect();
    let by_legend = found.iter().any(|word| legend.contains_key(word));
    // A legend of two shapes of which only one is met: the other is drawn in a way that is not known, and may be read as it.
    if by_legend && found.len() == 1 && legend.len() > 1 {
        return;
    }
    let two: Vec<&str> = found.iter().copied().collect();
    if let [one, other] = two[..] {
        let kinds = [one, other].map(|word| legend.get(word).copied());
        if let [Some(kind), None] | [None, Some(kind)] = kinds {
            let left = if kinds[0].is_none() { one } else { other };
            legend.insert(left, opposite(kind));
        }
    }
    let pointed = ["triangle", "solid"]
        .into_iter()
        .find(|word| found.contains(word));
    for (kind, word) in KINDS {
        let (shapes, why): (BTreeSet<String>, &str) = if by_legend {
            let says = |shape: &&&str| legend.get(**shape) == Some(&kind);
            let shapes = found.iter().filter(says).map(|&shape| shape.to_owned());
            (
                shapes.collect(),
                "Shapes at line ends, as words beside them elsewhere, or a note, say of them or of the other of two.",
            )
        } else if let Some(pointed) = pointed
            && found.len() == 2
        {
            let shapes = found
                .iter()
                .filter(|shape| (**shape == pointed) == (kind == EndKind::Live));
            (
                shapes.map(|&shape| shape.to_owned()).collect(),
                "A guess, since the drawing does not say: look at the legend before you trust it.",
            )
        } else {
            continue;
        };
        put(proposals, &format!("{word}_shapes"), &shapes, why);
    }
}
