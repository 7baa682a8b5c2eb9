//! Keys that the drawing itself suggests: where no layer or block fits the job, what most likely was meant.

use std::collections::BTreeMap;

use serde_json::{Value, json};

use super::contents::Contents;
use super::picked::Picked;
use super::{drawing_unit, gaps, labels, layers, notes, symbols, trial};
use crate::commands::job_file::JobFile;
use crate::commands::work;
use crate::drawing::Drawing;
use crate::job::keys::{KEYS, of_table};
use crate::job::{Job, Proposal};
use crate::units::LengthUnit;

/// What to set in the job file, by path of the key.
pub(super) fn proposals(
    drawing: &Drawing,
    contents: &Contents,
    job_file: &JobFile,
) -> BTreeMap<String, Proposal> {
    let job = &job_file.resolved.job;
    let mut proposals = symbols::proposals(contents, job);
    layers::propose(drawing, contents, job, &mut proposals);
    let tendons = Picked::tendons(job, &proposals);
    if let Some(proposal) = drawing_unit::proposal(drawing, contents, &tendons) {
        proposals.insert("drawing.unit".to_owned(), proposal);
    }
    let gap = gaps::proposal(drawing, &contents.at_ends, &tendons, job);
    proposals.extend(gap.map(|gap| ("drawing.bridge_gap_mm".to_owned(), gap)));
    let of_labels = labels::proposals(drawing, contents, job, &proposals);
    proposals.extend(of_labels);
    proposals.extend(notes::thickness(drawing, contents, job));
    proposals.extend(notes::each(drawing, job));
    proposals.extend(notes::measure(drawing));
    us_units(drawing, &mut proposals);
    keep_given(job_file, &mut proposals);
    for (key, proposal) in trial::proposals(drawing, &proposals) {
        proposals.entry(key).or_insert(proposal);
    }
    proposals
}

pub(super) fn put(proposals: &mut BTreeMap<String, Proposal>, key: &str, value: Value, why: &str) {
    let why = why.to_owned();
    proposals.insert(key.to_owned(), Proposal { value, why });
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
pub(super) fn is_fitted(drawing: &Drawing, job: &Job, role: &str) -> bool {
    let wanted = work::wanted(patterns(job, role));
    drawing
        .layers
        .iter()
        .any(|layer| !layer.counts.is_empty() && wanted.has(&layer.name))
}
