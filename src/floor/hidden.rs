//! Labels on layers that are frozen or off: read where nothing else speaks, and never against what is seen.

use std::collections::{BTreeMap, BTreeSet};

use rstar::RTree;
use rstar::primitives::GeomWithData;

use super::layers::Roles;
use super::rules::LAYER_HIDDEN;
use crate::drawing::{Drawing, Text};
use crate::finding::{Finding, Level};
use crate::geometry::distance_m;

/// Texts, by their places in the drawing, that stand on a hidden layer where a visible label of their kind stands:
/// within `reach` of their own heights. The visible one holds; how many give way is said layer by layer.
pub(super) fn outranked(
    drawing: &Drawing,
    roles: &Roles,
    reach: f64,
) -> (BTreeSet<usize>, Vec<Finding>) {
    let layers = drawing
        .layers
        .iter()
        .filter(|layer| layer.off || layer.frozen);
    let hidden: BTreeSet<&str> = layers.map(|layer| layer.name.as_str()).collect();
    let mut texts = BTreeSet::new();
    let mut of_layer: BTreeMap<&str, usize> = BTreeMap::new();
    if hidden.is_empty() {
        return (texts, Vec::new());
    }
    let label = |text: &Text| roles.of(&text.layer, text.look).label;
    let finite = |text: &Text| text.place.x.is_finite() && text.place.y.is_finite();
    let seen = drawing.texts.iter().filter(|text| {
        let label = label(text);
        !hidden.contains(text.layer.as_str()) && (label.heights || label.marks) && finite(text)
    });
    let seen: RTree<GeomWithData<[f64; 2], &Text>> = RTree::bulk_load(
        seen.map(|text| GeomWithData::new([text.place.x, text.place.y], text))
            .collect(),
    );
    for (at, text) in drawing.texts.iter().enumerate() {
        if !hidden.contains(text.layer.as_str()) || !finite(text) {
            continue;
        }
        let (own, far_m) = (label(text), reach * text.height_m);
        let beside = seen
            .locate_within_distance([text.place.x, text.place.y], far_m * far_m)
            .map(|found| found.data)
            .filter(|other| distance_m(other.place, text.place) <= far_m)
            .map(label)
            .any(|other| (own.heights && other.heights) || (own.marks && other.marks));
        if beside {
            texts.insert(at);
            *of_layer.entry(&text.layer).or_default() += 1;
        }
    }
    let findings = of_layer.into_iter().map(|(layer, count)| {
        let words = if count == 1 {
            "label stands on it beside a visible one of its kind and was"
        } else {
            "labels stand on it beside visible ones of their kind and were"
        };
        Finding::new(
            &LAYER_HIDDEN,
            Level::Warning,
            format!("layer {layer} is hidden: {count} {words} left out, since what is seen holds"),
            "show the layer and take the other labels away if the hidden ones are current; else delete them",
        )
    });
    let findings = findings.collect();
    (texts, findings)
}
