//! Layers of lines that give one height to all tendons they cross, and that height beside each.

use std::collections::{BTreeMap, BTreeSet};

use geo::Line;

use super::chords::{Chords, gap_m, straight};
use super::held::Held;
use super::picked::Picked;
use crate::drawing::{Drawing, Text};
use crate::floor::height_of_line;
use crate::job::Job;
use crate::patterns::pattern_of;

/// What is shorter is a tick or a leader, metres.
const SHORTEST_M: f64 = 0.5;
/// So many tendons are crossed by a level line at least.
const SEVERAL: usize = 2;

/// Patterns of the layers that `is_free` lets through on which every text is a height, and nearly every line crosses
/// several tendons and has such a text beside it.
pub(super) fn layers(
    drawing: &Drawing,
    layers: &BTreeMap<String, Held>,
    tendons: &Picked,
    job: &Job,
    is_free: impl Fn(&str) -> bool,
) -> BTreeSet<String> {
    let own = drawing
        .shapes
        .iter()
        .filter(|shape| tendons.picks(drawing, shape));
    let tendons = Chords::of(own);
    let fits = |layer: &str| {
        let texts: Vec<&Text> = drawing
            .texts
            .iter()
            .filter(|text| text.layer == layer)
            .collect();
        let reads = |text: &&&Text| {
            let mut lines = text.content.lines();
            lines.any(|line| height_of_line(line, &job.conventions).is_some())
        };
        let heights: Vec<&&Text> = texts.iter().filter(reads).collect();
        if 2 * heights.len() <= texts.len() {
            return false;
        }
        let lines: Vec<Line<f64>> = drawing
            .shapes
            .iter()
            .filter(|shape| shape.layer == layer)
            .filter_map(|shape| straight(shape, SHORTEST_M))
            .collect();
        let labelled = |line: &&Line<f64>| {
            let reach_m = |text: &Text| job.conventions.label_reach * text.height_m;
            tendons.crossed_by(**line) >= SEVERAL
                && heights
                    .iter()
                    .any(|text| gap_m(text, **line) <= reach_m(text))
        };
        let good = lines.iter().filter(labelled).count();
        !lines.is_empty() && 5 * good >= 4 * lines.len() && texts.len() <= 2 * lines.len()
    };
    let candidates = layers.iter().filter(|(layer, held)| {
        held.texts > 0 && !held.open_m.is_empty() && held.closed_m.is_empty() && is_free(layer)
    });
    candidates
        .filter(|(layer, _)| fits(layer))
        .map(|(layer, _)| pattern_of(layer))
        .collect()
}
