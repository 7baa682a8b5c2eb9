//! Label layers judged by where their texts stand: marks and heights stand beside tendons, notes and schedules do not.

use std::collections::BTreeSet;

use super::chords::Chords;
use super::contents::Contents;
use super::picked::Picked;
use super::roles::Guesses;
use super::slab::outside_edges;
use crate::drawing::{Drawing, Text};
use crate::patterns::{Selectors, pattern_of};

/// Labels stand this near to tendons, in text heights, and half of a layer's must.
const NEAR: f64 = 12.0;
/// Fewer marks than one to so many tendon lines are no marks of tendons.
const TENDONS: usize = 3;

/// Takes layers of notes and schedules from the guesses, and adds layers of marks alone.
pub(super) fn judge(
    drawing: &Drawing,
    contents: &Contents,
    [tendons, edge]: [&Picked; 2],
    is_free: impl Fn(&str) -> bool,
    guesses: &mut Guesses,
) {
    // A legend's or an elevation's lines have words beside them that are no labels.
    let out = outside_edges(drawing, tendons, edge);
    let lines = drawing.shapes.iter().enumerate().filter(|(number, shape)| {
        !shape.closed
            && !out.contains(number)
            && tendons.picks(drawing, shape)
            && !contents.grids.draw(*number, shape)
    });
    let lines: Vec<_> = lines.map(|(_, shape)| shape).collect();
    let chords = Chords::of(lines.iter().copied());
    let beside = |text: &&Text| chords.beside(text, NEAR * text.height_m);
    let stands =
        |texts: &[&Text]| 2 * texts.iter().filter(|text| beside(text)).count() >= texts.len();
    for role in ["heights", "marks"] {
        let Some(patterns) = guesses.get_mut(role) else {
            continue;
        };
        let kept = |pattern: &String| {
            let named = Selectors::new([pattern]).unwrap_or_default();
            let on = |text: &&Text| {
                named.picks(&text.layer, text.look.colour, drawing.linetype(text.look))
            };
            stands(&drawing.texts.iter().filter(on).collect::<Vec<_>>())
        };
        let near: BTreeSet<String> = patterns
            .iter()
            .filter(|pattern| kept(pattern))
            .cloned()
            .collect();
        // Where none is near, leaders may point from afar.
        if !near.is_empty() {
            *patterns = near;
        }
    }
    for (layer, held) in &contents.layers {
        let marks: usize = held.bare_marks.values().sum();
        let alone =
            held.counts_marks() && 2 * marks >= held.texts && TENDONS * marks >= lines.len();
        let texts = || {
            drawing
                .texts
                .iter()
                .filter(|text| text.layer == *layer)
                .collect::<Vec<_>>()
        };
        if alone && marks > 1 && is_free(layer) && stands(&texts()) {
            guesses
                .entry("marks")
                .or_default()
                .insert(pattern_of(layer));
        }
    }
}
