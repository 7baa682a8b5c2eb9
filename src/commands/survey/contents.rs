//! What a drawing holds, counted: by layer, and by colour and linetype where these differ on a layer.

use std::collections::BTreeMap;

use super::at_ends::AtEnds;
use super::grids::Grids;
use super::held::Held;
use super::readings::reading;
use crate::drawing::{Drawing, Look, ShapeKind};
use crate::job::Job;

/// What a drawing holds.
#[derive(Debug, Default)]
pub(super) struct Contents {
    /// By layer.
    pub(super) layers: BTreeMap<String, Held>,
    /// By layer, then by look.
    pub(super) looks: BTreeMap<String, BTreeMap<Look, Held>>,
    /// What stands at line ends.
    pub(super) at_ends: AtEnds,
    /// Grid lines: no tendons, and their names are no heights.
    pub(super) grids: Grids,
}

impl Contents {
    /// Counts what a drawing holds; texts are read by the job's patterns.
    pub(super) fn of(drawing: &Drawing, job: &Job) -> Self {
        let grids = Grids::of(drawing);
        let mut contents = Self {
            at_ends: AtEnds::of(drawing, job, &grids),
            grids,
            ..Self::default()
        };
        for (number, shape) in drawing.shapes.iter().enumerate() {
            if contents.grids.draw(number, shape) {
                contents.held(&shape.layer, shape.look).of_grid += 1;
                continue;
            }
            if shape.kind == ShapeKind::Solid || contents.at_ends.draws(drawing, shape) {
                continue;
            }
            let marked = contents.at_ends.marked.get(&number).copied().unwrap_or(0);
            let held = contents.held(&shape.layer, shape.look);
            if shape.closed {
                held.closed_m.push(shape.path.length_m());
                continue;
            }
            held.open_m.push(shape.path.length_m());
            held.ends_marked += marked;
            if let (Some(start), Some(end)) = (shape.path.start(), shape.path.end()) {
                held.spans.push([start, end]);
            }
        }
        for (number, text) in drawing.texts.iter().enumerate() {
            if contents.grids.write(number, text) {
                contents.held(&text.layer, text.look).of_grid += 1;
                continue;
            }
            let said = reading(&text.content, job);
            let held = contents.held(&text.layer, text.look);
            held.take(text, said, job);
        }
        let at_ends: Vec<usize> = contents.at_ends.insert_layers.keys().copied().collect();
        for insert in at_ends.iter().filter_map(|&at| drawing.inserts.get(at)) {
            contents.held(&insert.layer, insert.look).blocks_at_ends += 1;
        }
        for (layer, looks) in &contents.looks {
            let mut whole = Held::default();
            for held in looks.values() {
                whole.add(held);
            }
            contents.layers.insert(layer.clone(), whole);
        }
        let looks = contents.looks.values_mut().flat_map(BTreeMap::values_mut);
        contents
            .layers
            .values_mut()
            .chain(looks)
            .for_each(Held::settle);
        contents
    }

    fn held(&mut self, layer: &str, look: Look) -> &mut Held {
        let looks = self.looks.entry(layer.to_owned()).or_default();
        looks.entry(look).or_default()
    }
}
