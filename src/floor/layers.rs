//! What lies on which layer: the job's patterns turned into roles.

use std::collections::BTreeMap;

use geo::Coord;

use super::rules::LAYER_HIDDEN;
use super::types::Run;
use crate::drawing::{Drawing, Shape};
use crate::finding::{Finding, Level};
use crate::job::Conventions;
use crate::patterns::Patterns;

/// What a layer may hold; a layer may serve more than one purpose.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq)]
pub(super) struct Role {
    pub(super) run: Option<Run>,
    pub(super) label: Labels,
    pub(super) ground: Ground,
}

/// Labels that a layer may hold.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq)]
pub(super) struct Labels {
    pub(super) heights: bool,
    pub(super) level_lines: bool,
    pub(super) marks: bool,
}

/// The slab's parts that a layer may hold.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq)]
pub(super) enum Ground {
    /// None of them.
    #[default]
    Nothing,
    /// Slab edge.
    Edge,
    /// Openings.
    Opening,
    /// Zones.
    Zone,
    /// Columns and walls.
    Column,
}

/// The roles of a drawing's layers.
pub(super) struct Roles(BTreeMap<String, Role>);

impl Roles {
    /// Looks every layer of the drawing up in the job's patterns.
    pub(super) fn new(drawing: &Drawing, conventions: &Conventions) -> Self {
        let layers = &conventions.layers;
        let sets = [
            set(&layers.banded),
            set(&layers.distributed),
            set(&layers.heights),
            set(&layers.level_lines),
            set(&layers.marks),
            set(&layers.slab_edge),
            set(&layers.slab_opening),
            set(&layers.slab_zone),
            set(&layers.column),
        ];
        let named = drawing.layers.iter().map(|layer| &layer.name);
        let used = drawing.shapes.iter().map(|shape| &shape.layer);
        let lettered = drawing.texts.iter().map(|text| &text.layer);
        let mut roles = BTreeMap::new();
        for name in named.chain(used).chain(lettered) {
            if !roles.contains_key(name) {
                roles.insert(name.clone(), role(&sets, name));
            }
        }
        Self(roles)
    }

    /// The role of a layer.
    pub(super) fn of(&self, layer: &str) -> Role {
        self.0.get(layer).copied().unwrap_or_default()
    }

    /// One finding for each hidden layer that holds what was read.
    pub(super) fn hidden(&self, drawing: &Drawing) -> Vec<Finding> {
        let mut findings = Vec::new();
        for layer in drawing.layers.iter().filter(|l| l.off || l.frozen) {
            let role = self.of(&layer.name);
            let labels = role.label != Labels::default();
            let shapes = drawing
                .shapes
                .iter()
                .filter(|s| s.layer == layer.name && (role.run.is_some() || role.label.level_lines))
                .count();
            let texts = drawing
                .texts
                .iter()
                .filter(|t| t.layer == layer.name && labels)
                .count();
            if shapes + texts > 0 {
                let state = if layer.frozen { "frozen" } else { "off" };
                findings.push(Finding::new(
                    &LAYER_HIDDEN,
                    Level::Warning,
                    format!(
                        "layer {} is {state} and holds {shapes} lines and {texts} texts that were read as tendons and labels",
                        layer.name
                    ),
                    "thaw and switch on the layer if it is current; else delete it or take it out of the job's layer patterns",
                ));
            }
        }
        findings.sort_by(|a, b| a.text.cmp(&b.text));
        findings
    }
}

fn role(sets: &[Patterns; 9], name: &str) -> Role {
    let [
        banded,
        distributed,
        heights,
        levels,
        marks,
        edge,
        opening,
        zone,
        column,
    ] = sets.each_ref().map(|set| set.fit(name));
    let run = if banded {
        Some(Run::Banded)
    } else if distributed {
        Some(Run::Distributed)
    } else {
        None
    };
    let ground = if opening {
        Ground::Opening
    } else if zone {
        Ground::Zone
    } else if column {
        Ground::Column
    } else if edge {
        Ground::Edge
    } else {
        Ground::Nothing
    };
    Role {
        run,
        label: Labels {
            heights,
            level_lines: levels,
            marks,
        },
        ground,
    }
}

/// Whether a shape lies somewhere and has a length.
pub(super) fn sound(shape: &Shape) -> bool {
    let finite =
        |place: Option<Coord<f64>>| place.is_some_and(|p| p.x.is_finite() && p.y.is_finite());
    let path = &shape.path;
    path.length_m().is_finite() && finite(path.start()) && finite(path.end())
}

/// Names by the job's patterns; broken ones were refused where the job was read, and fit nothing here.
pub(super) fn set(patterns: &[String]) -> Patterns {
    Patterns::new(patterns).unwrap_or_default()
}
