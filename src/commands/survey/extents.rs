//! Layers of lines across groups of tendons: beside them stand texts such as `D05-D24 @ 1200`.

use std::collections::{BTreeMap, BTreeSet};

use geo::Line;

use super::at_ends::AtEnds;
use super::chords::{Chords, gap_m, straight};
use super::picked::Picked;
use super::trade_words::{Trade, named};
use crate::drawing::{Drawing, Text};
use crate::job::Job;
use crate::patterns::pattern_of;

/// Extent lines are at least this long, metres: what is shorter is an arrow of one.
const SHORTEST_M: f64 = 0.5;

/// Patterns of the layers that `is_free` lets through on which most lines cross a tendon about squarely, and a text of
/// a group stands beside one.
pub(super) fn layers(
    drawing: &Drawing,
    at_ends: &AtEnds,
    tendons: &Picked,
    job: &Job,
    is_free: impl Fn(&str) -> bool,
) -> BTreeSet<String> {
    let texts: Vec<&Text> = drawing
        .texts
        .iter()
        .filter(|text| names_group(&text.content, job))
        .collect();
    if texts.is_empty() {
        return BTreeSet::new();
    }
    let own = drawing
        .shapes
        .iter()
        .filter(|shape| tendons.picks(drawing, shape));
    let crossed = Chords::of(own);
    let mut by_layer: BTreeMap<&str, Vec<Line<f64>>> = BTreeMap::new();
    for shape in &drawing.shapes {
        let candidate = is_free(&shape.layer) && !named(Trade::Grid, &shape.layer);
        if candidate
            && !tendons.picks(drawing, shape)
            && !at_ends.draws(drawing, shape)
            && let Some(line) = straight(shape, SHORTEST_M)
        {
            by_layer.entry(&shape.layer).or_default().push(line);
        }
    }
    let fits = |lines: &Vec<Line<f64>>| {
        let crossing: Vec<&Line<f64>> = lines
            .iter()
            .filter(|line| crossed.crossed_by(**line) > 0)
            .collect();
        let beside = |text: &Text| {
            let reach_m = job.conventions.label_reach * text.height_m;
            crossing.iter().any(|line| gap_m(text, **line) <= reach_m)
        };
        2 * crossing.len() > lines.len() && texts.iter().any(|text| beside(text))
    };
    let layers = by_layer.into_iter().filter(|(_, lines)| fits(lines));
    layers.map(|(layer, _)| pattern_of(layer)).collect()
}

/// Whether a text names the first and the last of a group, or how many at what spacing.
pub(super) fn names_group(text: &str, job: &Job) -> bool {
    let group = |name: &str| {
        text.lines().any(|line| {
            let patterns = job.conventions.group_patterns.iter();
            let mut found = patterns.filter_map(|pattern| pattern.captures(line));
            found.any(|groups| groups.name(name).is_some())
        })
    };
    group("first") && group("last") || group("number") && group("spacing")
}
