//! Live and dead end symbols matched to ends, one to one.

use std::collections::BTreeSet;

use geo::Coord;
use rstar::RTree;
use rstar::primitives::GeomWithData;

use super::layers::set;
use super::lines::Line;
use super::rules::{END_UNCLAIMED, END_UNKNOWN};
use super::settle::{Pairing, Settlement, Stakes};
use super::types::{End, EndKind};
use crate::drawing::{Drawing, Insert};
use crate::finding::{Finding, Level};
use crate::geometry::distance_m;
use crate::job::Conventions;
use crate::patterns::Patterns;

/// An end symbol on the plan.
#[derive(Debug, Clone)]
pub(super) struct Symbol<'a> {
    pub(super) kind: EndKind,
    pub(super) insert: &'a Insert,
}

/// Live and dead end blocks by name.
struct Blocks {
    live: Patterns,
    dead: Patterns,
}

impl Blocks {
    fn new(conventions: &Conventions) -> Self {
        Self {
            live: set(&conventions.live_end_blocks),
            dead: set(&conventions.dead_end_blocks),
        }
    }

    fn kind(&self, block: &str) -> Option<EndKind> {
        if self.live.fit(block) {
            Some(EndKind::Live)
        } else if self.dead.fit(block) {
            Some(EndKind::Dead)
        } else {
            None
        }
    }
}

/// Numbers of the shapes that end symbols consist of: those inside a symbol's own insert at any depth, not those beside
/// it in a block that holds both.
pub(super) fn shapes(drawing: &Drawing, conventions: &Conventions) -> BTreeSet<usize> {
    let blocks = Blocks::new(conventions);
    let mut in_symbol: Vec<bool> = Vec::with_capacity(drawing.inserts.len());
    for insert in &drawing.inserts {
        let outer = insert
            .within
            .and_then(|outer| in_symbol.get(outer).copied());
        in_symbol.push(outer == Some(true) || blocks.kind(&insert.block).is_some());
    }
    let shapes = drawing.shapes.iter().enumerate();
    shapes
        .filter(|(_, shape)| {
            let within = shape.within.and_then(|insert| in_symbol.get(insert));
            within == Some(&true)
        })
        .map(|(at, _)| at)
        .collect()
}

/// Symbols by block name, whatever their layer, in an order that their places decide.
pub(super) fn symbols<'a>(drawing: &'a Drawing, conventions: &Conventions) -> Vec<Symbol<'a>> {
    let blocks = Blocks::new(conventions);
    let mut symbols: Vec<Symbol<'a>> = drawing
        .inserts
        .iter()
        .filter(|insert| insert.place.x.is_finite() && insert.place.y.is_finite())
        .filter_map(|insert| {
            let kind = blocks.kind(&insert.block)?;
            Some(Symbol { kind, insert })
        })
        .collect();
    symbols.sort_by(|a, b| {
        let (a, b) = (a.insert, b.insert);
        a.place
            .x
            .total_cmp(&b.place.x)
            .then(a.place.y.total_cmp(&b.place.y))
            .then_with(|| a.block.cmp(&b.block))
            .then_with(|| a.handle.cmp(&b.handle))
    });
    symbols
}

/// Each line's two ends; findings for symbols without an end. Ends without a symbol are told by [`unknown`].
pub(super) fn ends(
    lines: &[Line],
    symbols: &[Symbol<'_>],
    reach_m: f64,
) -> (Vec<[End; 2]>, Vec<Finding>) {
    let places: Vec<Coord<f64>> = lines
        .iter()
        .flat_map(|line| [line.path.start(), line.path.end()].map(Option::unwrap_or_default))
        .collect();
    let tree = RTree::bulk_load(
        places
            .iter()
            .enumerate()
            .map(|(at, place)| GeomWithData::new([place.x, place.y], at))
            .collect(),
    );
    let mut pairings = Vec::new();
    let mut costs = Vec::new();
    for (label, symbol) in symbols.iter().enumerate() {
        let place = symbol.insert.place;
        let mut near: Vec<usize> = tree
            .locate_within_distance([place.x, place.y], reach_m * reach_m)
            .map(|found| found.data)
            .collect();
        near.sort_unstable();
        for host in near {
            pairings.push(Pairing {
                label,
                host,
                station_m: 0.0,
            });
            // Squared, so that of two ways to match a pair of ends the one without a long reach is the cheaper.
            let share = distance_m(places[host], place) / reach_m.max(1e-9);
            costs.push(4.0 * share * share);
        }
    }
    let stakes = OneEach(costs);
    let taken = Settlement::new(&pairings, symbols.len(), places.len(), &stakes, &[]).settle();
    let mut kinds = vec![None; places.len()];
    let mut findings = Vec::new();
    for (symbol, taken) in symbols.iter().zip(taken) {
        match taken {
            Some(pairing) => kinds[pairings[pairing].host] = Some(symbol.kind),
            None => findings.push(unclaimed(symbol, reach_m)),
        }
    }
    let ends = places
        .chunks(2)
        .zip(kinds.chunks(2))
        .map(|(places, kinds)| {
            [0, 1].map(|end| End {
                kind: kinds[end],
                place: places[end],
            })
        });
    (ends.collect(), findings)
}

/// One finding for each end of a tendon that has no symbol.
pub(super) fn unknown(mark: &str, ends: &[End; 2], length_m: f64, reach_m: f64) -> Vec<Finding> {
    ends.iter()
        .zip([0.0, length_m])
        .filter(|(end, _)| end.kind.is_none())
        .map(|(end, station_m)| {
            Finding::new(
                &END_UNKNOWN,
                Level::Error,
                format!("no end symbol lies within {reach_m:.2} m of this end; expected a live or a dead end"),
                "insert the live or dead end block at the end, or name the office's blocks in the job file",
            )
            .on_tendon(mark)
            .at_station(station_m)
            .at_place(end.place)
        })
        .collect()
}

fn unclaimed(symbol: &Symbol<'_>, reach_m: f64) -> Finding {
    let kind = match symbol.kind {
        EndKind::Live => "live",
        EndKind::Dead => "dead",
    };
    Finding::new(
        &END_UNCLAIMED,
        Level::Warning,
        format!(
            "{kind} end symbol {} ({}) is not the nearest to any tendon's end within {reach_m:.2} m",
            symbol.insert.handle, symbol.insert.block
        ),
        "move the symbol to its tendon's end, or delete it",
    )
    .at_place(symbol.insert.place)
}

/// An end takes one symbol.
struct OneEach(Vec<f64>);

impl Stakes for OneEach {
    fn own(&self, pairing: usize) -> f64 {
        self.0[pairing]
    }

    fn shared(&self, _: usize, pairings: &[usize]) -> f64 {
        let extra = u32::try_from(pairings.len().saturating_sub(1)).unwrap_or(u32::MAX);
        10.0 * f64::from(extra)
    }

    fn apart_m(&self) -> f64 {
        f64::INFINITY
    }
}
