//! Keys below `[layers]`: which layers to name for what, where no pattern of the job fits any.

use std::collections::BTreeMap;

use serde_json::json;

use super::contents::Contents;
use super::directions::two_ways;
use super::picked::Picked;
use super::proposals::{is_fitted, put};
use super::roles::{Guesses, guesses};
use super::trade_words::{Trade, named as named_for};
use super::{beside_tendons, extents, level_lines, revisions, slab};
use crate::commands::work;
use crate::drawing::{Drawing, Wanted};
use crate::floor::EndWords;
use crate::job::{Job, Proposal};
use crate::patterns::{Selectors, pattern_of};

/// Adds them to the proposals, which hold the symbols at line ends already.
pub(super) fn propose(
    drawing: &Drawing,
    contents: &Contents,
    job: &Job,
    proposals: &mut BTreeMap<String, Proposal>,
) {
    let named = work::wanted(job.layer_patterns());
    let mut guesses = guesses(drawing, contents, |layer| is_free(drawing, &named, layer));
    end_layers(contents, job, &named, proposals, &mut guesses);
    let left_out = revisions::leave_out(drawing, &mut guesses);
    guesses.retain(|role, _| !is_fitted(drawing, job, role));
    directions(contents, &mut guesses, proposals);
    let runs = ["banded", "distributed", "tendons"];
    for role in runs.into_iter().filter(|role| guesses.contains_key(role)) {
        set(role, &guesses, &left_out, proposals);
    }
    let tendons = Picked::tendons(job, proposals);
    let unread = |layer: &str, guesses: &Guesses| {
        let hidden = guessed(&left_out, layer);
        is_free(drawing, &named, layer) && !hidden && !guessed(guesses, layer)
    };
    let before = guesses.clone();
    let free = |layer: &str| unread(layer, &before);
    slab::propose(drawing, contents, &tendons, job, free, &mut guesses);
    set("slab_edge", &guesses, &left_out, proposals);
    let edge = Picked::of(&["slab_edge"], job, proposals);
    beside_tendons::judge(drawing, contents, [&tendons, &edge], free, &mut guesses);
    let of_heights = guesses.get("heights").cloned().unwrap_or_default();
    let levels = level_lines::layers(drawing, &contents.layers, &tendons, job, |layer| {
        unread(layer, &guesses) || of_heights.contains(&pattern_of(layer))
    });
    if let Some(heights) = guesses.get_mut("heights") {
        heights.retain(|pattern| !levels.contains(pattern));
    }
    let free = |layer: &str| unread(layer, &guesses) && !levels.contains(&pattern_of(layer));
    let extents = extents::layers(drawing, &contents.at_ends, &tendons, job, free);
    guesses.extend([("level_lines", levels), ("extents", extents)]);
    guesses.retain(|role, patterns| !patterns.is_empty() && !is_fitted(drawing, job, role));
    for role in guesses.keys().copied().collect::<Vec<_>>() {
        set(role, &guesses, &left_out, proposals);
    }
}

/// Names a role's layers; those left out are said beside them.
fn set(
    role: &str,
    guesses: &Guesses,
    left_out: &Guesses,
    proposals: &mut BTreeMap<String, Proposal>,
) {
    let Some(patterns) = guesses.get(role) else {
        return;
    };
    let hidden = left_out.get(role).map(|old| {
        let old: Vec<&str> = old.iter().map(String::as_str).collect();
        format!(
            " Frozen or off, and so left out as an older state: {}.",
            old.join(", ")
        )
    });
    let why = format!("{}{}", why(role), hidden.unwrap_or_default());
    put(proposals, &format!("layers.{role}"), json!(patterns), &why);
}

/// Whether a layer is proposed for something already.
fn guessed(guesses: &Guesses, layer: &str) -> bool {
    let patterns = guesses.values().flatten().cloned();
    work::wanted(patterns).has(layer)
}

/// Whether no pattern of the job fits a layer that something lies on.
fn is_free(drawing: &Drawing, named: &Wanted, layer: &str) -> bool {
    !named.has(layer) && drawing.layers.iter().any(|known| known.name == layer)
}

/// Layers that no pattern fits on which words that mark ends stand, or shapes that were proposed.
fn end_layers(
    contents: &Contents,
    job: &Job,
    named: &Wanted,
    proposals: &BTreeMap<String, Proposal>,
    guesses: &mut Guesses,
) {
    let words = EndWords::new(&job.conventions);
    let found = &contents.at_ends;
    let proposed = |keys: [&str; 2], told: &str| {
        let values = keys
            .into_iter()
            .filter_map(|key| proposals.get(key)?.value.as_array());
        values.flatten().any(|value| value == told)
    };
    let says = |word: &String| {
        let mut lines = word.lines().map(str::trim);
        lines.any(|line| {
            words.kind(line).is_some() || proposed(["ends.live_words", "ends.dead_words"], line)
        })
    };
    let lettered = found.words.keys().filter(|(_, word)| says(word));
    let drawn = found.shapes.keys().filter(|(layer, shape)| {
        !named_for(Trade::Grid, layer) && proposed(["ends.live_shapes", "ends.dead_shapes"], shape)
    });
    let drawn = drawn.map(|(layer, _)| layer);
    for layer in lettered.map(|(layer, _)| layer).chain(drawn) {
        if !named.has(layer) {
            let ends = guesses.entry("ends").or_default();
            ends.insert(pattern_of(layer));
        }
    }
}

fn why(role: &str) -> &'static str {
    match role {
        "slab_edge" => {
            "No layer fits the default; by name, size, or since tendons end at it, this is the edge."
        }
        "slab_zone" => {
            "No layer fits the default; texts here say a slab thickness, or closed lines hold such a text."
        }
        "marks" => {
            "No layer fits the default; texts here count strands, or are marks beside tendons."
        }
        "heights" => "No layer fits the default; texts here are heights.",
        "level_lines" => {
            "Lines here cross tendons, and each has one height beside it: all tendons it crosses get it. Check it."
        }
        "extents" => "Lines here cross tendons, and texts beside them name groups. Check it.",
        "ends" => {
            "No layer fits the default; blocks, words or shapes of these layers stand at line ends."
        }
        "tendons" => {
            "No layer fits the default; by name, or by what stands at their ends, these lines are tendons, and they go two ways."
        }
        "distributed" => {
            "No layer fits the default; by name, or by what stands at their ends, these lines are tendons. Move banded ones to banded."
        }
        _ => "No layer fits the default; the name or the size of what lies there says so.",
    }
}

/// Where tendons of one kind of layer go two ways, direction tells the runs apart.
fn directions(
    contents: &Contents,
    guesses: &mut Guesses,
    proposals: &mut BTreeMap<String, Proposal>,
) {
    if guesses.contains_key("banded") {
        return;
    }
    let Some(patterns) = guesses.get("distributed").cloned() else {
        return;
    };
    let ways = Selectors::new(&patterns)
        .ok()
        .and_then(|picked| two_ways(contents, &picked));
    let Some(ways) = ways else {
        return;
    };
    guesses.remove("distributed");
    guesses.insert("tendons", patterns);
    if let Some(banded_deg) = ways.banded_deg {
        proposals.insert(
            "drawing.banded_along_deg".to_owned(),
            Proposal {
                value: json!(banded_deg),
                why:
                    "By their spacing, the tendons that go this way are the banded ones. Check it."
                        .to_owned(),
            },
        );
    }
}
