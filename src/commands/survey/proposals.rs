//! Keys that the drawing itself suggests: where no layer or block fits the job, what most likely was meant.

use std::collections::BTreeMap;

use serde_json::{Value, json};

use super::contents::{Contents, LayerContents};
use super::labels;
use crate::commands::job_file::JobFile;
use crate::commands::{units, work};
use crate::drawing::{Drawing, UnitFrom};
use crate::job::keys::{KEYS, of_table};
use crate::job::{Job, Proposal};
use crate::patterns::pattern_of;

/// Keys of `[layers]` by what is told from a layer's name and contents, in the order they are tried.
const ROLES: [&str; 9] = [
    "slab_zone",
    "marks",
    "heights",
    "ends",
    "slab_opening",
    "column",
    "slab_edge",
    "banded",
    "distributed",
];

/// What to set in the job file, by path of the key.
pub(super) fn proposals(
    drawing: &Drawing,
    contents: &Contents,
    job_file: &JobFile,
) -> BTreeMap<String, Proposal> {
    let job = &job_file.resolved.job;
    let mut proposals = BTreeMap::new();
    let free = free_layers(drawing, contents, job);
    for role in ROLES {
        let fits = |(name, held): &(&str, &LayerContents)| self::role(name, held) == Some(role);
        let mut names: Vec<&str> = free
            .iter()
            .filter(|layer| fits(layer))
            .map(|(name, _)| *name)
            .collect();
        names.sort_unstable();
        if !names.is_empty() && !is_fitted(drawing, job, role) {
            let patterns: Vec<String> = names.iter().map(|name| pattern_of(name)).collect();
            proposals.insert(
                format!("layers.{role}"),
                Proposal {
                    value: json!(patterns),
                    why: why(role).to_owned(),
                },
            );
        }
    }
    blocks(contents, job, &mut proposals);
    if let Some(proposal) = unit(drawing, contents, job, &proposals) {
        proposals.insert("drawing.unit".to_owned(), proposal);
    }
    let of_labels = labels::proposals(drawing, contents, job, &proposals);
    proposals.extend(of_labels);
    keep_given(job_file, &mut proposals);
    proposals
}

/// What the job file that was given sets stays set.
fn keep_given(job_file: &JobFile, proposals: &mut BTreeMap<String, Proposal>) {
    let given = KEYS
        .iter()
        .filter(|key| job_file.resolved.given.contains(&key.path()));
    for key in given {
        if let Some(value) = key.value(&job_file.resolved.job) {
            let why = match &job_file.path {
                Some(path) => format!("As in {}.", path.display()),
                None => String::new(),
            };
            proposals.insert(key.path(), Proposal { value, why });
        }
    }
}

/// The job's patterns of a key below `[layers]`.
pub(super) fn patterns(job: &Job, role: &str) -> Vec<String> {
    let key = of_table("layers").find(|key| key.name == role);
    match key.and_then(|key| key.value(job)) {
        Some(Value::Array(items)) => items
            .iter()
            .filter_map(|item| item.as_str().map(str::to_owned))
            .collect(),
        _ => Vec::new(),
    }
}

/// Whether some layer with anything on it fits the job's patterns of a role.
fn is_fitted(drawing: &Drawing, job: &Job, role: &str) -> bool {
    let wanted = work::wanted(patterns(job, role));
    drawing
        .layers
        .iter()
        .any(|layer| !layer.counts.is_empty() && wanted.has(&layer.name))
}

/// Layers that fit none of the job's patterns.
fn free_layers<'c>(
    drawing: &Drawing,
    contents: &'c Contents,
    job: &Job,
) -> Vec<(&'c str, &'c LayerContents)> {
    let named = work::wanted(job.layer_patterns());
    let known = |name: &str| drawing.layers.iter().any(|layer| layer.name == name);
    contents
        .layers
        .iter()
        .filter(|(name, _)| known(name) && !named.has(name))
        .map(|(name, held)| (name.as_str(), held))
        .collect()
}

/// The key below `[layers]` that a layer belongs to, as far as its texts, its blocks and the words of its name tell.
fn role(name: &str, held: &LayerContents) -> Option<&'static str> {
    let name = name.to_uppercase();
    let says = |words: &[&str]| words.iter().any(|word| name.contains(word));
    let most = |part: usize, all: usize| all > 0 && part * 2 > all;
    // Grid lines carry bubbles at their ends and numbers in them: they look like tendons and heights.
    if says(&["GRID", "AXIS", "AXES"]) {
        return None;
    }
    let open = held.open_m.len();
    if most(held.thicknesses + held.inched_thicknesses, held.texts) {
        return Some("slab_zone");
    }
    if most(held.strands + held.offered_counts(), held.texts) {
        return Some("marks");
    }
    if most(held.heights + held.likely_heights(), held.texts) && held.texts >= 3 && open == 0 {
        return Some("heights");
    }
    if says(&["OPENING", "VOID", "HOLE"]) {
        return Some("slab_opening");
    }
    if says(&["COLUMN", "WALL"]) {
        return Some("column");
    }
    if held.closed > 0 && says(&["EDGE", "OUTLINE"]) {
        return Some("slab_edge");
    }
    if open > 0 && says(&["BANDED", "BAND-", "-BAND"]) {
        return Some("banded");
    }
    // Two ends a line: a layer whose lines mostly carry a symbol at an end holds tendons.
    if open > 0 && (says(&["DISTRIB", "TENDON", "CABLE"]) || most(held.ends_with_block, 2 * open)) {
        return Some("distributed");
    }
    (held.blocks_at_ends > 0).then_some("ends")
}

fn why(role: &str) -> &'static str {
    match role {
        "slab_zone" => "No layer fits the default; most texts here say a slab thickness.",
        "marks" => "No layer fits the default; most texts here count strands.",
        "heights" => "No layer fits the default; most texts here are heights.",
        "ends" => "No layer fits the default; blocks of these layers stand at line ends.",
        "distributed" => {
            "No layer fits the default; by name, or by the blocks at their ends, these lines are tendons. Move banded ones to banded."
        }
        _ => "No layer fits the default; the name says so.",
    }
}

/// Blocks at line ends whose names say what they are, where none fits the job.
fn blocks(contents: &Contents, job: &Job, proposals: &mut BTreeMap<String, Proposal>) {
    let read = &job.conventions;
    for (key, known, words) in [
        (
            "ends.live_blocks",
            &read.live_end_blocks,
            &["LIVE", "STRESSING", "ACTIVE", "JACK"][..],
        ),
        (
            "ends.dead_blocks",
            &read.dead_end_blocks,
            &["DEAD", "FIXED", "PASSIVE"][..],
        ),
    ] {
        let fitting = work::wanted(known.clone());
        if contents
            .blocks_at_ends
            .keys()
            .any(|block| fitting.has(block))
        {
            continue;
        }
        let says = |block: &&String| {
            let block = block.to_uppercase();
            words.iter().any(|word| block.contains(word))
        };
        let names: Vec<String> = contents
            .blocks_at_ends
            .keys()
            .filter(says)
            .map(|block| pattern_of(block))
            .collect();
        if !names.is_empty() {
            proposals.insert(
                key.to_owned(),
                Proposal {
                    value: json!(names),
                    why: "No block at a line end fits the default; the name says so.".to_owned(),
                },
            );
        }
    }
}

/// A unit, where the drawing's own gives tendons of a length that no floor has.
fn unit(
    drawing: &Drawing,
    contents: &Contents,
    job: &Job,
    proposals: &BTreeMap<String, Proposal>,
) -> Option<Proposal> {
    let mut tendons = Vec::new();
    for role in ["banded", "distributed"] {
        match proposals
            .get(&format!("layers.{role}"))
            .map(|proposal| &proposal.value)
        {
            Some(Value::Array(items)) => {
                tendons.extend(
                    items
                        .iter()
                        .filter_map(|item| item.as_str().map(str::to_owned)),
                );
            }
            _ => tendons.extend(patterns(job, role)),
        }
    }
    let wanted = work::wanted(tendons);
    let lengths_m = contents
        .layers
        .iter()
        .filter(|(name, _)| wanted.has(name))
        .flat_map(|(_, held)| held.open_m.iter().copied());
    let median_m = units::median_m(lengths_m)?;
    if units::plausible(median_m) || drawing.unit_from == UnitFrom::Job {
        return None;
    }
    let (unit, would_m) = units::sensible(median_m, drawing.unit_m)
        .into_iter()
        .next()?;
    Some(Proposal {
        value: json!(unit.name()),
        why: format!(
            "As the drawing says it, half of the tendon lines would be {} than {median_m:.4} m; in {} that is {would_m:.1} m. Check it.",
            if median_m < 1.0 { "shorter" } else { "longer" },
            unit.name()
        ),
    })
}
