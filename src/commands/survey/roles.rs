//! What a layer, or what is seen on it in one colour and linetype, most likely holds.

use std::collections::{BTreeMap, BTreeSet};

use super::contents::Contents;
use super::held::Held;
use super::trade_words::{Trade, named};
use crate::drawing::{Drawing, Look};
use crate::patterns::pattern_of;

/// Patterns by key of `[layers]`.
pub(super) type Guesses = BTreeMap<&'static str, BTreeSet<String>>;

/// What to name in the job file for layers that no pattern of it fits.
pub(super) fn guesses(
    drawing: &Drawing,
    contents: &Contents,
    is_free: impl Fn(&str) -> bool,
) -> Guesses {
    let mut guesses = Guesses::new();
    let longest_m = contents
        .layers
        .values()
        .flat_map(|held| held.closed_m.iter().copied())
        .fold(0.0, f64::max);
    for (layer, held) in contents.layers.iter().filter(|(name, _)| is_free(name)) {
        let name = pattern_of(layer);
        let looks = contents.looks.get(layer);
        let several = looks.filter(|looks| {
            let lines: BTreeSet<Option<&str>> = looks
                .values()
                .filter(|held| {
                    !held.open_m.is_empty() || !held.closed_m.is_empty() || held.of_grid > 0
                })
                .map(|held| line_role("", held, Some(longest_m)))
                .collect();
            lines.len() > 1 && lines.iter().flatten().next().is_some()
        });
        let Some(looks) = several else {
            for role in roles(layer, held, None) {
                guesses.entry(role).or_default().insert(name.clone());
            }
            continue;
        };
        // Several kinds of line share the layer: what is seen tells them apart. Texts tell themselves apart.
        let mut by_role: BTreeMap<&'static str, Vec<Look>> = BTreeMap::new();
        for (look, held) in looks {
            for role in roles("", held, Some(longest_m)) {
                by_role.entry(role).or_default().push(*look);
            }
        }
        for (role, own) in &by_role {
            let others: Vec<&Look> = looks.keys().filter(|look| !own.contains(look)).collect();
            for look in own {
                let by_colour = look
                    .colour
                    .filter(|_| others.iter().all(|other| other.colour != look.colour));
                let by_linetype = others.iter().all(|other| other.linetype != look.linetype);
                let linetype = format!("@linetype={}", pattern_of(drawing.linetype(*look)));
                let seen = match (by_colour, look.colour) {
                    (Some(index), _) => format!("@colour={index}"),
                    (None, _) if by_linetype => linetype,
                    (None, Some(index)) => format!("@colour={index}{linetype}"),
                    (None, None) => linetype,
                };
                guesses
                    .entry(role)
                    .or_default()
                    .insert(format!("{name}{seen}"));
            }
        }
    }
    guesses
}

/// The keys below `[layers]` that fit, as far as texts, symbols at line ends and the words of the name tell. `longest_m`
/// is the longest closed line of the drawing, where closed lines are to be told apart by their size.
fn roles(name: &str, held: &Held, longest_m: Option<f64>) -> Vec<&'static str> {
    let most = |part: usize, all: usize| all > 0 && part * 2 > all;
    // Grid lines carry bubbles at their ends and numbers in them: they look like tendons and heights.
    if named(Trade::Grid, name) {
        return Vec::new();
    }
    if most(held.thicknesses + held.inched_thicknesses, held.texts) {
        return vec!["slab_zone"];
    }
    let lines = line_role(name, held, longest_m);
    let mut roles: Vec<&'static str> = lines.into_iter().collect();
    let tendons = matches!(lines, Some("banded" | "distributed"));
    // Texts beside their own tendons, or on a layer of texts alone.
    let labels = tendons || held.lines_are_small() && held.closed_m.is_empty();
    let some = |part: usize| part > 0 && 8 * part >= held.texts;
    let (strands, in_words) = (
        held.strands + held.offered_counts(),
        held.heights + held.likely_heights(),
    );
    let marks = most(strands, held.texts) || labels && some(strands);
    if marks {
        roles.push("marks");
    }
    let heights = most(in_words, held.texts) || (tendons || marks) && some(in_words);
    // Lines beside heights are ticks or leaders.
    if heights && in_words >= 3 && (tendons || lines.is_none()) {
        roles.push("heights");
    }
    if held.blocks_at_ends > 0 && (roles.is_empty() || tendons) {
        roles.push("ends");
    }
    roles
}

/// What its lines are.
fn line_role(name: &str, held: &Held, longest_m: Option<f64>) -> Option<&'static str> {
    if named(Trade::Opening, name) {
        return Some("slab_opening");
    }
    if named(Trade::Column, name) {
        return Some("column");
    }
    if !held.closed_m.is_empty() && named(Trade::Edge, name) {
        return Some("slab_edge");
    }
    let open = held.open_m.len();
    let upper = name.to_uppercase();
    let banded = ["BANDED", "BAND-", "-BAND"];
    if open > 0 && banded.iter().any(|word| upper.contains(word)) {
        return Some("banded");
    }
    // Two ends a line: lines that mostly carry a symbol at an end are tendons.
    let small = held.texts > 0 && held.lines_are_small();
    if open > 0 && (named(Trade::Tendon, name) && !small || held.ends_marked > open) {
        return Some("distributed");
    }
    let longest_m = longest_m.filter(|_| open == 0)?;
    let size_m = held.closed_m.iter().copied().fold(0.0, f64::max);
    if size_m > 0.5 * longest_m {
        Some("slab_edge")
    } else {
        (size_m > 0.0 && size_m < COLUMN_M && held.closed_m.len() >= 4).then_some("column")
    }
}

/// Columns are no longer than this around, metres.
const COLUMN_M: f64 = 8.0;
