//! Keys that the drawing itself suggests: where no layer or block fits the job, what most likely was meant.

use std::collections::BTreeMap;

use serde_json::{Value, json};

use super::contents::Contents;
use super::directions::two_ways;
use super::picked::Picked;
use super::roles::{Guesses, guesses};
use super::trade_words::{Trade, hinted, named as named_for};
use super::{extents, gaps, labels, notes, symbols, trial};
use crate::commands::job_file::JobFile;
use crate::commands::{units, work};
use crate::drawing::{Drawing, UnitFrom, Wanted};
use crate::floor::EndWords;
use crate::job::keys::{KEYS, of_table};
use crate::job::{Job, Proposal};
use crate::patterns::{Selectors, pattern_of};
use crate::units::LengthUnit;

/// What to set in the job file, by path of the key.
pub(super) fn proposals(
    drawing: &Drawing,
    contents: &Contents,
    job_file: &JobFile,
) -> BTreeMap<String, Proposal> {
    let job = &job_file.resolved.job;
    let mut proposals = symbols::proposals(contents, job);
    let named = work::wanted(job.layer_patterns());
    let mut guesses = guesses(drawing, contents, |layer| is_free(drawing, &named, layer));
    end_layers(contents, job, &named, &proposals, &mut guesses);
    guesses.retain(|role, _| !is_fitted(drawing, job, role));
    directions(contents, &mut guesses, &mut proposals);
    for (role, patterns) in &guesses {
        proposals.insert(
            format!("layers.{role}"),
            Proposal {
                value: json!(patterns),
                why: why(role).to_owned(),
            },
        );
    }
    let tendons = Picked::tendons(job, &proposals);
    let at_ends = &contents.at_ends;
    let unread = |layer: &str| is_free(drawing, &named, layer) && !guessed(&guesses, layer);
    let extents = extents::layers(drawing, at_ends, &tendons, job, unread);
    if !extents.is_empty() {
        let why = "Lines here cross tendons, and texts beside them name groups. Check it.";
        put(&mut proposals, "layers.extents", json!(extents), why);
    }
    if let Some(proposal) = unit(drawing, contents, job, &proposals) {
        proposals.insert("drawing.unit".to_owned(), proposal);
    }
    let gap = gaps::proposal(drawing, at_ends, &tendons, job);
    proposals.extend(gap.map(|gap| ("drawing.bridge_gap_mm".to_owned(), gap)));
    let of_labels = labels::proposals(drawing, contents, job, &proposals);
    proposals.extend(of_labels);
    proposals.extend(notes::thickness(drawing, contents, job));
    us_units(drawing, &mut proposals);
    keep_given(job_file, &mut proposals);
    for (key, proposal) in trial::proposals(drawing, &proposals) {
        proposals.entry(key).or_insert(proposal);
    }
    proposals
}

fn put(proposals: &mut BTreeMap<String, Proposal>, key: &str, value: Value, why: &str) {
    let why = why.to_owned();
    proposals.insert(key.to_owned(), Proposal { value, why });
}

/// Whether a layer is proposed for something already.
fn guessed(guesses: &Guesses, layer: &str) -> bool {
    let patterns = guesses.values().flatten().cloned();
    work::wanted(patterns).has(layer)
}

/// Reports in kips and inches where the drawing is in inches or feet, or its labels are.
fn us_units(drawing: &Drawing, proposals: &mut BTreeMap<String, Proposal>) {
    let inches = |key: &str| {
        let value = proposals
            .get(key)
            .and_then(|proposal| proposal.value.as_str());
        value.is_some_and(|unit| ["in", "ft"].contains(&unit))
    };
    let drawn = matches!(labels::unit_of(drawing), LengthUnit::In | LengthUnit::Ft)
        && !proposals.contains_key("drawing.unit");
    let why = if drawn || inches("drawing.unit") {
        "The drawing is in inches or feet."
    } else if inches("height.unit") {
        "Heights are in inches."
    } else {
        return;
    };
    put(proposals, "units", json!("us"), why);
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
    let lettered = found
        .words
        .keys()
        .filter(|(_, word)| words.kind(word).is_some() || hinted(word).is_some());
    let proposed = |shape: &str| {
        let keys = ["ends.live_shapes", "ends.dead_shapes"].into_iter();
        let values = keys.filter_map(|key| proposals.get(key)?.value.as_array());
        values.flatten().any(|value| value == shape)
    };
    let drawn = found
        .shapes
        .keys()
        .filter(|(layer, shape)| !named_for(Trade::Grid, layer) && proposed(shape));
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
        "slab_zone" => "No layer fits the default; most texts here say a slab thickness.",
        "marks" => "No layer fits the default; texts here count strands.",
        "heights" => "No layer fits the default; texts here are heights.",
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

/// A unit, where the drawing's own gives tendons of a length that no floor has.
fn unit(
    drawing: &Drawing,
    contents: &Contents,
    job: &Job,
    proposals: &BTreeMap<String, Proposal>,
) -> Option<Proposal> {
    let mut tendons = Vec::new();
    for role in ["banded", "distributed", "tendons"] {
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
    // What the drawing says is doubted where it cannot be; what is assumed already where it would be strange.
    let fits = match drawing.unit_from {
        UnitFrom::Job => true,
        UnitFrom::Header => units::plausible(median_m),
        UnitFrom::Assumed => units::usual(median_m),
    };
    if fits {
        return None;
    }
    let fits = units::sensible(median_m, drawing.unit_m);
    // Of units that would do, one of the office's own system.
    let inch = |unit: LengthUnit| matches!(unit, LengthUnit::In | LengthUnit::Ft);
    let own =
        |(unit, _): &&(LengthUnit, f64)| drawing.metric.is_some_and(|metric| metric != inch(*unit));
    let (unit, would_m) = *fits.iter().find(own).or(fits.first())?;
    Some(Proposal {
        value: json!(unit.name()),
        why: format!(
            "As the drawing says it, half of the tendon lines would be {} than {median_m:.4} m; in {} that is {would_m:.1} m. Check it.",
            if median_m < 1.0 { "shorter" } else { "longer" },
            unit.name()
        ),
    })
}
