//! Keys that the label texts themselves suggest: patterns of known families, words of heights, units of numbers.

use std::collections::{BTreeMap, BTreeSet};

use serde_json::{Value, json};

use super::contents::Contents;
use super::held::Held;
use super::readings::{high_word, low_word};
use crate::commands::work;
use crate::drawing::Drawing;
use crate::job::families::offered_named;
use crate::job::{Job, Pattern, Proposal};
use crate::units::LengthUnit;

/// Below this the middle of all heights is no millimetres, and below the second no centimetres either.
const LEAST_MM: f64 = 25.0;
const LEAST_CM: f64 = 1.5;
/// A tenth of the heights above this are high points in millimetres.
const LEAST_HIGH_MM: f64 = 80.0;
/// The same of slab thickness.
const LEAST_SLAB_MM: f64 = 80.0;
const LEAST_SLAB_CM: f64 = 2.0;

/// What to set, by path of the key. `proposed` are the keys that layers and blocks suggest.
pub(super) fn proposals(
    drawing: &Drawing,
    contents: &Contents,
    job: &Job,
    proposed: &BTreeMap<String, Proposal>,
) -> BTreeMap<String, Proposal> {
    let of = |role: &str| layers(contents, job, proposed, role);
    let mut found = BTreeMap::new();
    found.extend(mark_patterns(&of("marks"), job));
    let heights = of("heights");
    found.extend(words(&heights, job));
    let inches = matches!(unit_of(drawing), LengthUnit::In | LengthUnit::Ft);
    let unit = height_unit(&heights, job, inches);
    let in_inches = unit
        .as_ref()
        .is_some_and(|(_, proposal)| proposal.value == json!("in"));
    found.extend(unit);
    found.extend(slab_unit(&of("slab_zone"), job, inches || in_inches));
    found
}

/// Layers of a role, by the job or as proposed.
fn layers<'c>(
    contents: &'c Contents,
    job: &Job,
    proposed: &BTreeMap<String, Proposal>,
    role: &str,
) -> Vec<&'c Held> {
    let mut patterns = super::proposals::patterns(job, role);
    if let Some(Value::Array(items)) = proposed.get(&format!("layers.{role}")).map(|p| &p.value) {
        patterns.extend(
            items
                .iter()
                .filter_map(|item| item.as_str().map(str::to_owned)),
        );
    }
    let wanted = work::wanted(patterns);
    let named = contents.layers.iter().filter(|(name, _)| wanted.has(name));
    named.map(|(_, held)| held).collect()
}

/// The unit that the drawing's own unit is nearest to.
pub(super) fn unit_of(drawing: &Drawing) -> LengthUnit {
    use LengthUnit::{Cm, Ft, In, M, Mm};
    let off = |unit: LengthUnit| (drawing.unit_m / unit.metres()).ln().abs();
    let nearest = [Mm, Cm, M, In, Ft]
        .into_iter()
        .min_by(|a, b| off(*a).total_cmp(&off(*b)));
    nearest.unwrap_or(Mm)
}

/// The job's patterns and those of the families that are found.
fn mark_patterns(layers: &[&Held], job: &Job) -> Option<(String, Proposal)> {
    let mut counts: BTreeMap<&'static str, usize> = BTreeMap::new();
    for (family, count) in layers.iter().flat_map(|held| &held.offered) {
        *counts.entry(family).or_default() += count;
    }
    let offers = counts.keys().filter_map(|family| offered_named(family));
    let offers: Vec<_> = offers.collect();
    if offers.is_empty() {
        return None;
    }
    let known = job.conventions.mark_patterns.iter();
    let added = offers.iter().map(|offer| &offer.pattern);
    let value = known.chain(added).map(Pattern::written).collect();
    let why: Vec<String> = offers
        .iter()
        .map(|offer| {
            let count = offer
                .pattern
                .name
                .as_deref()
                .and_then(|name| counts.get(name));
            format!(
                "Added for {} texts: {}. {}",
                count.copied().unwrap_or(0),
                offer.pattern.label(),
                offer.caution
            )
        })
        .collect();
    let proposal = Proposal {
        value: Value::Array(value),
        why: why.join("\n"),
    };
    Some(("labels.mark_patterns".to_owned(), proposal))
}

/// Words beside numbers that the job does not know, where they are words of heights.
fn words(layers: &[&Held], job: &Job) -> Vec<(String, Proposal)> {
    let found = |is: fn(&str) -> bool, told: fn(&Held) -> &BTreeSet<String>| -> Vec<String> {
        let mut words: Vec<String> = layers
            .iter()
            .flat_map(|held| held.words.keys().filter(|word| is(word)).chain(told(held)))
            .cloned()
            .collect();
        words.sort_unstable();
        words.dedup();
        words
    };
    let read = &job.conventions;
    [
        (
            "height.high_words",
            &read.high_words,
            found(high_word, |held| &held.highs),
        ),
        (
            "height.low_words",
            &read.low_words,
            found(low_word, |held| &held.lows),
        ),
    ]
    .into_iter()
    .filter(|(.., found)| !found.is_empty())
    .map(|(key, known, found)| {
        let why = format!(
            "These words stand beside numbers there: {}. Check them.",
            found.join(", ")
        );
        let all: Vec<String> = known.iter().cloned().chain(found).collect();
        (
            key.to_owned(),
            Proposal {
                value: json!(all),
                why,
            },
        )
    })
    .collect()
}

/// Another unit of heights, where texts have inch signs or fractions, or numbers that are no millimetres.
fn height_unit(layers: &[&Held], job: &Job, inches: bool) -> Option<(String, Proposal)> {
    if job.conventions.height.unit != LengthUnit::Mm {
        return None;
    }
    let inched: usize = layers.iter().map(|held| held.inched).sum();
    let mut values_mm: Vec<f64> = layers
        .iter()
        .flat_map(|held| held.heights_mm.iter().copied())
        .filter(|value_mm| *value_mm > 0.0)
        .collect();
    let all = inched + values_mm.len();
    if inched > 0 && inched * 10 >= all {
        let why = format!("{inched} of {all} height texts have inch signs or fractions.");
        return Some(unit("height.unit", "in", why));
    }
    // Low points of a thin slab are small in millimetres too, its high points are not.
    values_mm.sort_by(f64::total_cmp);
    if values_mm
        .get(values_mm.len() * 9 / 10)
        .is_some_and(|high_mm| *high_mm >= LEAST_HIGH_MM)
    {
        return None;
    }
    by_size(
        "height.unit",
        &mut values_mm,
        [LEAST_MM, LEAST_CM],
        inches,
        "heights",
    )
}

/// Another unit of thickness texts.
fn slab_unit(layers: &[&Held], job: &Job, inches: bool) -> Option<(String, Proposal)> {
    if job.conventions.thickness_unit != LengthUnit::Mm {
        return None;
    }
    let inched: usize = layers.iter().map(|held| held.inched_thicknesses).sum();
    if inched > 0 {
        let why = format!("{inched} thickness texts have inch signs or fractions.");
        return Some(unit("slab.text_unit", "in", why));
    }
    let values = layers.iter().flat_map(|held| held.thicknesses_mm.iter());
    let mut values_mm: Vec<f64> = values.copied().collect();
    let least = [LEAST_SLAB_MM, LEAST_SLAB_CM];
    by_size(
        "slab.text_unit",
        &mut values_mm,
        least,
        inches,
        "thicknesses",
    )
}

/// A unit in which the middle of these numbers is one that a slab may have.
fn by_size(
    key: &str,
    values_mm: &mut [f64],
    [least_mm, least_cm]: [f64; 2],
    inches: bool,
    what: &str,
) -> Option<(String, Proposal)> {
    values_mm.sort_by(f64::total_cmp);
    let median_mm = *values_mm.get(values_mm.len() / 2)?;
    if median_mm >= least_mm {
        return None;
    }
    let name = match (inches, median_mm < least_cm) {
        (true, _) => "in",
        (false, true) => "m",
        (false, false) => "cm",
    };
    let why = format!(
        "Half of the {what} are numbers below {median_mm:.2}, which is too little for millimetres. Check it."
    );
    Some(unit(key, name, why))
}

fn unit(key: &str, name: &str, why: String) -> (String, Proposal) {
    let value = json!(name);
    (key.to_owned(), Proposal { value, why })
}

#[cfg(test)]
mod tests;
