//! What lies on which layer: the job's patterns turned into roles.

use std::collections::{BTreeMap, BTreeSet};

use geo::Coord;

use super::rules::{HATCH_UNREAD, LAYER_HIDDEN};
use super::types::Run;
use crate::drawing::{Drawing, Look, Shape};
use crate::finding::{Finding, Level};
use crate::job::Conventions;
use crate::patterns::{Names, Selectors};

/// What a layer may hold; a layer may serve more than one purpose.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq)]
pub(super) struct Role {
    pub(super) run: Option<Way>,
    /// Symbols at the ends of tendons.
    pub(super) ends: bool,
    pub(super) label: Labels,
    pub(super) ground: Ground,
    /// Lines across groups of tendons.
    pub(super) extents: bool,
}

/// How a tendon's run is told.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub(super) enum Way {
    /// By its layer.
    Run(Run),
    /// By its direction.
    ByDirection,
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
    /// Slab edge and zones: an outline inside another is a zone.
    Slab,
}

/// The roles of a drawing's layers.
pub(super) struct Roles {
    by_layer: BTreeMap<String, Role>,
    /// Roles of what lies on layers for which some pattern asks for a colour or a linetype.
    by_look: BTreeMap<String, BTreeMap<Look, Role>>,
}

impl Roles {
    /// Looks every layer of the drawing up in the job's patterns.
    pub(super) fn new(drawing: &Drawing, conventions: &Conventions) -> Self {
        let layers = &conventions.layers;
        let sets = [
            &layers.banded,
            &layers.distributed,
            &layers.tendons,
            &layers.heights,
            &layers.level_lines,
            &layers.marks,
            &layers.ends,
            &layers.slab_edge,
            &layers.slab_opening,
            &layers.slab_zone,
            &layers.column,
            &layers.extents,
        ]
        .map(|patterns| selectors(patterns));
        let mut roles = Self {
            by_layer: BTreeMap::new(),
            by_look: BTreeMap::new(),
        };
        for layer in &drawing.layers {
            roles.learn(&sets, drawing, &layer.name, Look::default());
        }
        for shape in &drawing.shapes {
            roles.learn(&sets, drawing, &shape.layer, shape.look);
        }
        for text in &drawing.texts {
            roles.learn(&sets, drawing, &text.layer, text.look);
        }
        roles
    }

    fn learn(&mut self, sets: &[Selectors; 12], drawing: &Drawing, layer: &str, look: Look) {
        if let Some(looks) = self.by_look.get_mut(layer) {
            looks
                .entry(look)
                .or_insert_with(|| role(sets, layer, look.colour, drawing.linetype(look)));
        } else if !self.by_layer.contains_key(layer) {
            let seen = role(sets, layer, look.colour, drawing.linetype(look));
            if sets.iter().any(|set| set.asks_more(layer)) {
                let looks = BTreeMap::from([(look, seen)]);
                self.by_look.insert(layer.to_owned(), looks);
            } else {
                self.by_layer.insert(layer.to_owned(), seen);
            }
        }
    }

    /// The role of what lies on a layer and is seen so.
    pub(super) fn of(&self, layer: &str, look: Look) -> Role {
        let plain = self.by_layer.get(layer);
        let seen = || self.by_look.get(layer).and_then(|looks| looks.get(&look));
        plain.or_else(seen).copied().unwrap_or_default()
    }

    /// One finding for each hidden layer that holds what was read.
    pub(super) fn hidden(&self, drawing: &Drawing) -> Vec<Finding> {
        let mut findings = Vec::new();
        for layer in drawing.layers.iter().filter(|l| l.off || l.frozen) {
            let shapes = drawing
                .shapes
                .iter()
                .filter(|s| s.layer == layer.name)
                .map(|s| self.of(&s.layer, s.look))
                .filter(|role| role.run.is_some() || role.label.level_lines)
                .count();
            let texts = drawing
                .texts
                .iter()
                .filter(|t| t.layer == layer.name)
                .filter(|t| self.of(&t.layer, t.look).label != Labels::default())
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

    /// One finding for each layer of outlines on which there are hatches and nothing else that is read.
    pub(super) fn hatched(&self, drawing: &Drawing) -> Vec<Finding> {
        let drawn: BTreeSet<&str> = drawing.shapes.iter().map(|s| s.layer.as_str()).collect();
        let mut findings = Vec::new();
        for layer in &drawing.layers {
            let hatches = layer.counts.iter().find(|(kind, _)| kind == "HATCH");
            let Some((_, count)) = hatches.filter(|_| !drawn.contains(layer.name.as_str())) else {
                continue;
            };
            let what = match self.of(&layer.name, Look::default()).ground {
                Ground::Nothing => continue,
                Ground::Edge => "slab edges",
                Ground::Opening => "openings",
                Ground::Zone => "zones",
                Ground::Slab => "slab edges and zones",
                Ground::Column => "columns",
            };
            findings.push(Finding::new(
                &HATCH_UNREAD,
                Level::Warning,
                format!(
                    "layer {} holds {count} hatches and no line: no {what} were read from it; expected closed lines",
                    layer.name
                ),
                "draw the outlines of the hatches as closed polylines on that layer",
            ));
        }
        findings.sort_by(|a, b| a.text.cmp(&b.text));
        findings
    }
}

fn role(sets: &[Selectors; 12], layer: &str, colour: Option<u8>, linetype: &str) -> Role {
    let [
        banded,
        distributed,
        tendons,
        heights,
        levels,
        marks,
        ends,
        edge,
        opening,
        zone,
        column,
        extents,
    ] = sets
        .each_ref()
        .map(|set| set.picks(layer, colour, linetype));
    let run = if banded {
        Some(Way::Run(Run::Banded))
    } else if distributed {
        Some(Way::Run(Run::Distributed))
    } else if tendons {
        Some(Way::ByDirection)
    } else {
        None
    };
    let ground = if opening {
        Ground::Opening
    } else if zone && edge {
        Ground::Slab
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
        ends,
        label: Labels {
            heights,
            level_lines: levels,
            marks,
        },
        ground,
        extents,
    }
}

/// Whether a shape lies somewhere and has a length.
pub(super) fn sound(shape: &Shape) -> bool {
    let finite =
        |place: Option<Coord<f64>>| place.is_some_and(|p| p.x.is_finite() && p.y.is_finite());
    let path = &shape.path;
    path.length_m().is_finite() && finite(path.start()) && finite(path.end())
}

/// A job's patterns of layers; one that is none was refused where the job was read, and then none picks anything here.
fn selectors(patterns: &[String]) -> Selectors {
    Selectors::new(patterns).unwrap_or_default()
}

/// A job's patterns of names, likewise.
pub(super) fn names(patterns: &[String]) -> Names {
    Names::new(patterns).unwrap_or_default()
}
